/** `npm start` as a new user meets it: a home of its own, no display, no Electron. */
import { spawn, type ChildProcess } from 'node:child_process'
import { existsSync, mkdtempSync, rmSync, statSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { buildStale } from '../../app/shells/build.ts'
import { hasDisplay } from '../../app/shells/start-window.ts'

const root = join(import.meta.dirname, '..', '..')
let home: string
let child: ChildProcess | undefined

beforeAll(async () => {
  await buildStale()
})
beforeEach(() => {
  home = mkdtempSync(join(tmpdir(), 'levelstead-home-'))
})
afterEach(() => {
  child?.kill('SIGKILL')
  rmSync(home, { recursive: true, force: true })
})

async function start(environment: Record<string, string> = {}, ...words: string[]) {
  const { DISPLAY: _1, WAYLAND_DISPLAY: _2, ...rest } = process.env
  child = spawn(process.execPath, [join(root, 'app', 'shells', 'start.ts'), ...words], {
    env: { ...rest, HOME: home, USERPROFILE: home, ...environment },
  })
  const said = { out: '', error: '' }
  child.stdout!.on('data', (text) => (said.out += String(text)))
  child.stderr!.on('data', (text) => (said.error += String(text)))
  await expect.poll(() => /http:\S+/.test(said.out), { timeout: 30_000 }).toBe(true)
  return { said, url: /http:\S+/.exec(said.out)![0] }
}

async function ended(): Promise<number | null> {
  return new Promise((settle) => child!.on('exit', (code) => settle(code)))
}

describe('npm start without a display', () => {
  it('prints one address and goes on serving the window until it is ended', async () => {
    const { said, url } = await start()
    expect(said.out.match(/http:/g)).toHaveLength(1)
    const page = await fetch(url)
    expect([page.status, await page.text()]).toEqual([200, expect.stringContaining('Levelstead')])
    expect(said.error).toContain('There is no display here')
    expect(said.error).not.toMatch(/^\s+at /m)
    child!.kill('SIGTERM')
    expect(await ended()).toBe(0)
  })

  it('makes the example once and leaves it as it was left', async () => {
    const example = join(home, 'Levelstead', 'Tannery Row, block 2.levelstead')
    await start()
    expect(existsSync(example)).toBe(true)
    child!.kill('SIGTERM')
    await ended()
    const { mtimeMs } = statSync(example)
    await start()
    expect(statSync(example).mtimeMs).toBe(mtimeMs)
  })
})

describe('npm start with a display', () => {
  it('says in one line that the browser is used where Electron has no runtime, and needs no browser opener', async () => {
    const { said } = await start({ DISPLAY: ':99', PATH: '', ELECTRON_OVERRIDE_DIST_PATH: home })
    await expect.poll(() => said.error).toContain('open that address yourself')
    expect(said.error.split('\n').filter((line) => line.includes('browser instead'))).toHaveLength(1)
    expect(said.error).not.toMatch(/^\s+at /m)
  })

  it('is known by DISPLAY or Wayland on Linux, and always there on Windows and macOS', () => {
    expect(hasDisplay({}, 'linux')).toBe(false)
    expect(hasDisplay({ WAYLAND_DISPLAY: 'wayland-0' }, 'linux')).toBe(true)
    expect(hasDisplay({}, 'win32')).toBe(true)
  })
})
