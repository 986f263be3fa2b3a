/** Cells of a grid as they are typed: rows of text by column, with what a spreadsheet does to them. */

export type Cells = Readonly<Record<string, string>>

export interface GridColumn {
  key: string
  heading: string
  unit?: string
  kind: 'name' | 'number'
  /** Width in characters. */
  width: number
}

export interface Spot {
  row: number
  column: number
}

export function cellOf(rows: readonly Cells[], row: number, key: string): string {
  return rows[row]?.[key] ?? ''
}

/** The rows with one cell set; rows before it come into being as needed, blank ones at the end go. */
export function withCell(rows: readonly Cells[], row: number, key: string, text: string): Cells[] {
  const next: Cells[] = [...rows]
  while (next.length <= row) next.push({})
  next[row] = { ...next[row], [key]: text }
  return withoutBlankEnd(next)
}

/** The rows with a block of cells put down from a spot on, to the right and downwards. */
export function withBlock(
  rows: readonly Cells[],
  keys: readonly string[],
  at: Spot,
  block: readonly (readonly string[])[],
): Cells[] {
  const next: Cells[] = [...rows]
  block.forEach((line, i) => {
    while (next.length <= at.row + i) next.push({})
    const row = { ...next[at.row + i] }
    line.forEach((text, j) => {
      const key = keys[at.column + j]
      if (key !== undefined) row[key] = text
    })
    next[at.row + i] = row
  })
  return withoutBlankEnd(next)
}

export function withRowAt(rows: readonly Cells[], row: number): Cells[] {
  return row >= rows.length ? [...rows] : [...rows.slice(0, row), {}, ...rows.slice(row)]
}

export function withoutRow(rows: readonly Cells[], row: number): Cells[] {
  return withoutBlankEnd(rows.filter((_, i) => i !== row))
}

export function isBlank(row: Cells | undefined): boolean {
  return !row || Object.values(row).every((text) => text.trim() === '')
}

function withoutBlankEnd(rows: Cells[]): Cells[] {
  let end = rows.length
  while (end > 0 && isBlank(rows[end - 1])) end--
  return rows.slice(0, end)
}

/** The known name that what was typed begins, the unused ones first; undefined where it is a name already. */
export function completed(typed: string, names: readonly string[], used: ReadonlySet<string>): string | undefined {
  const start = typed.toLowerCase()
  if (start === '' || names.some((name) => name.toLowerCase() === start)) return undefined
  const begun = names.filter((name) => name.toLowerCase().startsWith(start))
  return begun.find((name) => !used.has(name)) ?? begun[0]
}

/** A known name as it is written, whatever case it was typed in. */
export function asKnown(typed: string, names: readonly string[]): string {
  const plain = typed.trim()
  return (
    names.find((name) => name === plain) ?? names.find((name) => name.toLowerCase() === plain.toLowerCase()) ?? plain
  )
}
