/**
 * A level book as the place Log and the report show it: reduced, adjusted, checked, and compared with the rounds
 * before. A half-typed book gives what it can, and lists what is in the way instead of refusing.
 */
import { criteriaOf, type BookRow, type Building, type LevelBook, type Round } from '../model/building.ts'
import { Fault, type FaultRecord } from '../model/faults.ts'
import type { BenchmarkCheck, Levelling, Misclosure, SuspectReading } from '../model/findings.ts'
import { normalQuantile, type BookReading } from '../../solver/index.ts'
import { adjustReadings, type AdjustedReadings } from './adjusted-readings.ts'
import { allowedMisclosure, DEFAULT_ALLOWANCE, type Allowance } from './allowances.ts'
import { benchmarkChecks } from './benchmarks.ts'
import { blunderCauses } from './blunder-causes.ts'
import { collimationHint, collimationOf, confusedHints, exchangedHints, type CollimationView } from './book-hints.ts'
import { CONTROLLED_FROM, levellingOf, levelRound, numberBook, SUSPECT_AT, type NumberedBook } from './levels.ts'
import { levelled, type Prepared } from './prepare.ts'
import { sdOf } from './line-movement.ts'
import { soundRows } from './sound-rows.ts'
import { studMovements, type StudMovement } from './stud-movements.ts'

/** One reading of a row after the adjustment. */
export interface ReadingView {
  sight: 'back' | 'mid' | 'fore'
  /** Adjusted less observed. */
  residual_mm: number
  /** Size; absent where nothing controls the reading. */
  standardised_residual?: number
  controlled: boolean
  suspect: boolean
  /** Of a suspect reading: what it is off by, reading less what the rest of the book says. */
  error_mm?: number
}

export interface BookRowView {
  point: string
  rise_m?: number
  fall_m?: number
  /** Height of collimation of the setup that begins in this row. */
  collimation_m?: number
  reduced_m?: number
  adjusted_m?: number
  sd_mm?: number
  readings: ReadingView[]
  suspect: boolean
  /** Of a stud: settlement since the round before and since the baseline, down positive. */
  since_previous_mm?: number
  since_baseline_mm?: number
}

export interface MisclosureView extends Omit<Misclosure, 'predicted_mm'> {
  /** Absent where the weight of a reading on the way is not known. */
  predicted_mm?: number
  allowed_mm?: number
  within?: boolean
}

export interface BookChecksView {
  back_m: number
  fore_m: number
  rise_m: number
  fall_m: number
  gain_m: number
  /** Both sides of the full check by heights of collimation; absent where a level is not known. */
  sights_m?: number
  collimations_m?: number
  agrees: boolean
}

export interface BookView {
  rows: BookRowView[]
  setups: number
  /** Of all booked sights; absent where one is missing. */
  length_km?: number
  checks?: BookChecksView
  misclosures: MisclosureView[]
  /** The class of levelling that the misclosures are held against. */
  allowance: Allowance
  degrees_of_freedom?: number
  variance_factor?: number
  scaled?: boolean
  suspects: SuspectReading[]
  uncontrolled_rows: number[]
  benchmarks: BenchmarkCheck[]
  /** What the book looks like where something is wrong with it, a sentence each. */
  hints: string[]
  /** Absent where the sights tell nothing of it. */
  collimation?: CollimationView
  /** Every stud of the building: its level, its movement, or that it is not read yet. */
  studs: StudMovement[]
  /** Round that `since_previous_mm` counts from. */
  previous?: string
  problems: FaultRecord[]
}

/** Differences of the arithmetic check below this are rounding, m. */
const ROUNDING = 1e-9

export interface BookViewOptions {
  allowance?: Allowance
  /** Spares adjusting the rounds before again. */
  prepared?: Prepared
}

