/**
 * Movement of the ground as linear maps of the settlements: the least-squares plane (mean and tilt), chord
 * rotation and angular distortion of a span, deflection ratio of a stretch. A map is a row of weights, so
 * that `value = weights . settlement` and its variance is `weights C weights'`. All in m and rad; settlement
 * down positive; rotation clockwise positive when the ground falls towards positive x (or y).
 */
import { SolverFault } from '../types.ts'

export interface PlaneMap {
  /** centre of the supports in plan, m */
  centreX: number
  centreY: number
  /** shape (n): mean settlement, which is the plane's settlement at the centre */
  mean: Float64Array
  /** shape (n), 1/m: slope of the settlement along x */
  tiltX: Float64Array
  /** shape (n), 1/m: slope along y */
  tiltY: Float64Array
  /** 2: a plane; 1: supports in one straight line, slope along it and none across; 0: one place, mean only */
  rank: 0 | 1 | 2
}

/** Supports whose root mean square offset from their line is below this share of that along it count as in line. */
const IN_LINE = 1e-3

/**
 * Unweighted least-squares plane through the settlements of supports in plan.
 *
 *     settlement = mean + tiltX (x - centreX) + tiltY (y - centreY)
 *
 * @param x, y shape (n), n >= 1, m: plan positions
 * @returns    rows of weights over the n supports; see PlaneMap
 * @throws SolverFault `shape` when there is no support or the lengths differ; `not-finite` naming the entry
 * @source     common practice (tilt of the building as a best-fit plane); definitions: J. B. Burland and C. P. Wroth,
 *             Settlement of buildings and associated damage, 1974
 */
export function planeMap(x: ArrayLike<number>, y: ArrayLike<number>): PlaneMap {
  const n = x.length
  if (n === 0 || y.length !== n) throw new SolverFault('shape', 'x')
  for (let i = 0; i < n; i++) if (!Number.isFinite(x[i]! + y[i]!)) throw new SolverFault('not-finite', 'x', [i])
  let centreX = 0
  let centreY = 0
  for (let i = 0; i < n; i++) {
    centreX += x[i]! / n
    centreY += y[i]! / n
  }
  let xx = 0
  let xy = 0
  let yy = 0
  for (let i = 0; i < n; i++) {
    const dx = x[i]! - centreX
    const dy = y[i]! - centreY
    xx += dx * dx
    xy += dx * dy
    yy += dy * dy
  }
  const mean = new Float64Array(n).fill(1 / n)
  const tiltX = new Float64Array(n)
  const tiltY = new Float64Array(n)
  // Principal axes of the supports in plan: the longer spread and the one across it.
  const half = Math.hypot((xx - yy) / 2, xy)
  const along = (xx + yy) / 2 + half
  const map = { centreX, centreY, mean, tiltX, tiltY }
  if (!(along > 0)) return { ...map, rank: 0 }
  const angle = Math.atan2(2 * xy, xx - yy) / 2
  const ux = Math.cos(angle)
  const uy = Math.sin(angle)
  let across = 0
  for (let i = 0; i < n; i++) across += ((y[i]! - centreY) * ux - (x[i]! - centreX) * uy) ** 2
  const plane = across > IN_LINE ** 2 * along
  for (let i = 0; i < n; i++) {
    const dx = x[i]! - centreX
    const dy = y[i]! - centreY
    const a = (dx * ux + dy * uy) / along
    const c = plane ? (dy * ux - dx * uy) / across : 0
    tiltX[i] = a * ux - c * uy
    tiltY[i] = a * uy + c * ux
  }
  return { ...map, rank: plane ? 2 : 1 }
}

/**
 * Slope of the plane along a direction in plan: the tilt of a frame line that runs that way.
 *
 * @param towardsX, towardsY the direction, of any length above 0; no direction gives no slope
 * @returns shape (n), 1/m
 */
export function tiltAlong(plane: PlaneMap, towardsX: number, towardsY: number): Float64Array {
  const length = Math.hypot(towardsX, towardsY)
  if (!(length > 0)) return new Float64Array(plane.mean.length)
  return plane.tiltX.map((w, i) => (w * towardsX + plane.tiltY[i]! * towardsY) / length)
}

