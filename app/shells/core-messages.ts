/** What passes between a window shell and the worker thread that holds the database and the use cases. */
import type { Call, Envelope, Progress } from '../contract/wire.ts'

export type ToWorker =
  /** `stop` is one shared word: not 0 once nobody waits for the answer any more. */
  { seq: number; call: Call; stop: SharedArrayBuffer } | { close: true }

export type FromWorker = { seq: number; envelope: Envelope } | { progress: Progress }

export interface WorkerSettings {
  shell: 'electron' | 'browser'
}
