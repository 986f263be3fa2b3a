/** The desktop shell with a stand-in for Electron; for real where its runtime is present. */
import { spawnSync } from 'node:child_process'
import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import vm from 'node:vm'
import { beforeAll, describe, expect, it } from 'vitest'
import type { Call, Envelope } from '../../app/contract/wire.ts'
import { buildStale } from '../../app/shells/build.ts'
import type { Core } from '../../app/shells/core.ts'
import { CHANNEL, projectAmong, startDesktop } from '../../app/shells/desktop.ts'
import { electronRuntime } from '../../app/shells/start-window.ts'
import { fakeElectron } from '../support/electron.ts'

const root = join(import.meta.dirname, '..', '..')
const files = new Map([
  ['/index.html', { type: 'text/html', read: () => new TextEncoder().encode('window') as Uint8Array<ArrayBuffer> }],
])

function core(answer: (call: Call) => Envelope = () => ({ ok: true, value: null })) {
  const calls: Call[] = []
  const made: Core = {
    call: (call) => (calls.push(call), Promise.resolve(answer(call))),
    stop: () => undefined,
    onProgress: () => () => undefined,
    restart: () => Promise.resolve(),
    close: () => Promise.resolve(),
  }
  return { made, calls }
}

async function started(args: readonly string[] = [], answer?: (call: Call) => Envelope) {
  const fake = fakeElectron()
  const { made, calls } = core(answer)
  startDesktop(fake.electron, { core: made, files, preload: '/dist/electron-preload.cjs', args })
  await new Promise((settle) => setTimeout(settle, 5))
  return { fake, calls, window: fake.windows[0]!, call: fake.handlers.get(CHANNEL)! as (...args: unknown[]) => Promise<Envelope> } // prettier-ignore
}

