/** The level book, its adjustment, and the quantiles that its tests are made with. */
import { adjustLevels, chiSquareQuantile, normalQuantile, reduceBook, studentQuantile } from '../../../solver/index.ts'
import type { Check } from './check.ts'

const TABLES = 'Statistical tables of the normal, t and chi-square distributions, any handbook (from memory)'
const PRACTICE = 'Common practice of levelling'

export function surveyChecks(): Check[] {
  return [...quantiles(), ...book(), ...adjustment()]
}

function quantiles(): Check[] {
  return [
    { source: TABLES, check: 'normal, two-sided 95 %', expected: 1.96, found: normalQuantile(0.975), unit: '', tolerance: 0.005 }, // prettier-ignore
    { source: TABLES, check: 't, 10 degrees of freedom, two-sided 95 %', expected: 2.228, found: studentQuantile(0.975, 10), unit: '', tolerance: 0.0005 }, // prettier-ignore
    { source: TABLES, check: 'chi-square, 1 degree of freedom, 95 %', expected: 3.841, found: chiSquareQuantile(0.95, 1), unit: '', tolerance: 0.0005 }, // prettier-ignore
    { source: TABLES, check: 'chi-square, 10 degrees of freedom, 95 %', expected: 18.307, found: chiSquareQuantile(0.95, 10), unit: '', tolerance: 0.0005 }, // prettier-ignore
  ]
}

/** From a benchmark at 100.000 m over one change point and back: 3 mm short. */
function book(): Check[] {
  const reduced = reduceBook(
    [
      { point: 0, back: 1.5 },
      { point: 1, fore: 1.2, back: 1.4 },
      { point: 0, fore: 1.697 },
    ],
    [100, NaN],
  )
  const { back, fore, gain } = reduced.checks
  return [
    { source: PRACTICE, check: 'reduced level of the change point, 100 + 1.500 \u2212 1.200', expected: 100.3, found: reduced.rows[1]!.level!, unit: 'm' }, // prettier-ignore
    { source: PRACTICE, check: 'misclosure of the loop', expected: 3, found: reduced.closures[0]!.misclosure * 1000, unit: 'mm' }, // prettier-ignore
    { source: PRACTICE, check: 'backsights less foresights, against last less first level', expected: gain, found: back - fore, unit: 'm' }, // prettier-ignore
  ]
}

/** Between two benchmarks over one change point, 100 m and 300 m long, 4 mm misclosure: shared 1 to 3. */
function adjustment(): Check[] {
  const perMetre = 1e-9
  const adjusted = adjustLevels({
    setup: Int32Array.of(0, 0, 1, 1),
    point: Int32Array.of(0, 1, 1, 2),
    reading: Float64Array.of(1.5, 1, 1.5, 0.996),
    variance: Float64Array.of(50 * perMetre, 50 * perMetre, 150 * perMetre, 150 * perMetre),
    held: Float64Array.of(100, NaN, 101),
  })
  return [
    { source: `${PRACTICE}: a misclosure is shared in proportion to length`, check: 'adjusted level of the change point, a quarter of the way', expected: 100.499, found: adjusted.level[1]!, unit: 'm' }, // prettier-ignore
    { source: 'Gauss-Markov model: readings less unknowns', check: 'degrees of freedom of one line between benchmarks', expected: 1, found: adjusted.degreesOfFreedom, unit: '' }, // prettier-ignore
    { source: 'W. Baarda, A testing procedure for use in geodetic networks, 1968 (from memory)', check: 'sum of the redundancy numbers is the degrees of freedom', expected: 1, found: adjusted.redundancy.reduce((a, b) => a + b, 0), unit: '' }, // prettier-ignore
  ]
}
