/** Short ways to make primitives, and a little plane geometry in drawing millimetres. */
import type { Status } from '../model/findings.ts'
import type { Point, Primitive, Role, Target } from './scene.ts'
import { CAP_HEIGHT } from './text-width.ts'

export interface Extra {
  id?: string
  target?: Target
  label?: string
  weight?: number
}

export function line(role: Role, from: Point, to: Point, extra: Extra = {}): Primitive {
  return { shape: 'line', role, from, to, ...extra }
}

export function polyline(role: Role, points: readonly Point[], extra: Extra = {}): Primitive {
  return { shape: 'polyline', role, points, ...extra }
}

export function polygon(role: Role, points: readonly Point[], extra: Extra = {}): Primitive {
  return { shape: 'polyline', role, points, closed: true, ...extra }
}

export function circle(role: Role, centre: Point, radius: number, extra: Extra = {}): Primitive {
  return { shape: 'circle', role, centre, radius, ...extra }
}

export function mark(status: Status, centre: Point, size: number, extra: Extra = {}): Primitive {
  return { shape: 'mark', role: `status-${status}`, status, centre, size, ...extra }
}

/** A text whose baseline starts, is centred or ends at a point. */
export function text(
  role: Role,
  at: Point,
  words: string,
  size: number,
  anchor: 'start' | 'middle' | 'end' = 'middle',
  extra: Extra & { turn?: number } = {},
): Primitive {
  return { shape: 'text', role, at, text: words, anchor, size, ...extra }
}

/** Baseline of figures that are to be centred on y. */
export function baselineFor(y: number, size: number): number {
  return y + (CAP_HEIGHT * size) / 2
}

/** A shaft with a solid head at its end; the head shrinks with a short shaft. */
export function arrow(role: Role, from: Point, to: Point, head = 1.8, extra: Extra = {}): Primitive {
  const length = Math.hypot(to[0] - from[0], to[1] - from[1])
  if (length === 0) return { shape: 'group', role, children: [], ...extra }
  const [tx, ty] = [(to[0] - from[0]) / length, (to[1] - from[1]) / length]
  const h = Math.min(head, length)
  const neck: Point = [to[0] - tx * h, to[1] - ty * h]
  const half = h * 0.36
  return {
    shape: 'group',
    role,
    children: [
      line(role, from, neck, extra),
      polygon(
        role,
        [to, [neck[0] - ty * half, neck[1] + tx * half], [neck[0] + ty * half, neck[1] - tx * half]],
        extra,
      ),
    ],
    ...extra,
  }
}

/** A rectangle whose corners are given by its left top and its size. */
export function corners(x: number, y: number, width: number, height: number): Point[] {
  return [
    [x, y],
    [x + width, y],
    [x + width, y + height],
    [x, y + height],
  ]
}

export function between(a: Point, b: Point, share: number): Point {
  return [a[0] + (b[0] - a[0]) * share, a[1] + (b[1] - a[1]) * share]
}

export function sameTarget(a: Target | undefined, b: Target | undefined): boolean {
  if (!a || !b) return false
  if (a.kind === 'span') return b.kind === 'span' && a.line === b.line && a.from === b.from && a.to === b.to
  if (a.kind === 'support' || a.kind === 'line') return a.kind === b.kind && a.id === b.id
  return (b.kind === 'member' || b.kind === 'node') && a.kind === b.kind && a.line === b.line && a.id === b.id
}
