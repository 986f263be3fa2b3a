/**
 * Weighted least-squares adjustment of single staff readings. Each setup has its own unknown height of
 * collimation, so that readings of one setup share it and no correlation is lost. Held points carry no
 * variance. All in m; levels up positive.
 *
 *     reading = HI(setup) - level(point) + e,   var(e) given
 *
 * The heights of collimation are eliminated setup by setup (exact), and so are points that are read once: the
 * system is that of the points which tie setups together, solved for corrections to approximate levels so that no
 * digits are lost.
 */
import { CholeskyDecomposition, Matrix } from 'ml-matrix'
import { SolverFault, type SurveyArrays } from '../types.ts'

export interface Adjustment {
  /** shape (p), m: held or adjusted level; NaN for a point that no reading reaches */
  level: Float64Array
  /** shape (p, q), m, row-major: covariance of the levels = factor factor' (a-priori variances); rows of held points are 0 */
  factor: Float64Array
  q: number
  /** shape (r), m: adjusted less observed */
  residual: Float64Array
  /** shape (r), 0 to 1: share of an error in the reading that shows in its residual */
  redundancy: Float64Array
  /** shape (r): residual over its sd; 0 where nothing controls the reading */
  standardised: Float64Array
  /** readings less unknowns */
  degreesOfFreedom: number
  /** v'Pv / degrees of freedom; NaN where there are none */
  varianceFactor: number
}

/**
 * Points that are read but that no chain of setups joins to a held point.
 *
 * @returns indices of points, rising
 */
export function untiedPoints(survey: SurveyArrays): number[] {
  return unreached(survey, approximateLevels(survey).level)
}

/**
 * Levels, their full covariance, residuals and redundancy of a levelling network with held points.
 *
 *     N = sum over setups (P - p p' / sum p),   N dx = -sum p (l - mean l),   Q = N^-1 = S S'
 *     var(HI - x_i) = 1 / sum p + (a - e_i)' Q (a - e_i),   a = p / sum p over the points of the setup
 *     redundancy_i = 1 - p_i var(HI - x_i),   sum of redundancies = degrees of freedom
 *
 * @param survey r readings, s setups, p points; see SurveyArrays
 * @returns      see Adjustment
 * @throws SolverFault `shape`, `not-finite` naming the reading, `not-positive` naming the variance,
 *               `untied` naming points joined to no held point
 * @source       facts of the trade: weighted least squares (Gauss-Markov model with parameters);
 *               W. Baarda, A testing procedure for use in geodetic networks, 1968 (redundancy numbers, data snooping)
 */
export function adjustLevels(survey: SurveyArrays): Adjustment {
  const { point, reading, variance, held } = survey
  check(survey)
  const r = reading.length
  const p = held.length
  const { level, setups } = approximateLevels(survey)
  const untied = unreached(survey, level)
  if (untied.length) throw new SolverFault('untied', 'point', untied)

  // A point read once carries nothing but itself: it is hung on its setup once the net of the others is solved.
  const times = new Int32Array(p)
  for (let i = 0; i < r; i++) times[point[i]!]!++
  function isSideShot(i: number): boolean {
    return times[point[i]!] === 1 && Number.isNaN(held[point[i]!]!)
  }
  const net = setups.map((members) => members.filter((i) => !isSideShot(i)))
  const unknown = new Int32Array(p).fill(-1)
  let q = 0
  for (const members of net)
    for (const i of members) if (Number.isNaN(held[point[i]!]!) && unknown[point[i]!]! < 0) unknown[point[i]!] = q++

  const normal = Matrix.zeros(q, q)
  const right = new Float64Array(q)
  const weightSum = new Float64Array(net.length)
  const meanHeight = new Float64Array(net.length)
  net.forEach((members, s) => {
    let sum = 0
    let mean = 0
    for (const i of members) {
      const w = 1 / variance[i]!
      sum += w
      mean += w * (reading[i]! + level[point[i]!]!)
    }
    mean /= sum
    weightSum[s] = sum
    meanHeight[s] = mean
    for (const i of members) {
      const a = unknown[point[i]!]!
      if (a < 0) continue
      const w = 1 / variance[i]!
      right[a]! -= w * (reading[i]! + level[point[i]!]! - mean)
      normal.set(a, a, normal.get(a, a) + w)
      for (const j of members) {
        const b = unknown[point[j]!]!
        if (b >= 0) normal.set(a, b, normal.get(a, b) - w / variance[j]! / sum)
      }
    }
  })

  const inverse = inverseFactor(normal)
  const step = product(inverse, right, q)
  const sideShots = setups.map((members) => members.filter(isSideShot))
  // Columns: the net, then for each setup with side shots its own part of its height, then each side shot's own error.
  const width = q + sideShots.reduce((sum, shots) => sum + (shots.length ? 1 + shots.length : 0), 0)
  const factor = new Float64Array(p * width)
  for (let j = 0; j < p; j++) {
    const a = unknown[j]!
    if (a < 0) continue
    level[j]! += step[a]!
    factor.set(inverse.subarray(a * q, (a + 1) * q), j * width)
  }

  const residual = new Float64Array(r)
  const redundancy = new Float64Array(r)
  const standardised = new Float64Array(r)
  let square = 0
  let column = q
  net.forEach((members, s) => {
    const shared = new Float64Array(q)
    let height = meanHeight[s]!
    for (const i of members) {
      const share = 1 / variance[i]! / weightSum[s]!
      const a = unknown[point[i]!]!
      if (a < 0) continue
      height += share * step[a]!
      for (let k = 0; k < q; k++) shared[k]! += share * inverse[a * q + k]!
    }
    for (const i of members) {
      residual[i] = height - level[point[i]!]! - reading[i]!
      square += residual[i]! ** 2 / variance[i]!
      let spread = 1 / weightSum[s]!
      for (let k = 0; k < q; k++) spread += (shared[k]! - factor[point[i]! * width + k]!) ** 2
      const part = 1 - spread / variance[i]!
      // Below this a redundancy is nothing but rounding.
      redundancy[i] = part > 1e-9 ? part : 0
      if (redundancy[i]) standardised[i] = residual[i]! / Math.sqrt(variance[i]! * part)
    }
    const shots = sideShots[s]!
    if (shots.length === 0) return
    const own = column++
    for (const i of shots) {
      const begin = point[i]! * width
      level[point[i]!] = height - reading[i]!
      factor.set(shared, begin)
      factor[begin + own] = Math.sqrt(1 / weightSum[s]!)
      factor[begin + column++] = Math.sqrt(variance[i]!)
    }
  })
  const readings = net.reduce((sum, members) => sum + members.length, 0)
  const degreesOfFreedom = readings - net.length - q
  return {
    level,
    factor,
    q: width,
    residual,
    redundancy,
    standardised,
    degreesOfFreedom,
    varianceFactor: degreesOfFreedom > 0 ? square / degreesOfFreedom : NaN,
  }
}

