/**
 * Project files: made, opened and copied. A new file is made under another name and takes its own only when it is
 * whole; what is opened is looked at before anything is written to it, and a file of a newer version, of another
 * program or with damage is left as it is.
 */
import { accessSync, constants, lstatSync, renameSync, rmSync, statSync } from 'node:fs'
import { basename, dirname, join, resolve } from 'node:path'
import type { Building } from '../app/model/building.ts'
import { Fault } from '../app/model/faults.ts'
import type { DraftRound, OpenProject, Projects } from '../app/usecases/ports.ts'
import { connect, PATIENCE_MS, type Connection, type ReadDb, type WriteDb } from './connection.ts'
import { copyBeforeStep, copyOfTheDay, copyTo } from './copies.ts'
import { damageOf, isWritable, refuseForeign, refuseHeadless, refuseUnsound } from './inspect.ts'
import { LATEST, migrate, schemaOf } from './migrate.ts'
import { onFile } from './sqlite-faults.ts'
import { readStore } from './store.ts'
import { fill, writeStore } from './write.ts'

export function projects(
  now: () => string = () => new Date().toISOString(),
  patience_ms: number = PATIENCE_MS,
): Projects {
  return {
    create(path, building, rounds, who, when) {
      madeWhole(path, (beside) => create(beside, building, rounds, who, when))
    },
    open: (path) => open(resolve(path), now(), patience_ms),
    duplicate(from, path) {
      madeWhole(path, (beside) => duplicate(from.path, beside))
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

function duplicate(from: string, path: string): void {
  const db = connect(from, { readonly: true })
  try {
    copyTo(db, path)
  } finally {
    db.close()
  }
}

/** Makes a file beside its target and renames it, so that no half a project ever stands under the name. */
function madeWhole(path: string, make: (beside: string) => void): void {
  onFile(path, 'writing', () => {
    refuseTarget(path)
    const beside = join(dirname(resolve(path)), `.${basename(path)}.${process.pid}.part`)
    try {
      rmSync(beside, { force: true })
      make(beside)
      renameSync(beside, path)
    } catch (error) {
      rmSync(beside, { force: true })
      rmSync(`${beside}-journal`, { force: true })
      throw error
    }
  })
}

function refuseTarget(path: string): void {
  const folder = dirname(resolve(path))
  if (!statSync(folder, { throwIfNoEntry: false })?.isDirectory()) throw new Fault('folder.missing', { file: path })
  if (lstatSync(path, { throwIfNoEntry: false })) throw new Fault('file.exists', { file: path })
  accessSync(folder, constants.W_OK)
}

function open(path: string, now: string, patience_ms: number): OpenProject {
  return onFile(path, 'reading', () => {
    refuseForeign(path)
    const db = connectSound(path, patience_ms)
    try {
      if (db.readonly) refuseOlder(db, path)
      else bringUpToDate(db, path, now)
      refuseHeadless(db, path)
      if (!db.readonly) copyQuietly(db, path, now)
      return opened(db, path)
    } catch (error) {
      db.close()
      throw damageOf(error, path)
    }
  })
}

/** Connects to a file that is looked at first. */
function connectSound(path: string, patience_ms: number): Connection {
  let db: Connection | undefined
  try {
    db = connect(path, { readonly: !isWritable(path), patience_ms })
    refuseUnsound(db, path)
    return db
  } catch (error) {
    db?.close()
    throw damageOf(error, path)
  }
}

function refuseOlder(db: Connection, path: string): void {
  if (schemaOf(db) === LATEST) return
  const reason = 'it is of an older version and would have to be brought up to date'
  throw new Fault('file.unwritable', { file: path, detail: { reason } })
}

/** An older file keeps a copy of itself as it was. */
function bringUpToDate(db: Connection, path: string, now: string): void {
  if (schemaOf(db) === LATEST) return
  onFile(path, 'writing', () => {
    copyBeforeStep(db, path, now, LATEST)
    migrate(db)
  })
}

function opened(db: Connection, path: string): OpenProject {
  const read = readStore(db as ReadDb, path, db.readonly)
  const store = writeStore(db as WriteDb, read)
  return {
    path,
    read,
    write(run) {
      if (db.readonly)
        throw new Fault('file.unwritable', { file: path, detail: { reason: 'it is open for reading only' } })
      try {
        return onFile(path, 'writing', () => db.transaction(() => run(store)).immediate())
      } catch (error) {
        read.forget()
        throw error
      }
    },
    close: () => void db.close(),
  }
}

/** A project of today has nothing yet that a copy would save. */
function isOfToday(db: Connection, now: string): boolean {
  const created = db.prepare('SELECT created_at FROM project').pluck().get() as string
  return created.slice(0, 10) === now.slice(0, 10)
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
