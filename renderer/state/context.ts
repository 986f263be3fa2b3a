/** A state that App creates and hands down; asking for one outside of App says so. */
import { getContext, setContext } from 'svelte'

export function contextOf<T>(name: string): { hand: (state: T) => T; use: () => T } {
  const key = Symbol(name)
  return {
    hand: (state) => setContext(key, state),
    use() {
      const state = getContext<T | undefined>(key)
      if (state === undefined) throw new Error(`There is no ${name} here: App hands it down.`)
      return state
    },
  }
}