export function bookView(building: Building, round: Round, options: BookViewOptions = {}): BookView {
  const problems: FaultRecord[] = []
  const book: LevelBook = round.book ?? { rows: [] }
  const { confidence } = criteriaOf(building)
  const z = normalQuantile(0.5 + confidence / 2)
  const numbered = numberBook({ ...book, rows: soundRows(book.rows, round, problems) }, building)
  const { reduced } = numbered
  for (const row of reduced.before)
    problems.push({ code: 'book.unopened', place: rowPlace(round, row, book.rows[row]!.point) })
  const adjusted = adjustReadings(numbered, book, round, problems)
  const tests = adjusted && levellingOf(numbered, adjusted.adjustment, adjusted.variance, confidence, z)
  const levels = adjusted ? levelsOf(numbered, adjusted, tests!.scale) : givenLevels(building, round, confidence, z)
  const { studs, previous } = studMovements(building, round, levels, (other) =>
    earlier(building, other, options, confidence, z),
  )
  const movement = new Map(studs.map((s) => [s.point, s]))
  const total = lengthOf(reduced.readings)
  const collimation = adjusted && collimationOf(numbered, adjusted.variance)
  const allowance = options.allowance ?? (total === undefined ? DEFAULT_ALLOWANCE.setup : DEFAULT_ALLOWANCE.km)
  return {
    rows: book.rows.map((row, i) => rowView(row, i, numbered, adjusted, levels, movement.get(row.point))),
    setups: reduced.setups,
    ...(total === undefined ? {} : { length_km: total / 1000 }),
    ...(reduced.readings.length ? { checks: checksOf(numbered) } : {}),
    misclosures: misclosuresOf(numbered, adjusted, z, allowance),
    allowance,
    ...(tests ? testsOf(tests.levelling) : {}),
    suspects: tests && adjusted ? withCauses(tests.levelling.suspects ?? [], book, adjusted) : [],
    uncontrolled_rows: tests?.levelling.uncontrolled_rows ?? [],
    benchmarks: adjusted ? benchmarkChecks(numbered, adjusted, tests!.scale, z) : [],
    hints: [
      ...(adjusted ? exchangedHints(numbered, HINT_SDS * largestSd(numbered, adjusted)) : []),
      ...confusedHints(studs),
      ...collimationHint(collimation),
    ],
    ...(collimation ? { collimation } : {}),
    studs,
    ...(previous === undefined ? {} : { previous }),
    problems,
  }
}

/** How many standard deviations of the book a slip's size may be away from what it is taken for. */
const HINT_SDS = 4

/** The standard deviation of the longest closure: how well the book knows where it should be, m. */
function largestSd({ reduced }: NumberedBook, { variance }: AdjustedReadings): number {
  const sums = reduced.closures.map((c) => c.readings.reduce((sum, i) => sum + variance[i]!, 0))
  return Math.sqrt(Math.max(0, ...sums))
}

function withCauses(
  suspects: readonly SuspectReading[],
  { rows }: LevelBook,
  { variance }: AdjustedReadings,
): SuspectReading[] {
  const tolerance = HINT_SDS * Math.sqrt(Math.max(0, ...variance))
  return suspects.map((suspect) => {
    const row = rows[suspect.row - 1]
    const reading = row && { back: row.back_m, mid: row.mid_m, fore: row.fore_m }[suspect.sight]
    if (reading === undefined) return suspect
    const causes = blunderCauses(reading, suspect.error_mm / 1000, tolerance)
    return causes.length ? { ...suspect, causes } : suspect
  })
}

function rowPlace(round: Round, row: number, point: string): FaultRecord['place'] {
  return {
    element: { kind: 'row', id: String(row + 1), within: round.id },
    detail: { row: row + 1, point, round: round.id },
  }
}

/** Level and sd of each point that has one. */
export type Levels = ReadonlyMap<string, { level: number; sd: number }>

function levelsOf({ ids }: NumberedBook, { adjustment }: AdjustedReadings, scale: number): Levels {
  const { level, factor, q } = adjustment
  return new Map(
    ids.flatMap((id, i) =>
      Number.isNaN(level[i]!)
        ? []
        : [[id, { level: level[i]!, sd: scale * sdOf(factor.subarray(i * q, (i + 1) * q)) }] as const],
    ),
  )
}

function givenLevels(building: Building, round: Round, confidence: number, z: number): Levels {
  if (!round.levels) return new Map()
  return readOff(levelRound(building, { ...round, book: undefined }, confidence, z))
}

/** Levels of an earlier round; none where it cannot be levelled, which its own page says. */
function earlier(building: Building, round: Round, options: BookViewOptions, confidence: number, z: number): Levels {
  try {
    return readOff(options.prepared ? levelled(options.prepared, round) : levelRound(building, round, confidence, z))
  } catch (error) {
    if (error instanceof Fault) return new Map()
    throw error
  }
}

