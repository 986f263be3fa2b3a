/**
 * From a building before and after to the edit that leads from one to the other, one entity at a time. The
 * functions of this folder say what the building becomes; what has to change, and in which order, is found
 * here once: what is referred to comes before what refers to it and goes after it, so that every step of the
 * edit, and of its reverse, can be stored with its references whole. Rounds are no part of a description and
 * are left alone. What is in both keeps its order: a change cannot move an entity within its list.
 */
import type { Building, FrameLine } from '../building.ts'
import type { BuildingHead, Change, Edit } from '../changes.ts'

interface Entity {
  id: string
}

/** The edit that makes `before` into `after`. */
export function editOf(what: string, before: Building, after: Building): Edit {
  const changes: Change[] = []
  const heads = [headOf(before), headOf(after)] as const
  if (!same(...heads)) changes.push({ kind: 'head', before: heads[0], after: heads[1] })
  const criteria = [before.criteria ?? null, after.criteria ?? null] as const
  if (!same(...criteria)) changes.push({ kind: 'criteria', before: criteria[0], after: criteria[1] })

  const lists = listsOf(before, after)
  for (const list of lists) changes.push(...list.put)
  for (const list of lists.reverse()) changes.push(...list.taken)
  return { what, changes }
}

/** The description's head alone, without the keys that hold nothing. */
export function headOf(building: Building): BuildingHead {
  const { name, reference, client, address, notes } = building
  return filled({ name, reference, client, address, notes })
}

/** A copy without the keys that are undefined, which a file does not have. */
export function filled<T extends object>(value: T): T {
  return Object.fromEntries(Object.entries(value).filter(([, v]) => v !== undefined)) as T
}

/** Whether two values of a building file say the same, whatever the order of their keys. */
export function same(a: unknown, b: unknown): boolean {
  if (a === b) return true
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return false
  if (Array.isArray(a) !== Array.isArray(b)) return false
  const keys = new Set([...Object.keys(a), ...Object.keys(b)])
  return [...keys].every((key) => same(a[key as keyof typeof a], b[key as keyof typeof b]))
}

interface Steps {
  put: Change[]
  taken: Change[]
}

/** Every list of the description, what is referred to before what refers to it. */
function listsOf(before: Building, after: Building): Steps[] {
  const lines = linePairs(before, after)
  return [
    steps(before.sections, after.sections, (change) => ({ kind: 'section', ...change })),
    steps(before.supports, after.supports, (change) => ({ kind: 'support', ...change })),
    steps(before.survey.points, after.survey.points, (change) => ({ kind: 'point', ...change })),
    steps(before.frame_lines.map(nameOf), after.frame_lines.map(nameOf), (change) => ({ kind: 'line', ...change })),
    ...lines.map(([line, b, a]) =>
      steps(b?.nodes ?? [], a?.nodes ?? [], (change) => ({ kind: 'node', line, ...change })),
    ),
    ...lines.map(([line, b, a]) =>
      steps(b?.members ?? [], a?.members ?? [], (change) => ({ kind: 'member', line, ...change })),
    ),
  ]
}

function nameOf({ id }: FrameLine): Pick<FrameLine, 'id'> {
  return { id }
}

function linePairs(before: Building, after: Building): Array<[string, FrameLine | undefined, FrameLine | undefined]> {
  const ids = new Set([...before.frame_lines, ...after.frame_lines].map((line) => line.id))
  return [...ids].map((id) => [
    id,
    before.frame_lines.find((line) => line.id === id),
    after.frame_lines.find((line) => line.id === id),
  ])
}

/** What is put (new and altered, in the list's order) and what is then taken away, of one list. */
function steps<T extends Entity>(
  before: readonly T[],
  after: readonly T[],
  change: (entity: { id: string; at?: number; before: T | null; after: T | null }) => Change,
): Steps {
  const old = new Map(before.map((entity) => [entity.id, entity]))
  const kept = new Set(after.map((entity) => entity.id))
  const order = before.map((entity) => entity.id)
  const put: Change[] = []
  let previous = -1
  for (const entity of after) {
    const was = old.get(entity.id)
    if (was) {
      if (!same(was, entity)) put.push(change({ id: entity.id, before: was, after: entity }))
      previous = order.indexOf(entity.id)
    } else {
      previous += 1
      const at = previous < order.length ? { at: previous } : {}
      put.push(change({ id: entity.id, ...at, before: null, after: entity }))
      order.splice(previous, 0, entity.id)
    }
  }
  const taken: Change[] = []
  for (const entity of before) {
    if (kept.has(entity.id)) continue
    const at = order.indexOf(entity.id)
    taken.push(change({ id: entity.id, at, before: entity, after: null }))
    order.splice(at, 1)
  }
  return { put, taken }
}
