/** What crosses a boundary: the envelope of an answer, and progress by the id of the call. */
import type { FaultRecord } from '../model/faults.ts'
import type { RequestName } from './requests.ts'

export interface Call {
  /** Chosen by the caller; progress and stop refer to it. */
  id: string
  name: RequestName
  input: unknown
}

export type Envelope<T = unknown> =
  | { ok: true; value: T }
  /** Expected: the input or the world is not as needed. */
  | { ok: false; faults: readonly FaultRecord[] }
  /** A bug of the program; the file is as it was. */
  | { ok: false; bug: { message: string; stack: string } }

export interface Progress {
  id: string
  done: number
  of: number
  what: string
}

/** Tells long work that nobody waits for it any more; an AbortSignal is one. */
export interface Stop {
  readonly aborted: boolean
}
