/**
 * Triangles between points in plan, after Delaunay: no point lies inside the circle of a triangle (Bowyer 1981 and
 * Watson 1981, The Computer Journal 24: points are added one by one). Supports are tens to hundreds, so the plain
 * quadratic form is quick enough.
 */
import type { Point } from '../scene.ts'

/** Indices of the three corners. */
export type Triangle = readonly [number, number, number]

interface Circled {
  corners: Triangle
  centre: Point
  radius2: number
}

/** Triangles over the points; none where all lie on one line or fewer than three are given. */
export function triangulate(points: readonly Point[]): Triangle[] {
  const n = points.length
  if (n < 3) return []
  const xs = points.map((p) => p[0])
  const ys = points.map((p) => p[1])
  const size = Math.max(Math.max(...xs) - Math.min(...xs), Math.max(...ys) - Math.min(...ys))
  if (!(size > 0)) return []
  const [cx, cy] = [Math.min(...xs) + size / 2, Math.min(...ys) + size / 2]
  // One triangle far round everything to begin with; what hangs on its corners is dropped at the end.
  const all: Point[] = [
    ...points,
    [cx - 400 * size, cy - 300 * size],
    [cx + 400 * size, cy - 300 * size],
    [cx, cy + 500 * size],
  ]
  let triangles = [circled([n, n + 1, n + 2], all)!]
  for (let i = 0; i < n; i++) {
    const p = all[i]!
    const hit = triangles.filter((t) => distance2(t.centre, p) < t.radius2 * (1 - 1e-12))
    if (hit.length === 0) continue
    const edges = outline(hit)
    triangles = triangles.filter((t) => !hit.includes(t))
    for (const [a, b] of edges) {
      const made = circled([a, b, i], all)
      if (made) triangles.push(made)
    }
  }
  return triangles.map((t) => t.corners).filter((c) => c.every((k) => k < n) && isWide(c, points, size))
}

/** Edges that belong to one of the triangles only. */
function outline(triangles: readonly Circled[]): [number, number][] {
  const seen = new Map<string, [number, number] | undefined>()
  for (const { corners } of triangles)
    for (let k = 0; k < 3; k++) {
      const [a, b] = [corners[k]!, corners[(k + 1) % 3]!]
      const key = a < b ? `${a},${b}` : `${b},${a}`
      seen.set(key, seen.has(key) ? undefined : [a, b])
    }
  return [...seen.values()].filter((edge) => edge !== undefined)
}

function circled(corners: Triangle, points: readonly Point[]): Circled | undefined {
  const [a, b, c] = corners.map((k) => points[k]!) as [Point, Point, Point]
  const twice = 2 * cross(a, b, c)
  if (twice === 0) return undefined
  const [bx, by, ox, oy] = [b[0] - a[0], b[1] - a[1], c[0] - a[0], c[1] - a[1]]
  const x = (oy * (bx * bx + by * by) - by * (ox * ox + oy * oy)) / twice
  const y = (bx * (ox * ox + oy * oy) - ox * (bx * bx + by * by)) / twice
  return { corners, centre: [a[0] + x, a[1] + y], radius2: x * x + y * y }
}

/** Slivers along the rim, left by the far corners, say nothing about the ground. */
function isWide(corners: Triangle, points: readonly Point[], size: number): boolean {
  const [a, b, c] = corners.map((k) => points[k]!) as [Point, Point, Point]
  const longest = Math.sqrt(Math.max(distance2(a, b), distance2(b, c), distance2(c, a)))
  return Math.abs(cross(a, b, c)) > 0.05 * longest * longest && longest > 1e-9 * size
}

function cross(a: Point, b: Point, c: Point): number {
  return (b[0] - a[0]) * (c[1] - a[1]) - (b[1] - a[1]) * (c[0] - a[0])
}

function distance2(a: Point, b: Point): number {
  return (a[0] - b[0]) ** 2 + (a[1] - b[1]) ** 2
}
