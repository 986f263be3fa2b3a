/** What the settlement does to the members of a line, held against what they can take. */
import type { Certainty, Governing, MemberFinding, Status } from '../model/findings.ts'
import { worse } from '../model/findings.ts'
import {
  capacityFor,
  certaintyOf,
  extremeBending,
  fractionOf,
  fractionSd,
  shearAt,
  statusOf,
  type FrameResponse,
  type MemberAlong,
} from '../../solver/index.ts'
import { sdOf, type LineMovement, type Valued } from './line-movement.ts'
import type { MemberCapacity, Prepared, SolvedLine } from './prepare.ts'

/** Moments below this draw on no capacity, kNm. */
const NO_MOMENT = 1e-9

/** End moments of every member of a line by settlement alone, with their factor rows. */
export interface LineMoments {
  movement: LineMovement
  from: Valued[]
  to: Valued[]
}

export function lineMoments(movement: LineMovement): LineMoments {
  const { solved } = movement.prepared
  const members = solved?.arrays.members ?? []
  return {
    movement,
    from: members.map((_, i) => responded(solved!.influence.momentFrom, i, members.length, movement)),
    to: members.map((_, i) => responded(solved!.influence.momentTo, i, members.length, movement)),
  }
}

/** Sum over the bases of the response to each times its straining movement. */
export function responded(response: Float64Array, index: number, width: number, { strain, q }: LineMovement): Valued {
  let value = 0
  const factor = new Float64Array(q)
  for (let b = 0; b < strain.length; b++) {
    const w = response[b * width + index]!
    if (w === 0) continue
    value += w * strain[b]!.value
    const row = strain[b]!.factor
    for (let k = 0; k < q; k++) factor[k]! += w * row[k]!
  }
  return { value, factor }
}

/** As responded, without the factor. */
export function respondedValue(
  response: Float64Array,
  index: number,
  width: number,
  strain: readonly Valued[],
): number {
  let value = 0
  for (let b = 0; b < strain.length; b++) value += response[b * width + index]! * strain[b]!.value
  return value
}

/** Induced bending at a share of the length from the `from` end, sagging positive. */
export function bendingThere(from: Valued, to: Valued, share: number): Valued {
  const factor = new Float64Array(from.factor.length)
  for (let k = 0; k < factor.length; k++) factor[k] = (1 - share) * from.factor[k]! - share * to.factor[k]!
  return { value: (1 - share) * from.value - share * to.value, factor }
}

export function memberFindings(
  prepared: Prepared,
  lines: readonly LineMoments[],
  own: number,
  isEstimated: readonly boolean[],
): MemberFinding[] {
  const moments = lines[own]!
  const { prepared: line } = moments.movement
  const { solved } = line
  if (!solved) return []
  const m = solved.arrays.members.length
  return solved.arrays.members.map((member, i): MemberFinding => {
    const from = moments.from[i]!
    const to = moments.to[i]!
    const finding: MemberFinding = {
      member: member.id,
      moment_from_kNm: from.value,
      moment_to_kNm: to.value,
      sd_from_kNm: sdOf(from.factor),
      sd_to_kNm: sdOf(to.factor),
      shear_kN: -(from.value + to.value) / solved.length[i]!,
      axial_kN: respondedValue(solved.influence.axial, i, m, moments.movement.strain),
      status: 'none',
      certainty: 'clear',
    }
    if (solved.existing) {
      finding.existing_from_kNm = solved.existing.momentFrom[i]!
      finding.existing_to_kNm = solved.existing.momentTo[i]!
    }
    const capacity = line.capacities[i]!
    const fraction = inducedFraction(finding, capacity)
    const used = utilisation(prepared, lines, own, i)
    if (fraction) Object.assign(finding, fraction)
    if (used) {
      finding.utilisation = used.utilisation
      finding.sd_utilisation = used.sd
      finding.governing = used.governing
    }
    const { status, certainty } = judge(prepared, finding)
    finding.status = status
    finding.certainty = certainty
    if (status === 'none') return finding
    const shared = [{ line: own, member: i }, ...line.partners[i]!]
    const hangsOnEstimate = shared.some((s) => restsOn(lines[s.line]!.movement, s.member, isEstimated))
    if (hangsOnEstimate || hasUnstatedSense(finding, capacity)) finding.certainty = 'borderline'
    return finding
  })
}

