/**
 * A connection to a project file. Reading and writing connections are of different types although they are the same
 * object: only a transaction hands out one that writes. Rollback journal and full synchronisation, so that
 * one file is the whole project whenever it is closed, on a share or in a synced folder as well.
 */
import Database from 'better-sqlite3'

export type Connection = Database.Database

declare const reads: unique symbol
declare const writes: unique symbol
export type ReadDb = Connection & { readonly [reads]: true }
export type WriteDb = ReadDb & { readonly [writes]: true }

/** "LvSt", the project file's own mark in its header. */
export const APPLICATION_ID = 0x4c765374

/** How long to wait for another program to let go of the file. */
export const PATIENCE_MS = 2000

export interface ConnectOptions {
  readonly?: boolean
  mustExist?: boolean
  patience_ms?: number
}

export function connect(path: string, options: ConnectOptions = {}): Connection {
  const db = new Database(path, {
    readonly: options.readonly ?? false,
    fileMustExist: options.mustExist ?? true,
    timeout: options.patience_ms ?? PATIENCE_MS,
  })
  try {
    db.pragma('trusted_schema = OFF')
    db.pragma('foreign_keys = ON')
    if (!options.readonly) {
      db.pragma('journal_mode = DELETE')
      db.pragma('synchronous = FULL')
    }
    return db
  } catch (error) {
    db.close()
    throw error
  }
}

const statements = new WeakMap<Connection, Map<string, Database.Statement>>()

/** The statement of that SQL, prepared once a connection. */
export function prepared(db: Connection, sql: string): Database.Statement {
  let known = statements.get(db)
  if (!known) statements.set(db, (known = new Map()))
  let statement = known.get(sql)
  if (!statement) known.set(sql, (statement = db.prepare(sql)))
  return statement
}
