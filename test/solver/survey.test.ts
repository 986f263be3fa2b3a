/** Levelling against published nets and tables; numbers and marks as in the design's facts, section 4. */
import fc from 'fast-check'
import { inverse, Matrix } from 'ml-matrix'
import { describe, expect, it } from 'vitest'
import {
  adjustLevels,
  chiSquareQuantile,
  grossError,
  normalQuantile,
  reduceBook,
  SolverFault,
  studentQuantile,
  untiedPoints,
  type SurveyArrays,
} from '../../solver/index.ts'
import { madeBook, network, residualsOf, type Difference } from '../support/made-levels.ts'

function near(values: readonly number[], digits: number): unknown[] {
  return values.map((v) => expect.closeTo(v, digits))
}

describe('published level nets', () => {
  it('Ghilani, Adjustment Computations, example 12.1 (from memory, recomputed): levels, residuals, sd, standardised residuals', () => {
    const mm = (sd: number) => (sd / 1000) ** 2
    const differences: Difference[] = [
      [0, 1, 10.509, mm(6)],
      [1, 2, 5.36, mm(4)],
      [2, 3, -8.523, mm(5)],
      [3, 0, -7.348, mm(3)],
      [1, 3, -3.167, mm(4)],
      [0, 2, 15.881, mm(12)],
    ]
    const found = adjustLevels(network([437.596, NaN, NaN, NaN], differences))
    expect([...found.level.slice(1)]).toEqual(near([448.10871, 453.46847, 444.94361], 5))
    const v = residualsOf(differences, found.level).map((x) => x * 1000)
    expect(v).toEqual(near([3.712, -0.244, -1.862, 0.395, 1.894, -8.532], 3))
    expect(found.degreesOfFreedom).toBe(3)
    expect(Math.sqrt(found.varianceFactor)).toBeCloseTo(0.6512, 4)
    const sd = [1, 2, 3].map(
      (p) => 1000 * 0.6512 * Math.hypot(...found.factor.subarray(p * found.q, (p + 1) * found.q)),
    )
    expect(sd).toEqual(near([2.295, 2.636, 1.761], 2))
    // A difference's residual over its sd is that of either of its two readings.
    const w = differences.map((_, i) => Math.abs(found.standardised[2 * i]!))
    expect(w).toEqual(near([0.764, 0.106, 0.522, 0.304, 0.72, 0.755], 3))
  })

  it('Ghilani, the second net of chapter 12 (from memory, recomputed): two benchmarks, weights by length', () => {
    const miles = [4, 3, 2, 3, 2, 2, 2]
    const pairs = [
      [0, 2, 5.1],
      [2, 1, 2.34],
      [1, 4, -1.25],
      [4, 0, -6.13],
      [2, 3, -0.68],
      [1, 3, -3],
      [3, 4, 1.7],
    ] as const
    const weighted = pairs.map(([a, b, rise], i): Difference => [a, b, rise, miles[i]! / 12])
    const found = adjustLevels(network([100, 107.5, NaN, NaN, NaN], weighted))
    expect([...found.level.slice(2)]).toEqual(near([105.15, 104.489, 106.197], 3))
    expect(Math.sqrt(found.varianceFactor)).toBeCloseTo(0.1072, 4)
    const alike = pairs.map(([a, b, rise]): Difference => [a, b, rise, 1])
    expect([...adjustLevels(network([100, 107.5, NaN, NaN, NaN], alike)).level.slice(2)]).toEqual(
      near([105.141, 104.483, 106.188], 3),
    )
  })

  it('a circuit with four benchmarks (J. Mahun, open text on adjustment, seen): unweighted levels, weighted S0 and sds', () => {
    const setups = [3, 2, 1, 3, 3, 4, 2, 3]
    const pairs = [
      [0, 4, 8.91],
      [1, 4, -2.92],
      [2, 4, -4.67],
      [3, 4, -8.66],
      [0, 5, -3.56],
      [2, 5, -17.12],
      [3, 5, -21.1],
      [4, 5, -12.47],
    ] as const
    const held = [806.52, 818.32, 820.12, 824.04, NaN, NaN]
    const alike = adjustLevels(network(held, pairs.map(([a, b, d]): Difference => [a, b, d, 1]))) // prettier-ignore
    expect([...alike.level.slice(4)]).toEqual(near([815.418, 802.962], 3))
    const cofactor = (a: number, b: number) =>
      [0, 1].reduce((sum, k) => sum + alike.factor[a * alike.q + k]! * alike.factor[b * alike.q + k]!, 0)
    expect([cofactor(4, 4), cofactor(4, 5), cofactor(5, 5)]).toEqual(near([4 / 19, 1 / 19, 5 / 19], 12))
    const weighted = adjustLevels(network(held, pairs.map(([a, b, d], i): Difference => [a, b, d, setups[i]! / 12]))) // prettier-ignore
    expect([...weighted.level.slice(4)]).toEqual(near([815.4 + 12.44 / 494, 802.9 + 29.08 / 494], 9))
    const s0 = Math.sqrt(weighted.varianceFactor)
    const sd = [4, 5].map((p) => s0 * Math.hypot(...weighted.factor.subarray(p * weighted.q, (p + 1) * weighted.q)))
    expect([s0, ...sd]).toEqual(near([0.067, 0.012, 0.016], 3))
  })
})

