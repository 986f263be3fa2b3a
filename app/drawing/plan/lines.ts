/** Frame lines by their worst flag, each with its bubble and status mark at one end. */
import type { Building } from '../../model/building.ts'
import { worse, type Certainty, type FrameLineFinding, type RoundFindings, type Status } from '../../model/findings.ts'
import { bubbleFor, drawBubble, statusMark, BUBBLE, type Bubble } from '../bubble.ts'
import { placeLabels, type Box } from '../place-labels.ts'
import type { Point, Primitive, Role, Target } from '../scene.ts'
import { line, sameTarget } from '../shapes.ts'
import { MARK } from '../sizes.ts'
import type { PlanFit } from './fit.ts'

/** From the outermost support to the middle of the bubbles. */
export const BUBBLE_AWAY = 15
/** A bubble on the plan is never longer than this. */
export const LONGEST_BUBBLE = 26

const ROLES: Record<Status, Role> = { none: 'member', green: 'member-green', amber: 'member-amber', red: 'member-red' }

export interface PlanLine {
  id: string
  from: Point
  to: Point
  /** Supports in the order of the line. */
  supports: { id: string; x_m: number; at: Point }[]
  status: Status
  certainty: Certainty
  assessed: boolean
}

export function planLines(building: Building, fit: PlanFit, findings?: RoundFindings): PlanLine[] {
  const places = new Map(fit.supports.map((s) => [s.id, s.at]))
  return building.frame_lines.flatMap((frame): PlanLine[] => {
    const supports = frame.nodes
      .flatMap((n) => {
        const at = n.support === undefined ? undefined : places.get(n.support)
        return at ? [{ id: n.support!, x_m: n.x_m, at }] : []
      })
      .sort((a, b) => a.x_m - b.x_m)
    if (supports.length < 2) return []
    const finding = findings?.frame_lines.find((f) => f.id === frame.id)
    return [
      {
        id: frame.id,
        from: supports[0]!.at,
        to: supports.at(-1)!.at,
        supports,
        ...flagOf(finding),
        assessed: finding !== undefined,
      },
    ]
  })
}

/** The worst status of the line; borderline where nothing of that status is clear. */
function flagOf(finding: FrameLineFinding | undefined): { status: Status; certainty: Certainty } {
  const held = [...(finding?.members ?? []), ...(finding?.spans ?? [])]
  const status = held.reduce<Status>((s, x) => worse(s, x.status), 'none')
  const isClear = held.some((x) => x.status === status && x.certainty === 'clear')
  return { status, certainty: isClear ? 'clear' : 'borderline' }
}

export function drawLines(lines: readonly PlanLine[], selected?: Target): Primitive[] {
  return [
    ...lines.flatMap((l) => selection(l, selected)),
    ...lines.map((l) =>
      line(ROLES[l.status], l.from, l.to, {
        id: `line/${l.id}`,
        target: { kind: 'line', id: l.id },
        label: lineLabel(l),
      }),
    ),
  ]
}

function lineLabel({ id, status, certainty, assessed }: PlanLine): string {
  if (!assessed) return `Frame line ${id}`
  return `Frame line ${id}: ${status === 'none' ? 'no capacity given' : `worst flag ${status}, ${certainty}`}`
}

function selection({ id, from, to, supports }: PlanLine, selected?: Target): Primitive[] {
  if (!selected || selected.kind === 'support') return []
  if (selected.kind === 'line') return selected.id === id ? [line('selection', from, to)] : []
  if (selected.line !== id) return []
  if (selected.kind !== 'span') return [line('selection', from, to)]
  const a = supports.find((s) => s.id === selected.from)
  const b = supports.find((s) => s.id === selected.to)
  return a && b ? [line('selection', a.at, b.at)] : []
}

export interface PlacedBubbles {
  drawn: Primitive[]
  boxes: Box[]
  /** Thin lines from the frame lines to their bubbles. */
  leaders: (readonly [Point, Point])[]
}