/** Size of a gross error in one reading, observed less true, that best explains its residual; m. */
export function grossError(adjustment: Pick<Adjustment, 'residual' | 'redundancy'>, reading: number): number {
  return -adjustment.residual[reading]! / adjustment.redundancy[reading]!
}

function check({ setup, point, reading, variance, held }: SurveyArrays): void {
  const r = reading.length
  if (setup.length !== r || point.length !== r || variance.length !== r) throw new SolverFault('shape', 'reading')
  for (let i = 0; i < r; i++) {
    if (!Number.isFinite(reading[i]!)) throw new SolverFault('not-finite', 'reading', [i])
    if (!(variance[i]! > 0 && variance[i]! < Infinity)) throw new SolverFault('not-positive', 'variance', [i])
    if (!(point[i]! >= 0 && point[i]! < held.length)) throw new SolverFault('shape', 'point', [i])
  }
}

/** Levels walked from the held points through the setups, and the readings of each setup that has any. */
function approximateLevels({ setup, point, reading, held }: SurveyArrays) {
  const level = Float64Array.from(held)
  const bySetup = new Map<number, number[]>()
  const byPoint = new Map<number, number[]>()
  for (let i = 0; i < reading.length; i++) {
    put(bySetup, setup[i]!, i)
    put(byPoint, point[i]!, i)
  }
  const next = [...byPoint.keys()].filter((j) => !Number.isNaN(level[j]!))
  const seen = new Set<number>()
  for (let j = next.pop(); j !== undefined; j = next.pop())
    for (const i of byPoint.get(j)!) {
      if (seen.has(setup[i]!)) continue
      seen.add(setup[i]!)
      const height = level[j]! + reading[i]!
      for (const k of bySetup.get(setup[i]!)!)
        if (Number.isNaN(level[point[k]!]!)) {
          level[point[k]!] = height - reading[k]!
          next.push(point[k]!)
        }
    }
  return { level, setups: [...bySetup.values()] }
}

function unreached({ point }: SurveyArrays, level: Float64Array): number[] {
  const untied = new Set<number>()
  for (const p of point) if (Number.isNaN(level[p]!)) untied.add(p)
  return [...untied].sort((a, b) => a - b)
}

function put(lists: Map<number, number[]>, key: number, value: number): void {
  const list = lists.get(key)
  if (list) list.push(value)
  else lists.set(key, [value])
}

/** S with S S' = N^-1: the inverse transpose of N's Cholesky factor; shape (q, q), upper triangular. */
function inverseFactor(normal: Matrix): Float64Array {
  const q = normal.rows
  const inverse = new Float64Array(q * q)
  if (q === 0) return inverse
  const lower = new CholeskyDecomposition(symmetric(normal)).lowerTriangularMatrix
  // Column j of L^-1, written as row j of its transpose.
  for (let j = 0; j < q; j++)
    for (let i = j; i < q; i++) {
      let sum = i === j ? 1 : 0
      for (let k = j; k < i; k++) sum -= lower.get(i, k) * inverse[j * q + k]!
      inverse[j * q + i] = sum / lower.get(i, i)
    }
  return inverse
}

function symmetric(m: Matrix): Matrix {
  for (let i = 0; i < m.rows; i++) for (let j = 0; j < i; j++) m.set(i, j, m.get(j, i))
  return m
}

/** S S' b */
function product(factor: Float64Array, b: Float64Array, q: number): Float64Array {
  const middle = new Float64Array(q)
  const out = new Float64Array(q)
  for (let i = 0; i < q; i++) for (let k = 0; k < q; k++) middle[k]! += factor[i * q + k]! * b[i]!
  for (let i = 0; i < q; i++) for (let k = 0; k < q; k++) out[i]! += factor[i * q + k]! * middle[k]!
  return out
}
