/** Delimited text as rows of trimmed cells: quoted cells, doubled quotes, line breaks inside quotes. */

export type Separator = 'tab' | 'semicolon' | 'comma' | 'none'

const SIGNS: Record<Separator, string> = { tab: '\t', semicolon: ';', comma: ',', none: '\n' }

export interface DelimitedRows {
  /** Blank rows are kept, so that a row's number is that of the spreadsheet. */
  rows: string[][]
  /** Row, counted from 1, in which a quote is opened that is never closed. */
  openQuote?: number
}

export function delimitedRows(text: string, separator: Separator): DelimitedRows {
  const sign = SIGNS[separator]
  const rows: string[][] = []
  let row: string[] = []
  let cell = ''
  let quoted = false
  function endCell(): void {
    row.push(cell.trim())
    cell = ''
  }
  for (let i = 0; i < text.length; i++) {
    const next = text[i]!
    if (quoted) {
      if (next !== '"') cell += next
      else if (text[i + 1] === '"') cell += text[i++]
      else quoted = false
    } else if (next === '"' && cell.trim() === '') {
      quoted = true
      cell = ''
    } else if (next === '\n') {
      endCell()
      rows.push(row)
      row = []
    } else if (next === sign) endCell()
    else cell += next
  }
  endCell()
  rows.push(row)
  return quoted ? { rows, openQuote: rows.length } : { rows }
}
