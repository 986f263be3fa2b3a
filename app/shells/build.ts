/**
 * Builds dist: the core and the shells with esbuild, the window with Vite.
 *
 *     node app/shells/build.ts                all of it; anything missing is an error
 *     node app/shells/build.ts --if-missing   what is missing or older than its sources (run by `npm ci`)
 *     node app/shells/build.ts --core         the core and the shells alone, without a word
 */
import { existsSync, mkdirSync, readdirSync, renameSync, rmSync, writeFileSync } from 'node:fs'
import { dirname, join, relative } from 'node:path'
import { pathToFileURL } from 'node:url'
import type { BuildOptions } from 'esbuild'
import { isStale, rootFrom, sourceStamp, stampFile, type Part } from './freshness.ts'

const root = rootFrom(import.meta.url)
const dist = join(root, 'dist')
function shell(name: string): string {
  return join(root, 'app', 'shells', `${name}.ts`)
}

/** Loaded from node_modules when they are needed and not before: the database for projects, pdfmake for reports. */
const EXTERNAL = ['better-sqlite3', 'pdfmake', 'electron', 'esbuild', 'vite']

const common: BuildOptions = {
  absWorkingDir: root,
  bundle: true,
  platform: 'node',
  target: 'node20',
  external: EXTERNAL,
  sourcemap: 'linked',
  write: false,
  outdir: dist,
  logLevel: 'warning',
  legalComments: 'none',
}

/** Modules that run in plain Node, worker included, sharing their common parts. */
const MODULES = ['cli', 'command-line', 'core-worker', 'start-window']
/** Electron loads its main and its sandboxed preload as CommonJS. */
const ELECTRON = ['electron-main', 'electron-preload']

/** Under its name there is always a whole file: another process may be starting from dist just now. */
function put(path: string, contents: Uint8Array | string): void {
  mkdirSync(dirname(path), { recursive: true })
  const beside = `${path}.${process.pid}.part`
  writeFileSync(beside, contents)
  renameSync(beside, path)
}

async function buildCore(): Promise<void> {
  const stamp = sourceStamp(root, 'core')
  const modules = MODULES.filter((name) => existsSync(shell(name)))
  const electron = ELECTRON.filter((name) => existsSync(shell(name)))
  const { build: bundle } = await import('esbuild')
  const results = await Promise.all([
    bundle({ ...common, entryPoints: modules.map(shell), format: 'esm', splitting: true, chunkNames: 'chunks/[hash]' }),
    bundle({ ...common, entryPoints: electron.map(shell), format: 'cjs', outExtension: { '.js': '.cjs' } }),
  ])
  const files = results.flatMap((result) => result.outputFiles ?? [])
  for (const file of files) put(file.path, file.contents)
  const kept = new Set(files.map((file) => relative(dist, file.path)))
  const chunks = join(dist, 'chunks')
  if (existsSync(chunks))
    for (const name of readdirSync(chunks)) if (!kept.has(join('chunks', name))) rmSync(join(chunks, name))
  put(stampFile(root, 'core'), stamp)
}

async function buildWindow(): Promise<void> {
  const stamp = sourceStamp(root, 'window')
  const { build } = await import('vite')
  await build({ configFile: join(root, 'renderer', 'vite.config.ts'), logLevel: 'warn' })
  put(stampFile(root, 'window'), stamp)
}

const BUILDERS: Record<Part, () => Promise<void>> = { core: buildCore, window: buildWindow }

/** Builds the parts that are missing or older than their sources; gives those it built. */
export async function buildStale(parts: readonly Part[] = ['core', 'window']): Promise<Part[]> {
  const stale = parts.filter((part) => isStale(root, part))
  for (const part of stale) await BUILDERS[part]()
  return stale
}

export async function buildAll(): Promise<void> {
  await buildCore()
  await buildWindow()
}

function say(error: unknown): void {
  // esbuild and Vite have printed where and why; their stack says nothing more.
  console.error(`The build failed: ${error instanceof Error ? error.message.split('\n')[0] : String(error)}`)
}

async function main(options: ReadonlySet<string>): Promise<void> {
  if (options.has('--core')) await buildCore()
  else if (options.has('--if-missing')) {
    // An install must not fail for a build that the first start makes up for; `npm run build` fails loudly.
    for (const part of ['core', 'window'] as const) await buildStale([part]).catch(say)
  } else {
    await buildAll()
    console.log('Built dist: command line, core, desktop shell and window.')
  }
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href)
  await main(new Set(process.argv.slice(2))).catch((error: unknown) => {
    say(error)
    process.exitCode = 1
  })
