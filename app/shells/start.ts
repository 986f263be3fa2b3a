/**
 * `npm start`: builds what is stale and opens the window on the example building, a project of the person's own
 * in their folder for trying things out; it is made once and then left as they left it.
 */
import { existsSync, mkdirSync } from 'node:fs'
import { homedir } from 'node:os'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { rootFrom } from './freshness.ts'

const OLDEST_NODE = 22

async function start(): Promise<number> {
  const major = Number(process.versions.node.split('.')[0])
  if (major < OLDEST_NODE) {
    console.error(
      `Levelstead needs Node ${OLDEST_NODE} or later and found ${process.versions.node}. Run it by: npm start`,
    )
    return 1
  }
  const { buildStale } = await import('./build.ts')
  const built = await buildStale()
  if (built.length) console.error(`Built: ${built.join(', ')}.`)
  const dist = join(rootFrom(import.meta.url), 'dist')
  const { runCommandLine } = (await import(
    pathToFileURL(join(dist, 'command-line.js')).href
  )) as typeof import('./command-line.ts')
  const folder = join(homedir(), 'Levelstead')
  const example = join(folder, 'Tannery Row, block 2.levelstead')
  if (!existsSync(example)) {
    mkdirSync(folder, { recursive: true })
    const code = await runCommandLine(['example', example])
    if (code !== 0) return code
  }
  return runCommandLine(['open', example, ...process.argv.slice(2)])
}

process.exitCode = await start().catch((error: unknown) => {
  console.error(
    `Levelstead could not be started: ${error instanceof Error ? error.message.split('\n')[0] : String(error)}`,
  )
  return 1
})
