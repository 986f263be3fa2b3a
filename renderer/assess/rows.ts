/** Rows of the ledger, worst first, as they are shown: text apart from layout. */
import { headroomOf } from '../../app/assess/headroom.ts'
import type { Prepared } from '../../app/assess/prepare.ts'
import { reachedOn, type Rate, type Series } from '../../app/assess/series.ts'
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
import { reckonedDate } from '../strip/dates.ts'

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
  supports: { name: 'support', value: 'settlement, mm', share: 'since last, mm', remark: '' },
  spans: { name: 'span', value: 'distortion', share: 'differs, mm', remark: 'certainty' },
  members: { name: 'member', value: 'induced, kNm', share: 'of capacity', remark: 'certainty' },
  headroom: { name: 'support', value: 'to amber, mm', share: 'to red, mm', remark: 'first red' },
}

/** `rounds` are all visits by date; what changed since the last one is counted from the one before. */
export function ledgerRows(
  tab: LedgerTab,
  findings: RoundFindings,
  prepared: Prepared,
  rounds: readonly RoundFindings[] = [],
): LedgerRow[] {
  const { z } = prepared
  if (tab === 'supports') return supportRows(findings, z, rounds.filter((r) => r.date < findings.date).at(-1))
  if (tab === 'spans') return spanRows(findings, z)
  if (tab === 'members') return memberRows(findings, z)
  return headroomRows(findings, prepared)
}

/** Without a visit between, the last one was the baseline, where all stood at nothing. */
function supportRows(findings: RoundFindings, z: number, last: RoundFindings | undefined): LedgerRow[] {
  const before = new Map(last?.supports.map((s) => [s.support, s.settlement_mm]))
  return [...findings.supports]
    .sort((a, b) => b.settlement_mm - a.settlement_mm)
    .map((s) => ({
      target: { kind: 'support', id: s.support },
      name: s.support,
      value: millimetres(s.settlement_mm),
      interval: millimetres(z * s.sd_mm),
      share: signed(s.settlement_mm - (before.get(s.support) ?? 0)),
      remark: s.estimated ? 'estimated, not measured' : s.significant ? 'has moved' : 'within the noise',
    }))
}

function signed(mm: number): string {
  const words = millimetres(mm)
  return Number(mm.toFixed(1)) > 0 ? `+${words}` : words
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

/** When it would be at a trigger if it went on, and how soon that may be with the uncertainty of the rate. */
export function reachText(status: 'amber' | 'red', rate: Rate, trigger: number, z: number): string | undefined {
  const day = reachedOn(rate, trigger)
  const { line } = rate
  const soonest = reachedOn({ ...rate, line: { ...line, rate: line.rate + z * line.sdRate } }, trigger)
  if (day === undefined) return undefined
  const about = reckonedDate(day, rate.to)
  const earliest = soonest === undefined ? about : reckonedDate(soonest, rate.to)
  return `${status} about ${about}${earliest === about ? '' : `, at the earliest ${earliest}`}`
}

/** A rate by the month, with its interval, in the words of its quantity. */
export function rateText(quantity: Series['quantity'], { perDay, sdPerDay }: Rate, z: number): string {
  const [rate, half] = [perDay * MONTH, z * sdPerDay * MONTH]
  if (quantity === 'settlement') return `${fixed(rate, 2)} \u00b1 ${fixed(half, 2)} mm a month`
  if (quantity === 'angular distortion')
    return `${fixed(rate * 1000, 3)} \u00b1 ${fixed(half * 1000, 3)} \u2030 a month`
  if (quantity === 'end moment') return `${fixed(rate, 1)} \u00b1 ${fixed(half, 1)} kNm a month`
  return `${fixed(rate * 100, 1)} \u00b1 ${fixed(half * 100, 1)} % of capacity a month`
}
