/** Levelling networks for tests: observed height differences as setups of two readings, and books made at random. */
import fc from 'fast-check'
import type { BookLine, SurveyArrays } from '../../solver/index.ts'

/** From, to, observed rise, variance. */
export type Difference = readonly [from: number, to: number, rise: number, variance: number]

/** Each difference is a setup of its own, half of its variance on each sight. */
export function network(held: readonly number[], differences: readonly Difference[]): SurveyArrays {
  return {
    setup: Int32Array.from(differences.flatMap((_, i) => [i, i])),
    point: Int32Array.from(differences.flatMap(([from, to]) => [from, to])),
    reading: Float64Array.from(differences.flatMap(([, , rise]) => [rise, 0])),
    variance: Float64Array.from(differences.flatMap(([, , , variance]) => [variance / 2, variance / 2])),
    held: Float64Array.from(held),
  }
}

/** Residual of each difference: adjusted less observed. */
export function residualsOf(differences: readonly Difference[], level: ArrayLike<number>): number[] {
  return differences.map(([from, to, rise]) => level[to]! - level[from]! - rise)
}

/** A closed run from point 0 over change points, with intermediate sights, that misses its start by a little. */
export const madeBook: fc.Arbitrary<BookLine[]> = fc
  .array(
    fc.record({
      back: fc.integer({ min: 2000, max: 29000 }),
      fore: fc.integer({ min: 2000, max: 29000 }),
      mids: fc.array(fc.integer({ min: 2000, max: 29000 }), { maxLength: 4 }),
      sight: fc.integer({ min: 50, max: 600 }),
    }),
    { minLength: 2, maxLength: 6 },
  )
  .chain((setups) =>
    fc.integer({ min: -20, max: 20 }).map((error) => {
      const lines: BookLine[] = []
      let level = 0
      let next = setups.length
      let carried: number | undefined
      setups.forEach(({ back, fore, mids, sight }, i) => {
        const isLast = i === setups.length - 1
        const foresight = isLast ? level + back + error : fore
        if (i === 0) lines.push({ point: 0, back: back / 1e4, sight: sight / 10 })
        else lines.push({ point: i, fore: carried! / 1e4, back: back / 1e4, sight: sight / 10 })
        for (const mid of mids) lines.push({ point: next++, mid: mid / 1e4, sight: sight / 12 })
        level += back - foresight
        carried = foresight
        if (isLast) lines.push({ point: 0, fore: foresight / 1e4, sight: sight / 10 })
      })
      return lines
    }),
  )
