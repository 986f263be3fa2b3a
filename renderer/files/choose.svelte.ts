/**
 * Asking for a file: the system's own dialog in the desktop window, else the chooser of this window, which lists folders
 * through the core.
 */
import { ask, hasDialogs } from '../client.svelte.ts'
import { withKind, type FileWish } from './wish.ts'

export class FileAsking {
  wish = $state.raw<FileWish | null>(null)
  /** The folder that was looked at last. */
  folder?: string
  #settle: ((path: string | null) => void) | undefined

  ask(wish: FileWish): Promise<string | null> {
    if (hasDialogs) return this.#askSystem(wish)
    this.#settle?.(null)
    this.wish = wish
    return new Promise((settle) => (this.#settle = settle))
  }

  /** The answer to a wish. One that has been answered already, or given up for another, is past answering. */
  answer(wish: FileWish, path: string | null): void {
    if (wish !== this.wish) return
    this.wish = null
    this.#settle?.(path === null || wish.does === 'open' ? path : withKind(path, wish.kinds))
    this.#settle = undefined
  }

  async #askSystem({ does, title, kinds, name }: FileWish): Promise<string | null> {
    // Systems know the last part of an extension only.
    const known = kinds.map((kind) => kind.replace(/^.*\./, ''))
    const at = does === 'save' && name ? { at: withKind(name, kinds) } : {}
    const path = await ask(does === 'open' ? 'dialog/open' : 'dialog/save', { title, kinds: known, ...at })
    return path === null || does === 'open' ? path : withKind(path, kinds)
  }
}

export function chooseFile(): FileAsking {
  return new FileAsking()
}
