/** A straight line through values in time, weighted by their standard deviations. Any consistent units. */
import { SolverFault } from '../types.ts'

export interface FittedLine {
  /** Mean time, weighted. */
  centre: number
  /** Value there. */
  level: number
  /** Change in unit time. */
  rate: number
  /** Standard deviations of the two, which are independent of each other. */
  sdLevel: number
  sdRate: number
}

/**
 * Weighted least-squares line and the standard deviation of its rate.
 *
 *     w = 1 / sd^2,  centre = sum w t / sum w,  rate = sum w (t - centre) y / sum w (t - centre)^2
 *     var level = 1 / sum w,  var rate = 1 / sum w (t - centre)^2         (a-priori variances)
 *
 * Values are taken as independent. Where they share a baseline its error moves all alike and does not touch the rate.
 *
 * @param time  shape (n), n >= 2, not all alike
 * @param value shape (n)
 * @param sd    shape (n), above 0
 * @throws SolverFault `shape` when lengths differ or n < 2; `not-positive` naming sd or time
 * @source      weighted linear regression, common practice
 * @example
 *     fittedLine([0, 1, 2], [1, 3, 5], [1, 1, 1]).rate    // 2
 *     fittedLine([0, 1, 2], [1, 3, 5], [1, 1, 1]).level   // 3
 *     fittedLine([0, 2], [0, 1], [0.5, 0.5]).sdRate       // 0.353553
 */
export function fittedLine(time: ArrayLike<number>, value: ArrayLike<number>, sd: ArrayLike<number>): FittedLine {
  const n = time.length
  if (n < 2 || value.length !== n || sd.length !== n) throw new SolverFault('shape', 'time')
  let weights = 0
  let centre = 0
  let level = 0
  for (let i = 0; i < n; i++) {
    if (!(sd[i] > 0)) throw new SolverFault('not-positive', 'sd', [i])
    const w = 1 / sd[i] ** 2
    weights += w
    centre += w * time[i]
    level += w * value[i]
  }
  centre /= weights
  level /= weights
  let spread = 0
  let product = 0
  for (let i = 0; i < n; i++) {
    const w = 1 / sd[i] ** 2
    spread += w * (time[i] - centre) ** 2
    product += w * (time[i] - centre) * (value[i] - level)
  }
  if (!(spread > 0)) throw new SolverFault('not-positive', 'time')
  return { centre, level, rate: product / spread, sdLevel: 1 / Math.sqrt(weights), sdRate: 1 / Math.sqrt(spread) }
}

/**
 * Value and standard deviation of a fitted line at a time.
 *
 * @example
 *     valueAt({ centre: 1, level: 3, rate: 2, sdLevel: 0.3, sdRate: 0.4 }, 2)   // { value: 5, sd: 0.5 }
 */
export function valueAt(
  { centre, level, rate, sdLevel, sdRate }: FittedLine,
  time: number,
): { value: number; sd: number } {
  return { value: level + rate * (time - centre), sd: Math.hypot(sdLevel, sdRate * (time - centre)) }
}