describe('an adjustment', () => {
  /** The same by the normal equations of the whole problem, heights of collimation as unknowns, with ml-matrix. */
  function dense({ setup, point, reading, variance, held }: SurveyArrays) {
    const points = [...new Set(point)].filter((p) => Number.isNaN(held[p]!))
    const setups = [...new Set(setup)]
    const A = Matrix.zeros(reading.length, points.length + setups.length)
    const l = Matrix.zeros(reading.length, 1)
    const P = Matrix.zeros(reading.length, reading.length)
    reading.forEach((value, i) => {
      const p = points.indexOf(point[i]!)
      if (p >= 0) A.set(i, p, -1)
      A.set(i, points.length + setups.indexOf(setup[i]!), 1)
      l.set(i, 0, value + (p >= 0 ? 0 : held[point[i]!]!))
      P.set(i, i, 1 / variance[i]!)
    })
    const Q = inverse(A.transpose().mmul(P).mmul(A))
    const x = Q.mmul(A.transpose()).mmul(P).mmul(l)
    const v = Matrix.sub(A.mmul(x), l)
    const redundancy = Matrix.sub(Matrix.eye(reading.length), A.mmul(Q).mmul(A.transpose()).mmul(P)).diagonal()
    return { points, x, Q, v, redundancy }
  }

  function surveyOf(lines: Parameters<typeof reduceBook>[0]): SurveyArrays {
    const { readings } = reduceBook(lines, [50])
    const points = 1 + Math.max(...lines.map((line) => line.point))
    return {
      setup: Int32Array.from(readings, (r) => r.setup),
      point: Int32Array.from(readings, (r) => r.point),
      reading: Float64Array.from(readings, (r) => r.reading),
      variance: Float64Array.from(readings, (r) => (0.0007 ** 2 * r.length!) / 1000),
      held: Float64Array.from({ length: points }, (_, i) => (i === 0 ? 50 : NaN)),
    }
  }

  it('agrees with the dense normal equations of all unknowns (ml-matrix), levels, covariance, residuals and redundancy', () => {
    fc.assert(
      fc.property(madeBook, (lines) => {
        const survey = surveyOf(lines)
        const found = adjustLevels(survey)
        const { points, x, Q, v, redundancy } = dense(survey)
        points.forEach((p, i) => {
          expect(found.level[p]!).toBeCloseTo(x.get(i, 0), 8)
          points.forEach((r, j) => {
            let covariance = 0
            for (let k = 0; k < found.q; k++)
              covariance += found.factor[p * found.q + k]! * found.factor[r * found.q + k]!
            expect(Math.abs(covariance - Q.get(i, j))).toBeLessThan(1e-6 * Q.get(i, i) + 1e-16)
          })
        })
        survey.reading.forEach((_, i) => {
          expect(found.residual[i]!).toBeCloseTo(v.get(i, 0), 8)
          expect(found.redundancy[i]!).toBeCloseTo(redundancy[i]!, 6)
        })
      }),
      { numRuns: 40 },
    )
  })

  it('has redundancy numbers that sum to its degrees of freedom', () => {
    fc.assert(
      fc.property(madeBook, (lines) => {
        const found = adjustLevels(surveyOf(lines))
        expect(found.redundancy.reduce((a, b) => a + b, 0)).toBeCloseTo(found.degreesOfFreedom, 6)
      }),
    )
  })

  it('does not change when every staff reading of a setup is shifted alike: that is only the height of the instrument', () => {
    fc.assert(
      fc.property(madeBook, fc.integer({ min: -500, max: 500 }), (lines, shift) => {
        const survey = surveyOf(lines)
        const moved = {
          ...survey,
          reading: survey.reading.map((r, i) => (survey.setup[i] === 1 ? r + shift / 1000 : r)),
        }
        const [a, b] = [adjustLevels(survey), adjustLevels(moved)]
        expect([...b.level]).toEqual(near([...a.level], 9))
        expect([...b.residual]).toEqual(near([...a.residual], 9))
      }),
    )
  })

  it('has standard deviations that agree with the scatter of 2,000 simulated books (within 4 sds of the sampling)', () => {
    const survey = surveyOf([
      { point: 0, back: 1.5, sight: 20 },
      { point: 3, mid: 1.1, sight: 15 },
      { point: 1, fore: 1.2, back: 1.4, sight: 22 },
      { point: 4, mid: 0.9, sight: 9 },
      { point: 2, fore: 1.3, back: 1.6, sight: 18 },
      { point: 0, fore: 1.4, sight: 21 },
    ])
    const exact = adjustLevels(survey)
    const truth = survey.reading.map((r, i) => r + exact.residual[i]!)
    const sums = new Float64Array(5)
    const runs = 2000
    const normal = scatter(20261201)
    for (let run = 0; run < runs; run++) {
      const reading = truth.map((r, i) => r + Math.sqrt(survey.variance[i]!) * normal())
      const { level } = adjustLevels({ ...survey, reading })
      level.forEach((h, p) => (sums[p]! += (h - exact.level[p]!) ** 2))
    }
    for (const p of [1, 2, 3, 4]) {
      const sd = Math.hypot(...exact.factor.subarray(p * exact.q, (p + 1) * exact.q))
      const ratio = Math.sqrt(sums[p]! / runs) / sd
      expect(Math.abs(ratio - 1)).toBeLessThan(4 / Math.sqrt(2 * runs))
    }
  })

  it('finds the reading that is 10 mm off, and by how much', () => {
    const differences: Difference[] = [
      [0, 1, 1, 1e-8],
      [1, 2, 1, 1e-8],
      [2, 0, -2, 1e-8],
      [0, 2, 2, 1e-8],
      [1, 0, -1, 1e-8],
    ]
    const survey = network([10, NaN, NaN], differences)
    survey.reading[2]! += 0.01
    const found = adjustLevels(survey)
    const worst = [...found.standardised.keys()].sort((a, b) => Math.abs(found.standardised[b]!) - Math.abs(found.standardised[a]!))[0]! // prettier-ignore
    expect([2, 3]).toContain(worst)
    expect(Math.abs(grossError(found, worst))).toBeCloseTo(0.01, 6)
  })

  it('names the points that no chain of readings joins to a benchmark', () => {
    const survey = network([10, NaN, NaN, NaN], [[0, 1, 1, 1], [2, 3, 1, 1]]) // prettier-ignore
    expect(untiedPoints(survey)).toEqual([2, 3])
    try {
      adjustLevels(survey)
      expect.unreachable()
    } catch (error) {
      expect(error).toBeInstanceOf(SolverFault)
      expect([(error as SolverFault).code, (error as SolverFault).at]).toEqual(['untied', [2, 3]])
    }
  })
})

