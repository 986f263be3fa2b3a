/** Where a key moves to in a grid, as hands know it from spreadsheets. */
import type { Spot } from './grid-cells.ts'

export interface Size {
  rows: number
  columns: number
}

const PAGE = 10

/**
 * The spot that a key leads to, or undefined where it leads nowhere or out of the grid. `start` is the column in
 * which a run of Tab keys began: Enter goes back to it one row down.
 */
export function moved(
  from: Spot,
  key: { key: string; shift: boolean; control: boolean },
  size: Size,
  start: number,
): Spot | undefined {
  const { row, column } = from
  const [bottom, right] = [size.rows - 1, size.columns - 1]
  switch (key.key) {
    case 'ArrowUp':
      return within({ row: key.control ? 0 : row - 1, column }, size)
    case 'ArrowDown':
      return within({ row: key.control ? bottom : row + 1, column }, size)
    case 'ArrowLeft':
      return within({ row, column: key.control ? 0 : column - 1 }, size)
    case 'ArrowRight':
      return within({ row, column: key.control ? right : column + 1 }, size)
    case 'Home':
      return { row: key.control ? 0 : row, column: 0 }
    case 'End':
      return { row: key.control ? bottom : row, column: right }
    case 'PageUp':
      return { row: Math.max(0, row - PAGE), column }
    case 'PageDown':
      return { row: Math.min(bottom, row + PAGE), column }
    case 'Enter':
      return within({ row: key.shift ? row - 1 : row + 1, column: key.shift ? column : start }, size)
    case 'Tab': {
      const next = row * size.columns + column + (key.shift ? -1 : 1)
      return within(
        { row: Math.floor(next / size.columns), column: ((next % size.columns) + size.columns) % size.columns },
        size,
      )
    }
    default:
      return undefined
  }
}

function within(spot: Spot, size: Size): Spot | undefined {
  const inside = spot.row >= 0 && spot.row < size.rows && spot.column >= 0 && spot.column < size.columns
  return inside ? spot : undefined
}
