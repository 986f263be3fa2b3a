/**
 * Columns that stand in two frame lines: upright members of two lines at the same place in plan and between the
 * same heights. Each line is solved as a plane frame; the column takes the bending of both.
 */
import type { Support } from '../model/building.ts'
import type { PreparedLine } from './prepare.ts'

/** The same column in another line. */
export interface Partner {
  /** Index of the other line. */
  line: number
  /** Index of the member there. */
  member: number
  /** True where it is drawn the other way up. */
  isTurned: boolean
}

/** Places closer than this are one, m. */
const SAME_PLACE = 0.01

/** Plan position of each node of a line's arrays: [x, y], NaN where it is not known. */
export function planPositions(line: PreparedLine, supports: readonly Support[]): [number, number][] {
  const known = line.supports.map((s) => ({ x: s.x, plan: supports[s.support]! }))
  const length = Math.hypot(...line.towards)
  return (line.solved?.arrays.nodes ?? []).map((node): [number, number] => {
    const next = known.findIndex((k) => k.x >= node.x_m)
    const left = next < 0 ? known.at(-1) : known[Math.max(next - 1, 0)]
    const right = known[next]
    if (!left) return [NaN, NaN]
    if (right && right.x > left.x && node.x_m >= left.x) {
      const share = (node.x_m - left.x) / (right.x - left.x)
      return [
        left.plan.x_m + share * (right.plan.x_m - left.plan.x_m),
        left.plan.y_m + share * (right.plan.y_m - left.plan.y_m),
      ]
    }
    const beyond = node.x_m - left.x
    if (Math.abs(beyond) <= SAME_PLACE) return [left.plan.x_m, left.plan.y_m]
    if (!(length > 0)) return [NaN, NaN]
    return [left.plan.x_m + (beyond * line.towards[0]) / length, left.plan.y_m + (beyond * line.towards[1]) / length]
  })
}

/** For each member of a line, the same column in the other lines. */
export function columnsInTwoLines(
  lines: readonly PreparedLine[],
  places: readonly [number, number][][],
  own: number,
): Partner[][] {
  const mine = uprights(lines[own]!, places[own]!)
  const partners: Partner[][] = (lines[own]!.solved?.arrays.members ?? []).map(() => [])
  if (mine.length === 0) return partners
  lines.forEach((line, other) => {
    if (other === own) return
    for (const theirs of uprights(line, places[other]!))
      for (const column of mine)
        if (
          isNear(column.x, theirs.x) &&
          isNear(column.y, theirs.y) &&
          isNear(column.low, theirs.low) &&
          isNear(column.high, theirs.high)
        )
          partners[column.member]!.push({
            line: other,
            member: theirs.member,
            isTurned: column.isUpwards !== theirs.isUpwards,
          })
  })
  return partners
}

function uprights({ solved }: PreparedLine, places: readonly [number, number][]) {
  if (!solved) return []
  const { x, z, from, to } = solved.arrays.frame
  return solved.arrays.members.flatMap((_, member) => {
    const a = from[member]!
    const b = to[member]!
    if (!isNear(x[a]!, x[b]!)) return []
    const [planX, planY] = places[a]!
    const isUpwards = z[b]! > z[a]!
    return [{ member, x: planX, y: planY, low: Math.min(z[a]!, z[b]!), high: Math.max(z[a]!, z[b]!), isUpwards }]
  })
}

function isNear(a: number, b: number): boolean {
  return Math.abs(a - b) <= SAME_PLACE
}
