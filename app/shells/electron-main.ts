/**
 * What the packed program starts with: the desktop window, or, where the first argument is a command, the command
 * line, so that one installed program is both.
 */
import { pathToFileURL } from 'node:url'
import { join } from 'node:path'
import * as electron from 'electron'
import { COMMANDS } from './cli-commands.ts'
import { startCore } from './core.ts'
import { besideMain, startDesktop } from './desktop.ts'
import { windowFiles } from './window-files.ts'

const folder = __dirname
// `electron MAIN FILE` in a checkout has one argument more than the installed program.
const args = process.argv.slice(electron.app.isPackaged ? 1 : 2)

/** `open` is left to the window. */
function isCommandLine(word: string | undefined): boolean {
  return word !== undefined && word !== 'open' && (Object.hasOwn(COMMANDS, word) || /^--(help|version)$/.test(word))
}

async function runCommand(): Promise<void> {
  type CommandLine = typeof import('./command-line.ts')
  const address = pathToFileURL(join(folder, 'command-line.js')).href
  const { runCommandLine } = (await import(address)) as CommandLine
  electron.app.exit(await runCommandLine(args))
}

function fail(error: unknown): void {
  console.error(error)
  electron.dialog.showErrorBox(
    'Levelstead cannot go on',
    'Levelstead itself failed; your file is as it was. Start it again. If it fails again, use `levelstead open --browser`.',
  )
  electron.app.exit(1)
}

if (isCommandLine(args[0])) runCommand().catch(fail)
else {
  process.on('uncaughtException', fail)
  const { preload, worker, window } = besideMain(folder)
  const core = startCore(worker, { shell: 'electron' })
  startDesktop(electron, { core, files: windowFiles(window), preload, args })
}
