/** Rounds as readings tables, one for levels and one for level books, as `read-readings.ts` reads them. */
import type { Round } from './building.ts'
import type { ReadingColumn } from './pasted-table.ts'

const OF_LEVELS: readonly ReadingColumn[] = ['round', 'date', 'point', 'level_m', 'sd_mm']
const OF_BOOKS: readonly ReadingColumn[] = ['round', 'date', 'point', 'back_m', 'mid_m', 'fore_m', 'sight_m']

/** Undefined where there is no round of that kind. A table has no place for what a book says of its instrument. */
export interface ReadingsTables {
  levels?: string
  books?: string
}

export function writeReadings(rounds: readonly Round[]): ReadingsTables {
  const levels = rounds.flatMap((round) => rowsOf(round, round.levels))
  const books = rounds.flatMap((round) => rowsOf(round, round.book?.rows))
  const hasBackSights = books.some((row) => row.back_sight_m !== undefined)
  return {
    ...(levels.length > 0 && { levels: table(OF_LEVELS, levels) }),
    ...(books.length > 0 && { books: table(hasBackSights ? [...OF_BOOKS, 'back_sight_m'] : OF_BOOKS, books) }),
  }
}

type Row = Partial<Record<ReadingColumn, string | number>>

function rowsOf({ id, date }: Round, readings: readonly object[] = []): Row[] {
  return readings.map((reading) => ({ round: id, date, ...reading }))
}

function table(columns: readonly ReadingColumn[], rows: readonly Row[]): string {
  const lines = [columns, ...rows.map((row) => columns.map((column) => row[column]))]
  return lines.map((line) => `${line.map(cell).join(',')}\n`).join('')
}

function cell(value: string | number | undefined): string {
  const text = value === undefined ? '' : String(value)
  return /[",;\t\n\r]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text
}