describe('a level book reduced', () => {
  it('passes its arithmetic checks whatever is booked: back less fore, rise less fall, last less first', () => {
    fc.assert(
      fc.property(madeBook, (lines) => {
        const { checks, closures } = reduceBook(lines, [50])
        expect(checks.back - checks.fore).toBeCloseTo(checks.gain, 9)
        expect(checks.rise - checks.fall).toBeCloseTo(checks.gain, 9)
        expect(checks.sights).toBeCloseTo(checks.collimations, 7)
        expect(closures).toHaveLength(1)
        expect(closures[0]!.misclosure).toBeCloseTo(checks.gain, 9)
      }),
    )
  })

  it('says by how much a loop does not close, and that is not changed by shifting all staff readings', () => {
    fc.assert(
      fc.property(madeBook, fc.integer({ min: -1000, max: 1000 }), (lines, shift) => {
        const moved = lines.map((line) => ({
          ...line,
          ...(line.back === undefined ? {} : { back: line.back + shift / 1000 }),
          ...(line.mid === undefined ? {} : { mid: line.mid + shift / 1000 }),
          ...(line.fore === undefined ? {} : { fore: line.fore + shift / 1000 }),
        }))
        const [a, b] = [reduceBook(lines, [50]), reduceBook(moved, [50])]
        expect(b.closures[0]!.misclosure).toBeCloseTo(a.closures[0]!.misclosure, 9)
      }),
    )
  })

  it('goes as far as a half-written book goes, and lists what is read before any backsight', () => {
    const { rows, before, setups } = reduceBook([{ point: 1, mid: 1 }, { point: 0, back: 1.5 }, { point: 1, mid: 1 }, { point: 2 }], [100]) // prettier-ignore
    expect([before, setups]).toEqual([[0], 1])
    expect(rows[2]!.level).toBeCloseTo(100.5, 12)
    expect(rows[3]!.level).toBeUndefined()
  })
})

describe('quantiles', () => {
  it('are those of the tables (Fisher and Yates, Statistical Tables, from memory)', () => {
    expect([0.95, 0.975, 0.995, 0.9995].map(normalQuantile)).toEqual(near([1.6449, 1.96, 2.5758, 3.2905], 4))
    expect([1, 2, 5, 10, 30].map((f) => chiSquareQuantile(0.95, f))).toEqual(
      near([3.841, 5.991, 11.07, 18.307, 43.773], 3),
    )
    expect([1, 2, 5, 10, 30].map((f) => studentQuantile(0.975, f))).toEqual(
      near([12.706, 4.303, 2.571, 2.228, 2.042], 3),
    )
  })

  it('two-sided 95 % chi-square of 3 degrees of freedom is 0.216 to 9.348 (computed with SciPy)', () => {
    expect([chiSquareQuantile(0.025, 3), chiSquareQuantile(0.975, 3)]).toEqual(near([0.216, 9.348], 3))
  })
})

/** Standard normal values from a fixed start: Park and Miller's generator, Box and Muller's transformation. */
function scatter(start: number): () => number {
  let state = start
  function uniform(): number {
    state = (state * 48271) % 2147483647
    return state / 2147483647
  }
  return () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform())
}
