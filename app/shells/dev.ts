/** `npm run dev`: the loopback door with Vite's pages; the core starts afresh when its sources change. */
import { watch } from 'node:fs'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { createServer } from 'vite'
import { buildStale } from './build.ts'
import { startCore } from './core.ts'
import { rootFrom } from './freshness.ts'
import { serveLoopback } from './loopback.ts'

const root = rootFrom(import.meta.url)
/** Editors save in several steps. */
const SETTLE_MS = 150

await buildStale(['core'])
const core = startCore(pathToFileURL(join(root, 'dist', 'core-worker.js')), { shell: 'browser' })
const vite = await createServer({
  configFile: join(root, 'renderer', 'vite.config.ts'),
  server: { middlewareMode: true, fs: { allow: [root] } },
  appType: 'spa',
  base: '/',
})
const door = await serveLoopback({
  core,
  files: new Map(),
  pages: (request, response) => vite.middlewares(request, response),
})
console.log(`Levelstead is at ${door.url}`)

let timer: NodeJS.Timeout | undefined
async function renew(): Promise<void> {
  try {
    if ((await buildStale(['core'])).length) await core.restart()
  } catch (error) {
    console.error(error instanceof Error ? error.message : String(error))
  }
}
for (const folder of ['solver', 'app', 'db'])
  watch(join(root, folder), { recursive: true }, () => {
    clearTimeout(timer)
    timer = setTimeout(() => void renew(), SETTLE_MS)
  })
process.once('SIGINT', () => void vite.close().then(() => door.close()))
await door.closed
