/**
 * Project files: made, opened and copied. A new file is made under another name and takes its own only when it is
 * whole; what is opened is looked at before anything is written to it, and a file of a newer version, of another
 * program or with damage is left as it is.
 */
import {
  accessSync,
  closeSync,
  constants,
  existsSync,
  lstatSync,
  openSync,
  readSync,
  renameSync,
  rmSync,
  statSync,
} from 'node:fs'
import { basename, dirname, join, resolve } from 'node:path'
import type { Building } from '../app/model/building.ts'
import { Fault } from '../app/model/faults.ts'
import type { DraftRound, OpenProject, Projects, WriteStore } from '../app/usecases/ports.ts'
import { APPLICATION_ID, connect, type Connection, type ReadDb, type WriteDb } from './connection.ts'
import { copiesFolder, copiesOf, copyBeforeStep, copyOfTheDay, copyTo } from './copies.ts'
import { LATEST, migrate, schemaOf } from './migrate.ts'
import { onFile } from './sqlite-faults.ts'
import { readStore } from './store.ts'
import { fill, writeStore } from './write.ts'

const HEAD = 'SQLite format 3\0'

export function projects(now: () => string = () => new Date().toISOString()): Projects {
  return {
    create(path, building, rounds, who, when) {
      refuseTarget(path)
      madeWhole(path, (beside) => create(beside, building, rounds, who, when))
    },
    open: (path) => open(resolve(path), now()),
    duplicate(from, path) {
      refuseTarget(path)
      madeWhole(path, (beside) => {
        const db = connect(from.path, { readonly: true })
        try {
          copyTo(db, beside)
        } finally {
          db.close()
        }
      })
    },
  }
}

function create(path: string, building: Building, rounds: readonly DraftRound[], who: string, when: string): void {
  const db = connect(path, { mustExist: false })
  try {
    migrate(db)
    db.transaction(() => fill(db as WriteDb, building, rounds, who, when)).immediate()
  } finally {
    db.close()
  }
}

/** Makes a file beside its target and renames it, so that no half a project ever stands under the name. */
function madeWhole(path: string, make: (beside: string) => void): void {
  const beside = join(dirname(resolve(path)), `.${basename(path)}.${process.pid}.part`)
  try {
    onFile(path, () => make(beside))
    renameSync(beside, path)
  } catch (error) {
    rmSync(beside, { force: true })
    rmSync(`${beside}-journal`, { force: true })
    throw error
  }
}

function refuseTarget(path: string): void {
  const folder = dirname(resolve(path))
  if (!statSync(folder, { throwIfNoEntry: false })?.isDirectory()) throw new Fault('folder.missing', { file: path })
  if (lstatSync(path, { throwIfNoEntry: false })) throw new Fault('file.exists', { file: path })
  try {
    accessSync(folder, constants.W_OK)
  } catch (error) {
    throw new Fault(
      'file.unwritable',
      { file: path, detail: { reason: 'the folder cannot be written to' } },
      { cause: error },
    )
  }
}

function open(path: string, now: string): OpenProject {
  refuseForeign(path)
  return onFile(path, () => {
    const db = connect(path, { readonly: !isWritable(path) })
    try {
      inspect(db, path)
      if (!db.readonly) {
        if (schemaOf(db) < LATEST) copyBeforeStep(db, path, LATEST)
        migrate(db)
        copyQuietly(db, path, now)
      } else if (schemaOf(db) < LATEST) throw new Fault('file.unwritable', { file: path })
      return opened(db, path)
    } catch (error) {
      db.close()
      throw error
    }
  })
}

function opened(db: Connection, path: string): OpenProject {
  const read = readStore(db as ReadDb, path, db.readonly)
  const store: WriteStore = writeStore(db as WriteDb, read)
  return {
    path,
    read,
    write(run) {
      if (db.readonly)
        throw new Fault('file.unwritable', { file: path, detail: { reason: 'it is open for reading only' } })
      try {
        return onFile(path, () => db.transaction(() => run(store)).immediate())
      } catch (error) {
        read.forget()
        throw error
      }
    },
    close: () => void db.close(),
  }
}

/** What the first bytes tell, before SQLite is asked. */
function refuseForeign(path: string): void {
  const stat = statSync(path, { throwIfNoEntry: false })
  if (!stat) throw new Fault('file.missing', { file: path })
  if (stat.isDirectory()) throw new Fault('file.folder', { file: path })
  if (stat.size === 0) throw new Fault('file.empty', { file: path })
  const bytes = Buffer.alloc(100)
  let handle: number
  try {
    handle = openSync(path, 'r')
  } catch (error) {
    throw new Fault(
      'file.unreadable',
      { file: path, detail: { reason: (error as NodeJS.ErrnoException).code ?? '' } },
      { cause: error },
    )
  }
  try {
    readSync(handle, bytes, 0, bytes.length, 0)
  } finally {
    closeSync(handle)
  }
  const text = bytes.toString('latin1')
  if (!text.startsWith(HEAD)) {
    const isBuilding = /^[\s\u00ef\u00bb\u00bf]*\{/.test(text)
    throw new Fault('project.foreign', { file: path, detail: isBuilding ? { isBuilding: 'yes' } : {} })
  }
  if (bytes.readUInt32BE(68) !== APPLICATION_ID) throw new Fault('project.foreign', { file: path })
}

function inspect(db: Connection, path: string): void {
  const schema = schemaOf(db)
  if (schema > LATEST) throw new Fault('project.newer', { file: path, value: schema, detail: { known: LATEST } })
  const check = db.pragma('quick_check(1)', { simple: true })
  if (check !== 'ok') throw damaged(path, String(check))
}

function damaged(path: string, reason: string): Fault {
  const detail: Record<string, string> = { reason }
  if (copiesOf(path).length) detail.copies = copiesFolder(path)
  return new Fault('project.damaged', { file: path, detail })
}

function isWritable(path: string): boolean {
  try {
    accessSync(path, constants.W_OK)
    return existsSync(dirname(path))
  } catch {
    // Read-only media and files that others own are opened for reading.
    return false
  }
}

/** A project of today has nothing yet that a copy would save. */
function isOfToday(db: Connection, now: string): boolean {
  const { created_at } = db.prepare('SELECT created_at FROM project').get() as { created_at: string }
  return created_at.slice(0, 10) === now.slice(0, 10)
}

/** A copy that cannot be made (a full disk, a folder that is not ours) must not keep anybody from their project. */
function copyQuietly(db: Connection, path: string, now: string): void {
  try {
    if (!isOfToday(db, now)) copyOfTheDay(db, path, now)
  } catch (error) {
    if (!(error instanceof Error)) throw error
    process.emitWarning(`No copy of ${path} was made today: ${error.message}`, { code: 'LEVELSTEAD_COPY' })
  }
}
