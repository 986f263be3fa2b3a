/**
 * Asking for a file: the system's own dialog in the desktop window, else the chooser of this window, which lists folders
 * through the core.
 */
import { ask, hasDialogs } from '../client.svelte.ts'
import { folderOf, withKind, type FileWish } from './wish.ts'

export class FileAsking {
  wish = $state.raw<FileWish | null>(null)
  /** The folder that was looked at last. */
  folder: string | undefined
  readonly #beside: () => string | undefined
  #settle: ((path: string | null) => void) | undefined

  constructor(beside: () => string | undefined) {
    this.#beside = beside
  }

  /** Where to begin: where the last file was, else beside the project that is open. */
  get place(): string | undefined {
    return this.folder ?? folderOf(this.#beside() ?? '')
  }

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

/** `beside` gives the path of the project that is open. */
export function chooseFile(beside: () => string | undefined = () => undefined): FileAsking {
  return new FileAsking(beside)
}
