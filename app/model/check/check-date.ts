/** Calendar days as yyyy-mm-dd. */
import type { FaultCode, Place } from '../faults.ts'

const DAYS = [31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31]

/** What is wrong with a day; undefined where it is one. */
export function dateFault(date: string): { code: FaultCode; detail?: NonNullable<Place['detail']> } | undefined {
  const parts = /^(\d{4})-(\d{2})-(\d{2})$/.exec(date)
  if (!parts) {
    const meant = dayMeant(date.trim())
    return { code: 'date.malformed', ...(meant !== undefined && { detail: { date: meant } }) }
  }
  return isDay(Number(parts[1]), Number(parts[2]), Number(parts[3])) ? undefined : { code: 'date.impossible' }
}

function isDay(year: number, month: number, day: number): boolean {
  if (year < 1800 || month < 1 || month > 12 || day < 1) return false
  const leap = year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0)
  return day <= (month === 2 && leap ? 29 : DAYS[month - 1]!)
}

/** The day that another way of writing stands for, where it can stand for one only. */
export function dayMeant(text: string): string | undefined {
  const yearFirst =
    /^(\d{4})[-/. ](\d{1,2})[-/. ](\d{1,2})(?:[T ].*)?$/.exec(text) ?? /^(\d{4})(\d{2})(\d{2})$/.exec(text)
  if (yearFirst) return written(yearFirst[1]!, yearFirst[2]!, yearFirst[3]!)
  const yearLast = /^(\d{1,2})([-/. ])(\d{1,2})[-/. ](\d{4})$/.exec(text)
  if (!yearLast) return undefined
  const [, a, sign, b, year] = yearLast
  // Points stand in dates that begin with the day; slashes in both kinds.
  if (sign === '.' || a === b || Number(a) > 12) return written(year!, b!, a!)
  return Number(b) > 12 ? written(year!, a!, b!) : undefined
}

function written(year: string, month: string, day: string): string | undefined {
  if (!isDay(Number(year), Number(month), Number(day))) return undefined
  return `${year}-${month.padStart(2, '0')}-${day.padStart(2, '0')}`
}
