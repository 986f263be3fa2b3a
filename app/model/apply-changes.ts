/**
 * Changes put into a building. Every change is held to what is there: it is applied whole or refused as
 * `change.unfit`, and what it does can be taken back exactly, down to the place of each entity in its list.
 */
import type { Building, FrameLine } from './building.ts'
import type { Change, Edit } from './changes.ts'
import { headOf, same } from './edits/difference.ts'
import { Fault, type ElementRef } from './faults.ts'

interface Entity {
  id: string
}

/** One entity's change within its list. */
interface Step<T extends Entity> {
  id: string
  at?: number
  before: T | null
  after: T | null
}

/** The building after the changes; what they do not touch is shared with the building before. */
export function applyChanges(building: Building, changes: readonly Change[]): Building {
  return changes.reduce(applyChange, building)
}

/** The edit that takes an edit back: last first, before and after exchanged. */
export function reverseEdit(edit: Edit): Edit {
  const changes = edit.changes.toReversed().map((change) => ({ ...change, before: change.after, after: change.before }))
  return { what: edit.what, changes: changes as Change[] }
}

function applyChange(building: Building, change: Change): Building {
  const { survey } = building
  switch (change.kind) {
    case 'head':
      return withHead(building, change)
    case 'criteria':
      return withCriteria(building, change)
    case 'support':
      return { ...building, supports: put(building.supports, change, refOf(change)) }
    case 'section':
      return { ...building, sections: put(building.sections, change, refOf(change)) }
    case 'point':
      return { ...building, survey: { ...survey, points: put(survey.points, change, refOf(change)) } }
    case 'line':
      return { ...building, frame_lines: putLine(building.frame_lines, change) }
    case 'node':
      return withLine(building, change, (line) => ({ ...line, nodes: put(line.nodes, change, refOf(change)) }))
    case 'member':
      return withLine(building, change, (line) => ({ ...line, members: put(line.members, change, refOf(change)) }))
  }
  // Changes come over a wire as well, where no compiler has looked at them.
  throw new Fault('request.malformed', { path: 'changes', value: (change as { kind: unknown }).kind })
}

function withHead(building: Building, change: Extract<Change, { kind: 'head' }>): Building {
  if (!same(headOf(building), change.before)) throw unfit({ kind: 'building', id: building.name })
  const { reference: _1, client: _2, address: _3, notes: _4, ...rest } = building
  const { format, version, name: _5, ...description } = rest
  return { format, version, ...change.after, ...description }
}

function withCriteria(building: Building, change: Extract<Change, { kind: 'criteria' }>): Building {
  const { criteria, ...rest } = building
  if (!same(criteria ?? null, change.before)) throw unfit({ kind: 'criteria', id: '' })
  return change.after === null ? rest : { ...rest, criteria: change.after }
}

/** A line comes and goes without its nodes and members, which are changes of their own. */
function putLine(lines: readonly FrameLine[], change: Extract<Change, { kind: 'line' }>): FrameLine[] {
  const own = lines.find((line) => line.id === change.id)
  const isEmpty = !own || (own.nodes.length === 0 && own.members.length === 0)
  if (change.after === null && !isEmpty) throw unfit(refOf(change))
  const found = own && { id: own.id }
  if (!same(found ?? null, change.before)) throw unfit(refOf(change))
  if (change.before !== null && change.after !== null)
    return lines.map((line) => (line === own ? { ...line, ...change.after } : line))
  const step = { id: change.id, at: change.at, before: own ?? null, after: change.after && emptyLine(change.after) }
  return put(lines, step, refOf(change))
}

function emptyLine({ id }: Entity): FrameLine {
  return { id, nodes: [], members: [] }
}

function withLine(building: Building, change: { line: string }, put: (line: FrameLine) => FrameLine): Building {
  if (!building.frame_lines.some((line) => line.id === change.line)) throw unfit({ kind: 'line', id: change.line })
  return {
    ...building,
    frame_lines: building.frame_lines.map((line) => (line.id === change.line ? put(line) : line)),
  }
}

function put<T extends Entity>(list: readonly T[], { id, at, before, after }: Step<T>, ref: ElementRef): T[] {
  const index = list.findIndex((entity) => entity.id === id)
  if (!same(list[index] ?? null, before) || (after !== null && after.id !== id)) throw unfit(ref)
  const rest = [...list]
  if (after === null) {
    if (index < 0 || (at !== undefined && at !== index)) throw unfit(ref)
    rest.splice(index, 1)
  } else if (index >= 0) rest[index] = after
  else rest.splice(placeFor(at, list.length, ref), 0, after)
  return rest
}

function placeFor(at: number | undefined, length: number, ref: ElementRef): number {
  if (at === undefined) return length
  if (!Number.isInteger(at) || at < 0 || at > length) throw unfit(ref)
  return at
}

function refOf(change: Extract<Change, { id: string }>): ElementRef {
  return 'line' in change
    ? { kind: change.kind, id: change.id, within: change.line }
    : { kind: change.kind, id: change.id }
}

function unfit(element: ElementRef): Fault {
  return new Fault('change.unfit', { element, value: element.id })
}
