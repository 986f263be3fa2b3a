/** The drawing's theme, following the system; on paper it is always that of paper. */
import { flushSync } from 'svelte'
import { darkTheme, lightTheme, type Theme } from '../../app/drawing/theme.ts'
import { contextOf } from './context.ts'

export class ThemeState {
  #dark = $state(false)
  #printing = $state(false)
  #large = $state(false)

  constructor(query: MediaQueryList = matchMedia('(prefers-color-scheme: dark)')) {
    this.#dark = query.matches
    query.addEventListener('change', () => (this.#dark = query.matches))
    // The page is laid out for print as soon as these have been heard.
    addEventListener('beforeprint', () => flushSync(() => (this.#printing = true)))
    addEventListener('afterprint', () => (this.#printing = false))
  }

  /** For a screen in the sun, or read from a step away. */
  get isLarge(): boolean {
    return this.#large
  }

  set isLarge(large: boolean) {
    this.#large = large
    document.documentElement.classList.toggle('large', large)
  }

  get drawing(): Theme {
    return this.#dark && !this.#printing ? darkTheme : lightTheme
  }
}

const context = contextOf<ThemeState>('theme')
export const handTheme = context.hand
export const useTheme = context.use
