/** The readings of a book adjusted as far as they hang on a benchmark; the rest is left out and said. */
import type { LevelBook, Round } from '../model/building.ts'
import type { FaultRecord } from '../model/faults.ts'
import { adjustLevels, untiedPoints, type Adjustment, type SurveyArrays } from '../../solver/index.ts'
import { readingVariance, type NumberedBook } from './levels.ts'

export interface AdjustedReadings {
  /** Of all readings of the book in their order; those left out have no residual and no redundancy. */
  adjustment: Adjustment
  /** m2; of readings left out as well */
  variance: Float64Array
  isUsed: boolean[]
}

/** Undefined where nothing can be adjusted yet; `problems` says why. */
export function adjustReadings(
  { ids, held, reduced }: NumberedBook,
  book: LevelBook,
  round: Round,
  problems: FaultRecord[],
): AdjustedReadings | undefined {
  const { readings } = reduced
  if (readings.length === 0) return undefined
  if (book.sd_mm_per_sqrt_km === undefined && book.sd_mm_per_setup === undefined) {
    problems.push({
      code: 'book.sdless',
      place: { element: { kind: 'round', id: round.id }, detail: { round: round.id } },
    })
    return undefined
  }
  const variance = Float64Array.from(readings, (r) => readingVariance(book, r.length) ?? NaN)
  const unweighted = readings.findIndex((_, i) => !(variance[i]! > 0 && Number.isFinite(variance[i]!)))
  if (unweighted >= 0) {
    const { row, point } = readings[unweighted]!
    problems.push({
      code: Number.isNaN(variance[unweighted]!) ? 'sight.missing' : 'sight.lengthless',
      place: {
        element: { kind: 'row', id: String(row + 1), within: round.id },
        detail: { row: row + 1, point: ids[point]!, round: round.id },
      },
    })
    return undefined
  }
  const all: SurveyArrays = {
    setup: Int32Array.from(readings, (r) => r.setup),
    point: Int32Array.from(readings, (r) => r.point),
    reading: Float64Array.from(readings, (r) => r.reading),
    variance,
    held,
  }
  const untied = new Set(untiedPoints(all))
  if (untied.size)
    problems.push({
      code: 'round.untied',
      place: { element: { kind: 'round', id: round.id }, detail: { points: [...untied].map((i) => ids[i]!) } },
    })
  const isUsed = readings.map((r) => !untied.has(r.point))
  const used = readings.flatMap((_, i) => (isUsed[i] ? [i] : []))
  if (used.length === 0) return undefined
  return { adjustment: spread(adjustLevels(subset(all, used)), used, readings.length), variance, isUsed }
}

/** The readings of some indices, setups numbered anew without gaps. */
export function subset(all: SurveyArrays, used: readonly number[]): SurveyArrays {
  const number = new Map<number, number>()
  for (const i of used) if (!number.has(all.setup[i]!)) number.set(all.setup[i]!, number.size)
  return {
    setup: Int32Array.from(used, (i) => number.get(all.setup[i]!)!),
    point: Int32Array.from(used, (i) => all.point[i]!),
    reading: Float64Array.from(used, (i) => all.reading[i]!),
    variance: Float64Array.from(used, (i) => all.variance[i]!),
    held: all.held,
  }
}

function spread(adjustment: Adjustment, used: readonly number[], count: number): Adjustment {
  function over(values: Float64Array): Float64Array {
    const all = new Float64Array(count)
    used.forEach((i, k) => (all[i] = values[k]!))
    return all
  }
  const { residual, redundancy, standardised } = adjustment
  return { ...adjustment, residual: over(residual), redundancy: over(redundancy), standardised: over(standardised) }
}
