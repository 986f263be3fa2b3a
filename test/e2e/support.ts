/**
 * The real thing for end-to-end tests: the loopback door with its worker and database on a folder of its own, and a
 * window of it in Chromium. Whatever the page says to its console or asks of another machine is an error of the test.
 */
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { chromium, type Browser, type BrowserContextOptions, type Page } from 'playwright-core'
import { startCore } from '../../app/shells/core.ts'
import { serveLoopback, type Loopback } from '../../app/shells/loopback.ts'
import { windowFiles } from '../../app/shells/window-files.ts'
import { BROWSER_ARGUMENTS, ensuredBrowser } from '../support/browser.ts'

const dist = join(import.meta.dirname, '..', '..', 'dist')

export interface House {
  /** Folder for the files of the test. */
  folder: string
  door: Loopback
  /** Opens a window; `project` is opened in it beforehand. */
  open(options?: BrowserContextOptions): Promise<Page>
  /** What went wrong in any window: errors of the page, messages of its console, requests to elsewhere. */
  complaints: string[]
  close(): Promise<void>
}

/** Opens the house; with the example in it where `example` is asked for. */
export async function openHouse({ example = false } = {}): Promise<House> {
  const folder = mkdtempSync(join(tmpdir(), 'levelstead-e2e-'))
  const core = startCore(pathToFileURL(join(dist, 'core-worker.js')), { shell: 'browser' })
  if (example) {
    const path = join(folder, 'example.levelstead')
    const made = await core.call({ id: 'example', name: 'project/example', input: { path } })
    if (!made.ok) throw new Error(JSON.stringify(made))
  }
  const door = await serveLoopback({ core, files: windowFiles(join(dist, 'window')) })
  const complaints: string[] = []
  let browser: Browser | undefined

  async function open(options: BrowserContextOptions = {}): Promise<Page> {
    browser ??= await chromium.launch({ executablePath: ensuredBrowser(), args: BROWSER_ARGUMENTS })
    const context = await browser.newContext({ viewport: { width: 1280, height: 720 }, ...options })
    const page = await context.newPage()
    page.on('pageerror', (error) => complaints.push(`page: ${error.message}`))
    page.on('console', (message) => {
      // A fault of the input is answered with 422, which Chromium notes in its console.
      if (message.type() === 'error' && !/status of 422/.test(message.text()))
        complaints.push(`console: ${message.text()}`)
    })
    page.on('request', (request) => {
      const { hostname, protocol } = new URL(request.url())
      if (/^https?:$/.test(protocol) && hostname !== '127.0.0.1') complaints.push(`request to ${request.url()}`)
    })
    await page.goto(door.url)
    return page
  }

  return {
    folder,
    door,
    open,
    complaints,
    async close() {
      await browser?.close()
      await door.close()
      rmSync(folder, { recursive: true, force: true })
    },
  }
}

/** Presses keys one after another. */
export async function press(page: Page, ...keys: string[]): Promise<void> {
  for (const key of keys) await page.keyboard.press(key)
}

/** Presses Tab until the element with that role and name has the focus, as somebody without a mouse gets there. */
export async function tabTo(page: Page, role: string, name: string | RegExp, most = 200): Promise<void> {
  const wanted = typeof name === 'string' ? (text: string) => text === name : (text: string) => name.test(text)
  for (let i = 0; i < most; i++) {
    const found = await focused(page)
    if (found.role === role && wanted(found.name)) return
    await page.keyboard.press('Tab')
  }
  const found = await focused(page)
  throw new Error(`No ${role} ${String(name)} after ${most} tabs; the focus is on ${found.role} ${found.name}`)
}

/** Role and name of what has the focus, as a screen reader is told. */
export async function focused(page: Page): Promise<{ role: string; name: string }> {
  const text = await page
    .locator(':focus')
    .ariaSnapshot({ timeout: 500 })
    .catch(() => '')
  const parts = /^- '?(\w+)(?: "((?:[^"\\]|\\.)*)")?/.exec(text)
  return { role: parts?.[1] ?? '', name: parts?.[2] ?? '' }
}
