/** What SQLite and the file system refuse, as faults; an error that is not the world's is thrown on as it is. */
import Database from 'better-sqlite3'
import { Fault, type FaultCode } from '../app/model/faults.ts'

export type Doing = 'reading' | 'writing'

const CODES: readonly (readonly [start: string, code: FaultCode])[] = [
  ['SQLITE_BUSY', 'file.busy'],
  ['SQLITE_LOCKED', 'file.busy'],
  ['SQLITE_FULL', 'disk.full'],
  ['SQLITE_NOTADB', 'project.damaged'],
  ['SQLITE_CORRUPT', 'project.damaged'],
  ['SQLITE_READONLY', 'file.unwritable'],
  ['SQLITE_PERM', 'file.unwritable'],
]
/** What these are of depends on what was being done. */
const ACCESS = ['SQLITE_CANTOPEN', 'SQLITE_IOERR', 'SQLITE_AUTH']

function codeOf(reason: string, doing: Doing): FaultCode | undefined {
  const unusable = doing === 'reading' ? 'file.unreadable' : 'file.unwritable'
  if (reason === 'ENOSPC' || reason === 'EDQUOT') return 'disk.full'
  if (/^E[A-Z0-9]+$/.test(reason)) return unusable
  if (ACCESS.some((start) => reason.startsWith(start))) return unusable
  return CODES.find(([start]) => reason.startsWith(start))?.[1]
}

/** The error as a fault of that file, where it is one of SQLite or of the system. */
export function fileFault(error: unknown, file: string, doing: Doing): unknown {
  if (!(error instanceof Error) || error instanceof Fault) return error
  const isOfSystem = error instanceof Database.SqliteError || 'syscall' in error
  const reason = (error as { code?: string }).code
  const code = isOfSystem && reason !== undefined ? codeOf(reason, doing) : undefined
  return code ? new Fault(code, { file, detail: { reason: reason! } }, { cause: error }) : error
}

/** Runs, and turns what SQLite or the system refuses into a fault of that file. */
export function onFile<T>(file: string, doing: Doing, run: () => T): T {
  try {
    return run()
  } catch (error) {
    throw fileFault(error, file, doing)
  }
}
