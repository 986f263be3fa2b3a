/** What SQLite refuses, as faults; an error that is not the world's is thrown on as it is. */
import Database from 'better-sqlite3'
import { Fault, type FaultCode } from '../app/model/faults.ts'

const CODES: readonly (readonly [start: string, code: FaultCode])[] = [
  ['SQLITE_BUSY', 'file.busy'],
  ['SQLITE_LOCKED', 'file.busy'],
  ['SQLITE_FULL', 'disk.full'],
  ['SQLITE_NOTADB', 'project.foreign'],
  ['SQLITE_CORRUPT', 'project.damaged'],
  ['SQLITE_READONLY', 'file.unwritable'],
  ['SQLITE_PERM', 'file.unwritable'],
  ['SQLITE_CANTOPEN', 'file.unreadable'],
  ['SQLITE_IOERR', 'file.unreadable'],
]

export function sqliteFault(error: unknown, file: string): unknown {
  if (!(error instanceof Database.SqliteError)) return error
  const known = CODES.find(([start]) => error.code.startsWith(start))
  return known ? new Fault(known[1], { file, detail: { reason: error.code } }, { cause: error }) : error
}

/** Runs, and turns what SQLite refuses into a fault of that file. */
export function onFile<T>(file: string, run: () => T): T {
  try {
    return run()
  } catch (error) {
    throw sqliteFault(error, file)
  }
}
