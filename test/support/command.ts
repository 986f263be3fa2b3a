/** The built command line as a child process, in a folder of its own. */
import { spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

const CLI = join(import.meta.dirname, '..', '..', 'dist', 'cli.js')

export interface Ran {
  code: number | null
  out: string
  error: string
}

export interface Bench {
  folder: string
  path(name: string): string
  run(...words: string[]): Ran
  remove(): void
}

export function openBench(): Bench {
  const folder = mkdtempSync(join(tmpdir(), 'levelstead-cli-'))
  return {
    folder,
    path: (name) => join(folder, name),
    run(...words) {
      const { status, stdout, stderr } = spawnSync(process.execPath, [CLI, ...words], {
        cwd: folder,
        encoding: 'utf8',
        maxBuffer: 256 * 1024 * 1024,
      })
      return { code: status, out: stdout, error: stderr }
    },
    remove: () => rmSync(folder, { recursive: true, force: true }),
  }
}
