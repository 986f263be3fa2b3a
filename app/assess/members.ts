/** What the settlement does to the members of a line, held against what they can take. */
import type { Certainty, MemberFinding, Status } from '../model/findings.ts'
import { worse } from '../model/findings.ts'
import { capacityFor, certaintyOf, fractionOf, fractionSd, statusOf, type FrameResponse } from '../../solver/index.ts'
import { sdOf, type LineMovement, type Valued } from './line-movement.ts'
import type { MemberCapacity, Prepared } from './prepare.ts'
import { utilisation } from './utilisation.ts'

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
  function ends(at: number, member: number) {
    return { from: lines[at]!.from[member]!, to: lines[at]!.to[member]! }
  }
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
    const used = utilisation(prepared, ends, own, i)
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

/** Induced bending over the capacity of its sense, at the worse end; undefined where none is stated. */
export function inducedFraction(
  finding: Pick<MemberFinding, 'moment_from_kNm' | 'moment_to_kNm' | 'sd_from_kNm' | 'sd_to_kNm'>,
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
