/** Work that takes long enough to be waited for: what it is, how far it is, and the way to stop it. */
import type { Progress } from '../../app/contract/wire.ts'
import type { Following } from '../client.svelte.ts'
import { contextOf } from './context.ts'

export interface Working {
  what: string
  step: Progress | null
  stop: () => void
}

export class WorkState {
  #now = $state.raw<Working | null>(null)

  /** The work that was begun last and is not over. */
  get now(): Working | null {
    return this.#now
  }

  /** Does it, to be seen and stopped; `ending` where the one who began it may also end it. */
  async run<T>(what: string, act: (following: Following) => Promise<T>, ending = new AbortController()): Promise<T> {
    const stop = (): void => ending.abort()
    const isMine = (): boolean => this.#now?.stop === stop
    this.#now = { what, step: null, stop }
    try {
      return await act({
        signal: ending.signal,
        progress: (step) => {
          if (isMine()) this.#now = { what, step, stop }
        },
      })
    } finally {
      if (isMine()) this.#now = null
    }
  }
}

const context = contextOf<WorkState>('work')
export const handWork = context.hand
export const useWork = context.use