describe('the desktop window', () => {
  it('is one, sandboxed and isolated, without Node, on our own scheme, with paper behind it until it is drawn', async () => {
    const { fake, window } = await started()
    expect(fake.windows).toHaveLength(1)
    expect(window.options.webPreferences).toMatchObject({
      preload: '/dist/electron-preload.cjs',
      sandbox: true,
      contextIsolation: true,
      nodeIntegration: false,
      webSecurity: true,
      webviewTag: false,
    })
    expect([window.options.backgroundColor, window.options.show, window.shown]).toEqual(['#f6f4ee', false, 1])
    expect(window.loaded).toEqual(['levelstead://window/index.html'])
    expect([...fake.handlers.keys()]).toEqual(['levelstead:call'])
  })

  it('serves the files of the list alone, with the strict content policy', async () => {
    const { fake } = await started()
    const serve = fake.schemes.get('levelstead')!
    const page = serve(new Request('levelstead://window/index.html'))
    expect([page.status, await page.text()]).toEqual([200, 'window'])
    expect(page.headers.get('content-security-policy')).toContain("default-src 'none'")
    for (const url of [
      'levelstead://window/../etc/passwd',
      'levelstead://window/other.js',
      'levelstead://elsewhere/index.html',
    ])
      expect(serve(new Request(url)).status).toBe(404)
  })

  it('goes nowhere: no navigation, no further window, no permission, no download, no request off the machine', async () => {
    const { fake, window } = await started()
    for (const name of ['will-navigate', 'will-frame-navigate', 'will-redirect', 'will-attach-webview']) {
      let prevented = false
      window.contents.emit(name, { preventDefault: () => (prevented = true) })
      expect([name, prevented]).toEqual([name, true])
    }
    expect(window.contents.openHandler!({ url: 'https://example.org' })).toEqual({ action: 'deny' })
    const decided: unknown[] = []
    ;(fake.session.permission as (...a: unknown[]) => void)({}, 'camera', (granted: boolean) => decided.push(granted))
    expect([decided, (fake.session.permissionCheck as () => unknown)(), (fake.session.device as () => unknown)()]).toEqual([[false], false, false]) // prettier-ignore
    const passed = [
      'levelstead://window/index.html',
      'blob:x',
      'https://example.org/',
      'http://127.0.0.1/',
      'file:///etc/passwd',
    ].map((url) => {
      let cancelled: boolean | undefined
      ;(fake.session.beforeRequest as (...a: unknown[]) => void)(
        { url },
        (d: { cancel: boolean }) => (cancelled = d.cancel),
      )
      return cancelled
    })
    expect(passed).toEqual([false, false, true, true, true])
    let stopped = false
    fake.session.events.emit('will-download', { preventDefault: () => (stopped = true) })
    expect(stopped).toBe(true)
  })

  it('answers its own main frame, and nobody else', async () => {
    const { call, calls, window } = await started()
    const own = { senderFrame: window.contents.mainFrame }
    expect(await call(own, { id: '1', name: 'project/view', input: {} })).toEqual({ ok: true, value: null })
    expect(calls).toHaveLength(1)
    for (const senderFrame of [null, { url: 'levelstead://window/index.html' }, { url: 'https://evil.example/' }])
      expect(await call({ senderFrame }, { id: '1', name: 'project/view', input: {} })).toMatchObject({ ok: false })
    window.contents.mainFrame.url = 'https://evil.example/'
    expect(await call(own, { id: '1', name: 'project/view', input: {} })).toMatchObject({ ok: false })
    expect(calls).toHaveLength(1)
  })

  it('opens the system’s dialogs itself and gives back a path or nothing', async () => {
    const { call, calls, window, fake } = await started()
    const own = { senderFrame: window.contents.mainFrame }
    const open = await call(own, {
      id: '1',
      name: 'dialog/open',
      input: { title: 'Open', kinds: ['levelstead', '../x'] },
    })
    expect(open).toEqual({ ok: true, value: '/tmp/chosen.levelstead' })
    expect(fake.dialogs[0]).toMatchObject({ title: 'Open', filters: [{ extensions: ['levelstead'] }] })
    expect(await call(own, { id: '2', name: 'dialog/save', input: {} })).toEqual({ ok: true, value: null })
    expect(calls).toEqual([])
  })

  it('opens the project named on the command line, by the system, or by a second start', async () => {
    const { fake, calls, window } = await started(['--flag', 'a.levelstead'])
    expect(calls.map((c) => [c.name, c.input])).toEqual([
      ['project/open', { path: join(process.cwd(), 'a.levelstead') }],
    ])
    fake.app.emit('open-file', { preventDefault: () => undefined }, '/tmp/b.levelstead')
    fake.app.emit('second-instance', {}, ['levelstead', '/tmp/c.levelstead'], '/tmp')
    await new Promise((settle) => setTimeout(settle, 5))
    expect(calls.slice(1).map((c) => c.input)).toEqual([{ path: '/tmp/b.levelstead' }, { path: '/tmp/c.levelstead' }])
    expect(window.contents.reloads).toBe(2)
    expect(projectAmong(['x.json'], '/')).toBeUndefined()
  })

  it('says what is wrong with a file that cannot be opened, and opens all the same', async () => {
    const { fake } = await started(['a.levelstead'], () => ({
      ok: false,
      faults: [{ code: 'file.missing', place: { file: 'a.levelstead' } }],
    }))
    expect(fake.errors).toEqual([expect.stringContaining('a.levelstead')])
    expect(fake.windows).toHaveLength(1)
  })

  it('leaves a second start to the first', () => {
    const fake = fakeElectron({ locked: true })
    startDesktop(fake.electron, { core: core().made, files, preload: '', args: [] })
    expect([fake.app.quits, fake.windows.length, fake.handlers.size]).toEqual([1, 0, 0])
  })
})

describe('the preload', () => {
  beforeAll(async () => {
    await buildStale(['core'])
  })

  it('exposes one call and the progress, and nothing of Electron or Node', () => {
    const exposed: Record<string, Record<string, (...args: unknown[]) => unknown>> = {}
    const invoked: unknown[][] = []
    const electron = {
      contextBridge: { exposeInMainWorld: (name: string, api: never) => (exposed[name] = api) },
      ipcRenderer: { invoke: (...args: unknown[]) => invoked.push(args), on: () => undefined, off: () => undefined },
    }
    const code = readFileSync(join(root, 'dist', 'electron-preload.cjs'), 'utf8')
    const asked: string[] = []
    vm.runInNewContext(code, {
      module: { exports: {} },
      exports: {},
      require: (name: string) => (asked.push(name), electron),
    })
    expect(asked).toEqual(['electron'])
    expect(Object.keys(exposed)).toEqual(['levelstead'])
    expect(Object.keys(exposed.levelstead!)).toEqual(['call', 'onProgress'])
    exposed.levelstead!.call!({ id: '1' })
    expect(invoked).toEqual([['levelstead:call', { id: '1' }]])
  })
})

describe('Electron itself', () => {
  const runtime = electronRuntime(root, false)
  if (!runtime) console.log('skipped: no Electron runtime')

  it.skipIf(!runtime)('starts the packed main and runs the built-in checks', () => {
    const { status, stdout } = spawnSync(runtime!, [join(root, 'dist', 'electron-main.cjs'), 'verify'], {
      encoding: 'utf8',
      timeout: 60_000,
    })
    expect([status, stdout]).toEqual([0, expect.stringContaining('checks agree')])
  })
})
