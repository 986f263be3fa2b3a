/** The things that a drawing shows, each once, where it stands: what the keyboard walks on the sheet. */
import type { Point, Primitive, Target } from '../../app/drawing/scene.ts'

export interface Thing {
  target: Target
  label: string
  /** Its middle, drawing mm. */
  at: Point
  /** Its extent, drawing mm. */
  from: Point
  to: Point
}

export type Direction = 'left' | 'right' | 'up' | 'down'

/** How much nearer something straight ahead counts than something to the side. */
const SIDEWAYS = 2.5

/** The things of primitives without groups; a thing is where the first primitive that shows it is. */
export function thingsOf(primitives: readonly Primitive[]): Thing[] {
  const found = new Map<string, Thing>()
  for (const primitive of primitives) {
    const { target } = primitive
    const points = target ? pointsOf(primitive) : []
    if (!target || points.length === 0) continue
    const key = keyOf(target)
    const before = found.get(key)
    if (before) before.label ||= primitive.label ?? ''
    else found.set(key, { target, label: primitive.label ?? '', ...extentOf(points) })
  }
  return [...found.values()].map((thing) => ({ ...thing, label: thing.label || nameOf(thing.target) }))
}

/** The nearest thing in that direction; undefined where there is none. Without a place to go from: the first by reading. */
export function nextThing(things: readonly Thing[], from: Thing | undefined, direction: Direction): Thing | undefined {
  if (!from) return [...things].sort((a, b) => a.at[1] - b.at[1] || a.at[0] - b.at[0])[0]
  let best: { thing: Thing; cost: number } | undefined
  for (const thing of things) {
    const { along, across } = ahead(from.at, thing.at, direction)
    if (along <= 0.5) continue
    const cost = along + SIDEWAYS * Math.abs(across)
    if (!best || cost < best.cost) best = { thing, cost }
  }
  return best?.thing
}

/** Which end of a member is meant plays no part. */
function keyOf(target: Target): string {
  if (target.kind === 'span') return `span/${target.line}/${target.from}/${target.to}`
  return `${target.kind}/${'line' in target ? target.line : ''}/${target.id}`
}

function nameOf(target: Target): string {
  if (target.kind === 'span') return `span ${target.from}\u2013${target.to} of frame line ${target.line}`
  if (target.kind === 'line') return `frame line ${target.id}`
  return target.kind === 'support' ? `support ${target.id}` : `${target.kind} ${target.id} of frame line ${target.line}`
}

function ahead(from: Point, to: Point, direction: Direction): { along: number; across: number } {
  const [x, y] = [to[0] - from[0], to[1] - from[1]]
  if (direction === 'right') return { along: x, across: y }
  if (direction === 'left') return { along: -x, across: y }
  return direction === 'down' ? { along: y, across: x } : { along: -y, across: x }
}

function pointsOf(primitive: Primitive): Point[] {
  switch (primitive.shape) {
    case 'line':
      return [primitive.from, primitive.to]
    case 'polyline':
      return [...primitive.points]
    case 'path':
      return primitive.d.flatMap((step) => (step.to === 'close' ? [] : [step.at]))
    case 'circle':
      return around(primitive.centre, primitive.radius)
    case 'mark':
      return around(primitive.centre, primitive.size / 2)
    case 'text':
      return [primitive.at, [primitive.at[0], primitive.at[1] - primitive.size]]
    case 'group':
      return primitive.children.flatMap(pointsOf)
  }
}

function around([x, y]: Point, radius: number): Point[] {
  return [
    [x - radius, y - radius],
    [x + radius, y + radius],
  ]
}

function extentOf(points: readonly Point[]): Pick<Thing, 'at' | 'from' | 'to'> {
  const [xs, ys] = [points.map((p) => p[0]), points.map((p) => p[1])]
  const from: Point = [Math.min(...xs), Math.min(...ys)]
  const to: Point = [Math.max(...xs), Math.max(...ys)]
  return { from, to, at: [(from[0] + to[0]) / 2, (from[1] + to[1]) / 2] }
}
