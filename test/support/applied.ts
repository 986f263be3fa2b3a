/** Applies an edit's changes to a building in memory, holding every step to its references. For tests. */
import { isDeepStrictEqual } from 'node:util'
import type { Building } from '../../app/model/building.ts'
import type { Change } from '../../app/model/changes.ts'

/** The building after the changes. Throws where a change does not fit what is there or leaves a reference open. */
export function applied(building: Building, changes: readonly Change[]): Building {
  const next = structuredClone(building)
  for (const change of changes) {
    step(next, change)
    const open = openReferences(next)
    if (open.length) throw new Error(`${change.kind}: ${open.join('; ')}`)
  }
  return next
}

/** The changes that take these back: last first, before and after exchanged. */
export function reversed(changes: readonly Change[]): Change[] {
  return changes.toReversed().map((change) => ({ ...change, before: change.after, after: change.before }) as Change)
}

function step(building: Building, change: Change): void {
  if (change.kind === 'head') {
    for (const key of ['reference', 'client', 'address', 'notes'] as const) delete building[key]
    Object.assign(building, change.after)
  } else if (change.kind === 'criteria') {
    if (change.after) building.criteria = structuredClone(change.after)
    else delete building.criteria
  } else if (change.kind === 'line') {
    const own = building.frame_lines.find((line) => line.id === change.id)
    if (change.before && own && (own.nodes.length || own.members.length)) throw new Error('a line goes empty')
    put(
      building.frame_lines,
      { ...change, before: change.before && { ...change.before, nodes: [], members: [] } },
      change.after && { ...change.after, nodes: [], members: [] },
    )
  } else {
    put(listOf(building, change), change, change.after)
  }
}

function put(
  list: { id: string }[],
  change: { id: string; at?: number; before: unknown },
  after: { id: string } | null,
) {
  const index = list.findIndex((entity) => entity.id === change.id)
  if (change.before === null ? index >= 0 : !isDeepStrictEqual(list[index], change.before))
    throw new Error(`${change.id} is not as before`)
  if (!after) {
    if (change.at !== undefined && change.at !== index) throw new Error(`${change.id} stands at ${index}`)
    list.splice(index, 1)
  } else if (index >= 0) list[index] = structuredClone(after)
  else list.splice(change.at ?? list.length, 0, structuredClone(after))
}

function listOf(building: Building, change: Change): { id: string }[] {
  if (change.kind === 'support') return building.supports
  if (change.kind === 'section') return building.sections
  if (change.kind === 'point') return building.survey.points
  const line = building.frame_lines.find((l) => 'line' in change && l.id === change.line)
  if (!line) throw new Error('no such line')
  return change.kind === 'node' ? line.nodes : line.members
}

function openReferences(building: Building): string[] {
  const supports = new Set(building.supports.map((s) => s.id))
  const sections = new Set(building.sections.map((s) => s.id))
  const open: string[] = []
  for (const point of building.survey.points)
    if (point.kind === 'stud' && !supports.has(point.support)) open.push(`${point.id} on ${point.support}`)
  for (const line of building.frame_lines) {
    const nodes = new Set(line.nodes.map((n) => n.id))
    for (const node of line.nodes)
      if (node.support !== undefined && !supports.has(node.support)) open.push(`${node.id} on ${node.support}`)
    for (const m of line.members) {
      for (const end of [m.from, m.to]) if (!nodes.has(end)) open.push(`${m.id} to ${end}`)
      if (!sections.has(m.section)) open.push(`${m.id} of ${m.section}`)
    }
  }
  return open
}
