/** Whether the benchmarks agree with each other: each is freed in turn, and found again from the others. */
import type { BenchmarkCheck } from '../model/findings.ts'
import { adjustLevels } from '../../solver/index.ts'
import { subset, type AdjustedReadings } from './adjusted-readings.ts'
import type { NumberedBook } from './levels.ts'
import { sdOf } from './line-movement.ts'

/** One check for each benchmark that was read; none where there is only one, whose stability is assumed. */
export function benchmarkChecks(
  { ids, held, reduced }: NumberedBook,
  { variance, isUsed }: AdjustedReadings,
  scale: number,
  z: number,
): BenchmarkCheck[] {
  const used = reduced.readings.flatMap((_, i) => (isUsed[i] ? [i] : []))
  const read = [...new Set(used.map((i) => reduced.readings[i]!.point))].filter((p) => !Number.isNaN(held[p]!))
  if (read.length < 2) return []
  const { readings } = reduced
  const survey = subset(
    {
      setup: Int32Array.from(readings, (r) => r.setup),
      point: Int32Array.from(readings, (r) => r.point),
      reading: Float64Array.from(readings, (r) => r.reading),
      variance,
      held,
    },
    used,
  )
  return read.flatMap((point): BenchmarkCheck[] => {
    const others = held.slice()
    others[point] = NaN
    const isAlone = read.every((other) => other === point || Number.isNaN(others[other]!))
    if (isAlone) return []
    const { level, factor, q } = adjustLevels({ ...survey, held: others })
    const sd = scale * sdOf(factor.subarray(point * q, (point + 1) * q))
    const difference = level[point]! - held[point]!
    return [
      {
        point: ids[point]!,
        level_m: held[point]!,
        found_m: level[point]!,
        difference_mm: difference * 1000,
        sd_mm: sd * 1000,
        agrees: Math.abs(difference) <= z * sd,
      },
    ]
  })
}
