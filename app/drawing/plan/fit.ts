/** The supports fitted to the sheet in plan: x to the right, y up. */
import type { Building } from '../../model/building.ts'
import type { Box } from '../place-labels.ts'
import type { Point } from '../scene.ts'

const MOST_MM_PER_M = 24

export interface PlacedSupport {
  id: string
  at: Point
}

export interface PlanFit {
  scale: number
  place: (x_m: number, y_m: number) => Point
  supports: PlacedSupport[]
  /** Round all supports. */
  box: Box
  /** Least distance between two supports on the sheet; Infinity with one. */
  nearest: number
}

export function planIn({ supports }: Building, room: Box): PlanFit {
  const xs = supports.map((s) => s.x_m)
  const ys = supports.map((s) => s.y_m)
  const [left, low] = [Math.min(...xs), Math.min(...ys)]
  const [w, h] = [Math.max(...xs) - left, Math.max(...ys) - low]
  const scale = Math.min(MOST_MM_PER_M, w > 0 ? room.width / w : Infinity, h > 0 ? room.height / h : Infinity)
  const x0 = room.x + (room.width - w * scale) / 2
  const y0 = room.y + (room.height + h * scale) / 2
  function place(x_m: number, y_m: number): Point {
    return [x0 + (x_m - left) * scale, y0 - (y_m - low) * scale]
  }
  const placed = supports.map((s) => ({ id: s.id, at: place(s.x_m, s.y_m) }))
  return {
    scale,
    place,
    supports: placed,
    box: { x: x0, y: y0 - h * scale, width: w * scale, height: h * scale },
    nearest: nearestOf(placed),
  }
}

function nearestOf(supports: readonly PlacedSupport[]): number {
  let least = Infinity
  supports.forEach((a, i) => {
    for (const b of supports.slice(i + 1)) least = Math.min(least, Math.hypot(a.at[0] - b.at[0], a.at[1] - b.at[1]))
  })
  return least
}

/** Places that stand apart by more than a hand: the grid as it would be dimensioned. */
export function gridPlaces(values: readonly number[]): number[] {
  const kept: number[] = []
  for (const v of [...values].sort((a, b) => a - b)) if (kept.length === 0 || v - kept.at(-1)! > 0.1) kept.push(v)
  return kept
}
