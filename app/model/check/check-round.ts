/** One visit: its date, and the levels given or the level book. */
import type { GivenLevel, Round, SurveyPoint } from '../building.ts'
import { filled } from '../edits/difference.ts'
import { checkBook } from './check-book.ts'
import { dateFault } from './check-date.ts'
import { LEVEL } from './check-points.ts'
import { Entry, type NumberRule } from './entry.ts'

export const SD: NumberRule = {
  above: 0,
  most: 1000,
  remedy: 'Give the standard deviation in millimetres, above 0; no reading is free of error.',
}
const KEYS = ['id', 'date', 'levels', 'book']

export function checkRoundEntry(round: Entry, points: ReadonlyMap<string, SurveyPoint>): Round {
  const id = round.name('id')
  round.element = { kind: 'round', id }
  const date = checkDate(round)
  const hasLevels = round.has('levels')
  const hasBook = round.has('book')
  if (hasLevels && hasBook) round.faults.add('round.doubled', placeOf(round, id))
  else if (!hasLevels && !hasBook) round.faults.add('round.readingless', placeOf(round, id))
  return filled({
    id,
    date,
    levels: hasLevels ? checkLevels(round, id, points) : undefined,
    book: hasBook ? checkBook(round, id, points) : undefined,
  })
}

/** The round as an entry; `more` are keys that a draft has besides. */
export function roundEntry(
  faults: Entry['faults'],
  path: string,
  value: unknown,
  more: readonly string[] = [],
): Entry | undefined {
  return Entry.of(faults, path, value, [...KEYS, ...more])
}

function placeOf(round: Entry, id: string) {
  return { path: round.path, value: id, element: round.element!, detail: { round: id } }
}

function checkDate(round: Entry): string {
  const date = round.neededText('date', 'the day in quotes, as "2026-03-02"')
  const fault = date === undefined ? undefined : dateFault(date)
  if (fault) round.fault(fault.code, 'date', fault.detail)
  return date ?? ''
}

function checkLevels(round: Entry, within: string, points: ReadonlyMap<string, SurveyPoint>): GivenLevel[] {
  const first = new Map<string, string>()
  const unread = unreadPoints(round.value('levels'), points)
  let row = 0
  const levels = round.list('levels', (value, path): GivenLevel => {
    row += 1
    const element = { kind: 'row', id: String(row), within } as const
    const entry = Entry.of(round.faults, path, value, ['point', 'level_m', 'sd_mm'], element)
    if (!entry) return { point: '', level_m: NaN, sd_mm: NaN }
    const point = entry.name('point')
    const before = first.get(point)
    if (point.trim() === '') return { point, level_m: NaN, sd_mm: NaN }
    if (!points.has(point)) entry.fault('point.unknown', 'point', round.faults.nearest(point, unread))
    if (before !== undefined) entry.fault('point.repeated', 'point', { first: before })
    else first.set(point, path)
    return { point, level_m: entry.number('level_m', LEVEL), sd_mm: entry.number('sd_mm', SD) }
  })
  if (row === 0 && Array.isArray(round.value('levels'))) round.fault('list.empty', 'levels', { of: 'level' })
  return levels
}

/** A misspelt point most likely stands for one that the round has not. */
function unreadPoints(levels: unknown, points: ReadonlyMap<string, SurveyPoint>): string[] {
  const rows: unknown[] = Array.isArray(levels) ? levels : []
  const read = new Set(rows.map((row) => (row as { point?: unknown } | null)?.point))
  return [...points.keys()].filter((point) => !read.has(point))
}
