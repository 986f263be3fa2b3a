/** What a file is, found out before anything is written to it: none of ours, newer, damaged, or a project. */
import { accessSync, closeSync, constants, openSync, readSync, statSync } from 'node:fs'
import { dirname } from 'node:path'
import Database from 'better-sqlite3'
import { Fault } from '../app/model/faults.ts'
import { APPLICATION_ID, type Connection } from './connection.ts'
import { copiesFolder, copiesOf } from './copies.ts'
import { LATEST, schemaOf } from './migrate.ts'

const HEAD = 'SQLite format 3\0'
const HEAD_BYTES = 100
const APPLICATION_ID_AT = 68

/** What the first bytes tell, before SQLite is asked. */
export function refuseForeign(path: string): void {
  const stat = statSync(path, { throwIfNoEntry: false })
  if (!stat) throw new Fault('file.missing', { file: path })
  if (stat.isDirectory()) throw new Fault('file.folder', { file: path })
  if (!stat.isFile()) throw new Fault('project.foreign', { file: path })
  if (stat.size === 0) throw new Fault('file.empty', { file: path })
  const bytes = firstBytes(path)
  const text = bytes.toString('latin1')
  if (!text.startsWith(HEAD)) {
    const isBuilding = /^[\s\u00ef\u00bb\u00bf]*\{/.test(text)
    throw new Fault('project.foreign', { file: path, detail: isBuilding ? { isBuilding: 'yes' } : {} })
  }
  if (stat.size < HEAD_BYTES) throw damaged(path, 'it ends in its first line')
  if (bytes.readUInt32BE(APPLICATION_ID_AT) !== APPLICATION_ID) throw new Fault('project.foreign', { file: path })
}

function firstBytes(path: string): Buffer {
  const bytes = Buffer.alloc(HEAD_BYTES)
  const handle = openSync(path, 'r')
  try {
    readSync(handle, bytes, 0, bytes.length, 0)
  } finally {
    closeSync(handle)
  }
  return bytes
}

/** Refuses a file of a newer version, and one with damage. */
export function refuseUnsound(db: Connection, path: string): void {
  const schema = schemaOf(db)
  if (schema > LATEST) throw new Fault('project.newer', { file: path, value: schema, detail: { known: LATEST } })
  const check = db.pragma('quick_check(1)', { simple: true })
  if (check !== 'ok') throw damaged(path, String(check))
}

/** Refuses a file that has lost the row that makes it a project. */
export function refuseHeadless(db: Connection, path: string): void {
  if (db.prepare('SELECT count(*) FROM project').pluck().get() !== 1) throw damaged(path, 'it names no building')
}

/** What SQLite says of a damaged file, told with the copies there are; any other error as it is. */
export function damageOf(error: unknown, path: string): unknown {
  if (!(error instanceof Database.SqliteError)) return error
  // A table or column that is not there is damage as well: the schema's number says that it should be.
  const isDamage = /^SQLITE_(CORRUPT|NOTADB)/.test(error.code) || error.code === 'SQLITE_ERROR'
  return isDamage ? damaged(path, error.message, error) : error
}

function damaged(path: string, reason: string, cause?: unknown): Fault {
  const detail: Record<string, string> = { reason }
  if (copiesOf(path).length) detail.copies = copiesFolder(path)
  return new Fault('project.damaged', { file: path, detail }, { cause })
}

/** Writing takes the folder as well: the rollback journal stands beside the file. */
export function isWritable(path: string): boolean {
  try {
    accessSync(path, constants.W_OK)
    accessSync(dirname(path), constants.W_OK)
    return true
  } catch {
    // Read-only media and files that others own are opened for reading.
    return false
  }
}
