/**
 * Places labels so that none lies over another, over what must stay readable, or over the edge. The first label
 * is served first; each takes the first of its places that is free. A label that finds none is left out: a calm
 * drawing with fewer figures is better than a full one that cannot be read, and every value is in the tables.
 */
import type { Point } from './scene.ts'

export interface Box {
  /** Left top corner. */
  x: number
  y: number
  width: number
  height: number
}

export interface Wanted {
  width: number
  height: number
  /** Centres, the best first. */
  places: readonly Point[]
  /** Left out rather than set on a soft line. */
  isShy?: boolean
}

export interface Obstacles {
  within: Box
  boxes?: readonly Box[]
  /** Lines that no label may lie on. */
  segments?: readonly (readonly [Point, Point])[]
  /** Lines that a label lies on only where there is no other place. */
  soft?: readonly (readonly [Point, Point])[]
}

/** Between a label and a line, mm. */
const CLEAR = 0.3

/** A box for each label, in their order; undefined where there was no room. */
export function placeLabels(wanted: readonly Wanted[], obstacles: Obstacles, gap = 0.8): (Box | undefined)[] {
  const taken: Box[] = [...(obstacles.boxes ?? [])]
  return wanted.map(({ width, height, places, isShy }) => {
    const boxes = places
      .map(([x, y]): Box => ({ x: x - width / 2, y: y - height / 2, width, height }))
      .filter(
        (box) =>
          isInside(box, obstacles.within) &&
          !taken.some((t) => overlap(box, t, gap)) &&
          !crossesAny(box, obstacles.segments),
      )
    const box = boxes.find((b) => !crossesAny(b, obstacles.soft)) ?? (isShy ? undefined : boxes[0])
    if (box) taken.push(box)
    return box
  })
}

/** Whether two boxes come nearer than the gap. */
export function overlap(a: Box, b: Box, gap = 0): boolean {
  return (
    a.x < b.x + b.width + gap && b.x < a.x + a.width + gap && a.y < b.y + b.height + gap && b.y < a.y + a.height + gap
  )
}

export function isInside(box: Box, within: Box): boolean {
  return (
    box.x >= within.x &&
    box.y >= within.y &&
    box.x + box.width <= within.x + within.width &&
    box.y + box.height <= within.y + within.height
  )
}

function crossesAny(box: Box, segments: Obstacles['soft'] = []): boolean {
  const grown = { x: box.x - CLEAR, y: box.y - CLEAR, width: box.width + 2 * CLEAR, height: box.height + 2 * CLEAR }
  return segments.some(([a, b]) => crosses(grown, a, b))
}

/** Whether a segment has a part inside a box: Liang and Barsky's clipping. */
export function crosses(box: Box, a: Point, b: Point): boolean {
  let [enter, leave] = [0, 1]
  const sides = [
    [b[0] - a[0], a[0], box.x, box.x + box.width],
    [b[1] - a[1], a[1], box.y, box.y + box.height],
  ] as const
  for (const [d, start, low, high] of sides) {
    if (d === 0) {
      if (start < low || start > high) return false
      continue
    }
    const t = [(low - start) / d, (high - start) / d]
    enter = Math.max(enter, Math.min(...t))
    leave = Math.min(leave, Math.max(...t))
  }
  return enter <= leave
}
