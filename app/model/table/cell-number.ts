/** A cell of a table as a number, where there is only one that it can stand for. */
import { parseNumber, type ParsedNumber } from '../numbers.ts'
import type { ReadingColumn } from '../pasted-table.ts'

/** Beyond these no reading, sight, standard deviation or level lies. */
const MOST: Partial<Record<ReadingColumn, number>> = {
  ...{ back_m: 20, mid_m: 20, fore_m: 20, sight_m: 200, back_sight_m: 200 },
  ...{ level_m: 9000, sd_mm: 100 },
}

/**
 * `decimal` is the sign that the table is known to write before decimals. Where it is not known, `1,234` is
 * read as 1.234 in a column in which 1234 cannot stand, and refused in any other.
 */
export function cellNumber(text: string, column: ReadingColumn, decimal: '.' | ',' | undefined): ParsedNumber {
  const parsed = parseNumber(text, decimal ?? '.')
  if (parsed.ok || decimal !== undefined || parsed.code !== 'number.ambiguous') return parsed
  const fraction = parseNumber(text, ',')
  const most = MOST[column]
  const isOnly = fraction.ok && most !== undefined && Math.abs(fraction.value) * 1000 > most
  return isOnly ? fraction : parsed
}
