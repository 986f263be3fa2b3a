/**
 * Changes of the description as rows: each entity keeps its place in its list, so that what is taken back stands
 * where it stood. Gives each change back with what it found, which is what makes its reverse exact.
 */
import type { Change } from '../app/model/changes.ts'
import { Fault } from '../app/model/faults.ts'
import { prepared, type WriteDb } from './connection.ts'
import {
  COLUMNS,
  memberOf,
  memberRow,
  nodeOf,
  nodeRow,
  pointOf,
  pointRow,
  sectionOf,
  sectionRow,
  supportOf,
  supportRow,
  type Row,
} from './rows.ts'

type EntityChange = Exclude<Change, { kind: 'head' | 'criteria' }>
type Kind = EntityChange['kind']

const TABLE: Record<Kind, keyof typeof COLUMNS> = {
  support: 'support',
  section: 'section',
  line: 'frame_line',
  node: 'node',
  member: 'member',
  point: 'point',
}

const TO_ROW: Record<Kind, (entity: never) => Row> = {
  support: supportRow,
  section: sectionRow,
  line: ({ id }: { id: string }) => ({ id }),
  node: nodeRow,
  member: memberRow,
  point: pointRow,
}

const FROM_ROW: Record<Kind, (row: Row) => unknown> = {
  support: supportOf,
  section: sectionOf,
  line: ({ id }) => ({ id }),
  node: nodeOf,
  member: memberOf,
  point: pointOf,
}

/** Applies one change; gives it back with the entity and the place found. */
export function applyChange(db: WriteDb, change: Change): Change {
  if (change.kind === 'head') return applyHead(db, change)
  if (change.kind === 'criteria') {
    const { criteria } = db.prepare('SELECT criteria FROM project').get() as { criteria: string | null }
    db.prepare('UPDATE project SET criteria = ?').run(change.after === null ? null : JSON.stringify(change.after))
    return { ...change, before: criteria === null ? null : (JSON.parse(criteria) as typeof change.before) }
  }
  return applyEntity(db, change)
}

function applyHead(db: WriteDb, change: Extract<Change, { kind: 'head' }>): Change {
  const row = db.prepare('SELECT name, reference, client, address, notes FROM project').get() as Row
  const { name, reference, client, address, notes } = change.after
  db.prepare('UPDATE project SET name = ?, reference = ?, client = ?, address = ?, notes = ?').run(
    name,
    reference ?? null,
    client ?? null,
    address ?? null,
    notes ?? null,
  )
  const before = Object.fromEntries(Object.entries(row).filter(([, value]) => value !== null))
  return { ...change, before: before as unknown as typeof change.before }
}

function applyEntity(db: WriteDb, change: EntityChange): Change {
  const table = TABLE[change.kind]
  const line = 'line' in change ? change.line : undefined
  const scope = line === undefined ? '' : 'line = @line AND '
  const found = prepared(db, `SELECT ${COLUMNS[table]} FROM ${table} WHERE ${scope} id = @id`).get({
    line,
    id: change.id,
  })
  const before = found === undefined ? null : FROM_ROW[change.kind](found as Row)

  if (change.after === null) {
    if (found === undefined) throw unfit(change)
    const { place } = prepared(db, `SELECT place FROM ${table} WHERE ${scope} id = @id`).get({
      line,
      id: change.id,
    }) as {
      place: number
    }
    prepared(db, `DELETE FROM ${table} WHERE ${scope} id = @id`).run({ line, id: change.id })
    prepared(db, `UPDATE ${table} SET place = place - 1 WHERE ${scope} place > @place`).run({ line, place })
    return { ...change, at: place, before } as Change
  }
  if (found !== undefined) {
    const columns = TO_ROW[change.kind](change.after as never)
    const sets = Object.keys(columns).map((name) => `${name} = @${name}`)
    prepared(db, `UPDATE ${table} SET ${sets.join(', ')} WHERE ${scope} id = @id`).run({ ...columns, line })
    return { ...change, before } as Change
  }
  const all = line === undefined ? '' : 'WHERE line = @line'
  const { count } = prepared(db, `SELECT count(*) AS count FROM ${table} ${all}`).get({ line }) as { count: number }
  const place = Math.min(Math.max(change.at ?? count, 0), count)
  prepared(db, `UPDATE ${table} SET place = place + 1 WHERE ${scope} place >= @place`).run({ line, place })
  insert(db, change.kind, change.after, place, line)
  return { ...change, at: place, before: null } as Change
}

/** A new entity at a place that is free. */
export function insert(db: WriteDb, kind: Kind, entity: unknown, place: number, line?: string): void {
  const columns: Row = { ...TO_ROW[kind](entity as never), place, ...(line === undefined ? {} : { line }) }
  const names = Object.keys(columns)
  prepared(
    db,
    `INSERT INTO ${TABLE[kind]} (${names.join(', ')}) VALUES (${names.map((name) => `@${name}`).join(', ')})`,
  ).run(columns)
}

function unfit(change: EntityChange): Fault {
  return new Fault('change.unfit', { value: change.id, path: change.kind })
}

/** The changes that take these back: last first, before and after exchanged. */
export function reversed(changes: readonly Change[]): Change[] {
  return changes.toReversed().map((change) => ({ ...change, before: change.after, after: change.before }) as Change)
}
