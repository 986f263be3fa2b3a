/**
 * Contour lines of settlement: linear within each triangle between measured supports, nothing beyond them. Where
 * four supports make a rectangle neither diagonal is better founded than the other, so it is cut into four triangles
 * at its middle, which takes the mean of the four.
 */
import { multiples, niceStep } from '../nice.ts'
import type { Point } from '../scene.ts'
import { triangulate, type Triangle } from './delaunay.ts'

export interface Sample {
  at: Point
  value: number
}

export interface Contour {
  value: number
  points: Point[]
}

/** As many contours as can still be told apart. */
const MOST = 8

/** The step between contours: round, and no finer than what the survey can tell. */
export function contourStep(samples: readonly Sample[], finest: number): number {
  const values = samples.map((s) => s.value)
  const range = Math.max(...values) - Math.min(...values)
  return niceStep(Math.max(range / MOST, finest, 1e-6))
}

export function contours(samples: readonly Sample[], step: number): Contour[] {
  const { points, triangles } = mesh(samples)
  const values = points.map((s) => s.value)
  return multiples(step, Math.min(...values), Math.max(...values)).flatMap((value) => {
    const pieces = triangles.flatMap((t) => piece(t, points, value))
    return joined(pieces).map((line) => ({ value, points: line }))
  })
}

/** The triangles, rectangles cut at their middle. */
function mesh(samples: readonly Sample[]): { points: Sample[]; triangles: Triangle[] } {
  const points = [...samples]
  const whole = triangulate(samples.map((s) => s.at))
  const triangles: Triangle[] = []
  const used = new Set<Triangle>()
  for (const t of whole) {
    if (used.has(t)) continue
    used.add(t)
    const other = whole.find((o) => !used.has(o) && rectangle(t, o, points))
    const corners = other && rectangle(t, other, points)
    if (!other || !corners) {
      triangles.push(t)
      continue
    }
    used.add(other)
    const four = corners.map((k) => points[k]!)
    function mean(pick: (s: Sample) => number) {
      return four.reduce((sum, s) => sum + pick(s), 0) / 4
    }
    const middle = points.push({ at: [mean((s) => s.at[0]), mean((s) => s.at[1])], value: mean((s) => s.value) }) - 1
    for (let k = 0; k < 4; k++) triangles.push([corners[k]!, corners[(k + 1) % 4]!, middle])
  }
  return { points, triangles }
}

/** The corners in order where two triangles on one edge make a rectangle: both diagonals halve each other and are as long. */
function rectangle(a: Triangle, b: Triangle, points: readonly Sample[]): [number, number, number, number] | undefined {
  const shared = a.filter((k) => b.includes(k))
  if (shared.length !== 2) return undefined
  const [p, q] = shared as [number, number]
  const r = a.find((k) => !shared.includes(k))!
  const s = b.find((k) => !shared.includes(k))!
  function at(k: number) {
    return points[k]!.at
  }
  function length(i: number, j: number) {
    return Math.hypot(at(i)[0] - at(j)[0], at(i)[1] - at(j)[1])
  }
  const apart = Math.hypot(at(p)[0] + at(q)[0] - at(r)[0] - at(s)[0], at(p)[1] + at(q)[1] - at(r)[1] - at(s)[1])
  const diagonal = length(p, q)
  const isRectangle = apart < 0.05 * diagonal && Math.abs(diagonal - length(r, s)) < 0.02 * diagonal
  return isRectangle ? [p, r, q, s] : undefined
}

/** The part of a contour inside one triangle. A corner exactly on the contour counts as above it. */
function piece(triangle: Triangle, points: readonly Sample[], value: number): [Point, Point][] {
  const ends: Point[] = []
  for (let k = 0; k < 3; k++) {
    // From the lesser index to the greater, so that neighbours find the very same point on a shared edge.
    const [i, j] = [triangle[k]!, triangle[(k + 1) % 3]!].sort((x, y) => x - y) as [number, number]
    const [a, b] = [points[i]!, points[j]!]
    if (a.value >= value === b.value >= value) continue
    const t = (value - a.value) / (b.value - a.value)
    ends.push([a.at[0] + (b.at[0] - a.at[0]) * t, a.at[1] + (b.at[1] - a.at[1]) * t])
  }
  return ends.length === 2 ? [[ends[0]!, ends[1]!]] : []
}

/** Pieces end to end, as long lines. */
function joined(pieces: readonly [Point, Point][]): Point[][] {
  const left = [...pieces]
  const lines: Point[][] = []
  for (let first = left.pop(); first; first = left.pop()) {
    const points: Point[] = [...first]
    for (let grown = true; grown;) {
      grown = false
      for (let i = left.length - 1; i >= 0; i--) {
        const [a, b] = left[i]!
        const [head, tail] = [points[0]!, points.at(-1)!]
        if (same(a, tail)) points.push(b)
        else if (same(b, tail)) points.push(a)
        else if (same(a, head)) points.unshift(b)
        else if (same(b, head)) points.unshift(a)
        else continue
        left.splice(i, 1)
        grown = true
      }
    }
    lines.push(points)
  }
  return lines
}

function same(a: Point, b: Point): boolean {
  return a[0] === b[0] && a[1] === b[1]
}
