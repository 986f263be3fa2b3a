/** How far a convex effect is from its trigger. Any consistent unit. */

/** Relative width at which the bracket of the answer is narrow enough. */
const NARROW = 1e-13
const STEPS = 200

/**
 * The least x above 0 at which an effect that is below its trigger at 0 reaches it; Infinity where it does not by `most`.
 *
 * A utilisation or a fraction is a maximum of sums of |a + b x| / capacity, hence convex in x: below the trigger at 0, it
 * reaches it once at most on the way out. The crossing is bracketed by doubling, then found by the chord between the
 * bracket's ends (exact where the effect is straight) with bisection whenever the chord does not halve the bracket.
 *
 * @param effect  convex on [0, most]; effect(0) < trigger
 * @param trigger finite
 * @param first   where the search begins, above 0; only its order of magnitude matters
 * @param most    where it ends, at least `first`
 * @returns       x in (0, most], or Infinity; 0 where effect(0) is not below the trigger
 * @source  bracketed false position with bisection, common practice of numerical analysis
 * @example
 *     firstReach((x) => Math.abs(2 + 4 * x), 10, 1, 1000)  // 2
 *     firstReach((x) => Math.abs(2 - 4 * x), 10, 1, 1000)  // 3
 *     firstReach(() => 2, 10, 1, 1000)                     // Infinity
 *     firstReach((x) => 11 + x, 10, 1, 1000)               // 0
 */
export function firstReach(effect: (x: number) => number, trigger: number, first: number, most: number): number {
  let low = 0
  let under = effect(0) - trigger
  if (under >= 0) return 0
  let high = first
  let over = effect(high) - trigger
  while (over < 0) {
    if (high >= most) return Infinity
    low = high
    under = over
    high = Math.min(2 * high, most)
    over = effect(high) - trigger
  }
  for (let step = 0; step < STEPS && high - low > NARROW * high && over > 0; step++) {
    const width = high - low
    for (const x of [low - (under * width) / (over - under), low + width / 2]) {
      if (!(x > low && x < high)) continue
      const there = effect(x) - trigger
      if (there < 0) [low, under] = [x, there]
      else [high, over] = [x, there]
      if (high - low <= width / 2) break
    }
  }
  return high
}
