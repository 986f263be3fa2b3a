/**
 * The levels of one round with their full covariance: from a level book by adjustment, or as given. The
 * covariance is carried as a factor F with C = F F', so that a variance that is zero by theory comes out as zero.
 */
import { heldBenchmarks, type Building, type LevelBook, type Round } from '../model/building.ts'
import { Fault } from '../model/faults.ts'
import type { Levelling } from '../model/findings.ts'
import {
  adjustLevels,
  chiSquareQuantile,
  grossError,
  reduceBook,
  SolverFault,
  type Adjustment,
  type BookLine,
  type ReducedBook,
} from '../../solver/index.ts'

/** Baarda's critical value at 0.1 %, and the redundancy below which nothing checks a reading. */
export const SUSPECT_AT = 3.29
export const CONTROLLED_FROM = 0.05

export interface LevelledRound {
  id: string
  date: string
  /** Row of each point that has a level. */
  row: ReadonlyMap<string, number>
  /** shape (n), m */
  level: Float64Array
  /** shape (n, q), m, row-major */
  factor: Float64Array
  q: number
  /** Of a level book. */
  levelling?: Levelling
}

/** A level book with its points numbered, ready to be reduced and adjusted. */
export interface NumberedBook {
  ids: string[]
  /** shape (p), m: level of a benchmark, NaN of any other point */
  held: Float64Array
  reduced: ReducedBook
}

/** Readings corrected for the collimation error, where it and the length of the sight are known. */
export function numberBook(
  book: Pick<LevelBook, 'rows' | 'collimation_mm_per_10_m'>,
  building: Pick<Building, 'survey'>,
): NumberedBook {
  const benchmark = new Map(heldBenchmarks(building).map((b): [string, number] => [b.id, b.level_m]))
  const number = new Map<string, number>()
  const lines = book.rows.map((row): BookLine => {
    if (!number.has(row.point)) number.set(row.point, number.size)
    const { back_m: back, mid_m: mid, fore_m: fore, sight_m: sight, back_sight_m: backSight } = row
    const rise = (book.collimation_mm_per_10_m ?? 0) / 1e4
    const over = row.fore_m === undefined ? sight : (backSight ?? sight)
    return {
      point: number.get(row.point)!,
      back: level(back, rise, over),
      mid: level(mid, rise, sight),
      fore: level(fore, rise, sight),
      sight,
      backSight,
    }
  })
  const ids = [...number.keys()]
  const held = Float64Array.from(ids, (id) => benchmark.get(id) ?? NaN)
  return { ids, held, reduced: reduceBook(lines, held) }
}

/** What a level sight would have read. */
function level(reading: number | undefined, rise: number, sight: number | undefined): number | undefined {
  return reading === undefined || sight === undefined ? reading : reading - rise * sight
}

/** Variance of one reading in m2; undefined where neither its sight nor an sd for a setup is booked. */
export function readingVariance(book: LevelBook, sight: number | undefined): number | undefined {
  const { sd_mm_per_sqrt_km: perKm, sd_mm_per_setup: perSetup } = book
  if (perKm !== undefined && sight !== undefined) return (perKm / 1000) ** 2 * (sight / 1000)
  if (perSetup !== undefined) return (perSetup / 1000) ** 2 / 2
  return undefined
}

/** Levels of a round. Throws a Fault where they cannot be had. */
export function levelRound(
  building: Pick<Building, 'survey'>,
  round: Round,
  confidence: number,
  z: number,
): LevelledRound {
  if (round.book) return fromBook(building, round, round.book, confidence, z)
  const given = round.levels ?? []
  const n = given.length
  const factor = new Float64Array(n * n)
  given.forEach((g, i) => (factor[i * n + i] = g.sd_mm / 1000))
  return {
    id: round.id,
    date: round.date,
    row: new Map(given.map((g, i) => [g.point, i])),
    level: Float64Array.from(given, (g) => g.level_m),
    factor,
    q: n,
  }
}

