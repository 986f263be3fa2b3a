/**
 * The window shells' side of the worker thread. A worker that dies is a bug of the program: whoever waits is told
 * so, and the next call starts a new worker with the same project open.
 */
import { Worker } from 'node:worker_threads'
import type { Call, Envelope, Progress } from '../contract/wire.ts'
import type { FromWorker, ToWorker, WorkerSettings } from './core-messages.ts'

export interface Core {
  call(call: Call): Promise<Envelope>
  /** Tells the work of that call that nobody waits for it any more. */
  stop(id: string): void
  /** Gives back what ends the listening. */
  onProgress(listener: (progress: Progress) => void): () => void
  /** Lets the next call start with a fresh worker; used while developing. */
  restart(): Promise<void>
  close(): Promise<void>
}

interface Waiting {
  thread: Worker
  call: Call
  stop: SharedArrayBuffer
  settle: (envelope: Envelope) => void
}

/** Requests after which another project is open. */
const OPENING = new Set<string>([
  'project/new',
  'project/open',
  'project/example',
  'project/duplicate',
  'exchange/import',
])

/** How long a worker may take to close its database before it is ended. */
const CLOSING_MS = 3000

function bug(error: Error): Envelope {
  return { ok: false, bug: { message: error.message, stack: error.stack ?? '' } }
}

export function startCore(worker: URL | string, settings: WorkerSettings): Core {
  const listeners = new Set<(progress: Progress) => void>()
  const waiting = new Map<number, Waiting>()
  let thread: Worker | null = null
  let seq = 0
  /** Path of the project that the worker has open. */
  let opened: string | null = null

  function remember(name: string, envelope: Envelope): void {
    if (!envelope.ok) return
    if (name === 'project/close') opened = null
    else if (OPENING.has(name)) opened = (envelope.value as { path: string }).path
  }

  function onMessage(message: FromWorker): void {
    if ('progress' in message) {
      for (const listener of listeners) listener(message.progress)
      return
    }
    const entry = waiting.get(message.seq)
    if (!entry) return
    waiting.delete(message.seq)
    remember(entry.call.name, message.envelope)
    entry.settle(message.envelope)
  }

  function post(to: Worker, call: Call): Promise<Envelope> {
    return new Promise((settle) => {
      const stop = new SharedArrayBuffer(4)
      waiting.set(++seq, { thread: to, call, stop, settle })
      to.postMessage({ seq, call, stop } satisfies ToWorker)
    })
  }

  function start(): Worker {
    const started = new Worker(worker, { workerData: settings })
    let death: Error | undefined
    started.on('message', onMessage)
    started.on('error', (error: Error) => (death = error))
    started.on('exit', () => {
      if (thread === started) thread = null
      for (const [number, entry] of waiting) {
        if (entry.thread !== started) continue
        waiting.delete(number)
        entry.settle(bug(death ?? new Error('The core ended before it had answered.')))
      }
    })
    thread = started
    // Calls are answered in order, so whatever follows finds the project open again.
    if (opened !== null) void post(started, { id: 'reopen', name: 'project/open', input: { path: opened } })
    return started
  }

  async function end(): Promise<void> {
    const ending = thread
    thread = null
    if (!ending) return
    const gone = new Promise<void>((done) => ending.once('exit', () => done()))
    ending.postMessage({ close: true } satisfies ToWorker)
    const late = setTimeout(() => void ending.terminate(), CLOSING_MS)
    await gone
    clearTimeout(late)
  }

  return {
    call: (call) => post(thread ?? start(), call),
    stop(id) {
      for (const entry of waiting.values()) if (entry.call.id === id) Atomics.store(new Int32Array(entry.stop), 0, 1)
    },
    onProgress(listener) {
      listeners.add(listener)
      return () => listeners.delete(listener)
    },
    restart: end,
    close: end,
  }
}
