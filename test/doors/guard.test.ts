/** What the loopback door turns away, asked of the real server over raw HTTP: a browser would not send some of this. */
import { request as ask, type IncomingHttpHeaders } from 'node:http'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import type { Envelope, Progress } from '../../app/contract/wire.ts'
import type { Core } from '../../app/shells/core.ts'
import { serveLoopback, type Loopback } from '../../app/shells/loopback.ts'

const page = { type: 'text/html; charset=utf-8', read: () => new TextEncoder().encode('<p>window</p>') as Uint8Array<ArrayBuffer> } // prettier-ignore

interface Heard {
  status: number
  headers: IncomingHttpHeaders
  text: string
}

/** A core that notes what it is asked. */
function noting() {
  const calls: { name: string; input: unknown }[] = []
  const stopped: string[] = []
  let listener: ((progress: Progress) => void) | undefined
  const core: Core = {
    call: ({ name, input }) => {
      calls.push({ name, input })
      return Promise.resolve({ ok: true, value: name } satisfies Envelope)
    },
    stop: (id) => void stopped.push(id),
    onProgress: (heard) => {
      listener = heard
      return () => (listener = undefined)
    },
    restart: () => Promise.resolve(),
    close: () => Promise.resolve(),
  }
  return { core, calls, stopped, tell: (progress: Progress) => listener?.(progress) }
}

let door: Loopback
let made: ReturnType<typeof noting>

beforeEach(async () => {
  made = noting()
  door = await serveLoopback({ core: made.core, files: new Map([['/', page], ['/index.html', page]]) }) // prettier-ignore
})
afterEach(() => door.close())

function own(): Record<string, string> {
  return {
    host: `127.0.0.1:${door.house.port}`,
    'x-levelstead-token': door.house.token,
    'content-type': 'application/json',
  }
}

function send(method: string, path: string, headers: Record<string, string>, body?: string): Promise<Heard> {
  return new Promise((settle, fail) => {
    const sent = ask({ host: '127.0.0.1', port: door.house.port, method, path, headers }, (response) => {
      const parts: Buffer[] = []
      response.on('data', (part: Buffer) => parts.push(part))
      response.on('end', () =>
        settle({ status: response.statusCode!, headers: response.headers, text: Buffer.concat(parts).toString() }),
      )
    })
    sent.on('error', fail)
    sent.end(body)
  })
}

const CALL = JSON.stringify({ id: '1', input: {} })

describe('the loopback door', () => {
  it('lets our own window in: page, call, and the answer', async () => {
    expect((await send('GET', '/', { host: own().host! })).text).toBe('<p>window</p>')
    const { status, text } = await send('POST', '/call/about/view', own(), CALL)
    expect([status, JSON.parse(text)]).toEqual([200, { ok: true, value: 'about/view' }])
    expect(made.calls).toEqual([{ name: 'about/view', input: {} }])
  })

  const rude: [
    why: string,
    method: string,
    path: string,
    change: Record<string, string | undefined>,
    status: number,
  ][] = [
    ['another host, as after DNS rebinding', 'POST', '/call/about/view', { host: 'evil.example:80' }, 403],
    ['our address at another port', 'POST', '/call/about/view', { host: '127.0.0.1:1' }, 403],
    ['a page of another origin', 'POST', '/call/about/view', { origin: 'https://evil.example' }, 403],
    ['a page without an origin of its own', 'POST', '/call/about/view', { origin: 'null' }, 403],
    [
      'a page of another site that hides its origin',
      'POST',
      '/call/about/view',
      { 'sec-fetch-site': 'cross-site' },
      403,
    ],
    ['no token', 'POST', '/call/about/view', { 'x-levelstead-token': undefined }, 403],
    ['a wrong token', 'POST', '/call/about/view', { 'x-levelstead-token': 'x'.repeat(32) }, 403],
    ['a call by GET', 'GET', '/call/about/view', {}, 405],
    ['a form instead of JSON', 'POST', '/call/about/view', { 'content-type': 'text/plain' }, 415],
    ['more than is taken', 'POST', '/call/about/view', { 'content-length': String(64 * 1024 * 1024) }, 413],
    ['progress without a token', 'GET', '/progress', { 'x-levelstead-token': undefined }, 403],
    ['a page to be written', 'POST', '/', {}, 405],
    ['a page that is not in the list', 'GET', '/nothing.html', {}, 404],
    ['a path that climbs out', 'GET', '/../package.json', {}, 404],
    ['a path that climbs out, encoded', 'GET', '/%2e%2e%2fpackage.json', {}, 404],
  ]
  it.each(rude)('turns away %s', async (_, method, path, change, status) => {
    const headers = Object.fromEntries(Object.entries({ ...own(), ...change }).filter(([, v]) => v !== undefined)) as Record<string, string> // prettier-ignore
    const heard = await send(method, path, headers, method === 'POST' && !change['content-length'] ? CALL : undefined)
    expect(heard.status).toBe(status)
    expect(made.calls).toEqual([])
    expect(heard.text).not.toContain(door.house.token)
  })

  it('says on every answer that nothing but our own files may be loaded, and nothing be framed or kept', async () => {
    for (const path of ['/', '/nothing.html', '/call/about/view']) {
      const { headers } = await send('GET', path, own())
      expect(headers['content-security-policy']).toContain("default-src 'none'")
      expect(headers['content-security-policy']).toContain("script-src 'self'")
      expect(headers['content-security-policy']).not.toContain('unsafe-eval')
      expect([headers['x-frame-options'], headers['x-content-type-options'], headers['cache-control']]).toEqual(['DENY', 'nosniff', 'no-store']) // prettier-ignore
      expect(headers['access-control-allow-origin']).toBeUndefined()
    }
  })

  it('does not fall over what is no JSON or no call', async () => {
    for (const body of ['', '{', '[]', 'null', '{"id":1}', '"x"']) {
      const { status, text } = await send('POST', '/call/about/view', own(), body)
      expect([status, (JSON.parse(text) as Envelope).ok]).toEqual([422, false])
    }
    expect(made.calls).toEqual([])
  })

  it('stops work by its id without asking the core in its queue', async () => {
    await send('POST', '/call/work/stop', own(), JSON.stringify({ id: '2', input: { id: '1' } }))
    expect([made.stopped, made.calls]).toEqual([['1'], []])
  })

  it('tells every window of the progress of work', async () => {
    const lines: string[] = []
    const sent = ask({ host: '127.0.0.1', port: door.house.port, path: '/progress', headers: own() }, (response) =>
      response.on('data', (part: Buffer) => lines.push(part.toString())),
    )
    sent.on('error', () => undefined)
    sent.end()
    await expect.poll(() => lines.length).toBeGreaterThan(0)
    made.tell({ id: '7', done: 1, of: 2, what: 'Round R1' })
    await expect.poll(() => lines.join('')).toContain('{"id":"7","done":1,"of":2,"what":"Round R1"}')
    sent.destroy()
  })

  it('closes by itself once the last window has gone', async () => {
    const brief = await serveLoopback({ core: noting().core, files: new Map(), lingerMs: 20 })
    const headers = { host: `127.0.0.1:${brief.house.port}`, 'x-levelstead-token': brief.house.token }
    const sent = ask({ host: '127.0.0.1', port: brief.house.port, path: '/progress', headers }, (response) => {
      response.on('data', () => sent.destroy())
      response.on('error', () => undefined)
    })
    sent.on('error', () => undefined)
    sent.end()
    await brief.closed
  })
})
