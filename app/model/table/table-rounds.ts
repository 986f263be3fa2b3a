/** Rows of a readings table gathered into rounds, each cell kept with the row and column it stands in. */
import type { FaultsFound } from '../check/faults-found.ts'
import type { ElementRef } from '../faults.ts'
import type { ReadingColumn } from '../pasted-table.ts'
import { cellNumber } from './cell-number.ts'
import { decimalSign } from './decimal-sign.ts'
import type { Heading } from './heading.ts'

export interface NumberedRow {
  /** Counted from 1, the heading included, as a spreadsheet does. */
  number: number
  cells: readonly string[]
}

/** A round as the table has it, before it is held to the building. */
export interface TableRound {
  id: string
  date: string
  /** Entries of its levels or of its book. */
  entries: Record<string, unknown>[]
  /** Row of the table of each entry. */
  rows: number[]
}

const NUMBERS: readonly ReadingColumn[] = [
  ...(['level_m', 'sd_mm'] as const),
  ...(['back_m', 'mid_m', 'fore_m', 'sight_m', 'back_sight_m'] as const),
]

/** `row 12, column back_m`, the column as it is headed. */
export function cellPath(heading: Heading, row: number, column: ReadingColumn): string {
  const at = heading.place.get(column)
  return `row ${row}, column ${at === undefined ? column : heading.headings[at]}`
}

export function tableRounds(heading: Heading, rows: readonly NumberedRow[], faults: FaultsFound): TableRound[] {
  const columns = NUMBERS.filter((column) => heading.place.has(column))
  const decimal = decimalSign(
    rows.flatMap(({ cells }) => columns.map((column) => cells[heading.place.get(column)!] ?? '')),
  )
  const rounds = new Map<string, TableRound>()
  for (const row of rows) {
    const surplus = row.cells.slice(heading.headings.length).some((cell) => cell !== '')
    if (surplus) {
      const most = heading.headings.length
      faults.add('row.long', { path: `row ${row.number}`, value: row.cells.length, detail: { most } })
      continue
    }
    const round = roundOf(heading, row, rounds, faults)
    if (!round) continue
    const entry: Record<string, unknown> = { point: textIn(heading, row, 'point') }
    const element: ElementRef = { kind: 'row', id: String(round.rows.length + 1), within: round.id }
    for (const column of columns) {
      const text = textIn(heading, row, column)
      if (text === '' && heading.kind === 'book') continue
      const parsed = cellNumber(text, column, decimal)
      if (parsed.ok) entry[column] = parsed.value
      else {
        faults.add(parsed.code, { path: cellPath(heading, row.number, column), value: text, element })
        entry[column] = NaN // stands for the cell, whose fault is told
      }
    }
    round.entries.push(entry)
    round.rows.push(row.number)
  }
  return [...rounds.values()]
}

function textIn(heading: Heading, row: NumberedRow, column: ReadingColumn): string {
  return row.cells[heading.place.get(column)!] ?? ''
}

/** The round that a row belongs to; undefined where it names none. */
function roundOf(
  heading: Heading,
  row: NumberedRow,
  rounds: Map<string, TableRound>,
  faults: FaultsFound,
): TableRound | undefined {
  const id = textIn(heading, row, 'round')
  const date = textIn(heading, row, 'date')
  if (id === '') {
    faults.add('name.empty', { path: cellPath(heading, row.number, 'round'), value: id })
    return undefined
  }
  const round = rounds.get(id)
  if (!round) {
    const made: TableRound = { id, date, entries: [], rows: [] }
    rounds.set(id, made)
    return made
  }
  if (round.date !== date) {
    const detail = { round: id, other: round.date }
    const element: ElementRef = { kind: 'round', id }
    faults.add('date.divided', { path: cellPath(heading, row.number, 'date'), value: date, element, detail })
  }
  return round
}
