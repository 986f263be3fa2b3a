/** The steps of the schema, by number; a file is brought up to date in one transaction or not at all. */
import { APPLICATION_ID, type Connection } from './connection.ts'
import { up as first } from './migrations/0010-first.ts'
import { up as replace } from './migrations/0020-replace.ts'
import { up as released } from './migrations/0030-released.ts'
import { up as collimation } from './migrations/0040-collimation.ts'

export interface Step {
  number: number
  up(db: Connection): void
}

export const STEPS: readonly Step[] = [
  { number: 10, up: first },
  { number: 20, up: replace },
  { number: 30, up: released },
  { number: 40, up: collimation },
]

/** The schema that this version writes. */
export const LATEST = STEPS.at(-1)!.number

export function schemaOf(db: Connection): number {
  return db.pragma('user_version', { simple: true }) as number
}

/** Brings a file from the schema it has to the latest; nothing is changed where a step fails. */
export function migrate(db: Connection, steps: readonly Step[] = STEPS): void {
  db.exec('BEGIN IMMEDIATE')
  try {
    // Asked inside: another program may have brought the file up to date while this one waited for it.
    const from = schemaOf(db)
    for (const step of steps) if (step.number > from) step.up(db)
    db.pragma(`application_id = ${APPLICATION_ID}`)
    db.pragma(`user_version = ${Math.max(from, steps.at(-1)!.number)}`)
    const open = db.pragma('foreign_key_check') as unknown[]
    if (open.length) throw new Error(`${open.length} references are open after the migration`)
    db.exec('COMMIT')
  } catch (error) {
    if (db.inTransaction) db.exec('ROLLBACK')
    throw error
  }
}
