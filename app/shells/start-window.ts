/**
 * Opens the window: the program's own where Electron's runtime is there or can be fetched, else the local browser
 * over loopback. Without a display the address is printed and it goes on serving.
 */
import { spawn, spawnSync } from 'node:child_process'
import { existsSync, readFileSync } from 'node:fs'
import { join, resolve } from 'node:path'
import { pathToFileURL } from 'node:url'
import { rootFrom } from './freshness.ts'
import { serveLoopback } from './loopback.ts'
import { startCore } from './core.ts'
import { tell, print, tellFaults } from './terminal.ts'
import { windowFiles } from './window-files.ts'

export interface Wish {
  /** Project to open in it. */
  file?: string
  /** The local browser, whether the program's own window is there or not. */
  browser: boolean
}

/** After the last browser window is closed, so long until the door closes as well. */
const LINGER_MS = 10_000
const PATIENCE_MS = 120_000
const FETCH_MS = 90_000

export async function openWindow({ file, browser }: Wish): Promise<number> {
  const root = rootFrom(import.meta.url)
  if (!existsSync(join(root, 'dist', 'window', 'index.html'))) {
    tell('The window is not built yet. Run: npm run build')
    return 1
  }
  const display = hasDisplay()
  if (!browser && display) {
    const runtime = electronRuntime(root)
    if (runtime) return inElectron(runtime, root, file)
    tell('Electron has no runtime here, so the window opens in your browser instead.')
  }
  return inBrowser(root, file, display)
}

export function hasDisplay(environment: NodeJS.ProcessEnv = process.env, platform: string = process.platform): boolean {
  if (platform === 'win32' || platform === 'darwin') return true
  return Boolean(environment.DISPLAY ?? environment.WAYLAND_DISPLAY)
}

/** Path of Electron's program; it is fetched where it can be, without a word from the fetching. */
export function electronRuntime(root: string, fetch = true): string | null {
  const folder = join(root, 'node_modules', 'electron')
  const said = join(folder, 'path.txt')
  function found(): string | null {
    if (!existsSync(said)) return null
    const path = join(process.env.ELECTRON_OVERRIDE_DIST_PATH ?? join(folder, 'dist'), readFileSync(said, 'utf8'))
    return existsSync(path) ? path : null
  }
  const there = found()
  if (there || !fetch || !existsSync(join(folder, 'install.js'))) return there
  spawnSync(process.execPath, [join(folder, 'install.js')], { stdio: 'ignore', timeout: FETCH_MS })
  return found()
}

function inElectron(runtime: string, root: string, file: string | undefined): Promise<number> {
  const main = join(root, 'dist', 'electron-main.cjs')
  const child = spawn(runtime, [main, ...(file === undefined ? [] : [resolve(file)])], { stdio: 'inherit' })
  return new Promise((done) => {
    child.on('error', (error) => {
      tell(`The window could not be started: ${error.message}`)
      done(1)
    })
    child.on('exit', (code) => done(code ?? 0))
  })
}

async function inBrowser(root: string, file: string | undefined, display: boolean): Promise<number> {
  const dist = join(root, 'dist')
  const core = startCore(pathToFileURL(join(dist, 'core-worker.js')), { shell: 'browser' })
  if (file !== undefined) {
    const envelope = await core.call({ id: 'open', name: 'project/open', input: { path: resolve(file) } })
    if (!envelope.ok) {
      await core.close()
      if ('faults' in envelope) tellFaults(envelope.faults)
      else tell(`Levelstead itself failed: ${envelope.bug.message}`)
      return 'faults' in envelope ? 2 : 1
    }
  }
  const door = await serveLoopback({
    core,
    files: windowFiles(join(dist, 'window')),
    ...(display ? { lingerMs: LINGER_MS, patienceMs: PATIENCE_MS } : {}),
  })
  print(`Levelstead is at ${door.url}`)
  if (!display) tell('There is no display here: open that address in a browser of this machine. Ctrl+C ends it.')
  else browse(door.url)
  for (const signal of ['SIGINT', 'SIGTERM'] as const) process.once(signal, () => void door.close())
  await door.closed
  return 0
}

/** Hands the address to the system; where nothing takes it, it has been printed. */
function browse(url: string): void {
  const [command, ...rest] =
    process.platform === 'win32'
      ? ['cmd', '/c', 'start', '', url]
      : process.platform === 'darwin'
        ? ['open', url]
        : ['xdg-open', url]
  const child = spawn(command!, rest, { stdio: 'ignore', detached: true })
  child.on('error', () => tell('No browser could be opened from here: open that address yourself.'))
  child.unref()
}
