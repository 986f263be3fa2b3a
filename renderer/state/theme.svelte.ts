/** The drawing's theme, following the system. */
import { darkTheme, lightTheme, type Theme } from '../../app/drawing/theme.ts'
import { contextOf } from './context.ts'

export class ThemeState {
  #dark = $state(false)

  constructor(query: MediaQueryList = matchMedia('(prefers-color-scheme: dark)')) {
    this.#dark = query.matches
    query.addEventListener('change', () => (this.#dark = query.matches))
  }

  get drawing(): Theme {
    return this.#dark ? darkTheme : lightTheme
  }
}

const context = contextOf<ThemeState>('theme')
export const handTheme = context.hand
export const useTheme = context.use
