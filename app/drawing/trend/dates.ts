/** Calendar days as numbers, and the ticks of an axis of dates. Days are whole and know no time zone. */

const DAY = 86_400_000
const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec']
/** Months between ticks that the eye takes in. */
const STEPS = [1, 2, 3, 6, 12, 24, 60, 120, 240, 600]

export interface DateTick {
  day: number
  words: string
  /** Set under the first tick and under the first of each year. */
  year?: string
}

/** Days since 1970 of a calendar day, yyyy-mm-dd. */
export function dayOf(date: string): number {
  return Math.round(Date.parse(`${date}T00:00:00Z`) / DAY)
}

/** The first of months between two days, as many as fit; weeks where the time is shorter than two months. */
export function dateTicks(from: number, to: number, most: number): DateTick[] {
  const months = (to - from) / 30.44
  if (months < 2) return dayTicks(from, to, most)
  const step = STEPS.find((s) => months / s <= most) ?? STEPS.at(-1)!
  const start = new Date(from * DAY)
  const first = Math.ceil((start.getUTCFullYear() * 12 + start.getUTCMonth()) / step) * step
  const ticks: DateTick[] = []
  for (let m = first; ; m += step) {
    const day = Math.round(Date.UTC(Math.floor(m / 12), m % 12, 1) / DAY)
    if (day > to) break
    if (day < from) continue
    const year = String(Math.floor(m / 12))
    if (step >= 12) ticks.push({ day, words: year })
    else ticks.push({ day, words: MONTHS[m % 12]!, ...(isNewYear(ticks, year) ? { year } : {}) })
  }
  return ticks
}

function dayTicks(from: number, to: number, most: number): DateTick[] {
  const step = [1, 2, 7, 14, 28, 56].find((s) => (to - from) / s <= most) ?? 56
  const ticks: DateTick[] = []
  for (let day = from; day <= to; day += step) {
    const at = new Date(day * DAY)
    const year = String(at.getUTCFullYear())
    ticks.push({
      day,
      words: `${at.getUTCDate()} ${MONTHS[at.getUTCMonth()]!}`,
      ...(isNewYear(ticks, year) ? { year } : {}),
    })
  }
  return ticks
}

function isNewYear(ticks: readonly DateTick[], year: string): boolean {
  return (ticks.findLast((t) => t.year !== undefined)?.year ?? '') !== year
}
