/** A level book: every row with its readings, in the order in which they were booked. */
import type { BookRow, LevelBook, SurveyPoint } from '../building.ts'
import { filled } from '../edits/difference.ts'
import type { ElementRef, Place } from '../faults.ts'
import { Entry, type NumberRule } from './entry.ts'

const READINGS = ['back_m', 'mid_m', 'fore_m'] as const
const KEYS = ['point', ...READINGS, 'sight_m', 'back_sight_m']

/** Longer than any staff; negative where the staff hangs from a soffit. A reading in millimetres lies outside. */
const READING: NumberRule = { least: -20, most: 20, remedy: 'Give the staff reading in metres.' }
const SIGHT: NumberRule = { above: 0, most: 1000, remedy: 'Give the length of the sight in metres, above 0.' }
const INSTRUMENT: NumberRule = {
  above: 0,
  most: 100,
  remedy: "Give the instrument's standard deviation in millimetres, above 0.",
}

/** A level further out is not read with, but mended. */
const COLLIMATION: NumberRule = {
  least: -50,
  most: 50,
  remedy: 'Give the collimation error in millimetres over 10 m, as a two-peg test gives it.',
}

interface BookedRow {
  row: BookRow
  path: string
  element: ElementRef
}

export function checkBook(
  round: Entry,
  within: string,
  points: ReadonlyMap<string, SurveyPoint>,
): LevelBook | undefined {
  const book = round.entry('book', ['sd_mm_per_sqrt_km', 'sd_mm_per_setup', 'collimation_mm_per_10_m', 'rows'])
  if (!book) return undefined
  const sd_mm_per_sqrt_km = book.maybeNumber('sd_mm_per_sqrt_km', INSTRUMENT)
  const sd_mm_per_setup = book.maybeNumber('sd_mm_per_setup', INSTRUMENT)
  const collimation_mm_per_10_m = book.maybeNumber('collimation_mm_per_10_m', COLLIMATION)
  const hasPerSetup = book.has('sd_mm_per_setup')
  if (!hasPerSetup && !book.has('sd_mm_per_sqrt_km'))
    book.faults.add('book.sdless', {
      path: book.at('sd_mm_per_sqrt_km'),
      element: book.element!,
      detail: { round: within },
    })

  const booked: BookedRow[] = []
  book.list('rows', (value, path) => {
    const element = { kind: 'row', id: String(booked.length + 1), within } as const
    const entry = Entry.of(book.faults, path, value, KEYS, element)
    const row = entry ? checkRow(entry) : { point: '' }
    const needsSights = (!hasPerSetup && book.has('sd_mm_per_sqrt_km')) || (collimation_mm_per_10_m ?? 0) !== 0
    if (entry && needsSights) noteLengthless(entry, row, within)
    booked.push({ row, path, element })
  })
  if (booked.length === 0 && Array.isArray(book.value('rows'))) book.fault('list.empty', 'rows', { of: 'row' })
  noteOrder(book.faults, booked, within)
  noteUnknown(book.faults, booked, points)
  return filled({ sd_mm_per_sqrt_km, sd_mm_per_setup, collimation_mm_per_10_m, rows: booked.map(({ row }) => row) })
}

function checkRow(entry: Entry): BookRow {
  const point = entry.name('point')
  const row = filled({
    point,
    back_m: entry.maybeNumber('back_m', READING),
    mid_m: entry.maybeNumber('mid_m', READING),
    fore_m: entry.maybeNumber('fore_m', READING),
    sight_m: entry.maybeNumber('sight_m', SIGHT),
    back_sight_m: entry.maybeNumber('back_sight_m', SIGHT),
  })
  const detail = { row: entry.element!.id, point }
  if (!READINGS.some((key) => entry.has(key)))
    entry.faults.add('row.readingless', { path: entry.path, value: point, element: entry.element!, detail })
  if (row.mid_m !== undefined && row.fore_m !== undefined) entry.fault('row.crowded', 'mid_m')
  return row
}

/** Weights by length, and corrections by it, need the length of every sight. */
function noteLengthless(entry: Entry, row: BookRow, round: string): void {
  const needsOwn = row.mid_m !== undefined || row.fore_m !== undefined || !entry.has('back_sight_m')
  if (entry.has('sight_m') || !needsOwn || !READINGS.some((key) => entry.has(key))) return
  entry.faults.add('sight.missing', {
    path: entry.at('sight_m'),
    value: row.point,
    element: entry.element!,
    detail: { round, row: entry.element!.id, point: row.point },
  })
}

/** A setup begins with a backsight, and reads no point twice but the one that it began with, as a check. */
function noteOrder(faults: Entry['faults'], booked: readonly BookedRow[], round: string): void {
  let read: Map<string, string> | undefined
  for (const { row, path, element } of booked) {
    const sight = row.mid_m !== undefined ? 'mid_m' : row.fore_m !== undefined ? 'fore_m' : undefined
    if (sight !== undefined && row.point !== '') {
      const place: Place = { path: `${path}.${sight}`, value: row[sight], element }
      const detail = { round, row: element.id, point: row.point }
      if (!read) faults.add('book.unopened', { ...place, detail })
      else {
        const first = read.get(row.point)
        if (first === undefined) read.set(row.point, path)
        else
          faults.add('point.repeated', {
            path: `${path}.point`,
            value: row.point,
            element,
            detail: { first, setup: 'same' },
          })
      }
    }
    if (row.back_m !== undefined) read = new Map()
  }
}

/** A point that the survey does not describe can only be one that is turned on: read from one setup, and the next begun on it. */
function noteUnknown(
  faults: Entry['faults'],
  booked: readonly BookedRow[],
  points: ReadonlyMap<string, SurveyPoint>,
): void {
  const sighted = new Set<string>()
  const begun = new Set<string>()
  for (const { row } of booked) {
    if (row.fore_m !== undefined || row.mid_m !== undefined) sighted.add(row.point)
    if (row.back_m !== undefined) begun.add(row.point)
  }
  for (const { row, path, element } of booked) {
    if (row.point.trim() === '' || points.has(row.point)) continue
    if (sighted.has(row.point) && begun.has(row.point)) continue
    const detail = { turned: 'no', ...faults.nearest(row.point, points.keys()) }
    faults.add('point.unknown', { path: `${path}.point`, value: row.point, element, detail })
  }
}
