/** A frame line fitted to the sheet: where its nodes, members and bases stand in drawing millimetres. */
import type { Building, FrameLine, FrameNode, Member } from '../../model/building.ts'
import type { FrameLineFinding, RoundFindings } from '../../model/findings.ts'
import type { Box } from '../place-labels.ts'
import type { Point } from '../scene.ts'

/** Nobody wants to see a single bay as large as the sheet. */
const MOST_MM_PER_M = 24

export interface DrawnMember {
  member: Member
  a: FrameNode
  b: FrameNode
  from: Point
  to: Point
  /** mm on the sheet */
  length: number
}

export interface DrawnBase {
  node: FrameNode
  support: string
  at: Point
  /** Level of the underside of the footing where it lies below the base of the column. */
  underside_m?: number
}

export interface DrawnFrame {
  line: FrameLine
  finding?: FrameLineFinding
  /** mm on the sheet for a metre of the building */
  scale: number
  place: (x_m: number, z_m: number) => Point
  members: DrawnMember[]
  /** From left to right. */
  bases: DrawnBase[]
  /** Round all nodes. */
  box: Box
}

export interface Extent {
  left: number
  right: number
  low: number
  high: number
}

/** The extent of the nodes of a line, m. */
export function extentOf(line: FrameLine): Extent {
  const x = line.nodes.map((n) => n.x_m)
  const z = line.nodes.map((n) => n.z_m)
  return { left: Math.min(...x), right: Math.max(...x), low: Math.min(...z), high: Math.max(...z) }
}

/** The largest scale at which the line fits into a room on the sheet. */
export function scaleFor({ left, right, low, high }: Extent, width: number, height: number): number {
  const [w, h] = [right - left, high - low]
  return Math.min(MOST_MM_PER_M, w > 0 ? width / w : Infinity, h > 0 ? height / h : Infinity)
}

/** Stands the line in a room, in the middle of its width and on its floor. */
export function frameIn(building: Building, line: FrameLine, room: Box, findings?: RoundFindings): DrawnFrame {
  const extent = extentOf(line)
  const scale = scaleFor(extent, room.width, room.height)
  const width = (extent.right - extent.left) * scale
  const left = room.x + (room.width - width) / 2
  const floor = room.y + room.height
  function place(x_m: number, z_m: number): Point {
    return [left + (x_m - extent.left) * scale, floor - (z_m - extent.low) * scale]
  }
  const nodes = new Map(line.nodes.map((n) => [n.id, n]))
  const members = line.members.flatMap((member): DrawnMember[] => {
    const [a, b] = [nodes.get(member.from), nodes.get(member.to)]
    if (!a || !b) return [] // half described: nothing can be drawn of it yet
    const [from, to] = [place(a.x_m, a.z_m), place(b.x_m, b.z_m)]
    return [{ member, a, b, from, to, length: Math.hypot(to[0] - from[0], to[1] - from[1]) }]
  })
  const baseLevels = new Map(building.supports.map((s) => [s.id, s.base_m ?? 0]))
  const bases = line.nodes
    .flatMap((node): DrawnBase[] => {
      if (node.support === undefined) return []
      const level = baseLevels.get(node.support)
      const isBelow = level !== undefined && level < node.z_m - 0.005
      return [
        {
          node,
          support: node.support,
          at: place(node.x_m, node.z_m),
          ...(isBelow ? { underside_m: level } : {}),
        },
      ]
    })
    .sort((a, b) => a.at[0] - b.at[0])
  const height = (extent.high - extent.low) * scale
  return {
    line,
    finding: findings?.frame_lines.find((f) => f.id === line.id),
    scale,
    place,
    members,
    bases,
    box: { x: left, y: floor - height, width, height },
  }
}

/** The least distance on the sheet between neighbouring bases; Infinity with fewer than two. */
export function leastBay(frame: DrawnFrame): number {
  return Math.min(Infinity, ...frame.bases.slice(1).map((b, i) => b.at[0] - frame.bases[i]!.at[0]))
}

/** Lines of a frame with short members are thinner, so that they do not run together. */
export function weightOf(frame: DrawnFrame): number {
  return Math.min(1, Math.max(0.3, roomBeside(frame) / 9))
}

/** A length on the sheet that a diagram beside a member may have without reaching the next member. */
export function roomBeside({ members, box }: DrawnFrame): number {
  const lengths = members.map((m) => m.length).sort((a, b) => a - b)
  const typical = lengths[Math.floor(lengths.length * 0.25)] ?? Math.max(box.width, box.height)
  return typical
}
