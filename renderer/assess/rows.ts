/** Rows of the ledger, worst first, as they are shown: text apart from layout. */
import { headroomOf } from '../../app/assess/headroom.ts'
import type { Prepared } from '../../app/assess/prepare.ts'
import type { Rate, Series } from '../../app/assess/series.ts'
import type { Target } from '../../app/drawing/scene.ts'
import {
  byWorst,
  type Certainty,
  type MemberFinding,
  type Reach,
  type RoundFindings,
  type Status,
  type Triggered,
} from '../../app/model/findings.ts'
import { fixed, millimetres, momentWithInterval, percent, ratio } from '../../app/model/numbers.ts'

export interface LedgerRow {
  target: Target
  name: string
  /** Its frame line, where its name does not tell. */
  line?: string
  status?: Status
  certainty?: Certainty
  value: string
  /** Half the interval at the criteria's confidence. */
  interval: string
  share: string
  remark: string
}

export interface LedgerColumns {
  name: string
  value: string
  share: string
  remark: string
}

export type LedgerTab = 'members' | 'spans' | 'supports' | 'headroom'
export type LedgerPage = LedgerTab | 'trend'

export const COLUMNS: Record<LedgerTab, LedgerColumns> = {
  supports: { name: 'support', value: 'settlement mm', share: '', remark: '' },
  spans: { name: 'span', value: 'distortion', share: 'differential mm', remark: 'certainty' },
  members: { name: 'member', value: 'induced kNm', share: 'of capacity', remark: 'certainty' },
  headroom: { name: 'support', value: 'mm to amber', share: 'mm to red', remark: 'first to reach red' },
}

export function ledgerRows(tab: LedgerTab, findings: RoundFindings, prepared: Prepared): LedgerRow[] {
  const { z } = prepared
  if (tab === 'supports') return supportRows(findings, z)
  if (tab === 'spans') return spanRows(findings, z)
  if (tab === 'members') return memberRows(findings, z)
  return headroomRows(findings, prepared)
}

function supportRows(findings: RoundFindings, z: number): LedgerRow[] {
  return [...findings.supports]
    .sort((a, b) => b.settlement_mm - a.settlement_mm)
    .map((s) => ({
      target: { kind: 'support', id: s.support },
      name: s.support,
      value: millimetres(s.settlement_mm),
      interval: millimetres(z * s.sd_mm),
      share: '',
      remark: s.estimated ? 'estimated, not measured' : s.significant ? 'has moved' : 'within the noise',
    }))
}

function spanRows(findings: RoundFindings, z: number): LedgerRow[] {
  return findings.frame_lines
    .flatMap((line) => line.spans.map((span) => ({ line: line.id, span })))
    .sort(
      (a, b) =>
        byWorst(a.span.status, b.span.status) ||
        Math.abs(b.span.angular_distortion_rad) - Math.abs(a.span.angular_distortion_rad),
    )
    .map(({ line, span }) => ({
      target: { kind: 'span', line, from: span.from, to: span.to },
      name: `${span.from}\u2013${span.to}`,
      line,
      status: span.status,
      certainty: span.certainty,
      value: ratio(Math.abs(span.angular_distortion_rad)),
      interval: ratio(z * span.sd_rad),
      share: millimetres(span.differential_mm),
      remark: span.certainty,
    }))
}

export function severity(member: MemberFinding): number {
  return Math.max(member.induced_fraction ?? 0, 0)
}

/** The end that governs: the greater share of its capacity, else the greater moment. */
export function governingEnd(m: MemberFinding): 'from' | 'to' {
  return m.fraction_end ?? (Math.abs(m.moment_from_kNm) >= Math.abs(m.moment_to_kNm) ? 'from' : 'to')
}

function memberRows(findings: RoundFindings, z: number): LedgerRow[] {
  return findings.frame_lines
    .flatMap((line) => line.members.map((member) => ({ line: line.id, member })))
    .sort((a, b) => byWorst(a.member.status, b.member.status) || severity(b.member) - severity(a.member))
    .map(({ line, member }) => {
      const end = governingEnd(member)
      const size = Math.abs(end === 'from' ? member.moment_from_kNm : member.moment_to_kNm)
      const [value, interval] = momentWithInterval(size, z * (end === 'from' ? member.sd_from_kNm : member.sd_to_kNm))
      return {
        target: { kind: 'member', line, id: member.member },
        name: member.member,
        line,
        status: member.status,
        certainty: member.certainty,
        value,
        interval,
        share: member.induced_fraction === undefined ? '' : percent(member.induced_fraction),
        remark: member.status === 'none' ? 'no capacity' : member.certainty,
      }
    })
}

function headroomRows(findings: RoundFindings, prepared: Prepared): LedgerRow[] {
  return headroomOf(prepared, findings)
    .sort((a, b) => (a.red?.left_mm ?? Infinity) - (b.red?.left_mm ?? Infinity))
    .map(({ support, amber, red }) => ({
      target: { kind: 'support', id: support },
      name: support,
      value: left(amber),
      interval: amber ? fixed(prepared.z * amber.sd_mm, 1) : '',
      share: left(red),
      remark: red ? nameOf(red.target) : '',
    }))
}

/** Rounded down: nobody is promised more than there is. */
function left(reach: Reach | undefined): string {
  return reach ? fixed(Math.floor(reach.left_mm * 10) / 10, 1) : 'none'
}

function nameOf(target: Triggered): string {
  return target.kind === 'member' ? target.id : `${target.from}\u2013${target.to}`
}

/** Days in a month, on average. */
const MONTH = 30.44

/** A rate by the month, with its interval, in the words of its quantity. */
export function rateText(quantity: Series['quantity'], { perDay, sdPerDay }: Rate, z: number): string {
  const [rate, half] = [perDay * MONTH, z * sdPerDay * MONTH]
  if (quantity === 'settlement') return `${fixed(rate, 2)} \u00b1 ${fixed(half, 2)} mm a month`
  if (quantity === 'angular distortion')
    return `${fixed(rate * 1000, 3)} \u00b1 ${fixed(half * 1000, 3)} \u2030 a month`
  if (quantity === 'end moment') return `${fixed(rate, 1)} \u00b1 ${fixed(half, 1)} kNm a month`
  return `${fixed(rate * 100, 1)} \u00b1 ${fixed(half * 100, 1)} % of capacity a month`
}
