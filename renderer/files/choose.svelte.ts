/**
 * Asking for a file: the system's own dialog in the desktop window, else the chooser of this window, which lists folders
 * through the core.
 */
import { ask, hasDialogs } from '../client.svelte.ts'

export interface FileWish {
  does: 'open' | 'save'
  title: string
  /** Extensions without their dot; the first is given to a name typed without one. */
  kinds: readonly string[]
  /** Proposed name, without its extension. */
  name?: string
}

export class FileAsking {
  wish = $state.raw<FileWish | null>(null)
  #settle: ((path: string | null) => void) | undefined

  ask(wish: FileWish): Promise<string | null> {
    if (hasDialogs) return this.#askSystem(wish)
    this.#settle?.(null)
    this.wish = wish
    return new Promise((settle) => (this.#settle = settle))
  }

  answer(path: string | null): void {
    const wish = this.wish
    this.wish = null
    this.#settle?.(path === null || !wish || wish.does === 'open' ? path : withKind(path, wish.kinds))
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

/** The path with the first of the kinds, unless it ends in one of them. */
export function withKind(path: string, kinds: readonly string[]): string {
  const isKnown = kinds.some((kind) => path.toLowerCase().endsWith(`.${kind}`))
  return isKnown || !kinds[0] ? path : `${path}.${kinds[0]}`
}
