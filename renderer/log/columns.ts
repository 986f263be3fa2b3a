/** Columns of the two grids, and a pasted table set out in them. */
import { columnsNamed, type PastedTable, type ReadingColumn } from '../../app/model/pasted-table.ts'
import type { GridColumn } from './grid-cells.ts'
import type { Cells } from './grid-cells.ts'
import type { RoundKind } from './round-cells.ts'

const POINT: GridColumn = { key: 'point', heading: 'point', kind: 'name', width: 9 }
const BACK_SIGHT: GridColumn = { key: 'back_sight_m', heading: 'back length', unit: 'm', kind: 'number', width: 7 }

const BOOK: readonly GridColumn[] = [
  POINT,
  { key: 'back_m', heading: 'back', unit: 'm', kind: 'number', width: 8 },
  { key: 'mid_m', heading: 'intermediate', unit: 'm', kind: 'number', width: 8 },
  { key: 'fore_m', heading: 'fore', unit: 'm', kind: 'number', width: 8 },
  { key: 'sight_m', heading: 'length', unit: 'm', kind: 'number', width: 6 },
]

const LEVELS: readonly GridColumn[] = [
  POINT,
  { key: 'level_m', heading: 'level', unit: 'm', kind: 'number', width: 10 },
  { key: 'sd_mm', heading: 'sd', unit: 'mm', kind: 'number', width: 6 },
]

/** Columns of a grid; `ownBackLengths` where a backsight's length differs from that of the row's foresight. */
export function columnsOf(kind: RoundKind, ownBackLengths: boolean): readonly GridColumn[] {
  if (kind === 'levels') return LEVELS
  return ownBackLengths ? [...BOOK, BACK_SIGHT] : BOOK
}

export interface Taken {
  rows: Cells[]
  /** Each heading and what it was taken for; null where it is left out. */
  headings: { heading: string; column: ReadingColumn | null }[]
  /** Rounds that the table names, where it does. */
  rounds: string[]
  kind: RoundKind
}

/** A pasted table with headings as rows of the grid; `round` keeps the rows of that round alone. */
export function takenTable(table: PastedTable, round?: string): Taken {
  const named = columnsNamed(table.header ?? [])
  const at = named.indexOf('round')
  const kept = table.rows.filter((row) => round === undefined || at < 0 || row[at] === round)
  const isLevels = named.includes('level_m')
  const keys = (isLevels ? LEVELS : [...BOOK, BACK_SIGHT]).map((column) => column.key)
  return {
    rows: kept.map((row) =>
      Object.fromEntries(
        named.flatMap((column, i) => (column !== null && keys.includes(column) ? [[column, row[i] ?? '']] : [])),
      ),
    ),
    headings: (table.header ?? []).map((heading, i) => {
      const column = named[i] ?? null
      return { heading, column: column !== null && keys.includes(column) ? column : null }
    }),
    rounds: at < 0 ? [] : [...new Set(table.rows.map((row) => row[at] ?? ''))],
    kind: isLevels ? 'levels' : 'book',
  }
}
