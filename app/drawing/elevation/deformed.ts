/**
 * The deformed line: each member as the cubic that its end displacements and rotations make of it, exaggerated.
 * Between its ends a member carries nothing of the settlement but its end moments, so the cubic is exact where
 * shear deformation is left out.
 */
import type { NodeFinding } from '../../model/findings.ts'
import { niceBelow } from '../nice.ts'
import type { Box } from '../place-labels.ts'
import type { Point, Primitive, Target } from '../scene.ts'
import { weightOf, type DrawnFrame, type DrawnMember } from './frame.ts'

/** Displacement on the sheet that the automatic factor aims at, mm. */
const AIM = 12

/** The largest displacement of any node of the line, mm in the building. */
export function largestDisplacement(nodes: readonly NodeFinding[]): number {
  return nodes.reduce((most, n) => Math.max(most, Math.hypot(n.x_mm, n.down_mm)), 0)
}

/** The round factor that makes the largest displacement some millimetres on the sheet; 1 where nothing moves. */
export function factorFor(nodes: readonly NodeFinding[], scale: number, room: number): number {
  const largest = largestDisplacement(nodes)
  if (!(largest > 1e-6) || !(scale > 0)) return 1
  return Math.max(1, niceBelow((Math.min(AIM, room) * 1000) / (largest * scale)))
}

/** The factor at which the deformed line would touch the edge of a box; a curve stays within its four points. */
export function largestFactor(frame: DrawnFrame, within: Box): number {
  const nodes = new Map(frame.finding?.nodes.map((n) => [n.node, n]))
  let most = 1e6
  for (const member of frame.members) {
    const at0 = deformedCurve(member, nodes, frame.scale, 0)
    const at1 = deformedCurve(member, nodes, frame.scale, 1)
    if (!at0 || !at1) continue
    for (const key of ['from', 'c1', 'c2', 'to'] as const) {
      const [dx, dy] = [at1[key][0] - at0[key][0], at1[key][1] - at0[key][1]]
      const room = [
        dx > 0 ? (within.x + within.width - at0[key][0]) / dx : dx < 0 ? (within.x - at0[key][0]) / dx : Infinity,
        dy > 0 ? (within.y + within.height - at0[key][1]) / dy : dy < 0 ? (within.y - at0[key][1]) / dy : Infinity,
      ]
      most = Math.min(most, ...room)
    }
  }
  return Math.max(0, most >= 10 ? Math.floor(most) : most)
}

export interface Curve {
  from: Point
  c1: Point
  c2: Point
  to: Point
}

/** The deformed member on the sheet as one Bezier curve; undefined where its nodes have no displacement. */
export function deformedCurve(
  { member, from, to, length }: DrawnMember,
  nodes: ReadonlyMap<string, NodeFinding>,
  scale: number,
  factor: number,
): Curve | undefined {
  const [a, b] = [nodes.get(member.from), nodes.get(member.to)]
  if (!a || !b || length === 0) return undefined
  const enlarged = (factor * scale) / 1000
  function moved(p: Point, n: NodeFinding): Point {
    return [p[0] + n.x_mm * enlarged, p[1] + n.down_mm * enlarged]
  }
  const [start, end] = [moved(from, a), moved(to, b)]
  const along: Point = [(to[0] - from[0]) / length, (to[1] - from[1]) / length]
  // Across the member towards its right-hand side: where a clockwise turn takes the far end on a sheet whose y grows down.
  const across: Point = [-along[1], along[0]]
  const chord = dot([b.x_mm - a.x_mm, b.down_mm - a.down_mm], across) / (length / scale) / 1000
  const turns = endRotations(a.rotation_rad, b.rotation_rad, chord, member.pin_from === true, member.pin_to === true)
  const stretch = dot([end[0] - start[0], end[1] - start[1]], along) / 3
  function sway(turn: number) {
    return (length * factor * turn) / 3
  }
  return {
    from: start,
    c1: shifted(shifted(start, along, stretch), across, sway(turns[0])),
    c2: shifted(shifted(end, along, -stretch), across, -sway(turns[1])),
    to: end,
  }
}

/** Rotations of the member's own ends: at a pin it turns as its other end leaves it, not with the node. */
function endRotations(a: number, b: number, chord: number, pinFrom: boolean, pinTo: boolean): [number, number] {
  if (pinFrom && pinTo) return [chord, chord]
  if (pinFrom) return [1.5 * chord - b / 2, b]
  if (pinTo) return [a, 1.5 * chord - a / 2]
  return [a, b]
}

export function deformedLine(frame: DrawnFrame, factor: number): { curves: Curve[]; drawn: Primitive[] } {
  const nodes = new Map(frame.finding?.nodes.map((n) => [n.node, n]))
  const found = frame.members.flatMap((m) => {
    const curve = deformedCurve(m, nodes, frame.scale, factor)
    return curve ? [{ m, curve }] : []
  })
  const weight = weightOf(frame)
  const drawn = found.map(({ m, curve }): Primitive => {
    const target: Target = { kind: 'member', line: frame.line.id, id: m.member.id }
    const { from, c1, c2, to } = curve
    return {
      shape: 'path',
      role: 'deformed',
      d: [
        { to: 'move', at: from },
        { to: 'curve', c1, c2, at: to },
      ],
      target,
      ...(weight < 1 ? { weight } : {}),
    }
  })
  return { curves: found.map((f) => f.curve), drawn }
}

/** A point of the curve, from 0 at its start to 1 at its end. */
export function pointOn({ from, c1, c2, to }: Curve, t: number): Point {
  const u = 1 - t
  const weights = [u * u * u, 3 * u * u * t, 3 * u * t * t, t * t * t]
  const points = [from, c1, c2, to]
  return [0, 1].map((k) => points.reduce((sum, p, i) => sum + weights[i]! * p[k]!, 0)) as unknown as Point
}

function dot(a: Point, b: Point): number {
  return a[0] * b[0] + a[1] * b[1]
}

function shifted(p: Point, direction: Point, by: number): Point {
  return [p[0] + direction[0] * by, p[1] + direction[1] * by]
}