/** The plane's settlement at a place in plan; shape (n). */
export function planeAt(plane: PlaneMap, x: number, y: number): Float64Array {
  return plane.mean.map((w, i) => w + plane.tiltX[i]! * (x - plane.centreX) + plane.tiltY[i]! * (y - plane.centreY))
}

/**
 * Chord rotation of a span less the tilt along its frame line: the angular distortion, or relative rotation.
 *
 *     chord rotation = (s_to - s_from) / L        angular distortion = chord rotation - tilt
 *
 * @param tilt   shape (n), 1/m: the line's tilt as weights; not changed
 * @param length above 0, m
 * @returns      shape (n), 1/m
 * @throws SolverFault `not-positive` naming the length
 * @source       A. W. Skempton and D. H. MacDonald, The allowable settlements of buildings, Proc. ICE 5 (III), 1956, 727-768;
 *               J. B. Burland and C. P. Wroth, 1974 (relative rotation)
 */
export function angularDistortion(tilt: Float64Array, from: number, to: number, length: number): Float64Array {
  if (!(length > 0)) throw new SolverFault('not-positive', 'length')
  const weights = tilt.map((w) => -w)
  weights[from]! -= 1 / length
  weights[to]! += 1 / length
  return weights
}

/** A sagging or hogging stretch of a settlement profile. */
export interface Stretch {
  kind: 'sagging' | 'hogging'
  /** indices of the supports at its ends */
  from: number
  to: number
  /** support with the largest offset from the chord */
  at: number
  /** largest offset from the chord over the distance of the ends; above 0 */
  ratio: number
}

/**
 * Deflection ratio of every sagging and hogging stretch of a line of supports.
 *
 * A stretch runs over neighbouring supports at which the chord turns the same way, from the support before the
 * first to the one after the last; sagging where the middle is below the chord of its ends.
 *
 * @param x          shape (n), m, rising
 * @param settlement shape (n), m, down positive
 * @param level      turns of the chord below this are none, rad
 * @throws SolverFault `shape`; `not-positive` where x does not rise
 * @source           J. B. Burland and C. P. Wroth, 1974 (relative deflection over the length of its zone)
 * @example
 *     deflectionRatios([0, 5, 10], [0, 0.01, 0]) // [{ kind: 'sagging', from: 0, to: 2, at: 1, ratio: 0.001 }]
 */
export function deflectionRatios(x: ArrayLike<number>, settlement: ArrayLike<number>, level = 1e-12): Stretch[] {
  const n = x.length
  if (settlement.length !== n) throw new SolverFault('shape', 'settlement')
  for (let i = 1; i < n; i++) if (!(x[i]! > x[i - 1]!)) throw new SolverFault('not-positive', 'x', [i])
  const stretches: Stretch[] = []
  function slope(i: number): number {
    return (settlement[i + 1]! - settlement[i]!) / (x[i + 1]! - x[i]!)
  }
  function turn(i: number): number {
    const t = slope(i - 1) - slope(i)
    return Math.abs(t) <= level ? 0 : Math.sign(t)
  }
  for (let first = 1; first < n - 1;) {
    const kind = turn(first)
    let last = first
    while (last + 1 < n - 1 && turn(last + 1) === kind) last++
    if (kind !== 0) stretches.push(stretchOf(x, settlement, first - 1, last + 1, kind))
    first = last + 1
  }
  return stretches
}

function stretchOf(
  x: ArrayLike<number>,
  settlement: ArrayLike<number>,
  from: number,
  to: number,
  kind: number,
): Stretch {
  const length = x[to]! - x[from]!
  let at = from
  let most = 0
  for (let i = from + 1; i < to; i++) {
    const share = (x[i]! - x[from]!) / length
    const offset = kind * (settlement[i]! - settlement[from]! - share * (settlement[to]! - settlement[from]!))
    if (offset > most) {
      most = offset
      at = i
    }
  }
  return { kind: kind > 0 ? 'sagging' : 'hogging', from, to, at, ratio: most / length }
}
