/** Figures on the frame: the flagged members' share of capacity at a status mark, induced moments at their ends. */
import type { Criteria } from '../../model/building.ts'
import { byWorst, type MemberFinding } from '../../model/findings.ts'
import { moment } from '../../model/numbers.ts'
import { statusMark } from '../bubble.ts'
import { placeLabels, type Box, type Wanted } from '../place-labels.ts'
import type { Point, Primitive, Role } from '../scene.ts'
import { baselineFor, between, circle, text, type Extra } from '../shapes.ts'
import { MARK, SMALL, TEXT } from '../sizes.ts'
import { CAP_HEIGHT, textWidth } from '../text-width.ts'
import { pointOn, type Curve } from './deformed.ts'
import type { DrawnFrame, DrawnMember } from './frame.ts'
import type { MomentDiagram } from './moments.ts'
import { memberTarget, wholePercent } from './members.ts'

interface Label extends Wanted {
  words: string
  role: Role
  size: number
  extra: Extra
}

/** How much of the largest moment an end must have to be given its figure. */
const WORTH = 0.5
/** On a member shorter than this on the sheet a mark would hide it, and no figure could be told to be its own. */
const LEAST_LENGTH = 7

export function drawLabels(
  frame: DrawnFrame,
  criteria: Criteria,
  diagrams: readonly MomentDiagram[],
  curves: readonly Curve[],
  within: Box,
  loads: readonly Box[],
): Primitive[] {
  const flagged = flaggedMembers(frame)
  const marks = flagged.flatMap(({ drawn, finding }) => marksOf(frame, drawn, finding))
  const taken = flagged.map(({ drawn }) => around(between(drawn.from, drawn.to, 0.5), MARK * 1.28))
  const segments = frame.members.map((m) => [m.from, m.to] as const)
  const wanted = [
    ...flagged.flatMap(({ drawn, finding }) => fractionLabel(frame, criteria, drawn, finding)),
    ...momentLabels(frame, diagrams),
  ]
  const places = placeLabels(wanted, {
    within,
    boxes: [...taken, ...loads],
    segments,
    soft: [...curves.flatMap(segmentsOf), ...diagrams.flatMap(outlineOf)],
  })
  return [...marks, ...textsAt(wanted, places)]
}

/** Names of sections along the members of a frame that is only described. */
export function drawSectionNames(frame: DrawnFrame, within: Box, loads: readonly Box[]): Primitive[] {
  const wanted = frame.members.flatMap(({ member, from, to, length }): Label[] => {
    const width = textWidth(member.section, SMALL)
    const isFlat = Math.abs(to[0] - from[0]) > 2 * Math.abs(to[1] - from[1])
    const middle = between(from, to, 0.5)
    if (isFlat && width > length - 3) return []
    const places: Point[] = isFlat
      ? [...(loads.length > 0 ? [] : [[middle[0], middle[1] - 2.2] as const]), [middle[0], middle[1] + 2.2]]
      : [
          [middle[0] + width / 2 + 1.4, middle[1]],
          [middle[0] - width / 2 - 1.4, middle[1]],
        ]
    return [labelOf(member.section, 'text-quiet', SMALL, places, { target: memberTarget(frame.line.id, member.id) })]
  })
  const segments = frame.members.map((m) => [m.from, m.to] as const)
  return textsAt(wanted, placeLabels(wanted, { within, segments, boxes: loads }))
}

function textsAt(labels: readonly Label[], boxes: readonly (Box | undefined)[]): Primitive[] {
  return labels.flatMap(({ words, role, size, extra }, i) => {
    const box = boxes[i]
    if (!box) return []
    return [
      text(role, [box.x + box.width / 2, baselineFor(box.y + box.height / 2, size)], words, size, 'middle', extra),
    ]
  })
}

function labelOf(words: string, role: Role, size: number, places: readonly Point[], extra: Extra): Label {
  const weight = role === 'text-strong' ? 'medium' : 'regular'
  return { words, role, size, extra, places, width: textWidth(words, size, weight), height: size * CAP_HEIGHT }
}

/** Members at amber or red that are long enough for a mark, the worst first. */
export function flaggedMembers(frame: DrawnFrame): { drawn: DrawnMember; finding: MemberFinding }[] {
  const drawnOf = new Map(frame.members.map((m) => [m.member.id, m]))
  return (frame.finding?.members ?? [])
    .filter((m) => m.status === 'amber' || m.status === 'red')
    .flatMap((finding) => {
      const drawn = drawnOf.get(finding.member)
      return drawn && drawn.length >= LEAST_LENGTH ? [{ drawn, finding }] : []
    })
    .sort((a, b) => byWorst(a.finding.status, b.finding.status) || severity(b.finding) - severity(a.finding))
}

function severity(m: MemberFinding): number {
  return Math.max(m.induced_fraction ?? 0, m.utilisation ?? 0)
}

