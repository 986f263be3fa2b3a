/** The contours on the sheet with their values set into them. */
import type { SupportFinding } from '../../model/findings.ts'
import { fixed } from '../../model/numbers.ts'
import { placeLabels, type Box, type Obstacles } from '../place-labels.ts'
import type { Point, Primitive } from '../scene.ts'
import { baselineFor, corners, polygon, polyline, text } from '../shapes.ts'
import { SMALL } from '../sizes.ts'
import { CAP_HEIGHT, textWidth } from '../text-width.ts'
import { contours, contourStep, type Contour } from './contours.ts'
import type { PlanSupport } from './discs.ts'

/** A contour shorter than this is explained by the value of the support that it goes round, mm. */
const SHORTEST = 10

export interface DrawnContours {
  step_mm: number
  lines: Contour[]
}

/** Contours of the measured supports; none where they lie in one line or have not moved apart measurably. */
export function planContours(supports: readonly PlanSupport[], z: number): DrawnContours | undefined {
  const measured = supports.filter((s) => s.finding && !s.finding.estimated)
  if (measured.length < 3) return undefined
  const samples = measured.map((s) => ({ at: s.at, value: s.finding!.settlement_mm }))
  const step_mm = contourStep(samples, noise(measured.map((s) => s.finding!)) * z)
  const lines = contours(samples, step_mm)
  return lines.length > 0 ? { step_mm, lines } : undefined
}

/** A contour finer than what can be measured would draw the scatter of the readings. */
function noise(findings: readonly SupportFinding[]): number {
  const sds = findings.map((f) => f.sd_mm).sort((a, b) => a - b)
  return sds[Math.floor(sds.length / 2)] ?? 0
}

export function drawContours({ lines }: DrawnContours): Primitive[] {
  return lines.map(({ points, value }) => polyline('contour', points, { label: `${contourWords(value)} mm` }))
}

export function contourLabels({ lines }: DrawnContours, obstacles: Obstacles): { drawn: Primitive[]; boxes: Box[] } {
  const wanted = lines
    .filter((l) => lengthOf(l.points) >= SHORTEST)
    .sort((a, b) => lengthOf(b.points) - lengthOf(a.points))
    .map(({ value, points }) => {
      const words = contourWords(value)
      const width = textWidth(words, SMALL) + 1
      return { words, width, height: SMALL * CAP_HEIGHT + 0.8, places: placesAlong(points) }
    })
  const placed = placeLabels(wanted, obstacles)
  const boxes: Box[] = []
  const drawn = wanted.flatMap(({ words }, i) => {
    const box = placed[i]
    if (!box) return []
    boxes.push(box)
    const [x, y] = [box.x + box.width / 2, box.y + box.height / 2]
    return [
      polygon('paper', corners(box.x, box.y, box.width, box.height)),
      text('contour', [x, baselineFor(y, SMALL)], words, SMALL),
    ]
  })
  return { drawn, boxes }
}

function contourWords(value: number): string {
  return fixed(value, Number.isInteger(value) ? 0 : 1)
}

/** Places along a line, from its middle outwards, at last just beyond its ends. */
function placesAlong(points: readonly Point[]): Point[] {
  const length = lengthOf(points)
  const inside = [0.5, 0.4, 0.6, 0.3, 0.7, 0.2, 0.8, 0.12, 0.88].map((share) => pointAt(points, share * length))
  return [...inside, ...beyondEnds(points)]
}

function beyondEnds(points: readonly Point[]): Point[] {
  const [a, b, y, z] = [points[0]!, points[1]!, points.at(-2)!, points.at(-1)!]
  return [
    [b, a],
    [y, z],
  ].map(([before, end]): Point => {
    const length = Math.hypot(end![0] - before![0], end![1] - before![1]) || 1
    return [end![0] + ((end![0] - before![0]) / length) * 2.6, end![1] + ((end![1] - before![1]) / length) * 2.6]
  })
}

function pointAt(points: readonly Point[], distance: number): Point {
  let left = distance
  for (let i = 1; i < points.length; i++) {
    const [a, b] = [points[i - 1]!, points[i]!]
    const piece = Math.hypot(b[0] - a[0], b[1] - a[1])
    if (left <= piece && piece > 0)
      return [a[0] + ((b[0] - a[0]) * left) / piece, a[1] + ((b[1] - a[1]) * left) / piece]
    left -= piece
  }
  return points.at(-1)!
}

function lengthOf(points: readonly Point[]): number {
  return points.slice(1).reduce((sum, p, i) => sum + Math.hypot(p[0] - points[i]![0], p[1] - points[i]![1]), 0)
}
