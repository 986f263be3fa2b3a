/**
 * One value through the visits, and how fast it goes: the rate is that of the last visits alone, since ground that is
 * dug beside does not move at one rate for a year.
 */
import { criteriaOf, type Building } from '../model/building.ts'
import type { Findings, RoundFindings } from '../model/findings.ts'
import { fittedLine, valueAt, type FittedLine } from '../../solver/index.ts'
import type { BecauseTarget } from './because.ts'

export interface SeriesPoint {
  round: string
  date: string
  value: number
  sd: number
  estimated: boolean
}

export interface Series {
  quantity: 'settlement' | 'angular distortion' | 'end moment' | 'induced fraction'
  name: string
  points: SeriesPoint[]
  triggers?: { amber: number; red: number }
}

export interface Rate {
  /** Unit of the value a day. */
  perDay: number
  sdPerDay: number
  /** Visits that it is taken from. */
  from: string
  to: string
  line: FittedLine
}

/** Visits that a rate is taken from. */
const VISITS = 3
const DAY_MS = 86_400_000

export function dayNumber(date: string): number {
  return Date.parse(`${date}T00:00:00Z`) / DAY_MS
}

export function dateOf(day: number): string {
  return new Date(Math.round(day) * DAY_MS).toISOString().slice(0, 10)
}

/** The series of a support's settlement, a span's distortion or a member's induced fraction (without capacity: its end moment). */
export function seriesOf(building: Building, findings: Pick<Findings, 'rounds'>, target: BecauseTarget): Series {
  const criteria = criteriaOf(building)
  const points = findings.rounds.flatMap((round) => pointOf(round, target) ?? [])
  if (target.kind === 'support') return { quantity: 'settlement', name: target.id, points }
  if (target.kind === 'span')
    return {
      quantity: 'angular distortion',
      name: `${target.from}\u2013${target.to}`,
      points,
      triggers: criteria.angular_distortion,
    }
  const isHeld = findings.rounds.some((r) => memberOf(r, target.line, target.id)?.induced_fraction !== undefined)
  if (!isHeld) return { quantity: 'end moment', name: target.id, points }
  return { quantity: 'induced fraction', name: target.id, points, triggers: criteria.induced_fraction }
}

function memberOf(round: RoundFindings, line: string, id: string) {
  return round.frame_lines.find((l) => l.id === line)?.members.find((m) => m.member === id)
}

function pointOf(round: RoundFindings, target: BecauseTarget): SeriesPoint | undefined {
  const { id, date } = round
  if (target.kind === 'support') {
    const s = round.supports.find((x) => x.support === target.id)
    return s && { round: id, date, value: s.settlement_mm, sd: s.sd_mm, estimated: s.estimated }
  }
  if (target.kind === 'span') {
    const s = round.frame_lines
      .find((l) => l.id === target.line)
      ?.spans.find((x) => x.from === target.from && x.to === target.to)
    const estimated = round.supports.some((x) => x.estimated && (x.support === target.from || x.support === target.to))
    return s && { round: id, date, value: Math.abs(s.angular_distortion_rad), sd: s.sd_rad, estimated }
  }
  const m = memberOf(round, target.line, target.id)
  if (!m) return undefined
  if (m.induced_fraction !== undefined)
    return { round: id, date, value: m.induced_fraction, sd: m.sd_induced_fraction ?? 0, estimated: false }
  const end = target.end ?? (Math.abs(m.moment_from_kNm) >= Math.abs(m.moment_to_kNm) ? 'from' : 'to')
  return end === 'from'
    ? { round: id, date, value: m.moment_from_kNm, sd: m.sd_from_kNm, estimated: false }
    : { round: id, date, value: m.moment_to_kNm, sd: m.sd_to_kNm, estimated: false }
}

/** The rate over the last visits up to that date; undefined where there are fewer than two. */
export function rateOf({ points }: Pick<Series, 'points'>, until?: string): Rate | undefined {
  const known = points.filter((p) => p.sd > 0 && !p.estimated && (until === undefined || p.date <= until))
  const last = known.slice(-VISITS)
  if (last.length < 2 || last[0]!.date === last.at(-1)!.date) return undefined
  const line = fittedLine(
    last.map((p) => dayNumber(p.date)),
    last.map((p) => p.value),
    last.map((p) => p.sd),
  )
  return { perDay: line.rate, sdPerDay: line.sdRate, from: last[0]!.date, to: last.at(-1)!.date, line }
}

/** The day on which the value reaches the trigger at that rate; undefined where it does not go there. */
export function reachedOn({ line, to }: Rate, trigger: number): string | undefined {
  const now = valueAt(line, dayNumber(to)).value
  if (now >= trigger || line.rate <= 0) return undefined
  const days = (trigger - now) / line.rate
  // Beyond some years a rate of a few months says nothing.
  return days > 3650 ? undefined : dateOf(dayNumber(to) + Math.floor(days))
}

/** The line from its first visit to one interval beyond its last, with its band. */
export function fitAhead(
  { line, from, to }: Rate,
  z: number,
): { date: string; value: number; low: number; high: number }[] {
  const [start, end] = [dayNumber(from), dayNumber(to)]
  const step = (end - start) / 4
  return Array.from({ length: 7 }, (_, i) => {
    const day = start + i * step
    const { value, sd } = valueAt(line, day)
    return { date: dateOf(day), value, low: value - z * sd, high: value + z * sd }
  })
}
