/** What stands in the ground: ground line with hatching, footings at their base levels, kinds of base. */
import { baselineFor, circle, line, polyline, polygon, sameTarget } from '../shapes.ts'
import type { Point, Primitive, Target } from '../scene.ts'
import { leastBay, type DrawnBase, type DrawnFrame } from './frame.ts'

/** How far a footing reaches below the base of its column on the sheet, mm: at least, and at most. */
const LEAST_DEPTH = 3.6
const MOST_DEPTH = 11
/** How far the ground goes on beyond the outer bases. */
export const OVERHANG = 9
const HATCH = 2.2

export interface Ground {
  drawn: Primitive[]
  /** Depth of each footing below its base, mm, in the order of the bases. */
  depths: number[]
  /** The lowest that anything reaches, mm on the sheet. */
  bottom: number
}

export function depthOf({ node, underside_m }: DrawnBase, scale: number): number {
  if (underside_m === undefined) return LEAST_DEPTH
  return Math.min(MOST_DEPTH, Math.max(LEAST_DEPTH, (node.z_m - underside_m) * scale))
}

export function drawGround(frame: DrawnFrame, left: number, right: number, selected?: Target): Ground {
  const { bases, scale } = frame
  const depths = bases.map((b) => depthOf(b, scale))
  if (bases.length === 0) return { drawn: [], depths, bottom: frame.box.y + frame.box.height }
  const surface = groundLine(bases, left, right)
  const half = Math.min(3.4, leastBay(frame) * 0.3)
  return {
    drawn: [
      ...hatching(surface),
      polyline('ground', surface),
      ...bases.flatMap((base, i) => footing(base, depths[i]!, half, selected)),
    ],
    depths,
    bottom: Math.max(...bases.map((b, i) => b.at[1] + Math.max(depths[i]!, HATCH))),
  }
}

/** Level at each base, with a step half-way to a neighbour that stands at another level. */
function groundLine(bases: readonly DrawnBase[], left: number, right: number): Point[] {
  const points: Point[] = [[left, bases[0]!.at[1]]]
  bases.slice(1).forEach((base, i) => {
    const before = bases[i]!
    if (Math.abs(base.at[1] - before.at[1]) < 0.05) return
    const middle = (base.at[0] + before.at[0]) / 2
    points.push([middle, before.at[1]], [middle, base.at[1]])
  })
  points.push([right, bases.at(-1)!.at[1]])
  return points
}

function hatching(surface: readonly Point[]): Primitive[] {
  return surface.slice(1).flatMap((end, i) => {
    const start = surface[i]!
    const count = start[1] === end[1] ? Math.floor((end[0] - start[0]) / HATCH) : 0
    return Array.from({ length: count }, (_, k) => {
      const x = start[0] + (k + 1) * HATCH
      return line('ground', [x, start[1]], [x - 1.5, start[1] + 1.5])
    })
  })
}

function footing(
  { at: [x, y], node, support }: DrawnBase,
  depth: number,
  half: number,
  selected?: Target,
): Primitive[] {
  const target: Target = { kind: 'support', id: support }
  const pad = 1.7
  const stem = half * 0.36
  const outline: Point[] = [
    [x - stem, y],
    [x + stem, y],
    [x + stem, y + depth - pad],
    [x + half, y + depth - pad],
    [x + half, y + depth],
    [x - half, y + depth],
    [x - half, y + depth - pad],
    [x - stem, y + depth - pad],
  ]
  const shapes: Primitive[] = [polygon('footing', outline, { target, label: `Support ${support}` })]
  if (sameTarget(selected, target)) shapes.unshift(polygon('selection', outline))
  if (node.base === 'pinned') shapes.push(circle('pin', [x, y], 0.8, { target }))
  if (typeof node.base === 'object')
    shapes.push(circle('pin', [x, y], 1.3, { target }), circle('pin', [x, y], 0.6, { target }))
  return shapes
}

/** Level marks in a column: a line at the level, a triangle standing on it, the figure above. */
export function levelMarks(levels: readonly { y: number; words: string }[], x: number, size: number): Primitive[] {
  return levels.flatMap(({ y, words }): Primitive[] => [
    line('level', [x, y], [x + LEVEL_WIDTH, y]),
    polygon('level', [
      [x + 2.3, y],
      [x + 1.1, y - 1.8],
      [x + 3.5, y - 1.8],
    ]),
    {
      shape: 'text',
      role: 'text',
      at: [x + 4.1, baselineFor(y - 0.6 - size * 0.36, size)],
      text: words,
      anchor: 'start',
      size,
    },
  ])
}

export const LEVEL_WIDTH = 14
