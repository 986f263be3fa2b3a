/**
 * Loads at rest bases. A load on a member acts first on the member held at both ends; the forces that hold it
 * are then given back to the nodes. Held end moments follow from the end rotations of the same member simply
 * supported, which shear flexibility does not change: M = -k t. Pins and shear come in through k alone.
 */
import { SolverFault, type FrameLoads, type FrameResponse, type MemberLoadValue } from '../types.ts'
import type { FactoredFrame } from './factor.ts'
import { emptyResponse, respond } from './respond.ts'

/**
 * Response of the frame to sets of gravity loads, bases at rest.
 *
 *     simply supported, transverse q or P:  t_from = q L^3 / 24 EI    or   P a b (L + b) / 6 L EI
 *                                           t_to  = -q L^3 / 24 EI    or  -P a b (L + a) / 6 L EI,  b = L - a
 *     held:  M_from = -(kii t_from + kij t_to),  M_to = -(kij t_from + kjj t_to)
 *     held:  axial at `from` = (load along the member) b / L; half of a uniform load
 *
 * Loads act vertically whatever the member's slope; a uniform load is per metre of member. End moments are
 * total (held ends included), exactly 0 at a pinned end; axial force is that at the `from` end.
 *
 * @param f     as factorFrame gives it; n nodes
 * @param loads shape (c); kN and kN/m down positive; a from the `from` end, 0 <= a <= L [m]
 * @returns     c cases; shapes, units and signs as FrameResponse
 * @throws SolverFault `shape` naming nodeDown (not of length n), member (no such member) or a (not on the member);
 *         `not-finite` naming nodeDown, w, P or a; `at` is the case, then the node or the member
 * @source  fixed-end moments by slope-deflection, common practice; shear: J. S. Przemieniecki 1968, from memory
 */
export function loadResponse(f: FactoredFrame, loads: readonly FrameLoads[]): FrameResponse {
  const n = f.frame.x.length
  const response = emptyResponse(f, loads.length)
  const nodeDown = new Float64Array(loads.length * n)
  for (let c = 0; c < loads.length; c++) {
    const given = loads[c]
    if (given.nodeDown.length !== n) throw new SolverFault('shape', 'nodeDown', [c])
    for (let node = 0; node < n; node++) {
      if (!Number.isFinite(given.nodeDown[node])) throw new SolverFault('not-finite', 'nodeDown', [c, node])
      nodeDown[c * n + node] = given.nodeDown[node]
    }
    for (const load of given.onMembers) hold(f, response, nodeDown, c, load)
  }
  return respond(f, response, nodeDown)
}

/** Adds what holds a loaded member's ends, and its load's shares at the two nodes. */
function hold(
  { frame, members }: FactoredFrame,
  response: FrameResponse,
  nodeDown: Float64Array,
  c: number,
  load: MemberLoadValue,
): void {
  const n = frame.x.length
  const m = frame.from.length
  const i = load.member
  if (!(Number.isInteger(i) && i >= 0 && i < m)) throw new SolverFault('shape', 'member', [c, i])
  const L = members.length[i]
  const { total, shareFrom, turnFrom, turnTo } = simplySupported(L, load, c)
  const across = (total * members.right[i]) / frame.EI[i]
  const kii = members.bend[3 * i]
  const kij = members.bend[3 * i + 1]
  const kjj = members.bend[3 * i + 2]
  response.momentFrom[c * m + i] -= across * (kii * turnFrom + kij * turnTo)
  response.momentTo[c * m + i] -= across * (kij * turnFrom + kjj * turnTo)
  response.axial[c * m + i] += total * members.down[i] * shareFrom
  nodeDown[c * n + frame.from[i]] += total * shareFrom
  nodeDown[c * n + frame.to[i]] += total * (1 - shareFrom)
}

/** The whole load, the share of it that `from` carries, and end rotations for a load of 1 kN across and EI = 1. */
function simplySupported(
  L: number,
  load: MemberLoadValue,
  c: number,
): { total: number; shareFrom: number; turnFrom: number; turnTo: number } {
  if (load.kind === 'uniform') {
    if (!Number.isFinite(load.w)) throw new SolverFault('not-finite', 'w', [c, load.member])
    return { total: load.w * L, shareFrom: 0.5, turnFrom: (L * L) / 24, turnTo: (-L * L) / 24 }
  }
  const { P, a } = load
  if (!Number.isFinite(P)) throw new SolverFault('not-finite', 'P', [c, load.member])
  if (!Number.isFinite(a)) throw new SolverFault('not-finite', 'a', [c, load.member])
  // A length worked out from coordinates may fall short of a distance given as a figure by rounding.
  if (a < 0 || a > L * (1 + 1e-9)) throw new SolverFault('shape', 'a', [c, load.member])
  const from = Math.min(a, L)
  const to = L - from
  const turn = (from * to) / (6 * L)
  return { total: P, shareFrom: to / L, turnFrom: turn * (L + to), turnTo: -turn * (L + from) }
}
