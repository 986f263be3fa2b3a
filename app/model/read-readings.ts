/**
 * A readings table, from its text or bytes to rounds of a building: levels or level books, with whatever separates
 * cells and stands before decimals. Every fault is listed by row and column; rounds are given only where there is none.
 */
import type { Building, Round } from './building.ts'
import { checkRoundEntry, roundEntry } from './check/check-round.ts'
import { pointsByName } from './check/check-survey.ts'
import { FaultsFound } from './check/faults-found.ts'
import { decodeText } from './decode-text.ts'
import { delimitedRows, type Separator } from './delimited-rows.ts'
import { faultsOf, InputFault, type Place } from './faults.ts'
import type { ReadingColumn } from './pasted-table.ts'
import { bookSd } from './table/book-sd.ts'
import { headingOf, type Heading } from './table/heading.ts'
import { cellPath, tableRounds, type NumberedRow, type TableRound } from './table/table-rounds.ts'

export interface Readings {
  rounds: Round[]
  /** Heading to the column that it was taken for, or `left out`. */
  columns: Record<string, string>
  /** What was taken for granted, a sentence each: the standard deviation of a book's instrument. */
  notes: string[]
}

/** The rounds of the table. Throws an InputFault that lists all its faults. */
export function readReadings(input: string | Uint8Array, building: Pick<Building, 'survey'>, file?: string): Readings {
  const faults = new FaultsFound(file)
  const rows = rowsOf(input, file, faults)
  if (rows.length === 0) faults.add('file.empty', {})
  const heading = rows[0] && headingOf(rows[0].cells, `row ${rows[0].number}`, faults)
  if (!heading) throw new InputFault(faults.all)
  if (rows.length === 1)
    faults.add('table.rowless', { path: `row ${rows[0]!.number}`, value: heading.headings.join(', ') })
  const present = new Set(building.survey.rounds.map((round) => round.id))
  const points = pointsByName(building.survey.points)
  const notes: string[] = []
  const rounds = tableRounds(heading, rows.slice(1), faults).map((round) => {
    if (present.has(round.id))
      faults.add('round.present', {
        path: cellPath(heading, round.rows[0]!, 'round'),
        value: round.id,
        element: { kind: 'round', id: round.id },
      })
    const { value, note } = roundValue(heading, round, building)
    if (note !== undefined) notes.push(note)
    const found = new FaultsFound(file)
    const entry = roundEntry(found, '', value)!
    const checked = checkRoundEntry(entry, points)
    moveFaults(found, faults, heading, round)
    return checked
  })
  if (faults.all.length > 0) throw new InputFault(inOrder(faults))
  return { rounds, columns: heading.taken, notes }
}

function rowsOf(input: string | Uint8Array, file: string | undefined, faults: FaultsFound): NumberedRow[] {
  let text: string
  try {
    text = decodeText(input, file, { windows1252: true }).replace(/\r\n?/g, '\n')
  } catch (error) {
    const found = faultsOf(error)
    throw found ? new InputFault(found) : error
  }
  const { rows, openQuote } = delimitedRows(text, separatorOf(text))
  if (openQuote !== undefined) faults.add('quote.open', { path: `row ${openQuote}`, value: rows.at(-1)!.join(', ') })
  if (faults.all.length > 0) throw new InputFault(faults.all)
  const isHint = SEPARATOR_HINT.test(text)
  return rows
    .map((cells, i) => ({ number: i + 1, cells }))
    .filter(({ cells, number }) => !(isHint && number === 1) && cells.some((cell) => cell !== ''))
}

/** A first line by which spreadsheets tell each other what separates. */
const SEPARATOR_HINT = /^sep=.\n/i

/** The heading holds no numbers, so whatever stands in it most often separates. */
function separatorOf(text: string): Separator {
  const heading =
    text
      .replace(SEPARATOR_HINT, '')
      .split('\n')
      .find((line) => line.trim() !== '') ?? ''
  const counts: [Separator, number][] = [
    ['comma', heading.split(',').length],
    ['semicolon', heading.split(';').length],
    ['tab', heading.split('\t').length],
  ]
  return counts.reduce((most, next) => (next[1] > most[1] ? next : most))[0]
}

/** The round as a building file would have it. */
function roundValue(
  heading: Heading,
  { id, date, entries }: TableRound,
  building: Pick<Building, 'survey'>,
): { value: unknown; note?: string } {
  if (heading.kind === 'levels') return { value: { id, date, levels: entries } }
  const hasSights = entries.every((entry) => 'sight_m' in entry)
  const { sd, note } = bookSd(building, id, hasSights)
  return { value: { id, date, book: { ...sd, rows: entries } }, note }
}

/** Faults of the round, told by row and column; what was told of a cell already is not told again. */
function moveFaults(found: FaultsFound, faults: FaultsFound, heading: Heading, round: TableRound): void {
  const told = new Set(faults.all.map((fault) => fault.place.path))
  for (const { code, place } of found.all) {
    const path = tablePath(place.path ?? '', heading, round)
    if (told.has(path)) continue
    const first = place.detail?.first
    const moved: Place = { ...place, path }
    if (typeof first === 'string') moved.detail = { ...place.detail, first: tablePath(first, heading, round) }
    faults.add(code, moved)
  }
}

function tablePath(path: string, heading: Heading, { rows }: TableRound): string {
  const parts = /^(?:levels|book\.rows)\[(\d+)\](?:\.(\w+))?/.exec(path)
  if (!parts) return cellPath(heading, rows[0]!, path === 'date' ? 'date' : 'round')
  const row = rows[Number(parts[1])]!
  return parts[2] === undefined ? `row ${row}` : cellPath(heading, row, parts[2] as ReadingColumn)
}

/** By row, as one would mend them. */
function inOrder(faults: FaultsFound): FaultsFound['all'] {
  function rowOf(path: string | undefined): number {
    return Number(/^row (\d+)/.exec(path ?? '')?.[1] ?? 0)
  }
  return faults.all.toSorted((a, b) => rowOf(a.place.path) - rowOf(b.place.path))
}
