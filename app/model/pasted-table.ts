/**
 * Text pasted from a spreadsheet or a readings file, as rows of cells, and what its headings are taken for.
 * The numbers in it are left as they were written: the grid that takes them reads and checks each cell.
 */
import { delimitedRows, type Separator } from './delimited-rows.ts'

export interface PastedTable {
  separator: Separator
  /** Present where the first row names at least two columns that a grid can take. */
  header?: string[]
  rows: string[][]
}

export type ReadingColumn =
  'round' | 'date' | 'point' | 'back_m' | 'mid_m' | 'fore_m' | 'sight_m' | 'back_sight_m' | 'level_m' | 'sd_mm'

/** Words that stand over each column in practice, without space, sign and unit. */
const HEADINGS: Record<ReadingColumn, readonly string[]> = {
  round: ['round', 'visit', 'epoch'],
  date: ['date', 'day'],
  point: ['point', 'stud', 'mark', 'station', 'name', 'id'],
  back_m: ['back', 'backsight', 'bs'],
  mid_m: ['mid', 'intermediate', 'intermediatesight', 'midsight', 'is'],
  fore_m: ['fore', 'foresight', 'fs'],
  sight_m: ['sight', 'sightlength', 'distance', 'dist', 'foresightlength'],
  back_sight_m: ['backsightlength', 'backlength', 'backdistance'],
  level_m: ['level', 'reducedlevel', 'rl', 'elevation', 'height'],
  sd_mm: ['sd', 'standarddeviation', 'stdev', 'sigma'],
}

/** Reads pasted text as a table; empty rows go, cells are trimmed. */
export function pastedTable(text: string): PastedTable {
  const clean = text.replace(/^\uFEFF/, '').replace(/\r\n?/g, '\n')
  const separator = separatorOf(clean)
  const all = delimitedRows(clean, separator).rows.filter((row) => row.some((cell) => cell !== ''))
  const named = all[0] ? columnsNamed(all[0]).filter((column) => column !== null).length : 0
  return named >= 2 ? { separator, header: all[0]!, rows: all.slice(1) } : { separator, rows: all }
}

/** What each heading is taken for; null where it names nothing that a grid can take, or names it again. */
export function columnsNamed(header: readonly string[]): (ReadingColumn | null)[] {
  const taken = new Set<ReadingColumn>()
  return header.map((heading) => {
    const column = columnOf(heading)
    if (!column || taken.has(column)) return null
    taken.add(column)
    return column
  })
}

/** A heading that names another unit than the column's is not taken: nothing is a thousand times wrong in silence. */
function columnOf(heading: string): ReadingColumn | undefined {
  const plain = heading.trim().toLowerCase()
  const columns = Object.keys(HEADINGS) as ReadingColumn[]
  const own = columns.find((column) => column === plain)
  if (own) return own
  const parts = /^(?<name>.*?)(?:[\s_-]*[([]\s*(?<inner>[a-zµ]*)\s*[)\]]|[\s_-]+(?<outer>mm|cm|km|m|ft|in))?$/u.exec(
    plain,
  )
  const unit = parts?.groups?.inner ?? parts?.groups?.outer ?? ''
  const word = (parts?.groups?.name ?? plain).replace(/[^a-z]/g, '')
  const column = columns.find((c) => HEADINGS[c].includes(word))
  return column && (unit === '' || column.endsWith(`_${unit}`)) ? column : undefined
}

/**
 * A tab always separates, a semicolon separates where there is no tab. A comma separates only where it cannot
 * be a decimal comma: where a row holds a point as well, or a word, or two commas and more.
 */
function separatorOf(text: string): Separator {
  if (text.includes('\t')) return 'tab'
  if (text.includes(';')) return 'semicolon'
  const lines = text.split('\n').filter((line) => line.trim() !== '')
  const separates = lines.some((line) => {
    const cells = line.split(',')
    return cells.length > 2 || (cells.length === 2 && !/^\s*[-+]?\d+,\d+\s*$/.test(line))
  })
  return separates ? 'comma' : 'none'
}
