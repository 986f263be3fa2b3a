/**
 * A round as it stands in the grid, as text, and what the text says. A draft keeps what was typed: where a cell is
 * no number yet, its text is stored in the number's place, and the core refuses to accept it until it is one.
 */
import type { BookRow, GivenLevel, LevelBook, Round } from '../../app/model/building.ts'
import { filled } from '../../app/model/edits/difference.ts'
import type { FaultRecord } from '../../app/model/faults.ts'
import { parseNumber } from '../../app/model/numbers.ts'
import { isBlank, type Cells } from './grid-cells.ts'

export type RoundKind = 'book' | 'levels'

/** The visit besides its readings, as it is typed. */
export interface HeadText {
  date: string
  observer: string
  instrument: string
  weather: string
  sd_mm_per_sqrt_km: string
  sd_mm_per_setup: string
  collimation_mm_per_10_m: string
}

export interface RoundText {
  id: string
  kind: RoundKind
  head: HeadText
  rows: readonly Cells[]
}

/** What a round's text says. */
export interface ReadRound {
  /** As it is stored, every text kept. */
  stored: Round
  /** Numbers alone, row for row as in the grid: what the level book's page is made from. */
  typed: Round
  /** Only rows that say something whole: what is assessed while the rest is being typed. */
  whole: Round
  /** What is wrong with a cell, by row and key, and with what is said of the instrument by its key. */
  faults: ReadonlyMap<string, FaultRecord>
}

const NUMBERS: Record<RoundKind, readonly string[]> = {
  book: ['back_m', 'mid_m', 'fore_m', 'sight_m', 'back_sight_m'],
  levels: ['level_m', 'sd_mm'],
}
/** Decimals to which values are shown again; what was typed finer is shown as it is. */
const DECIMALS: Record<string, number> = { back_m: 4, mid_m: 4, fore_m: 4, level_m: 4, sight_m: 1, back_sight_m: 1 }
/** A staff is never a thousand metres long, so `1,234` on one can only be 1.234. */
const STAFF: readonly string[] = ['back_m', 'mid_m', 'fore_m']
const INSTRUMENT = ['sd_mm_per_sqrt_km', 'sd_mm_per_setup', 'collimation_mm_per_10_m'] as const
const WORDS = ['observer', 'instrument', 'weather'] as const

type StoredRound = Round & Partial<Record<(typeof WORDS)[number], string>>

export function cellKey(row: number, key: string): string {
  return `${row}:${key}`
}

/** The text of a stored round. */
export function textOf(round: StoredRound): RoundText {
  const kind = round.levels ? 'levels' : 'book'
  const rows: readonly object[] = (kind === 'levels' ? round.levels : round.book?.rows) ?? []
  return {
    id: round.id,
    kind,
    head: {
      date: round.date,
      observer: round.observer ?? '',
      instrument: round.instrument ?? '',
      weather: round.weather ?? '',
      sd_mm_per_sqrt_km: cellText('sd', round.book?.sd_mm_per_sqrt_km),
      sd_mm_per_setup: cellText('sd', round.book?.sd_mm_per_setup),
      collimation_mm_per_10_m: cellText('sd', round.book?.collimation_mm_per_10_m),
    },
    rows: rows.map((row) =>
      Object.fromEntries(Object.entries(row).map(([key, value]) => [key, cellText(key, value as number | string)])),
    ),
  }
}

/** What the text says, as far as it says anything. */
export function readRound({ id, kind, head, rows }: RoundText): ReadRound {
  const faults = new Map<string, FaultRecord>()
  const words = filled(Object.fromEntries(WORDS.map((key) => [key, head[key].trim() || undefined])))
  const sd = kind === 'book' ? INSTRUMENT.map((key) => instrumentSd(head[key], key, id, faults)) : []
  const cells = rows.map((row, i) => readRow(row, i, kind, id, faults))
  const start = { id, date: head.date.trim(), ...words }

  function round(values: readonly object[], sdOf: (text: Value) => unknown): Round {
    if (kind === 'levels') return { ...start, levels: values as GivenLevel[] }
    const instrument = Object.fromEntries(INSTRUMENT.map((key, i) => [key, sdOf(sd[i]!)])) as Partial<LevelBook>
    return { ...start, book: filled({ ...instrument, rows: values as BookRow[] }) }
  }

  const typed = cells.map((c) => c.typed)
  return {
    stored: round(
      cells.map((c) => c.stored),
      (value) => value.number ?? value.text,
    ),
    typed: round(typed, (value) => value.number),
    whole: round(
      typed.filter((row) => isWhole(row, kind)),
      (value) => value.number,
    ),
    faults,
  }
}

/** The same round without its blank rows, as it is accepted. */
export function withoutBlankRows(text: RoundText): RoundText {
  return { ...text, rows: text.rows.filter((row) => !isBlank(row)) }
}

interface Value {
  number?: number
  /** What was typed where it is no number. */
  text?: string
}

function readRow(row: Cells, index: number, kind: RoundKind, round: string, faults: Map<string, FaultRecord>) {
  const stored: Record<string, unknown> = { point: (row.point ?? '').trim() }
  const typed: Record<string, unknown> = { ...stored }
  for (const key of NUMBERS[kind]) {
    const value = valueOf(row[key] ?? '', STAFF.includes(key))
    if (value.number !== undefined) stored[key] = typed[key] = value.number
    else if (value.text !== undefined) {
      stored[key] = value.text
      faults.set(cellKey(index, key), slip(value.text, key, { kind: 'row', id: String(index + 1), within: round }))
    }
  }
  return { stored, typed }
}

function instrumentSd(text: string, key: string, round: string, faults: Map<string, FaultRecord>): Value {
  const value = valueOf(text)
  if (value.text !== undefined) faults.set(key, slip(value.text, key, { kind: 'round', id: round }))
  return value
}

function valueOf(text: string, isStaff = false): Value {
  const asTyped = parseNumber(text)
  const parsed = isStaff && !asTyped.ok && asTyped.code === 'number.ambiguous' ? parseNumber(text, ',') : asTyped
  if (parsed.ok) return { number: parsed.value }
  return parsed.code === 'number.empty' ? {} : { text: text.trim() }
}

function slip(text: string, path: string, element: FaultRecord['place']['element']): FaultRecord {
  const parsed = parseNumber(text)
  return {
    code: parsed.ok ? 'number.malformed' : parsed.code,
    place: { path, value: text, ...(element && { element }) },
  }
}

function isWhole(row: Record<string, unknown>, kind: RoundKind): boolean {
  if (row.point === '') return false
  if (kind === 'levels') return row.level_m !== undefined && row.sd_mm !== undefined
  return row.back_m !== undefined || row.mid_m !== undefined || row.fore_m !== undefined
}

function cellText(key: string, value: number | string | undefined): string {
  if (value === undefined) return ''
  if (typeof value === 'string') return value
  const fixed = value.toFixed(DECIMALS[key] ?? 0)
  return Number(fixed) === value && key in DECIMALS ? fixed : String(value)
}
