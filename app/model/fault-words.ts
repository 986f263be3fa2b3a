/** How values and names are set into the sentences of faults. */
import type { Place } from './faults.ts'

export interface FaultMessage {
  what: (place: Place) => string
  kept: string
  todo: (place: Place) => string
}

export const NOTHING_WRITTEN = 'Nothing was written.'

/** A value as it is shown in a sentence: short, quoted where it is text. */
export function shown(value: unknown): string {
  if (value === undefined) return 'nothing'
  if (typeof value === 'number') return String(value)
  const text = JSON.stringify(value) ?? String(value)
  return text.length > 60 ? `${text.slice(0, 57)}...` : text
}

/** Names in a sentence: the first few, and how many more. */
export function list(names: unknown): string {
  const all = Array.isArray(names) ? names.map(String) : []
  return all.length > 4 ? `${all.slice(0, 3).join(', ')} and ${all.length - 3} more` : all.join(', ')
}

/** Words in a sentence, every one of them. */
export function all(names: unknown): string {
  return Array.isArray(names) ? names.map(String).join(', ') : shown(names)
}

/** The element and key that a value stands at: `Section beam-300x600: E_GPa`. */
export function subject(place: Place): string {
  if (place.path?.startsWith('row ')) return `R${place.path.slice(1)}`
  const key = /[^.]+$/.exec(place.path ?? '')?.[0] ?? 'What was read'
  const { element } = place
  if (!element || element.id === '' || element.kind === 'building' || element.kind === 'criteria') return key
  const within =
    element.within === undefined ? '' : ` of ${element.kind === 'row' ? 'round' : 'frame line'} ${element.within}`
  return `${element.kind[0]!.toUpperCase()}${element.kind.slice(1)} ${element.id}${within}: ${key}`
}

/** The nearest right word as the end of a sentence; nothing where none is near. */
export function meant(place: Place): string {
  const { nearest } = place.detail ?? {}
  return nearest === undefined ? '' : ` Is ${String(nearest)} meant?`
}
