/**
 * The diagram of the moments that settlement induces, on the tension side: bending at `from` is moment_from, at
 * `to` it is -moment_to, and sagging lies on the right-hand side looking from `from` to `to`.
 */
import type { MemberFinding } from '../../model/findings.ts'
import { niceBelow } from '../nice.ts'
import type { Point, Primitive, Target } from '../scene.ts'
import { line, polygon } from '../shapes.ts'
import type { DrawnFrame, DrawnMember } from './frame.ts'
import { memberLabel } from './members.ts'

/** mm between hatching lines */
const HATCH = 2.4
/** Largest ordinate, mm. */
const AIM = 9

export interface MomentDiagram {
  drawn: DrawnMember
  finding: MemberFinding
  /** Ends of the ordinates at the member's ends. */
  fromTip: Point
  toTip: Point
}

export interface MomentScale {
  /** mm on the sheet for a kNm; 0 where there is nothing to draw */
  mmPerKNm: number
  /** A round moment for the legend's bar. */
  bar_kNm: number
}

export function momentScale(frame: DrawnFrame, room: number): MomentScale {
  const largest = (frame.finding?.members ?? []).reduce(
    (most, m) => Math.max(most, Math.abs(m.moment_from_kNm), Math.abs(m.moment_to_kNm)),
    0,
  )
  if (!(largest > 1e-6)) return { mmPerKNm: 0, bar_kNm: 0 }
  const mmPerKNm = Math.min(AIM, 0.3 * room) / largest
  return { mmPerKNm, bar_kNm: niceBelow(Math.max(largest, 5 / mmPerKNm), [1, 2, 5]) }
}

/** Ends of the ordinates of one member on the sheet. */
export function tipsOf(drawn: DrawnMember, finding: MemberFinding, mmPerKNm: number): { fromTip: Point; toTip: Point } {
  const { from, to, length } = drawn
  // The right-hand side looking from `from` to `to`, on a sheet whose y grows downwards.
  const right: Point = length === 0 ? [0, 0] : [-(to[1] - from[1]) / length, (to[0] - from[0]) / length]
  function tip(p: Point, bending: number): Point {
    return [p[0] + right[0] * bending * mmPerKNm, p[1] + right[1] * bending * mmPerKNm]
  }
  return { fromTip: tip(from, finding.moment_from_kNm), toTip: tip(to, -finding.moment_to_kNm) }
}

export function momentDiagrams(frame: DrawnFrame, { mmPerKNm }: MomentScale): MomentDiagram[] {
  if (mmPerKNm === 0) return []
  const findings = new Map(frame.finding?.members.map((m) => [m.member, m]))
  return frame.members.flatMap((drawn): MomentDiagram[] => {
    const finding = findings.get(drawn.member.id)
    if (!finding) return []
    const tips = tipsOf(drawn, finding, mmPerKNm)
    const least = Math.max(distance(tips.fromTip, drawn.from), distance(tips.toTip, drawn.to))
    return least < 0.15 ? [] : [{ drawn, finding, ...tips }]
  })
}

/** Fill, hatching and outline; all fills come first so that no outline is covered. */
export function drawMoments(
  lineId: string,
  diagrams: readonly MomentDiagram[],
  weight: number,
  z: number,
): Primitive[] {
  const shapes = diagrams.map((d) => ({
    points: [d.drawn.from, d.fromTip, d.toTip, d.drawn.to],
    target: { kind: 'member', line: lineId, id: d.drawn.member.id } satisfies Target,
    label: memberLabel(d.drawn, d.finding, z),
  }))
  return [
    ...shapes.map(({ points, target, label }) => polygon('moment-fill', points, { target, label })),
    ...diagrams.flatMap(hatching),
    ...shapes.map(({ points, target }): Primitive => ({
      shape: 'polyline',
      role: 'moment',
      points,
      target,
      ...(weight < 1 ? { weight } : {}),
    })),
  ]
}

function hatching({ drawn: { from, to, length }, fromTip, toTip }: MomentDiagram): Primitive[] {
  const count = Math.floor(length / HATCH)
  return Array.from({ length: Math.max(0, count - 1) }, (_, i): Primitive[] => {
    const share = (i + 1) / count
    const [foot, tip] = [along(from, to, share), along(fromTip, toTip, share)]
    return distance(foot, tip) < 0.3 ? [] : [line('moment-hatch', foot, tip)]
  }).flat()
}

function along(a: Point, b: Point, share: number): Point {
  return [a[0] + (b[0] - a[0]) * share, a[1] + (b[1] - a[1]) * share]
}

function distance(a: Point, b: Point): number {
  return Math.hypot(a[0] - b[0], a[1] - b[1])
}