/** Bubbles in line at the left and at the top of an orthogonal plan; beyond the line's end otherwise. */
export function lineBubbles(
  lines: readonly PlanLine[],
  fit: PlanFit,
  within: Box,
  taken: readonly Box[],
  selected?: Target,
): PlacedBubbles {
  const wanted = lines.map((l) => {
    const bubble = bubbleFor(l.id, LONGEST_BUBBLE)
    return { l, bubble, ...wantedPlaces(l, bubble, fit.box) }
  })
  const boxes = placeLabels(wanted, { within, boxes: [...taken, ...fit.supports.map((s) => around(s.at, 3))] }, 0.8)
  const drawn: Primitive[] = []
  const leaders: (readonly [Point, Point])[] = []
  wanted.forEach(({ l, bubble, start }, i) => {
    const box = boxes[i]
    if (!box) return
    const isWide = start === 'left'
    const centre: Point = isWide
      ? [box.x + box.width - bubble.half, box.y + box.height / 2]
      : [box.x + box.width / 2, box.y + box.height - bubble.radius]
    const target: Target = { kind: 'line', id: l.id }
    const end = distance(centre, l.from) <= distance(centre, l.to) ? l.from : l.to
    leaders.push([edgeOf(bubble, centre, end), end])
    drawn.push(...drawBubble(bubble, centre, { target, label: lineLabel(l) }, sameTarget(selected, target)))
    if (!l.assessed) return
    const away: Point = isWide
      ? [centre[0] - bubble.half - 1.2 - MARK / 2, centre[1]]
      : [centre[0], centre[1] - bubble.radius - 1.2 - MARK / 2]
    drawn.push(...statusMark(l.status, l.certainty, away, { target, label: lineLabel(l) }))
  })
  return {
    drawn: [...leaders.map(([a, b]) => line('leader', a, b)), ...drawn],
    boxes: boxes.filter((b) => b !== undefined),
    leaders,
  }
}

/** Centres and size of bubble and mark together. */
function wantedPlaces({ from, to }: PlanLine, { half, radius }: Bubble, plan: Box) {
  const length = distance(from, to) || 1
  const [dx, dy] = [(to[0] - from[0]) / length, (to[1] - from[1]) / length]
  const start = Math.abs(dx) >= Math.abs(dy) ? ('left' as const) : ('top' as const)
  const forward = start === 'left' ? dx > 0 : dy > 0
  const [near, far] = forward ? [from, to] : [to, from]
  const [ux, uy] = forward ? [dx, dy] : [-dx, -dy]
  const room = MARK + 1.6
  const [width, height] = start === 'left' ? [2 * half + room, 2 * radius] : [2 * half, 2 * radius + room]
  /** From the bubble's middle to the middle of both. */
  const shift: Point = start === 'left' ? [-room / 2, 0] : [0, -room / 2]
  const isStraight = Math.abs(dx) < 1e-6 || Math.abs(dy) < 1e-6
  // Bubbles of an orthogonal grid stand in one row, wherever their lines begin.
  const inRow: Point =
    start === 'left' ? [plan.x - BUBBLE_AWAY + BUBBLE - half, near[1]] : [near[0], plan.y - BUBBLE_AWAY]
  function beyond(p: Point, s: number, away: number): Point {
    return [p[0] + s * ux * away, p[1] + s * uy * away]
  }
  const reach = BUBBLE_AWAY + (half - radius) * Math.abs(ux)
  const centres = [
    ...(isStraight ? [inRow] : []),
    ...[0, 8, 16].flatMap((more) => [beyond(near, -1, reach + more), beyond(far, 1, reach + more)]),
  ]
  const places = centres.map(([x, y]): Point => [x + shift[0], y + shift[1]])
  return { start, width, height, places }
}

/** Where a line from the middle of a bubble to a point leaves the bubble. */
function edgeOf({ half, radius }: Bubble, centre: Point, to: Point): Point {
  const length = distance(centre, to) || 1
  const [ux, uy] = [(to[0] - centre[0]) / length, (to[1] - centre[1]) / length]
  const reach = Math.abs(uy) < 0.2 ? half : radius
  return [centre[0] + ux * reach, centre[1] + uy * reach]
}

function around([x, y]: Point, half: number): Box {
  return { x: x - half, y: y - half, width: 2 * half, height: 2 * half }
}

function distance(a: Point, b: Point): number {
  return Math.hypot(a[0] - b[0], a[1] - b[1])
}
