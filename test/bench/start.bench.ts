/** How long the command line takes to start, against a bare Node, in turns so that the machine's mood falls on both. */
import { spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

const root = join(import.meta.dirname, '..', '..')
const cli = join(root, 'dist', 'cli.js')
const TIMES = 7

function took(words: readonly string[]): number {
  const start = performance.now()
  const { status, stderr } = spawnSync(process.execPath, words, { encoding: 'utf8' })
  if (status !== 0) throw new Error(stderr)
  return performance.now() - start
}

export function run(): { name: string; lines: string[] } {
  const folder = mkdtempSync(join(tmpdir(), 'levelstead-bench-'))
  try {
    const project = join(folder, 'x.levelstead')
    const building = join(folder, 'x.building.json')
    took([cli, 'example', project])
    took([cli, 'export', project, building])
    const commands = {
      '--version': ['--version'],
      'assess, a building file': ['assess', building],
      'assess, a project': ['assess', project],
    }
    const best: Record<string, number> = { bare: Infinity }
    for (let i = 0; i < TIMES; i++) {
      best.bare = Math.min(best.bare!, took(['-e', '0']))
      for (const [name, words] of Object.entries(commands))
        best[name] = Math.min(best[name] ?? Infinity, took([cli, ...words]))
    }
    return {
      name: `start of the command line, best of ${TIMES}`,
      lines: Object.entries(best).map(
        ([name, ms]) =>
          `${name === 'bare' ? 'node -e 0' : `levelstead ${name}`}: ${ms.toFixed(0)} ms, ${(ms / best.bare!).toFixed(2)} times a bare Node`,
      ),
    }
  } finally {
    rmSync(folder, { recursive: true, force: true })
  }
}
