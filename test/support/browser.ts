/** A Chromium for the end-to-end tests: one on the PATH, else Playwright's own, else the system's package manager's. */
import { execFileSync, spawnSync } from 'node:child_process'
import { accessSync, constants, existsSync } from 'node:fs'
import { delimiter, join } from 'node:path'
import { chromium } from 'playwright-core'

const NAMES = ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable', 'microsoft-edge', 'msedge']
const SYSTEM = [
  '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
  '/Applications/Chromium.app/Contents/MacOS/Chromium',
  'C:\\Program Files\\Google\\Chrome\\Application\\chrome.exe',
  'C:\\Program Files (x86)\\Microsoft\\Edge\\Application\\msedge.exe',
]

export const NO_BROWSER =
  'No browser for the end-to-end tests: put a Chromium on the PATH, or run `npx playwright-core install chromium`, or run the tests as root where apt-get is.'

function isProgram(path: string): boolean {
  try {
    accessSync(path, constants.X_OK)
    return true
  } catch {
    // Not there, or not to be run: look further.
    return false
  }
}

/** Path of a browser that is there already; undefined where there is none. */
export function foundBrowser(path: string = process.env.PATH ?? ''): string | undefined {
  const given = process.env.LEVELSTEAD_BROWSER
  if (given && isProgram(given)) return given
  const folders = path.split(delimiter).filter((folder) => folder !== '')
  const onPath = folders.flatMap((folder) => NAMES.map((name) => join(folder, name))).find(isProgram)
  if (onPath) return onPath
  const own = chromium.executablePath()
  if (own && existsSync(own)) return own
  return SYSTEM.find(isProgram)
}

/** The same, fetched where it is missing and can be had; throws the sentence that says what to do. */
export function ensuredBrowser(): string {
  const found = foundBrowser()
  if (found) return found
  if (process.getuid?.() === 0 && spawnSync('apt-get', ['--version']).status === 0) {
    console.log('Fetching a browser for the end-to-end tests with apt-get …')
    const quiet = { stdio: 'ignore' as const, env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' } }
    if (spawnSync('apt-get', ['install', '-y', 'chromium'], quiet).status !== 0) {
      spawnSync('apt-get', ['update'], quiet)
      spawnSync('apt-get', ['install', '-y', 'chromium'], quiet)
    }
  } else {
    const cli = join(import.meta.dirname, '../../node_modules/playwright-core/cli.js')
    if (existsSync(cli))
      spawnSync(process.execPath, [cli, 'install', 'chromium'], { stdio: 'ignore', timeout: 300_000 })
  }
  const fetched = foundBrowser()
  if (!fetched) throw new Error(NO_BROWSER)
  execFileSync(fetched, ['--version'], { stdio: 'ignore' })
  return fetched
}

/** As root Chromium wants to be told that nobody shields it. */
export const BROWSER_ARGUMENTS = process.getuid?.() === 0 ? ['--no-sandbox'] : []
