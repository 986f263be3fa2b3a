/** Where the end moment of a member comes from. */
import type { MemberFinding } from '../model/findings.ts'
import type { Because } from './because.ts'
import { figure, fixed, term } from './figures.ts'
import { sdOf, type LineMovement } from './line-movement.ts'
import type { LineMoments } from './members.ts'
import type { Prepared } from './prepare.ts'
import type { Settlements } from './settlement.ts'
import { driverSentence, estimateSentences, flagSentence, sharesOf } from './shares.ts'

export function becauseMember(
  prepared: Prepared,
  settlements: Settlements,
  moments: LineMoments,
  finding: MemberFinding,
  wanted: 'from' | 'to' | undefined,
): Because {
  const { movement } = moments
  const { line, solved } = movement.prepared
  const index = solved!.arrays.members.findIndex((m) => m.id === finding.member)
  const member = solved!.arrays.members[index]!
  const end = wanted ?? governingEnd(finding)
  const isFrom = end === 'from'
  const own = moments[end][index]!
  const sd = sdOf(own.factor)
  const response = isFrom ? solved!.influence.momentFrom : solved!.influence.momentTo
  const weights = endWeights(response, index, solved!.arrays.members.length, movement)
  const { shares, beyond } = sharesOf(prepared, settlements, weights)
  const bending = isFrom ? own.value : -own.value
  return {
    title: `Moment at the ${member[end]} end of ${member.kind} ${member.id}, frame line ${line.id}`,
    sentences: [
      `The measured settlement ${senseOf(bending)} this end by ${fixed(Math.abs(bending), 1)} \u00b1 ${fixed(prepared.z * sd, 1)} kNm.`,
      driverSentence(shares, beyond, own.value),
      ...flags(prepared, finding, end),
      ...estimateSentences(prepared, settlements, shares),
    ].filter((s) => s !== ''),
    formula: formulaOf(prepared, movement, finding, end, bending, sd, shares),
    value: own.value,
    sd,
    unit: 'kNm',
    end,
    shares,
  }
}

/** The end with the greater share of its capacity, else with the greater moment. */
function governingEnd(finding: MemberFinding): 'from' | 'to' {
  if (finding.fraction_end) return finding.fraction_end
  return Math.abs(finding.moment_from_kNm) >= Math.abs(finding.moment_to_kNm) ? 'from' : 'to'
}

function senseOf(bending: number): string {
  return bending < 0 ? 'bends in hogging' : 'bends in sagging'
}

/** Weights over all supports of the building of one end moment. */
function endWeights(response: Float64Array, index: number, m: number, movement: LineMovement): Float64Array {
  const weights = new Float64Array(movement.tiltWeights.length)
  movement.strainWeights.forEach((row, b) => {
    const w = response[b * m + index]!
    for (let j = 0; j < weights.length; j++) weights[j]! += w * row[j]!
  })
  return weights
}

function flags(prepared: Prepared, finding: MemberFinding, end: 'from' | 'to'): string[] {
  const { criteria, z } = prepared
  if (finding.status === 'none') return ['No capacity is given for this member, so it is not assessed.']
  const said: string[] = []
  if (finding.induced_fraction !== undefined) {
    const sd = finding.sd_induced_fraction ?? 0
    if (finding.fraction_end !== end) said.push(`The ${finding.fraction_end} end governs the induced fraction.`)
    said.push(flagSentence('induced fraction', finding.induced_fraction, sd, z, criteria.induced_fraction, percent))
  }
  if (finding.utilisation !== undefined)
    said.push(
      flagSentence('utilisation', finding.utilisation, finding.sd_utilisation ?? 0, z, criteria.utilisation, percent),
    )
  return said
}

function percent(value: number): string {
  return `${fixed(value * 100, 1)} %`
}

function formulaOf(
  prepared: Prepared,
  movement: LineMovement,
  finding: MemberFinding,
  end: 'from' | 'to',
  bending: number,
  sd: number,
  shares: Because['shares'],
): string[] {
  const { criteria } = prepared
  const isFrom = end === 'from'
  const moment = isFrom ? finding.moment_from_kNm : finding.moment_to_kNm
  const largest = [...shares].sort((a, b) => Math.abs(b.share) - Math.abs(a.share)).slice(0, 3)
  const left = moment - largest.reduce((sum, s) => sum + s.share, 0)
  const others = shares.length > largest.length ? ` + ${term(left)} (others)` : ''
  const lines = [
    `M ${end} = sum of shares = ${largest.map((s) => `${term(s.share)} (${s.support})`).join(' + ')}${others} = ${figure(moment)} kNm, sd ${figure(sd)} kNm`,
    `bending = ${isFrom ? 'M from' : '\u2212M to'} = ${figure(bending)} kNm (${bending < 0 ? 'hogging' : 'sagging'})`,
  ]
  const existing = isFrom ? finding.existing_from_kNm : finding.existing_to_kNm
  if (existing !== undefined)
    lines.push(
      `with what it carries: ${criteria.combination.settlement} \u00d7 ${term(bending)} + ${term(isFrom ? existing : -existing)} = ${figure(criteria.combination.settlement * bending + (isFrom ? existing : -existing))} kNm`,
    )
  const capacity = movement.prepared.capacities.find(
    (_, i) => movement.prepared.solved!.arrays.members[i]!.id === finding.member,
  )
  const takes = bending < 0 ? capacity?.hogging : capacity?.sagging
  if (takes !== undefined && takes > 0)
    lines.push(`induced fraction here = |${figure(bending)}| / ${figure(takes)} = ${figure(Math.abs(bending) / takes)}`)
  const { governing, utilisation } = finding
  if (governing && utilisation !== undefined) {
    const unit = governing.effect === 'bending' ? 'kNm' : 'kN'
    const shared = governing.with_line === undefined ? '' : ` + share of frame line ${governing.with_line}`
    lines.push(
      `utilisation = |${figure(governing.total)} ${unit}| / ${figure(governing.capacity)} ${unit}${shared} = ${figure(utilisation)} (${governing.effect}, ${fixed(governing.at_m, 2)} m from ${movement.prepared.solved!.arrays.members.find((m) => m.id === finding.member)!.from})`,
    )
  }
  return lines
}
