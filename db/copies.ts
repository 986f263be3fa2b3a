/**
 * Copies of a project, made on its first opening of a day and before its schema changes, in a folder beside it named
 * after it. A copy is an ordinary project file named by its time, so that restoring one is opening it. Kept: the
 * three latest of the latest day, the latest of each other day, ten in all; those made before a schema change stay.
 */
import { existsSync, mkdirSync, readdirSync, rmSync } from 'node:fs'
import { basename, dirname, join } from 'node:path'
import type { Connection } from './connection.ts'

const OF_THE_DAY = 3
const IN_ALL = 10
const NAME = /^(\d{4}-\d{2}-\d{2}) \d{6}\.levelstead$/

export function copiesFolder(path: string): string {
  return join(dirname(path), `${basename(path, '.levelstead')}.copies`)
}

/** The copies there are, latest first. */
export function copiesOf(path: string): string[] {
  const folder = copiesFolder(path)
  if (!existsSync(folder)) return []
  return readdirSync(folder)
    .filter((name) => NAME.test(name))
    .sort()
    .reverse()
}

/** Copies the project unless one of that day is there. `now` is ISO 8601. Gives the copy's name, or null. */
export function copyOfTheDay(db: Connection, path: string, now: string): string | null {
  const day = now.slice(0, 10)
  if (copiesOf(path).some((name) => name.startsWith(day))) return null
  const name = `${day} ${now.slice(11, 19).replaceAll(':', '')}.levelstead`
  copyTo(db, join(makeFolder(path), name))
  const kept = keptCopies(copiesOf(path))
  for (const copy of copiesOf(path)) if (!kept.has(copy)) rmSync(join(copiesFolder(path), copy), { force: true })
  return name
}

/** Copies the project as it is before its schema changes. */
export function copyBeforeStep(db: Connection, path: string, step: number): void {
  const target = join(makeFolder(path), `before-${String(step).padStart(4, '0')}.levelstead`)
  if (!existsSync(target)) copyTo(db, target)
}

/** Which of the copies stay, of names by time, latest first. */
export function keptCopies(latestFirst: readonly string[]): Set<string> {
  const latestDay = latestFirst[0]?.slice(0, 10)
  const ofDay = new Map<string, number>()
  const kept = latestFirst.filter((name) => {
    const day = name.slice(0, 10)
    const count = (ofDay.get(day) ?? 0) + 1
    ofDay.set(day, count)
    return count <= (day === latestDay ? OF_THE_DAY : 1)
  })
  return new Set(kept.slice(0, IN_ALL))
}

function makeFolder(path: string): string {
  const folder = copiesFolder(path)
  mkdirSync(folder, { recursive: true })
  return folder
}

export function copyTo(db: Connection, target: string): void {
  db.prepare('VACUUM INTO ?').run(target)
}