function inducedFraction(
  finding: MemberFinding,
  capacity: MemberCapacity,
): Pick<MemberFinding, 'induced_fraction' | 'sd_induced_fraction' | 'fraction_end'> | undefined {
  const ends = (
    [
      ['from', finding.moment_from_kNm, finding.sd_from_kNm],
      ['to', -finding.moment_to_kNm, finding.sd_to_kNm],
    ] as const
  ).flatMap(([end, bending, sd]) => {
    const takes = capacityFor(bending, capacity)
    if (takes === undefined) return []
    return [{ end, fraction: fractionOf(bending, takes), sd: fractionSd(bending, sd, takes) }]
  })
  const worst = ends.sort((a, b) => b.fraction - a.fraction)[0]
  if (!worst) return undefined
  return { induced_fraction: worst.fraction, sd_induced_fraction: worst.sd, fraction_end: worst.end }
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

interface Used {
  utilisation: number
  sd: number
  governing: Governing
}

function utilisation(prepared: Prepared, lines: readonly LineMoments[], own: number, index: number): Used | undefined {
  const { prepared: line } = lines[own]!.movement
  const solved = line.solved!
  const capacity = line.capacities[index]!
  const factor = prepared.criteria.combination.settlement
  const { from, to } = { from: lines[own]!.from[index]!, to: lines[own]!.to[index]! }
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
      const theirs = partnerBending(prepared, lines, partner, share)
      if (!theirs) continue
      parts.push(theirs)
      counted.push(lines[partner.line]!.movement.prepared.line.id)
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

function partnerBending(
  prepared: Prepared,
  lines: readonly LineMoments[],
  partner: { line: number; member: number; isTurned: boolean },
  share: number,
) {
  const theirs = lines[partner.line]!
  const { solved, capacities } = theirs.movement.prepared
  const from = theirs.from[partner.member]!
  const to = theirs.to[partner.member]!
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

/** Worse of fraction and utilisation; borderline where either is. */
function judge(prepared: Prepared, finding: MemberFinding): { status: Status; certainty: Certainty } {
  const { criteria, z } = prepared
  let status: Status = 'none'
  let certainty: Certainty = 'clear'
  const held = [
    [finding.induced_fraction, finding.sd_induced_fraction, criteria.induced_fraction],
    [finding.utilisation, finding.sd_utilisation, criteria.utilisation],
  ] as const
  for (const [value, sd, triggers] of held) {
    if (value === undefined) continue
    status = worse(status, statusOf(value, triggers))
    if (certaintyOf(value, sd ?? 0, z, triggers) === 'borderline') certainty = 'borderline'
  }
  return { status, certainty }
}

/** Whether an end moment hangs on the settlement of a support that was not measured. */
function restsOn(movement: LineMovement, index: number, isEstimated: readonly boolean[]): boolean {
  const { solved, bases } = movement.prepared
  const at = bases.flatMap((support, b) => (isEstimated[support] ? [b] : []))
  if (at.length === 0 || !solved) return false
  const m = solved.arrays.members.length
  return [solved.influence.momentFrom, solved.influence.momentTo].some((response: FrameResponse['momentFrom']) => {
    let most = 0
    for (let b = 0; b < bases.length; b++) most = Math.max(most, Math.abs(response[b * m + index]!))
    return at.some((b) => Math.abs(response[b * m + index]!) > 1e-9 * most)
  })
}

/** Whether an end bends in a sense for which no capacity is stated: then nothing about the member is clear. */
function hasUnstatedSense(finding: MemberFinding, capacity: MemberCapacity): boolean {
  if (capacity.sagging === undefined && capacity.hogging === undefined) return false
  return [finding.moment_from_kNm, -finding.moment_to_kNm].some(
    (bending) => Math.abs(bending) > NO_MOMENT && capacityFor(bending, capacity) === undefined,
  )
}
