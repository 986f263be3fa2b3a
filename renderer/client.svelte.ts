/**
 * The one module of the window that talks to the outside: over the desktop shell's bridge where there is one, else over
 * loopback with the token of this start. A Svelte proxy cannot cross, so the snapshot is taken here.
 */
import type { Answer, Input, RequestName } from '../app/contract/requests.ts'
import type { Call, Envelope, Progress } from '../app/contract/wire.ts'
import { Fault, InputFault } from '../app/model/faults.ts'

interface Bridge {
  call(call: Call): Promise<Envelope>
  onProgress(listener: (progress: Progress) => void): () => void
}

/** What a shell answers by itself. */
interface ShellCalls {
  'dialog/open': { takes: DialogWish; gives: string | null }
  'dialog/save': { takes: DialogWish; gives: string | null }
}

export interface DialogWish {
  title?: string
  at?: string
  kinds?: readonly string[]
}

/** A fault of the program: not the person's, and the file is as it was. */
export class Bug extends Error {
  readonly details: string

  constructor(message: string, details: string) {
    super(message)
    this.name = 'Bug'
    this.details = details
  }
}

const TOKEN = 'levelstead-token'
const listeners = new Set<(progress: Progress) => void>()
const bridge: Bridge = (globalThis as { levelstead?: Bridge }).levelstead ?? loopback()
let count = 0

/** The desktop shell has the system's own file dialogs. */
export const hasDialogs = 'levelstead' in globalThis

bridge.onProgress((progress) => listeners.forEach((listener) => listener(progress)))

export interface Following {
  /** Told of each step of long work. */
  progress?: (progress: Progress) => void
  /** Aborting tells the core that nobody waits any more. */
  signal?: AbortSignal
}

/** Asks the core. Throws an InputFault for what is expected to fail, a Bug for what is not. */
export async function call<K extends RequestName>(
  name: K,
  input: Input<K>,
  { progress, signal }: Following = {},
): Promise<Answer<K>> {
  const id = `${++count}`
  const listener = (step: Progress) => step.id === id && progress?.(step)
  const stop = () => void bridge.call(callOf('work/stop', { id }))
  listeners.add(listener)
  signal?.addEventListener('abort', stop)
  try {
    return opened(await bridge.call({ ...callOf(name, input), id })) as Answer<K>
  } finally {
    listeners.delete(listener)
    signal?.removeEventListener('abort', stop)
  }
}

/** Asks the shell for one of the system's dialogs; null where the person turned back. */
export async function ask<K extends keyof ShellCalls>(
  name: K,
  wish: ShellCalls[K]['takes'],
): Promise<ShellCalls[K]['gives']> {
  return opened(await bridge.call(callOf(name, wish))) as ShellCalls[K]['gives']
}

function callOf(name: string, input: unknown): Call {
  return { id: `${++count}`, name: name as RequestName, input: $state.snapshot(input) }
}

function opened(envelope: Envelope): unknown {
  if (envelope.ok) return envelope.value
  if ('faults' in envelope) throw new InputFault(envelope.faults)
  throw new Bug(envelope.bug.message, envelope.bug.stack)
}

function loopback(): Bridge {
  const given = new URLSearchParams(location.hash.slice(1)).get('token')
  if (given) {
    // Kept for a reload of this window, and taken out of the address that others may see.
    sessionStorage.setItem(TOKEN, given)
    history.replaceState(null, '', location.pathname)
  }
  const headers = {
    'x-levelstead-token': given ?? sessionStorage.getItem(TOKEN) ?? '',
    'content-type': 'application/json',
  }
  return {
    async call(request) {
      try {
        const response = await fetch(`/call/${request.name}`, {
          method: 'POST',
          headers,
          body: JSON.stringify(request),
        })
        return (await response.json()) as Envelope
      } catch (error) {
        throw new Fault('core.lost', {}, { cause: error })
      }
    },
    onProgress(listener) {
      const ended = new AbortController()
      void follow(headers, listener, ended.signal)
      return () => ended.abort()
    },
  }
}

/** Reads lines of progress for as long as the window stands; the open line also tells the core that it does. */
async function follow(
  headers: HeadersInit,
  listener: (progress: Progress) => void,
  signal: AbortSignal,
): Promise<void> {
  try {
    const response = await fetch('/progress', { headers, signal })
    const reader = response.body!.pipeThrough(new TextDecoderStream()).getReader()
    let rest = ''
    for (;;) {
      const { value, done } = await reader.read()
      if (done) return
      const lines = (rest + value).split('\n')
      rest = lines.pop()!
      for (const line of lines) if (line !== '') listener(JSON.parse(line) as Progress)
    }
  } catch {
    // The door has closed; the next call says so where somebody asked for something.
  }
}
