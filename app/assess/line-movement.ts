/**
 * What a round's settlements mean for one frame line: its tilt, its spans, and the part of the movement of its
 * bases that bends the frame. With footings that follow the tilt, sinking together and turning together strain
 * nothing, so only the rest (settlement less mean less tilt) is put on the frame: no digits are lost and a building that
 * only tilts has no moments, exactly.
 */
import type { Certainty, SpanFinding, StretchFinding } from '../model/findings.ts'
import { angularDistortion, certaintyOf, deflectionRatios, statusOf } from '../../solver/index.ts'
import type { Prepared, PreparedLine } from './prepare.ts'
import { tiltWeights, type Settlements } from './settlement.ts'

/** A row of weights over supports, worked out: value and factor row (sd is its length). */
export interface Valued {
  value: number
  /** shape (q) */
  factor: Float64Array
}

export interface LineMovement {
  prepared: PreparedLine
  tilt: Valued
  /** shape (n supports of the building): weights of the tilt */
  tiltWeights: Float64Array
  /** shape (b): mean settlement of the bases taken out of `strain`, and where the turning centre is, m */
  mean: number
  centreX: number
  centreZ: number
  /** shape (b, n): weights of the movement of each base that strains the frame */
  strainWeights: Float64Array[]
  /** shape (b), m, and its factor rows of length q */
  strain: Valued[]
  q: number
}

export function lineMovement(prepared: Prepared, line: PreparedLine, settlements: Settlements): LineMovement {
  const n = settlements.value.length
  const weights = tiltWeights(settlements, line.towards[0], line.towards[1])
  const tilt = weigh(weights, settlements)
  const frame = line.solved?.arrays.frame
  const b = line.bases.length
  const x = line.bases.map((_, k) => frame!.x[frame!.base[k]!]!)
  const z = line.bases.map((_, k) => frame!.z[frame!.base[k]!]!)
  const centreX = average(x)
  const follows = prepared.criteria.base_rotation === 'follows-tilt'
  const strainWeights = line.bases.map((support, k) => {
    const row = new Float64Array(n)
    if (follows) for (let j = 0; j < n; j++) row[j] = -weights[j]! * (x[k]! - centreX)
    row[support]! += 1
    for (const other of line.bases) row[other]! -= 1 / b
    return row
  })
  return {
    prepared: line,
    tilt,
    tiltWeights: weights,
    mean: average(line.bases.map((support) => settlements.value[support]!)),
    centreX,
    centreZ: average(z),
    strainWeights,
    strain: strainWeights.map((row) => weigh(row, settlements)),
    q: settlements.q,
  }
}

/** Value and factor row of weights over all supports. */
export function weigh(weights: ArrayLike<number>, { value, factor, q }: Settlements): Valued {
  let sum = 0
  const row = new Float64Array(q)
  for (let j = 0; j < value.length; j++) {
    const w = weights[j]!
    if (w === 0) continue
    sum += w * value[j]!
    for (let k = 0; k < q; k++) row[k]! += w * factor[j * q + k]!
  }
  return { value: sum, factor: row }
}

/** Standard deviation: the length of a factor row. */
export function sdOf(factor: Float64Array): number {
  let sum = 0
  for (let k = 0; k < factor.length; k++) sum += factor[k]! * factor[k]!
  return Math.sqrt(sum)
}

export function spanFindings(prepared: Prepared, movement: LineMovement, settlements: Settlements): SpanFinding[] {
  const { supports } = prepared.building
  const triggers = prepared.criteria.angular_distortion
  const line = movement.prepared
  return line.supports.slice(1).flatMap((right, i): SpanFinding[] => {
    const left = line.supports[i]!
    const length = right.x - left.x
    if (!(length > 0)) return []
    const differential = settlements.value[right.support]! - settlements.value[left.support]!
    const distortion = weigh(angularDistortion(movement.tiltWeights, left.support, right.support, length), settlements)
    const sd = sdOf(distortion.factor)
    const size = Math.abs(distortion.value)
    const isEstimated = [left, right].some((s) => settlements.estimatedFrom[s.support] !== undefined)
    const certainty: Certainty = isEstimated ? 'borderline' : certaintyOf(size, sd, prepared.z, triggers)
    return [
      {
        from: supports[left.support]!.id,
        to: supports[right.support]!.id,
        length_m: length,
        differential_mm: differential * 1000,
        chord_rotation_rad: differential / length,
        angular_distortion_rad: distortion.value,
        sd_rad: sd,
        status: statusOf(size, triggers),
        certainty,
      },
    ]
  })
}

/** Turns of the chord below this are rounding, rad. */
const NO_TURN = 1e-9

/**
 * Deflection ratio of every sagging and hogging stretch. The ratio is linear in the settlements of its two ends and of
 * the support with the largest offset, which gives its standard deviation.
 */
export function stretchFindings(
  prepared: Prepared,
  movement: LineMovement,
  settlements: Settlements,
): StretchFinding[] {
  const { supports } = movement.prepared
  const isRising = supports.every((s, i) => i === 0 || s.x > supports[i - 1]!.x)
  if (supports.length < 3 || !isRising) return []
  const x = supports.map((s) => s.x)
  const settled = supports.map((s) => settlements.value[s.support]!)
  return deflectionRatios(x, settled, NO_TURN).map((stretch): StretchFinding => {
    const [from, at, to] = [stretch.from, stretch.at, stretch.to].map((i) => supports[i]!)
    const length = to!.x - from!.x
    const share = (at!.x - from!.x) / length
    const weights = new Float64Array(settlements.value.length)
    weights[at!.support]! += 1 / length
    weights[from!.support]! -= (1 - share) / length
    weights[to!.support]! -= share / length
    const names = prepared.building.supports
    return {
      kind: stretch.kind,
      from: names[from!.support]!.id,
      to: names[to!.support]!.id,
      at: names[at!.support]!.id,
      length_m: length,
      deflection_mm: stretch.ratio * length * 1000,
      deflection_ratio: stretch.ratio,
      sd_ratio: sdOf(weigh(weights, settlements).factor),
    }
  })
}

function average(of: readonly number[]): number {
  return of.length === 0 ? 0 : of.reduce((a, b) => a + b, 0) / of.length
}
