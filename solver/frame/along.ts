/**
 * What happens between the ends of one member: bending and shear at any place, and the places where bending
 * can be greatest. kN, m; loads are gravity and act across the member by their component towards its
 * right-hand side looking from -> to. Pure statics: how the end moments came about plays no part.
 */

/** A load of the member itself; a MemberLoadValue serves as it is. */
export type LoadAlong = { kind: 'uniform'; w: number } | { kind: 'point'; P: number; a: number }

export interface MemberAlong {
  /** m, above 0 */
  length: number
  /** x of `to` less x of `from`, m; its sign and share of the length turn gravity into load across the member */
  dx: number
  /** Total end moments, kNm, clockwise positive, acting on the member's ends. */
  momentFrom: number
  momentTo: number
  /** kN/m and kN, down positive, as FrameLoads */
  loads: readonly LoadAlong[]
}

/** A place along a member and the bending there. */
export interface BendingPoint {
  /** m from the `from` end */
  s: number
  /** kNm, sagging positive */
  bending: number
}

/**
 * Bending at distance s from the `from` end, sagging positive: tension on the right-hand side looking from -> to.
 *
 *     M(s) = M_from (1 - s / L) - M_to s / L + M_0(s)
 *     M_0  = q s (L - s) / 2   or   P_q b s / L for s <= a,  P_q a (L - s) / L beyond;  q = w dx / L, P_q = P dx / L
 *
 * @param along length > 0 [m]; end moments [kNm], clockwise +; loads [kN/m, kN], down +
 * @param s     0 <= s <= length [m]; values outside are taken to the nearer end
 * @returns     [kNm]; momentFrom at 0, -momentTo at length
 * @source  statics of a simply supported beam, common practice
 * @example
 *     bendingAt({ length: 6, dx: 6, momentFrom: 0, momentTo: 0, loads: [{ kind: 'uniform', w: 10 }] }, 3)         // 45
 *     bendingAt({ length: 6, dx: 6, momentFrom: 0, momentTo: 0, loads: [{ kind: 'point', P: 10, a: 3 }] }, 3)     // 15
 *     bendingAt({ length: 6, dx: -6, momentFrom: 0, momentTo: 0, loads: [{ kind: 'uniform', w: 10 }] }, 3)        // -45
 *     bendingAt({ length: 6, dx: 6, momentFrom: -21, momentTo: -21, loads: [] }, 6)                               // 21
 */
export function bendingAt(along: MemberAlong, s: number): number {
  const { length: L, dx, momentFrom, momentTo } = along
  const at = Math.min(Math.max(s, 0), L)
  let free = 0
  for (const load of along.loads) {
    if (load.kind === 'uniform') free += (load.w * at * (L - at)) / 2
    else free += (load.P * (at <= load.a ? (L - load.a) * at : load.a * (L - at))) / L
  }
  return momentFrom * (1 - at / L) - momentTo * (at / L) + (free * dx) / L
}

/**
 * Shear at distance s from the `from` end, the slope of the bending: dM/ds.
 *
 *     V(s) = -(M_from + M_to) / L + q (L / 2 - s)   and for a point load   + P_q b / L before it,  - P_q a / L after it
 *
 * Without loads this is the constant shear -(M_from + M_to) / L of the findings.
 *
 * @param along as for bendingAt
 * @param s     0 <= s <= length [m]; values outside are taken to the nearer end
 * @param side  under a point load: `before` it (towards `from`) or `after` it; default `after`. A load that stands over
 *              an end is left out by `after` at 0 and by `before` at L
 * @returns     [kN]; positive where bending grows towards `to`
 * @source  statics of a simply supported beam, common practice
 * @example
 *     shearAt({ length: 6, dx: 6, momentFrom: 0, momentTo: 0, loads: [{ kind: 'uniform', w: 10 }] }, 0)           // 30
 *     shearAt({ length: 6, dx: 6, momentFrom: 0, momentTo: 0, loads: [{ kind: 'point', P: 9, a: 2 }] }, 2)        // -3
 *     shearAt({ length: 6, dx: 6, momentFrom: -21, momentTo: -21, loads: [] }, 4)                                 // 7
 */
export function shearAt(along: MemberAlong, s: number, side: 'before' | 'after' = 'after'): number {
  const { length: L, dx } = along
  const at = Math.min(Math.max(s, 0), L)
  let free = 0
  for (const load of along.loads) {
    if (load.kind === 'uniform') free += load.w * (L / 2 - at)
    else {
      const isBefore = at < load.a || (at === load.a && side === 'before')
      free += (load.P * (isBefore ? L - load.a : -load.a)) / L
    }
  }
  return -(along.momentFrom + along.momentTo) / L + (free * dx) / L
}

/**
 * Every place at which the bending of a member can be greatest or least: both ends, under each point load, and
 * where the shear passes through zero between them.
 *
 * Bending is a parabola at most between these, so the greatest and the least of the list are those of the member.
 *
 * @param along as for bendingAt
 * @returns     by growing s, each place once; first the `from` end, last the `to` end
 * @source  shear is the slope of bending, common practice
 * @example
 *     extremeBending({ length: 6, dx: 6, momentFrom: 0, momentTo: 0, loads: [] }).length                          // 2
 *     extremeBending({ length: 8, dx: 8, momentFrom: 0, momentTo: 80, loads: [{ kind: 'uniform', w: 10 }] })[1]   // { s: 3, bending: 45 }
 */
export function extremeBending(along: MemberAlong): BendingPoint[] {
  const { length: L } = along
  const breaks = [0, L]
  let uniform = 0
  for (const load of along.loads) {
    if (load.kind === 'uniform') uniform += (load.w * along.dx) / L
    else if (load.a > 0 && load.a < L) breaks.push(load.a)
  }
  breaks.sort((a, b) => a - b)
  const places = new Set<number>()
  for (let piece = 0; piece + 1 < breaks.length; piece++) {
    const begin = breaks[piece]
    places.add(begin)
    if (uniform === 0) continue
    const level = begin + shearAt(along, begin) / uniform
    if (level > begin && level < breaks[piece + 1]) places.add(level)
  }
  places.add(L)
  return Array.from(places, (s) => ({ s, bending: bendingAt(along, s) }))
}
