/** What a new round is offered with: the next name, the day, and what does not change from visit to visit. */
import type { Round } from '../../app/model/building.ts'
import { dateFault } from '../../app/model/check/check-date.ts'
import { filled } from '../../app/model/edits/difference.ts'
import { Fault } from '../../app/model/faults.ts'
import type { Cells } from './grid-cells.ts'
import type { RoundKind } from './round-cells.ts'

interface Visit extends Round {
  observer?: string
  instrument?: string
}

/** The next name of the kind in use: R0, R1, ... */
export function nextRoundName(taken: readonly string[]): string {
  for (let k = 0; ; k++) if (!taken.includes(`R${k}`)) return `R${k}`
}

/** The calendar day at this place, yyyy-mm-dd. */
export function today(now: Date): string {
  const [month, day] = [now.getMonth() + 1, now.getDate()].map((n) => String(n).padStart(2, '0'))
  return `${now.getFullYear()}-${month}-${day}`
}

/** A draft without readings, with the observer, the instrument and its sd of the round before. Throws a Fault. */
export function draftAfter(
  last: Visit | undefined,
  { id, date, kind }: { id: string; date: string; kind: RoundKind },
  taken: readonly string[],
): Visit {
  const element = { kind: 'round', id } as const
  if (taken.includes(id)) throw new Fault('name.taken', { element, value: id })
  const wrong = dateFault(date)
  if (wrong)
    throw new Fault(wrong.code, { element, path: 'date', value: date, ...(wrong.detail && { detail: wrong.detail }) })
  const { sd_mm_per_sqrt_km, sd_mm_per_setup } = last?.book ?? {}
  return filled({
    id,
    date,
    observer: last?.observer,
    instrument: last?.instrument,
    ...(kind === 'levels' ? { levels: [] } : { book: filled({ sd_mm_per_sqrt_km, sd_mm_per_setup, rows: [] }) }),
  })
}

/** The points of a round in the order in which they were read, ready for new readings. */
export function pointsOf(round: Round): Cells[] {
  return (round.book?.rows ?? round.levels ?? []).map(({ point }) => ({ point }))
}
