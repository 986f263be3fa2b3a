/**
 * The window in the local browser: HTTP on 127.0.0.1, at a port and with a token of this start only.
 *
 *     GET  /…            the built window
 *     POST /call/NAME    a Call as JSON; the envelope comes back
 *     GET  /progress     one JSON line for each step of long work, for as long as the window stands open
 *
 * Every open window holds one /progress; when the last has been gone for a while, so has the door.
 */
import { randomBytes } from 'node:crypto'
import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http'
import type { AddressInfo } from 'node:net'
import type { Envelope } from '../contract/wire.ts'
import type { Core } from './core.ts'
import { LARGEST_BODY_BYTES, purposeOf, refusal, type House } from './loopback-guard.ts'
import { answerCall, type Dialogs } from './shell-calls.ts'
import { SAFE_HEADERS, type WindowFiles } from './window-files.ts'

export interface LoopbackSettings {
  core: Core
  files: WindowFiles
  /** Ends when the last window has been gone for this long; never where left out. */
  lingerMs?: number
  /** With `lingerMs`: how long the first window may take to come. */
  patienceMs?: number
  /** Serves pages instead of `files`, headers and all; used while developing. */
  pages?: (request: IncomingMessage, response: ServerResponse) => void
}

export interface Loopback {
  /** What the browser is to open; the token is in its fragment and so in no request. */
  url: string
  house: House
  server: Server
  /** Settles when the door has closed, by itself or by `close`. */
  closed: Promise<void>
  close(): Promise<void>
}

/** A line of nothing, so that a window that vanished without a word is noticed. */
const HEARTBEAT_MS = 15_000

/** Loopback has no dialogs of its own: the window asks for folders through files/list. */
const NO_DIALOGS: Dialogs = {}

function respond(response: ServerResponse, status: number, value: unknown, headers: Record<string, string> = {}): void {
  const text = JSON.stringify(value)
  const type = 'application/json; charset=utf-8'
  response.writeHead(status, { ...SAFE_HEADERS, 'content-type': type, ...headers }).end(text)
}

function statusOf(envelope: Envelope): number {
  if (envelope.ok) return 200
  if ('bug' in envelope) return 500
  return envelope.faults.some((fault) => fault.code === 'request.unknown') ? 404 : 422
}

/** The body, or undefined where it is larger than is taken, whatever its header said. */
async function bodyOf(request: IncomingMessage): Promise<string | undefined> {
  const parts: Buffer[] = []
  let size = 0
  for await (const part of request as AsyncIterable<Buffer>) {
    size += part.length
    if (size > LARGEST_BODY_BYTES) return undefined
    parts.push(part)
  }
  return Buffer.concat(parts).toString('utf8')
}

function parsed(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch {
    // No JSON is no call; the one who reads the value says so.
    return undefined
  }
}

async function takeCall(core: Core, name: string, request: IncomingMessage, response: ServerResponse): Promise<void> {
  const text = await bodyOf(request)
  if (text === undefined) return respond(response, 413, { why: 'The request is too large.' }, { connection: 'close' })
  const body = parsed(text)
  const call = typeof body === 'object' && body !== null && !Array.isArray(body) ? { ...body, name } : undefined
  const envelope = await answerCall(core, call, NO_DIALOGS)
  respond(response, statusOf(envelope), envelope)
}

/** Opens the door; settles when it can be knocked at. */
export async function serveLoopback(settings: LoopbackSettings): Promise<Loopback> {
  const { core, files } = settings
  const token = randomBytes(24).toString('base64url')
  const windows = new Set<ServerResponse>()
  let ending: NodeJS.Timeout | undefined

  function endIn(ms: number): void {
    clearTimeout(ending)
    if (settings.lingerMs !== undefined && windows.size === 0) ending = setTimeout(() => void close(), ms)
  }

  function takeWindow(response: ServerResponse): void {
    clearTimeout(ending)
    windows.add(response)
    response.writeHead(200, { ...SAFE_HEADERS, 'content-type': 'application/x-ndjson; charset=utf-8' })
    response.write('\n')
    response.on('close', () => {
      windows.delete(response)
      endIn(settings.lingerMs ?? 0)
    })
  }

  function page(path: string, request: IncomingMessage, response: ServerResponse): void {
    if (settings.pages) return settings.pages(request, response)
    const file = files.get(path)
    if (!file) return respond(response, 404, { why: 'There is no such page.' })
    response.writeHead(200, { ...SAFE_HEADERS, 'content-type': file.type })
    response.end(request.method === 'HEAD' ? undefined : file.read())
  }

  async function take(request: IncomingMessage, response: ServerResponse): Promise<void> {
    const path = (request.url ?? '/').split(/[?#]/, 1)[0]!
    const refused = refusal({ method: request.method ?? '', path, headers: request.headers }, house)
    if (refused) {
      const { status, why, allow } = refused
      return respond(response, status, { why }, { ...(allow ? { allow } : {}), connection: 'close' })
    }
    const purpose = purposeOf(path)
    if (purpose === 'progress') return takeWindow(response)
    if (purpose === 'call') return takeCall(core, path.slice('/call/'.length), request, response)
    return page(path, request, response)
  }

  const server = createServer((request, response) => {
    take(request, response).catch((error: unknown) => {
      const bug = { message: String(error), stack: error instanceof Error ? (error.stack ?? '') : '' }
      // Where the answer has begun, or nobody is there any more, there is nobody to tell.
      if (response.headersSent) response.destroy()
      else respond(response, 500, { ok: false, bug } satisfies Envelope)
    })
  })
  await new Promise<void>((listening, failed) => {
    server.once('error', failed)
    server.listen({ host: '127.0.0.1', port: 0 }, listening)
  })
  const house: House = { port: (server.address() as AddressInfo).port, token }

  const stopListening = core.onProgress((progress) => {
    const line = `${JSON.stringify(progress)}\n`
    for (const window of windows) window.write(line)
  })
  const heartbeat = setInterval(() => {
    for (const window of windows) window.write('\n')
  }, HEARTBEAT_MS)
  const closed = new Promise<void>((done) => server.once('close', () => done()))

  async function close(): Promise<void> {
    clearTimeout(ending)
    clearInterval(heartbeat)
    stopListening()
    server.close()
    server.closeAllConnections()
    await closed
    await core.close()
  }

  if (settings.patienceMs !== undefined) endIn(settings.patienceMs)
  return { url: `http://127.0.0.1:${house.port}/#token=${token}`, house, server, closed, close }
}
