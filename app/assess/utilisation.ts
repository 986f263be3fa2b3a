/** How much of a member's capacity settlement and loads take together, and what governs. */
import type { Governing } from '../model/findings.ts'
import { capacityFor, extremeBending, fractionOf, fractionSd, shearAt, type MemberAlong } from '../../solver/index.ts'
import { sdOf, type Valued } from './line-movement.ts'
import type { MemberCapacity, Prepared, SolvedLine } from './prepare.ts'
import type { Partner } from './shared-columns.ts'

/** Induced end moments of a member of a line, by their indices. */
export type EndMoments = (line: number, member: number) => { from: Valued; to: Valued }

/** Induced bending at a share of the length from the `from` end, sagging positive. */
export function bendingThere(from: Valued, to: Valued, share: number): Valued {
  const factor = new Float64Array(from.factor.length)
  for (let k = 0; k < factor.length; k++) factor[k] = (1 - share) * from.factor[k]! - share * to.factor[k]!
  return { value: (1 - share) * from.value - share * to.value, factor }
}

/** Total end moments and loads of one member: settlement by its factor, and what it carries already. */
export function totalAlong(
  { arrays, existing, loads, length }: SolvedLine,
  index: number,
  settlementFactor: number,
  from: number,
  to: number,
): MemberAlong {
  const { frame } = arrays
  return {
    length: length[index]!,
    dx: frame.x[frame.to[index]!]! - frame.x[frame.from[index]!]!,
    momentFrom: settlementFactor * from + (existing?.momentFrom[index] ?? 0),
    momentTo: settlementFactor * to + (existing?.momentTo[index] ?? 0),
    loads: loads[index]!,
  }
}

export interface Used {
  utilisation: number
  sd: number
  governing: Governing
}

/**
 * The most that a member is used, over its ends, the interior maximum and shear; undefined without a capacity.
 * As a function of any one settlement it is convex: a maximum of sums of |linear| / capacity.
 */
export function utilisation(prepared: Prepared, moments: EndMoments, own: number, index: number): Used | undefined {
  const line = prepared.lines[own]!
  const solved = line.solved!
  const capacity = line.capacities[index]!
  const factor = prepared.criteria.combination.settlement
  const { from, to } = moments(own, index)
  const along = totalAlong(solved, index, factor, from.value, to.value)
  const partners = line.partners[index]!
  // The bending of both planes is straight between the ends of an upright, so their sum is worst at an end.
  const places = extremeBending(along).filter((p) => partners.length === 0 || p.s === 0 || p.s === along.length)
  let worst: Used | undefined
  for (const { s, bending } of places) {
    const takes = capacityFor(bending, capacity)
    if (takes === undefined) continue
    const share = s / along.length
    const induced = bendingThere(from, to, share)
    const parts = [{ bending, takes, row: induced.factor }]
    const counted: string[] = []
    for (const partner of partners) {
      const theirs = partnerBending(prepared, moments, partner, share)
      if (!theirs) continue
      parts.push(theirs)
      counted.push(prepared.lines[partner.line]!.line.id)
    }
    const total = parts.reduce((sum, p) => sum + fractionOf(p.bending, p.takes), 0)
    if (worst && total <= worst.utilisation) continue
    worst = {
      utilisation: total,
      sd: sdOfSum(parts, factor),
      governing: {
        effect: 'bending',
        at_m: s,
        total: bending,
        capacity: takes,
        ...(counted.length ? { with_line: counted.join(', ') } : {}),
      },
    }
  }
  return worseShear(worst, along, capacity, factor, from, to)
}

function partnerBending(prepared: Prepared, moments: EndMoments, partner: Partner, share: number) {
  const { solved, capacities } = prepared.lines[partner.line]!
  const { from, to } = moments(partner.line, partner.member)
  const factor = prepared.criteria.combination.settlement
  const at = partner.isTurned ? 1 - share : share
  const along = totalAlong(solved!, partner.member, factor, from.value, to.value)
  const bending = (1 - at) * along.momentFrom - at * along.momentTo
  const takes = capacityFor(bending, capacities[partner.member]!)
  return takes === undefined ? undefined : { bending, takes, row: bendingThere(from, to, at).factor }
}

/** Sd of a sum of |bending| / capacity: each part counts with the sign of its bending. */
function sdOfSum(parts: readonly { bending: number; takes: number; row: Float64Array }[], factor: number): number {
  const row = new Float64Array(parts[0]!.row.length)
  for (const { bending, takes, row: own } of parts) {
    const sign = bending < 0 ? -1 : 1
    for (let k = 0; k < row.length; k++) row[k]! += sign * fractionSd(bending, factor * own[k]!, takes)
  }
  return sdOf(row)
}

/** Shear where its capacity is stated and it is worse than the bending. */
function worseShear(
  bending: Used | undefined,
  along: MemberAlong,
  { shear: takes }: MemberCapacity,
  factor: number,
  from: Valued,
  to: Valued,
): Used | undefined {
  if (takes === undefined) return bending
  const places: { s: number; side: 'before' | 'after' }[] = [
    { s: 0, side: 'after' },
    { s: along.length, side: 'before' },
  ]
  for (const load of along.loads)
    if (load.kind === 'point') places.push({ s: load.a, side: 'before' }, { s: load.a, side: 'after' })
  let worst = bending
  for (const { s, side } of places) {
    const total = shearAt(along, s, side)
    const used = fractionOf(total, takes)
    if (worst && used <= worst.utilisation) continue
    const row = from.factor.map((x, k) => (x + to.factor[k]!) / along.length)
    worst = {
      utilisation: used,
      sd: fractionSd(total, factor * sdOf(row), takes),
      governing: { effect: 'shear', at_m: s, total, capacity: takes },
    }
  }
  return worst
}
