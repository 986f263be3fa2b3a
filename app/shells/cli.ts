/**
 * What `levelstead` runs in a terminal. In a checkout whose sources have changed since the build (a pull, an edit) it is
 * built anew first and started again; the packed program has no sources and starts at once.
 */
import { spawnSync } from 'node:child_process'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { isStale, rootFrom } from './freshness.ts'

const AGAIN = 'LEVELSTEAD_BUILT'
const root = rootFrom(import.meta.url)

/** Whether the build is now new; where it cannot be made, what was built before still serves. */
function isBuiltAnew(): boolean {
  if (process.env[AGAIN] || !isStale(root, 'core')) return false
  const build = join(root, 'app', 'shells', 'build.ts')
  return spawnSync(process.execPath, [build, '--core'], { stdio: 'ignore' }).status === 0
}

if (isBuiltAnew()) {
  const words = [fileURLToPath(import.meta.url), ...process.argv.slice(2)]
  const { status } = spawnSync(process.execPath, words, { stdio: 'inherit', env: { ...process.env, [AGAIN]: '1' } })
  process.exitCode = status ?? 1
} else {
  const { runCommandLine } = await import('./command-line.ts')
  process.exitCode = await runCommandLine(process.argv.slice(2))
}
