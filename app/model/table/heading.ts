/** The heading of a readings table: what each column is taken for, and whether it is levels or a level book. */
import type { FaultsFound } from '../check/faults-found.ts'
import { columnsNamed, type ReadingColumn } from '../pasted-table.ts'

export interface Heading {
  kind: 'levels' | 'book'
  /** Where each column stands, and what it is headed. */
  place: ReadonlyMap<ReadingColumn, number>
  headings: readonly string[]
  /** Heading to what it was taken for, for the eye. */
  taken: Record<string, string>
}

const ALWAYS: readonly ReadingColumn[] = ['round', 'date', 'point']
const OF_LEVELS: readonly ReadingColumn[] = ['level_m', 'sd_mm']
const OF_BOOK: readonly ReadingColumn[] = ['back_m', 'mid_m', 'fore_m', 'sight_m', 'back_sight_m']
const COLUMNS = [...ALWAYS, ...OF_LEVELS, ...OF_BOOK]

/** Columns that people keep beside their readings; they are left out and told so. */
const REMARKS = /^(remarks?|notes?|comments?|observers?|instruments?|weather|time|temperature)$/i

const UNIT = /[\s_-]*[([]?(mm|cm|km|m|ft|in)[)\]]?$/i

/** The heading, or undefined where it is none; faults are noted either way. */
export function headingOf(row: readonly string[], path: string, faults: FaultsFound): Heading | undefined {
  const before = faults.all.length
  const named = columnsNamed(row)
  const place = new Map<ReadingColumn, number>()
  const taken: Record<string, string> = {}
  named.forEach((column, i) => {
    if (column === null) return
    place.set(column, i)
    taken[row[i]!] = column
  })
  if (place.size < 2) {
    faults.add('table.headless', { path, value: row.join(', ') })
    return undefined
  }
  named.forEach((column, i) => {
    if (column === null) noteUntaken(row[i]!, path, place, taken, faults)
  })
  const kind = kindOf(place, path, row, faults)
  // A heading not taken may be that of the column that is missing: told once.
  if (faults.all.length > before) return undefined
  for (const column of neededIn(kind, place))
    if (!place.has(column)) faults.add('column.missing', { path, value: column })
  return faults.all.length > before ? undefined : { kind, place, headings: row, taken }
}

function noteUntaken(
  heading: string,
  path: string,
  place: ReadonlyMap<ReadingColumn, number>,
  taken: Record<string, string>,
  faults: FaultsFound,
): void {
  if (heading === '') return
  const [again, withoutUnit] = [heading, heading.replace(UNIT, '')].map((text) => columnsNamed([text])[0])
  if (again) faults.add('column.repeated', { path, value: heading, detail: { column: again } })
  else if (REMARKS.test(heading)) taken[heading] = 'left out'
  else if (withoutUnit) faults.add('column.unit', { path, value: heading, detail: { column: withoutUnit } })
  else {
    const free = COLUMNS.filter((column) => !place.has(column))
    faults.add('column.unknown', { path, value: heading, detail: faults.nearest(heading, free) })
  }
}

function kindOf(
  place: ReadonlyMap<ReadingColumn, number>,
  path: string,
  row: readonly string[],
  faults: FaultsFound,
): Heading['kind'] {
  const ofLevels = OF_LEVELS.filter((column) => place.has(column))
  const ofBook = OF_BOOK.filter((column) => place.has(column))
  if (ofLevels.length > 0 && ofBook.length > 0)
    faults.add('table.mixed', { path, value: row.join(', '), detail: { columns: [...ofLevels, ...ofBook] } })
  return ofBook.length > 0 ? 'book' : 'levels'
}

/** A book may do without intermediate sights, or without change points, and without sights where their sd is a setup's. */
function neededIn(kind: Heading['kind'], place: ReadonlyMap<ReadingColumn, number>): readonly ReadingColumn[] {
  if (kind === 'levels') return [...ALWAYS, ...OF_LEVELS]
  return [...ALWAYS, 'back_m', ...(place.has('mid_m') ? [] : (['fore_m'] as const))]
}