function readOff({ row, level, factor, q }: ReturnType<typeof levelRound>): Levels {
  return new Map(
    [...row].map(([id, i]) => [id, { level: level[i]!, sd: sdOf(factor.subarray(i * q, (i + 1) * q)) }] as const),
  )
}

function rowView(
  row: BookRow,
  index: number,
  { reduced }: NumberedBook,
  adjusted: AdjustedReadings | undefined,
  levels: Levels,
  movement: StudMovement | undefined,
): BookRowView {
  const { rise, collimation, level } = reduced.rows[index]!
  const readings = reduced.readings.flatMap((reading, i) =>
    reading.row === index && adjusted?.isUsed[i] ? [readingView(reading, i, adjusted)] : [],
  )
  const found = levels.get(row.point)
  return {
    point: row.point,
    ...(rise === undefined ? {} : rise < 0 ? { fall_m: -rise } : { rise_m: rise }),
    ...(collimation === undefined ? {} : { collimation_m: collimation }),
    ...(level === undefined ? {} : { reduced_m: level }),
    ...(found ? { adjusted_m: found.level, sd_mm: found.sd * 1000 } : {}),
    readings,
    suspect: readings.some((r) => r.suspect),
    ...(movement?.since_previous_mm === undefined ? {} : { since_previous_mm: movement.since_previous_mm }),
    ...(movement?.since_baseline_mm === undefined ? {} : { since_baseline_mm: movement.since_baseline_mm }),
  }
}

function readingView({ sight }: BookReading, i: number, { adjustment }: AdjustedReadings): ReadingView {
  const redundancy = adjustment.redundancy[i]!
  const controlled = redundancy > CONTROLLED_FROM
  const standardised = Math.abs(adjustment.standardised[i]!)
  const suspect = controlled && standardised > SUSPECT_AT
  return {
    sight,
    residual_mm: adjustment.residual[i]! * 1000,
    ...(controlled ? { standardised_residual: standardised } : {}),
    controlled,
    suspect,
    ...(suspect ? { error_mm: (-adjustment.residual[i]! / redundancy) * 1000 } : {}),
  }
}

function checksOf({ reduced }: NumberedBook): BookChecksView {
  const { back, fore, rise, fall, gain, sights, collimations } = reduced.checks
  const isKnown = Number.isFinite(sights)
  const agrees =
    Math.abs(back - fore - gain) < ROUNDING &&
    Math.abs(rise - fall - gain) < ROUNDING &&
    (!isKnown || Math.abs(sights - collimations) < ROUNDING * Math.max(1, reduced.readings.length))
  return {
    back_m: back,
    fore_m: fore,
    rise_m: rise,
    fall_m: fall,
    gain_m: gain,
    ...(isKnown ? { sights_m: sights, collimations_m: collimations } : {}),
    agrees,
  }
}

function misclosuresOf(
  { ids, reduced }: NumberedBook,
  adjusted: AdjustedReadings | undefined,
  z: number,
  allowance: Allowance,
): MisclosureView[] {
  return reduced.closures.map((c): MisclosureView => {
    const length_km = c.length === undefined ? undefined : c.length / 1000
    const allowed = allowedMisclosure(allowance, c.setups, length_km)
    const variance = c.readings.reduce((sum, i) => sum + (adjusted?.variance[i] ?? NaN), 0)
    const misclosure_mm = c.misclosure * 1000
    return {
      from: ids[c.from]!,
      to: ids[c.to]!,
      setups: c.setups,
      ...(length_km === undefined ? {} : { length_km }),
      misclosure_mm,
      ...(Number.isFinite(variance) ? { predicted_mm: z * Math.sqrt(variance) * 1000 } : {}),
      ...(allowed === undefined ? {} : { allowed_mm: allowed, within: Math.abs(misclosure_mm) <= allowed }),
    }
  })
}

function testsOf({ degrees_of_freedom, variance_factor, scaled }: Levelling) {
  return { degrees_of_freedom, variance_factor, scaled }
}

function lengthOf(readings: readonly BookReading[]): number | undefined {
  return readings.reduce<number | undefined>(
    (sum, { length }) => (sum === undefined || length === undefined ? undefined : sum + length),
    0,
  )
}
