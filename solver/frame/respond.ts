/**
 * From prescribed movements and loads to movements, end moments, axial forces and reactions. A response is
 * handed in with what is known from the start (movements of the bases, moments and axial forces of members
 * held at both ends) and is completed case by case, LANES cases a pass over the factors.
 */
import type { FrameResponse } from '../types.ts'
import type { FactoredFrame } from './factor.ts'
import { LANES, solveProfile } from './profile.ts'

export function emptyResponse({ frame }: FactoredFrame, cases: number): FrameResponse {
  const n = frame.x.length
  const m = frame.from.length
  const b = frame.base.length
  return {
    cases,
    momentFrom: new Float64Array(cases * m),
    momentTo: new Float64Array(cases * m),
    axial: new Float64Array(cases * m),
    right: new Float64Array(cases * n),
    down: new Float64Array(cases * n),
    rotation: new Float64Array(cases * n),
    reactionUp: new Float64Array(cases * b),
    reactionRight: new Float64Array(cases * b),
    reactionMoment: new Float64Array(cases * b),
  }
}

/**
 * Completes a response in place and returns it.
 *
 * @param response right, down, rotation: the bases' prescribed movements, 0 elsewhere; momentFrom, momentTo,
 *                 axial: of members held at both ends, 0 without loads; reactions 0
 * @param nodeDown shape (c, n): loads at the nodes and the members' shares of theirs, kN down; left out: none
 * @param groundRotation rotation of the ground ends of base springs, rad
 */
export function respond(
  f: FactoredFrame,
  response: FrameResponse,
  nodeDown?: Float64Array,
  groundRotation = 0,
): FrameResponse {
  const n = f.frame.x.length
  const forces = new Float64Array(3 * n)
  const x = new Float64Array(LANES * f.profile.rows)
  for (let begin = 0; begin < response.cases; begin += LANES) {
    const end = Math.min(begin + LANES, response.cases)
    x.fill(0)
    for (let c = begin; c < end; c++) {
      resistance(f, response, c, groundRotation, forces, false)
      for (let node = 0; node < n; node++) {
        for (let d = 0; d < 3; d++) {
          const row = f.row[3 * node + d]
          if (row < 0) continue
          const load = d === 1 && nodeDown ? nodeDown[c * n + node] : 0
          x[LANES * row + (c - begin)] = load - forces[3 * node + d]
        }
      }
    }
    solveProfile(f.profile, x)
    for (let c = begin; c < end; c++) {
      for (let node = 0; node < n; node++) {
        const right = f.row[3 * node]
        const down = f.row[3 * node + 1]
        const turn = f.row[3 * node + 2]
        if (right >= 0) response.right[c * n + node] += x[LANES * right + (c - begin)]
        if (down >= 0) response.down[c * n + node] += x[LANES * down + (c - begin)]
        if (turn >= 0) response.rotation[c * n + node] += x[LANES * turn + (c - begin)]
      }
      resistance(f, response, c, groundRotation, forces, true)
      react(f, response, c, forces, nodeDown, groundRotation)
    }
  }
  return response
}

/**
 * Forces that hold every node in the present movements of case c: right, down, clockwise, shape (3n). With
 * `keep` the members' forces are written into the response; until then it holds those of held ends.
 */
function resistance(
  { frame, members, row }: FactoredFrame,
  response: FrameResponse,
  c: number,
  groundRotation: number,
  forces: Float64Array,
  keep: boolean,
): void {
  const m = frame.from.length
  const n = frame.x.length
  const { from, to } = frame
  const { length, right, down, stretch, bend } = members
  forces.fill(0)
  for (let i = 0; i < m; i++) {
    const a = from[i]
    const b = to[i]
    const rightApart = response.right[c * n + b] - response.right[c * n + a]
    const downApart = response.down[c * n + b] - response.down[c * n + a]
    const axial = stretch[i] * (right[i] * rightApart + down[i] * downApart)
    const chord = (right[i] * downApart - down[i] * rightApart) / length[i]
    const turnFrom = response.rotation[c * n + a] - chord
    const turnTo = response.rotation[c * n + b] - chord
    const momentFrom = response.momentFrom[c * m + i] + (bend[3 * i] * turnFrom + bend[3 * i + 1] * turnTo)
    const momentTo = response.momentTo[c * m + i] + (bend[3 * i + 1] * turnFrom + bend[3 * i + 2] * turnTo)
    // Axial force and the couple of the end moments at the `to` end; the opposite at the `from` end.
    const couple = (momentFrom + momentTo) / length[i]
    const forceRight = right[i] * axial + down[i] * couple
    const forceDown = down[i] * axial - right[i] * couple
    forces[3 * a] -= forceRight
    forces[3 * a + 1] -= forceDown
    forces[3 * a + 2] += momentFrom
    forces[3 * b] += forceRight
    forces[3 * b + 1] += forceDown
    forces[3 * b + 2] += momentTo
    if (keep) {
      response.momentFrom[c * m + i] = momentFrom
      response.momentTo[c * m + i] = momentTo
      response.axial[c * m + i] += axial
    }
  }
  for (let b = 0; b < frame.base.length; b++) {
    const node = frame.base[b]
    if (row[3 * node + 2] >= 0)
      forces[3 * node + 2] += frame.baseSpring[b] * (response.rotation[c * n + node] - groundRotation)
  }
}

function react(
  { frame, row }: FactoredFrame,
  response: FrameResponse,
  c: number,
  forces: Float64Array,
  nodeDown: Float64Array | undefined,
  groundRotation: number,
): void {
  const n = frame.x.length
  const count = frame.base.length
  for (let b = 0; b < count; b++) {
    const node = frame.base[b]
    const at = c * count + b
    response.reactionRight[at] = forces[3 * node]
    response.reactionUp[at] = (nodeDown ? nodeDown[c * n + node] : 0) - forces[3 * node + 1]
    if (frame.baseSpring[b] === Infinity) response.reactionMoment[at] = forces[3 * node + 2]
    else if (row[3 * node + 2] >= 0)
      response.reactionMoment[at] = frame.baseSpring[b] * (groundRotation - response.rotation[c * n + node])
  }
}
