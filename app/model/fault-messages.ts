/** The catalogue of fault sentences by code. A test goes through all codes and fails on a missing one. */
import type { Place } from './faults.ts'

export interface FaultMessage {
  what: (place: Place) => string
  kept: string
  todo: (place: Place) => string
}

/** A value as it is shown in a sentence: short, quoted where it is text. */
export function shown(value: unknown): string {
  if (value === undefined) return 'nothing'
  if (typeof value === 'number') return String(value)
  const text = JSON.stringify(value) ?? String(value)
  return text.length > 60 ? `${text.slice(0, 57)}...` : text
}

const NOTHING_WRITTEN = 'Nothing was written.'

export const catalogue = {
  'request.unknown': {
    what: (p) => `There is no request named ${shown(p.value)}.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Use one of the requests of this version.',
  },
  'request.malformed': {
    what: (p) => `The request is not of its form${p.path ? ` at ${p.path}` : ''}.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Send what the request takes.',
  },
  'work.stopped': {
    what: () => 'The work was stopped.',
    kept: NOTHING_WRITTEN,
    todo: () => 'Start it again when you want its result.',
  },
} satisfies Record<string, FaultMessage>

export type FaultCode = keyof typeof catalogue
