/**
 * The two-peg test of a level: the same two pegs read from half-way, where equal sights cancel the error of the line of
 * sight, and from near one of them, where they do not.
 */

/** Readings in m, lengths of sights in m. */
export interface TwoPegTest {
  /** From half-way. */
  middle: { a_m: number; b_m: number }
  /** From beyond or near peg A. */
  near: { a_m: number; b_m: number; sight_a_m: number; sight_b_m: number }
}

/**
 * Collimation error, mm in 10 m, positive where the line of sight rises:
 * `((a2 - b2) - (a1 - b1)) / (sight a - sight b)`. Undefined where the two sights are alike. Common practice.
 */
export function collimationByPegs({ middle, near }: TwoPegTest): number | undefined {
  const unequal = near.sight_a_m - near.sight_b_m
  if (!(Math.abs(unequal) > 1)) return undefined
  const error = near.a_m - near.b_m - (middle.a_m - middle.b_m)
  return (error / unequal) * 1e4
}