function marksOf(
  frame: DrawnFrame,
  { from, to, length, member }: DrawnMember,
  { status, certainty }: MemberFinding,
): Primitive[] {
  const size = Math.min(MARK, Math.max(1, length * 0.3))
  const at = between(from, to, 0.5)
  const marks = statusMark(status, certainty, at, { target: memberTarget(frame.line.id, member.id) }, size)
  // The line itself stays out of the ring.
  return certainty === 'borderline' ? [circle('paper', at, size * 0.64), ...marks] : marks
}

const USED = 'used'

export function isUsed(words: string): boolean {
  return words.endsWith(USED)
}

/** The figure that made the flag: the share of capacity induced, or what is used of it with the loads. */
export function flagWords(finding: MemberFinding, { induced_fraction, utilisation }: Criteria): string {
  function reached(value: number | undefined, triggers: { amber: number; red: number }): number {
    return value === undefined || value < triggers.amber ? 0 : value < triggers.red ? 1 : 2
  }
  const byUse = reached(finding.utilisation, utilisation) > reached(finding.induced_fraction, induced_fraction)
  if (byUse) return `${wholePercent(finding.utilisation!)} ${USED}`
  return finding.induced_fraction === undefined ? '' : wholePercent(finding.induced_fraction)
}

function fractionLabel(
  frame: DrawnFrame,
  criteria: Criteria,
  { from, to, member, length }: DrawnMember,
  finding: MemberFinding,
): Label[] {
  const words = flagWords(finding, criteria)
  const width = textWidth(words, TEXT, 'medium')
  const [x, y] = between(from, to, 0.5)
  const up = TEXT * 0.36 + 2.6
  const side = width / 2 + 2.5
  const isFlat = Math.abs(to[0] - from[0]) >= Math.abs(to[1] - from[1])
  if (words === '' || (isFlat && width > length - 0.5)) return []
  const beside: Point[] = [
    [x + side, y - up],
    [x - side, y - up],
    [x + side, y + up],
    [x - side, y + up],
  ]
  const nearest: Point[] = isFlat
    ? [
        [x, y - up],
        [x, y + up],
      ]
    : [
        [x + side, y],
        [x - side, y],
      ]
  // Beside the mark of a flat member only while the figure stays over its own member.
  const places = isFlat && side + width / 2 > length / 2 ? nearest : [...nearest, ...beside]
  return [labelOf(words, 'text-strong', TEXT, places, { target: memberTarget(frame.line.id, member.id) })]
}

/** The figure of each end moment that matters, just beyond the tip of its ordinate. */
function momentLabels(frame: DrawnFrame, diagrams: readonly MomentDiagram[]): Label[] {
  const ends = diagrams
    .filter((d) => d.drawn.length >= LEAST_LENGTH)
    .flatMap(({ drawn, finding, fromTip, toTip }) => [
      {
        drawn,
        finding,
        value: finding.moment_from_kNm,
        foot: drawn.from,
        tip: fromTip,
        other: drawn.to,
        end: 'from' as const,
      },
      {
        drawn,
        finding,
        value: finding.moment_to_kNm,
        foot: drawn.to,
        tip: toTip,
        other: drawn.from,
        end: 'to' as const,
      },
    ])
  const most = Math.max(0, ...ends.map((e) => Math.abs(e.value)))
  return ends
    .filter((e) => Math.abs(e.value) >= WORTH * most)
    .sort((a, b) => Math.abs(b.value) - Math.abs(a.value))
    .map(({ drawn, value, foot, tip, other, end }) => {
      const words = moment(Math.abs(value))
      const width = textWidth(words, SMALL)
      const length = Math.hypot(tip[0] - foot[0], tip[1] - foot[1]) || 1
      const out: Point = [(tip[0] - foot[0]) / length, (tip[1] - foot[1]) / length]
      const inward: Point = [(other[0] - foot[0]) / drawn.length, (other[1] - foot[1]) / drawn.length]
      function reach(d: Point) {
        return (Math.abs(d[0]) * width + Math.abs(d[1]) * SMALL * CAP_HEIGHT) / 2
      }
      const places = [1, 1.8, 0.2, 2.6].flatMap((along) =>
        [0.7, 1.6].map((beyond): Point => {
          const o = reach(out) + beyond
          const i = along * (reach(inward) + 0.7)
          return [tip[0] + out[0] * o + inward[0] * i, tip[1] + out[1] * o + inward[1] * i]
        }),
      )
      const target = { ...memberTarget(frame.line.id, drawn.member.id), end } as Extra['target']
      return { ...labelOf(words, 'text-moment', SMALL, places, { target }), isShy: Math.abs(value) < most }
    })
}

function outlineOf({ drawn, fromTip, toTip }: MomentDiagram): (readonly [Point, Point])[] {
  return [
    [drawn.from, fromTip],
    [fromTip, toTip],
    [toTip, drawn.to],
  ]
}

function segmentsOf(curve: Curve): (readonly [Point, Point])[] {
  const points = [0, 0.25, 0.5, 0.75, 1].map((t) => pointOn(curve, t))
  return points.slice(1).map((p, i) => [points[i]!, p] as const)
}

function around([x, y]: Point, size: number): Box {
  return { x: x - size / 2, y: y - size / 2, width: size, height: size }
}