function fromBook(
  building: Pick<Building, 'survey'>,
  round: Round,
  book: LevelBook,
  confidence: number,
  z: number,
): LevelledRound {
  const numbered = numberBook(book, building)
  const { ids, held, reduced } = numbered
  if (reduced.before.length) throw bookFault('book.unopened', round, reduced.before[0]!)
  if (book.sd_mm_per_sqrt_km === undefined && book.sd_mm_per_setup === undefined)
    throw new Fault('book.sdless', { element: { kind: 'round', id: round.id }, detail: { round: round.id } })
  const variance = reduced.readings.map((reading) => {
    const value = readingVariance(book, reading.length)
    if (value === undefined) throw bookFault('sight.missing', round, reading.row)
    if (!(value > 0)) throw bookFault('sight.lengthless', round, reading.row)
    return value
  })
  let adjusted: Adjustment
  try {
    adjusted = adjustLevels({
      setup: Int32Array.from(reduced.readings, (r) => r.setup),
      point: Int32Array.from(reduced.readings, (r) => r.point),
      reading: Float64Array.from(reduced.readings, (r) => r.reading),
      variance: Float64Array.from(variance),
      held,
    })
  } catch (error) {
    if (error instanceof SolverFault && error.code === 'untied') {
      const points = error.at.map((i) => ids[i]!)
      throw new Fault(
        'round.untied',
        { element: { kind: 'round', id: round.id }, detail: { points } },
        { cause: error },
      )
    }
    throw error
  }
  const { levelling, scale } = levellingOf(numbered, adjusted, variance, confidence, z)
  return {
    id: round.id,
    date: round.date,
    row: new Map(ids.map((id, i) => [id, i])),
    level: adjusted.level,
    factor: scale === 1 ? adjusted.factor : adjusted.factor.map((f) => f * scale),
    q: adjusted.q,
    levelling,
  }
}

function bookFault(code: 'book.unopened' | 'sight.missing' | 'sight.lengthless', round: Round, row: number): Fault {
  return new Fault(code, {
    element: { kind: 'row', id: String(row + 1), within: round.id },
    detail: { row: row + 1, point: round.book!.rows[row]!.point, round: round.id },
  })
}

/** The book's tests, and the factor on all standard deviations: above 1 where the readings scatter too much. */
export function levellingOf(
  { ids, reduced }: NumberedBook,
  adjusted: Adjustment,
  variance: ArrayLike<number>,
  confidence: number,
  z: number,
): { levelling: Levelling; scale: number } {
  const { degreesOfFreedom: dof, varianceFactor } = adjusted
  const levelling: Levelling = { degrees_of_freedom: dof }
  let scale = 1
  if (dof > 0) {
    levelling.variance_factor = varianceFactor
    levelling.scaled = varianceFactor > chiSquareQuantile(confidence, dof) / dof
    if (levelling.scaled) scale = Math.sqrt(varianceFactor)
  }
  levelling.misclosures = reduced.closures.map((c) => ({
    from: ids[c.from]!,
    to: ids[c.to]!,
    setups: c.setups,
    ...(c.length === undefined ? {} : { length_km: c.length / 1000 }),
    misclosure_mm: c.misclosure * 1000,
    predicted_mm: z * Math.sqrt(c.readings.reduce((sum, i) => sum + variance[i]!, 0)) * 1000,
  }))
  levelling.suspects = reduced.readings
    .map((reading, i) => ({
      row: reading.row + 1,
      point: ids[reading.point]!,
      sight: reading.sight,
      standardised_residual: Math.abs(adjusted.standardised[i]!),
      error_mm: grossError(adjusted, i) * 1000,
      redundancy: adjusted.redundancy[i]!,
    }))
    .filter((s) => s.redundancy > CONTROLLED_FROM && s.standardised_residual > SUSPECT_AT)
    .sort((a, b) => b.standardised_residual - a.standardised_residual)
    .map(({ redundancy: _, ...suspect }) => suspect)
  const uncontrolled = reduced.readings.filter((_, i) => adjusted.redundancy[i]! <= CONTROLLED_FROM)
  levelling.uncontrolled_rows = [...new Set(uncontrolled.map((r) => r.row + 1))].sort((a, b) => a - b)
  return { levelling, scale }
}
