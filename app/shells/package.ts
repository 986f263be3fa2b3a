/** `npm run package`: builds, packs with electron-builder, and lets what was packed run its own checks once. */
import { execFileSync } from 'node:child_process'
import { existsSync, readdirSync } from 'node:fs'
import { join } from 'node:path'
import { buildAll } from './build.ts'
import { rootFrom } from './freshness.ts'
import { electronRuntime } from './start-window.ts'

const root = rootFrom(import.meta.url)

/** The program in an unpacked package of this platform. */
function packedProgram(): string | undefined {
  const out = join(root, 'dist', 'packages')
  if (!existsSync(out)) return undefined
  const folders: Partial<Record<NodeJS.Platform, [RegExp, string]>> = {
    linux: [/^linux(-\w+)?-unpacked$/, 'levelstead'],
    win32: [/^win(-\w+)?-unpacked$/, 'Levelstead.exe'],
    darwin: [/^mac(-\w+)?$/, 'Levelstead.app/Contents/MacOS/Levelstead'],
  }
  const [folder, program] = folders[process.platform] ?? []
  return readdirSync(out)
    .filter((name) => folder?.test(name))
    .map((name) => join(out, name, program!))
    .find((path) => existsSync(path))
}

async function pack(): Promise<void> {
  await buildAll()
  if (!electronRuntime(root)) {
    console.log('skipped: no Electron runtime')
    return
  }
  const { build } = await import('electron-builder')
  await build({ projectDir: root, config: 'electron-builder.yml', publish: 'never' })
  const program = packedProgram()
  if (!program) throw new Error('nothing was packed for this platform')
  console.log(execFileSync(program, ['verify'], { encoding: 'utf8' }).split('\n').slice(-2).join('\n'))
}

await pack().catch((error: unknown) => {
  console.error(`Packing failed: ${error instanceof Error ? error.message : String(error)}`)
  process.exitCode = 1
})
