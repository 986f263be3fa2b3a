/**
 * Joins what the use cases ask for to what Node gives: files, clock, hashes, projects, printing. The database and
 * the printer are loaded on their first use only, so that a command that needs neither starts at once.
 */
import { createHash } from 'node:crypto'
import { existsSync, readFileSync } from 'node:fs'
import { userInfo } from 'node:os'
import { join } from 'node:path'
import type { Stop } from '../contract/wire.ts'
import type { Clock, Context, Hasher, Printer, Projects, Session } from '../usecases/ports.ts'
import { rootFrom, stampFile } from './freshness.ts'
import { nodeFiles } from './node-files.ts'

export type ShellName = Context['about']['shell']

export interface ContextParts {
  shell: ShellName
  projects: Projects
  session: Session
  signal?: Stop
  progress?: Context['progress']
}

export function programVersion(): string {
  const text = readFileSync(join(rootFrom(import.meta.url), 'package.json'), 'utf8')
  return (JSON.parse(text) as { version: string }).version
}

/** Tells builds of one version apart, so that findings kept by one are not taken for another's. */
function programBuild(): string {
  const stamp = stampFile(rootFrom(import.meta.url), 'core')
  return existsSync(stamp) ? readFileSync(stamp, 'utf8').slice(0, 8) : ''
}

/** The name under which the operating system knows the person; it stands in the audit trail. */
function who(): string {
  try {
    return userInfo().username
  } catch {
    // An account without an entry (a container's) has no name to give.
    return process.env.USER ?? process.env.USERNAME ?? 'unknown'
  }
}

const clock: Clock = {
  now: () => `${new Date().toISOString().slice(0, 19)}Z`,
  who,
}

const hasher: Hasher = {
  sha256: (bytes) => createHash('sha256').update(bytes).digest('hex'),
}

const printer: Printer = {
  async print(...request) {
    const report = await import('../report/print.ts')
    return report.printer().print(...request)
  },
}

/** Loads the database; for those who will open or make a project. */
export async function loadProjects(): Promise<Projects> {
  const database = await import('../../db/projects.ts')
  return database.projects()
}

export function nodeContext(parts: ContextParts): Context {
  return {
    projects: parts.projects,
    files: nodeFiles(),
    clock,
    printer,
    hasher,
    session: parts.session,
    signal: parts.signal ?? { aborted: false },
    progress: parts.progress ?? (() => undefined),
    about: { version: programVersion(), build: programBuild(), shell: parts.shell },
  }
}
