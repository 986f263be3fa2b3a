/**
 * Numbering and assembly. Three movements a node: right, down, clockwise. In axes right and down a clockwise turn
 * is the positive one, so the formulas are the usual ones with z replaced by depth. Bases have right and down
 * prescribed, and their rotation too where they are fixed. A rotation that nothing resists is left out.
 */
import type { FrameArrays } from '../types.ts'
import type { NodeGraph } from './connect.ts'
import type { Freedoms } from './mechanism.ts'
import { endStiffness } from './member.ts'
import { eliminationOrder } from './order.ts'
import type { Profile } from './profile.ts'

/** Members as the assembly and the recovery of forces need them; every array of shape (m). */
export interface MemberArrays {
  /** m */
  length: Float64Array
  /** Share of the length that goes right from `from` to `to`: dx / L. */
  right: Float64Array
  /** Share of the length that goes down: -dz / L. */
  down: Float64Array
  /** EA / L, kN/m */
  stretch: Float64Array
  /** shape (3m): kii, kij, kjj of each member, kNm/rad */
  bend: Float64Array
}

export function memberArrays(frame: FrameArrays): MemberArrays {
  const m = frame.from.length
  const members: MemberArrays = {
    length: new Float64Array(m),
    right: new Float64Array(m),
    down: new Float64Array(m),
    stretch: new Float64Array(m),
    bend: new Float64Array(3 * m),
  }
  for (let i = 0; i < m; i++) {
    const dx = frame.x[frame.to[i]] - frame.x[frame.from[i]]
    const dz = frame.z[frame.to[i]] - frame.z[frame.from[i]]
    const L = Math.hypot(dx, dz)
    members.length[i] = L
    members.right[i] = dx / L
    members.down[i] = -dz / L
    members.stretch[i] = frame.EA[i] / L
    endStiffness(L, frame.EI[i], frame.GAs[i], frame.pinFrom[i] !== 0, frame.pinTo[i] !== 0, members.bend, 3 * i)
  }
  return members
}

/** shape (3n): 1 for each movement that is to be found. */
export function freeMovements(frame: FrameArrays, { bend }: MemberArrays): Uint8Array {
  const n = frame.x.length
  const free = new Uint8Array(3 * n)
  for (let node = 0; node < n; node++) free[3 * node] = free[3 * node + 1] = 1
  for (let i = 0; i < frame.from.length; i++) {
    if (bend[3 * i] > 0) free[3 * frame.from[i] + 2] = 1
    if (bend[3 * i + 2] > 0) free[3 * frame.to[i] + 2] = 1
  }
  for (let b = 0; b < frame.base.length; b++) {
    const node = frame.base[b]
    free[3 * node] = free[3 * node + 1] = 0
    if (frame.baseSpring[b] === Infinity) free[3 * node + 2] = 0
    else if (frame.baseSpring[b] > 0) free[3 * node + 2] = 1
  }
  return free
}

export function numberMovements(
  graph: NodeGraph,
  frame: FrameArrays,
  free: Uint8Array,
): { row: Int32Array; freedoms: Freedoms; first: Int32Array } {
  const n = frame.x.length
  const count = new Uint8Array(n)
  let rows = 0
  for (let i = 0; i < 3 * n; i++) {
    count[(i / 3) | 0] += free[i]
    rows += free[i]
  }
  const order = eliminationOrder(graph, frame.x, frame.z, count)
  const row = new Int32Array(3 * n).fill(-1)
  const freedoms: Freedoms = { node: new Int32Array(rows), direction: new Uint8Array(rows) }
  const first = new Int32Array(rows)
  const start = new Int32Array(n).fill(-1)
  let next = 0
  for (const node of order) {
    start[node] = next
    let least = next
    for (let e = graph.start[node]; e < graph.start[node + 1]; e++) {
      const other = start[graph.neighbour[e]]
      if (other >= 0 && other < least) least = other
    }
    for (let direction = 0; direction < 3; direction++) {
      if (!free[3 * node + direction]) continue
      row[3 * node + direction] = next
      freedoms.node[next] = node
      freedoms.direction[next] = direction
      first[next++] = least
    }
  }
  return { row, freedoms, first }
}

export function assemble(profile: Profile, frame: FrameArrays, members: MemberArrays, row: Int32Array): void {
  const { at, lower, diagonal } = profile
  const rows = new Int32Array(6)
  const k = new Float64Array(36)
  for (let i = 0; i < frame.from.length; i++) {
    memberMatrix(members, i, k)
    for (let d = 0; d < 3; d++) {
      rows[d] = row[3 * frame.from[i] + d]
      rows[3 + d] = row[3 * frame.to[i] + d]
    }
    for (let p = 0; p < 6; p++) {
      const r = rows[p]
      if (r < 0) continue
      diagonal[r] += k[7 * p]
      for (let q = 0; q < 6; q++) {
        const c = rows[q]
        if (c >= 0 && c < r) lower[at[r] + c] += k[6 * p + q]
      }
    }
  }
  for (let b = 0; b < frame.base.length; b++) {
    const r = row[3 * frame.base[b] + 2]
    if (r >= 0) diagonal[r] += frame.baseSpring[b]
  }
}

/** 6 x 6 of one member, row-major: right, down, clockwise of `from`, then of `to`. */
function memberMatrix(members: MemberArrays, i: number, k: Float64Array): void {
  const L = members.length[i]
  const c = members.right[i]
  const s = members.down[i]
  const stretch = members.stretch[i]
  const kii = members.bend[3 * i]
  const kij = members.bend[3 * i + 1]
  const kjj = members.bend[3 * i + 2]
  const across = (kii + 2 * kij + kjj) / (L * L)
  const rr = stretch * c * c + across * s * s
  const rd = (stretch - across) * c * s
  const dd = stretch * s * s + across * c * c
  const pi = (kii + kij) / L
  const pj = (kij + kjj) / L
  // The side to the right of from -> to is (-s, c): a turn of an end by t pushes the ends apart along it.
  k.set([rr, rd, -s * pi, -rr, -rd, -s * pj], 0)
  k.set([rd, dd, c * pi, -rd, -dd, c * pj], 6)
  k.set([-s * pi, c * pi, kii, s * pi, -c * pi, kij], 12)
  k.set([-rr, -rd, s * pi, rr, rd, s * pj], 18)
  k.set([-rd, -dd, -c * pi, rd, dd, -c * pj], 24)
  k.set([-s * pj, c * pj, kij, s * pj, -c * pj, kjj], 30)
}
