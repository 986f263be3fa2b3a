/**
 * Copies of a project, made on its first opening of a day and before its schema changes, in a folder beside it named
 * after it. A copy is an ordinary project file named by its time, so that restoring one is opening it. Kept: the
 * three latest of the latest day, the latest of each other day, ten in all; those made before a schema change stay.
 */
import { existsSync, mkdirSync, readdirSync, renameSync, rmSync } from 'node:fs'
import { basename, dirname, join } from 'node:path'
import type { Connection } from './connection.ts'

const OF_THE_DAY = 3
const IN_ALL = 10
const NAME = /^\d{4}-\d{2}-\d{2} \d{6}( before \d{4})?\.levelstead$/
const PART = '.part'
const OF_A_STEP = / before \d{4}\.levelstead$/

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
  if (copiesOf(path).some((name) => name.startsWith(now.slice(0, 10)))) return null
  const name = copyNamed(db, path, `${timeName(now)}.levelstead`)
  const ofDays = copiesOf(path).filter((copy) => !OF_A_STEP.test(copy))
  const kept = keptCopies(ofDays)
  for (const copy of ofDays) if (!kept.has(copy)) rmSync(join(copiesFolder(path), copy), { force: true })
  return name
}

/** Copies the project as it is before the schema step of that number. Gives the copy's name. */
export function copyBeforeStep(db: Connection, path: string, now: string, step: number): string {
  return copyNamed(db, path, `${timeName(now)} before ${String(step).padStart(4, '0')}.levelstead`)
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

function timeName(now: string): string {
  return `${now.slice(0, 10)} ${now.slice(11, 19).replaceAll(':', '')}`
}

function copyNamed(db: Connection, path: string, name: string): string {
  const folder = copiesFolder(path)
  mkdirSync(folder, { recursive: true })
  // What a program that was killed had begun.
  for (const begun of readdirSync(folder)) if (begun.endsWith(PART)) rmSync(join(folder, begun), { force: true })
  copyTo(db, join(folder, name))
  return name
}

/** A copy has its name only once it is whole: one cut short would keep the day's real one from being made. */
export function copyTo(db: Connection, target: string): void {
  const beside = `${target}${PART}`
  try {
    db.prepare('VACUUM INTO ?').run(beside)
    renameSync(beside, target)
  } catch (error) {
    rmSync(beside, { force: true })
    throw error
  }
}
