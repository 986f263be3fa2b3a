/** The share of each support's settlement in a value that is linear in the settlements. */
import { fixed } from './figures.ts'
import type { Prepared } from './prepare.ts'
import type { Settlements } from './settlement.ts'

export interface Share {
  support: string
  settlement_mm: number
  /** Settlement beyond what moves the building as a whole: what the share is reckoned from. */
  beyond_mm: number
  /** In the unit of the value. */
  share: number
}

/**
 * Shares of a value that is `weights . settlement`. Where sinking and tilting together add nothing to the value, each
 * share is reckoned from the support's settlement beyond the plane; else, where sinking together adds nothing, from
 * that beyond the mean; else from the whole settlement.
 */
export function sharesOf(
  prepared: Prepared,
  settlements: Settlements,
  weights: ArrayLike<number>,
  unit = 1,
): { shares: Share[]; beyond: 'plane' | 'mean' | 'nothing' } {
  const { supports } = prepared.building
  const { value, plane } = settlements
  const mean = dot(settlements.mean, value)
  const slopes = [dot(settlements.tiltX, value), dot(settlements.tiltY, value)] as const
  const fields = {
    plane: supports.map((s) => mean + slopes[0] * (s.x_m - plane.centreX) + slopes[1] * (s.y_m - plane.centreY)),
    mean: supports.map(() => mean),
    nothing: supports.map(() => 0),
  }
  const size = supports.reduce((sum, _, i) => sum + Math.abs(weights[i]! * value[i]!), 0)
  const beyond =
    (['plane', 'mean'] as const).find((field) => Math.abs(dot(weights, fields[field])) <= 1e-9 * size) ?? 'nothing'
  const least = 1e-12 * supports.reduce((most, _, i) => Math.max(most, Math.abs(weights[i]!)), 0)
  const shares = supports.flatMap((support, i): Share[] => {
    if (Math.abs(weights[i]!) <= least) return []
    const more = value[i]! - fields[beyond][i]!
    return [
      {
        support: support.id,
        settlement_mm: value[i]! * 1000,
        beyond_mm: more * 1000,
        share: weights[i]! * more * unit,
      },
    ]
  })
  return { shares, beyond }
}

function dot(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let sum = 0
  for (let i = 0; i < b.length; i++) sum += a[i]! * b[i]!
  return sum
}

/** Which support drives the value most, in a sentence; empty where nothing does. */
export function driverSentence(shares: readonly Share[], beyond: 'plane' | 'mean' | 'nothing', total: number): string {
  const driver = shares.reduce<Share | undefined>(
    (most, s) => (most && Math.abs(most.share) >= Math.abs(s.share) ? most : s),
    undefined,
  )
  if (!driver || driver.share === 0) return ''
  const against = { plane: ' than the plane through the measured supports', mean: ' than the mean', nothing: '' }[
    beyond
  ]
  const size = fixed(Math.abs(driver.beyond_mm), 1)
  const moved =
    beyond === 'nothing'
      ? `has ${driver.beyond_mm < 0 ? 'risen' : 'settled'} ${size} mm`
      : `has settled ${size} mm ${driver.beyond_mm < 0 ? 'less' : 'more'}${against}`
  const part = total === 0 ? '' : `; alone that would give ${fixed((100 * driver.share) / total, 0)} % of the value`
  return `Driven most by support ${driver.support}, which ${moved}${part}.`
}

/** What is not measured among the supports that a value hangs on. */
export function estimateSentences(
  prepared: Prepared,
  { estimatedFrom }: Settlements,
  shares: readonly Share[],
): string[] {
  const hangsOn = new Set(shares.map((s) => s.support))
  return prepared.building.supports.flatMap((support, i) =>
    estimatedFrom[i] !== undefined && hangsOn.has(support.id)
      ? [`Support ${support.id} is an estimate (${estimatedFrom[i]}), so this value is never clear.`]
      : [],
  )
}

/** What the flag says, with the interval and the triggers. */
export function flagSentence(
  name: string,
  value: number,
  sd: number,
  z: number,
  triggers: { amber: number; red: number },
  text: (value: number) => string,
): string {
  const reached = value >= triggers.red ? 'red' : value >= triggers.amber ? 'amber' : undefined
  const held = reached
    ? `has reached ${reached} (${text(triggers[reached])})`
    : `is below amber (${text(triggers.amber)})`
  const low = Math.max(0, value - z * sd)
  return `The ${name} ${held}; with the survey's uncertainty it lies between ${text(low)} and ${text(value + z * sd)}.`
}
