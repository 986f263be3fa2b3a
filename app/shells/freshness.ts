/**
 * Whether what is built in dist still stands for the sources. The stamp is a hash of every source's path, size
 * and time of change, so that it also notices a file that was removed or put back to an older state. Asked at
 * each start of the command line in a checkout, so it reads no file and takes a few milliseconds.
 */
import { createHash } from 'node:crypto'
import { existsSync, readFileSync, readdirSync, statSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'

/** What is built apart: the core with its shells, and the window. */
export type Part = 'core' | 'window'

const SOURCES: Record<Part, readonly string[]> = {
  core: ['solver', 'app', 'db', 'package-lock.json'],
  window: ['renderer', 'solver', 'app/contract', 'app/model', 'app/assess', 'app/drawing', 'package-lock.json'],
}

/** The checkout or package that a module of app/shells or dist stands in. */
export function rootFrom(moduleUrl: string): string {
  let folder = dirname(fileURLToPath(moduleUrl))
  while (!existsSync(join(folder, 'package.json'))) {
    const parent = dirname(folder)
    if (parent === folder) throw new Error(`no package.json above ${moduleUrl}`)
    folder = parent
  }
  return folder
}

/** In the packed program there are no sources, and what is built is what counts. */
export function hasSources(root: string): boolean {
  return existsSync(join(root, 'app', 'shells', 'build.ts'))
}

export function sourceStamp(root: string, part: Part): string {
  const hash = createHash('sha1')
  for (const source of SOURCES[part]) {
    const path = join(root, source)
    const entry = statSync(path, { throwIfNoEntry: false })
    if (!entry) continue
    const files = entry.isDirectory() ? readdirSync(path, { recursive: true, withFileTypes: true }) : []
    const paths = entry.isDirectory() ? files.filter((f) => f.isFile()).map((f) => join(f.parentPath, f.name)) : [path]
    for (const file of paths.sort()) {
      const stat = statSync(file, { throwIfNoEntry: false })
      if (stat) hash.update(`${file.slice(root.length)}:${stat.size}:${stat.mtimeMs}\n`)
    }
  }
  return hash.digest('hex')
}

export function stampFile(root: string, part: Part): string {
  return join(root, 'dist', `.${part}-stamp`)
}

/** Says whether the part has to be built (again). */
export function isStale(root: string, part: Part): boolean {
  if (!hasSources(root)) return false
  const stamp = stampFile(root, part)
  return !existsSync(stamp) || readFileSync(stamp, 'utf8') !== sourceStamp(root, part)
}
