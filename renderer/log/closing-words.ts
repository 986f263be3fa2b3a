/** What a level book's checks come to, a sentence each. */
import type { BookView, MisclosureView } from '../../app/assess/level-book.ts'
import { fixed, level } from '../../app/model/numbers.ts'

export interface Said {
  text: string
  isDoubtful: boolean
}

export function closingWords(page: BookView): Said[] {
  if (!page.checks) return []
  return [
    ...page.misclosures.map(closure),
    ...openBook(page),
    ...suspects(page),
    ...page.hints.map((text) => ({ text, isDoubtful: true })),
    arithmetic(page.checks),
    ...benchmarks(page),
    ...loose(page),
  ]
}

function closure({
  from,
  to,
  setups,
  length_km,
  misclosure_mm,
  allowed_mm,
  predicted_mm,
  within,
}: MisclosureView): Said {
  const way = from === to ? `The loop from ${from} closes` : `The line from ${from} to ${to} closes`
  const along = [
    `${setups} ${setups === 1 ? 'setup' : 'setups'}`,
    length_km === undefined ? '' : `${fixed(length_km, 3)} km`,
  ]
  const held = [
    allowed_mm === undefined ? '' : `allowed ${fixed(allowed_mm, 1)}`,
    predicted_mm === undefined ? '' : `the instrument lets expect ${fixed(predicted_mm, 1)}`,
  ]
  const limits = held.filter(Boolean).join(', ')
  return {
    text: `${way} to ${fixed(misclosure_mm, 1)} mm over ${along.filter(Boolean).join(', ')}${limits && `; ${limits} mm`}.`,
    isDoubtful: within === false,
  }
}

function openBook({ misclosures }: BookView): Said[] {
  if (misclosures.length > 0) return []
  return [{ text: 'The book does not close on a benchmark yet: nothing checks it.', isDoubtful: false }]
}

function suspects({ suspects: readings }: BookView): Said[] {
  return readings.slice(0, 3).map(({ row, point, sight, error_mm, causes }) => ({
    text: `Row ${row}, ${sight}sight on ${point}: off by about ${fixed(error_mm, 1)} mm${causes?.length ? `; it looks as if ${causes.join(', or ')}` : ''}.`,
    isDoubtful: true,
  }))
}

function arithmetic({ back_m, fore_m, gain_m, agrees }: NonNullable<BookView['checks']>): Said {
  const sums = `backsights ${level(back_m)} − foresights ${level(fore_m)} = ${level(back_m - fore_m)} m`
  return {
    text: agrees
      ? `Arithmetic holds: ${sums}.`
      : `Arithmetic: ${sums}, but the levels gain ${level(gain_m)} m. The book may be unfinished.`,
    isDoubtful: false,
  }
}

function benchmarks({ benchmarks: checks }: BookView): Said[] {
  if (checks.length === 0)
    return [{ text: 'One benchmark is read; that it stands still is assumed.', isDoubtful: false }]
  return checks.map(({ point, difference_mm, sd_mm, agrees }) => ({
    text: `${point} is found ${fixed(Math.abs(difference_mm), 1)} ± ${fixed(sd_mm, 1)} mm ${difference_mm < 0 ? 'below' : 'above'} its level${agrees ? '.' : ': it may have moved, or the other has.'}`,
    isDoubtful: !agrees,
  }))
}

function loose({ uncontrolled_rows: rows, degrees_of_freedom }: BookView): Said[] {
  if (rows.length === 0 || degrees_of_freedom === undefined) return []
  const which = rows.length > 6 ? `${rows.slice(0, 5).join(', ')} and ${rows.length - 5} more` : rows.join(', ')
  return [
    {
      text: `Nothing controls the reading${rows.length === 1 ? '' : 's'} of row ${which}: a blunder there would not be seen.`,
      isDoubtful: false,
    },
  ]
}
