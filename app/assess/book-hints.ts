/** Slips that a whole book shows: columns exchanged at a change point, points confused, a level out of adjustment. */
import { fixed } from '../model/numbers.ts'
import { looksExchanged } from './blunder-causes.ts'
import type { NumberedBook } from './levels.ts'
import type { StudMovement } from './stud-movements.ts'

/** A stud that seems to have moved more than this since the last visit is looked at, mm. */
const STRANGE_MM = 6
/** As near as a stud's level of the last visit must be to be taken for it, mm. */
const LIKE_MM = 2

/** Change points whose back- and foresight look exchanged, from the misclosures that they leave. */
export function exchangedHints({ ids, reduced }: NumberedBook, tolerance: number): string[] {
  return reduced.closures.flatMap((closure) => {
    if (Math.abs(closure.misclosure) <= tolerance) return []
    const onWay = closure.readings.map((i) => reduced.readings[i]!)
    return onWay.flatMap((back) => {
      if (back.sight !== 'back') return []
      const fore = onWay.find((r) => r.row === back.row && r.sight === 'fore')
      // Booked the wrong way round, what stands in the back column is the foresight.
      if (!fore || !looksExchanged(back.reading, fore.reading, closure.misclosure, tolerance)) return []
      return [`Row ${back.row + 1}, ${ids[back.point]!}: backsight and foresight look exchanged.`]
    })
  })
}

/** Studs that read like another one did at the last visit. */
export function confusedHints(studs: readonly StudMovement[]): string[] {
  const strange = studs.filter((s) => Math.abs(s.since_previous_mm ?? 0) > STRANGE_MM)
  return strange.flatMap((stud) => {
    const like = studs
      .flatMap((other) => {
        if (other === stud || other.level_m === undefined || other.since_previous_mm === undefined) return []
        const before = other.level_m + other.since_previous_mm / 1000
        return [{ other, away_mm: Math.abs(stud.level_m! - before) * 1000 }]
      })
      .sort((x, y) => x.away_mm - y.away_mm)[0]
    if (!like || like.away_mm > LIKE_MM) return []
    return [`${stud.point} reads as ${like.other.point} did at the last visit: is it the wrong point?`]
  })
}

export interface CollimationView {
  /** Line of sight above (positive) or below the level, mm in 10 m. */
  mm_in_10_m: number
  sd_mm_in_10_m: number
  /** The misclosures are beyond what the instrument lets expect, and this takes them away. */
  explains: boolean
}

/**
 * The collimation error that would explain the misclosures best: `misclosure = c (sum of back - sum of fore sights)`, weighted
 * by the misclosures' own variances. Undefined where sights are not booked or so equal that they tell nothing.
 */
export function collimationOf({ reduced }: NumberedBook, variance: ArrayLike<number>): CollimationView | undefined {
  const rows = reduced.closures.map((closure) => {
    const onWay = closure.readings.map((i) => ({ ...reduced.readings[i]!, variance: variance[i]! }))
    // The sights of a change point's other readings play no part in the closure.
    const unequal = onWay.reduce((sum, r) => sum + (r.sight === 'back' ? 1 : -1) * (r.length ?? NaN), 0)
    return { unequal, misclosure: closure.misclosure, variance: onWay.reduce((sum, r) => sum + r.variance, 0) }
  })
  if (rows.length === 0 || rows.some((r) => !Number.isFinite(r.unequal) || !(r.variance > 0))) return undefined
  const weight = rows.reduce((sum, r) => sum + r.unequal ** 2 / r.variance, 0)
  if (!(weight > 0)) return undefined
  const c = rows.reduce((sum, r) => sum + (r.unequal * r.misclosure) / r.variance, 0) / weight
  const sd = 1 / Math.sqrt(weight)
  // Known no better than 1 mm in 10 m it says nothing about a level.
  if (sd > 1e-4) return undefined
  const isBeyond = rows.some((r) => Math.abs(r.misclosure) > 3 * Math.sqrt(r.variance))
  const isTaken = rows.every((r) => Math.abs(r.misclosure - c * r.unequal) <= 3 * Math.sqrt(r.variance))
  return { mm_in_10_m: c * 1e4, sd_mm_in_10_m: sd * 1e4, explains: isBeyond && isTaken }
}

export function collimationHint(view: CollimationView | undefined): string[] {
  if (!view?.explains) return []
  return [
    `The misclosure looks like a collimation error of ${fixed(view.mm_in_10_m, 1)} mm in 10 m with unequal sights: test the level by two pegs.`,
  ]
}
