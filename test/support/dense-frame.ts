/**
 * The displacement method once more, by another road, to hold the solver against: x right, z up, turns
 * anticlockwise; 6 x 6 member matrices turned by T'kT; a pinned end has a rotation of its own instead of
 * being condensed; fixed-end forces from handbook formulas; one dense matrix solved by ml-matrix.
 */
import { inverse, LuDecomposition, Matrix } from 'ml-matrix'
import type { FrameArrays, FrameLoads } from '../../solver/index.ts'

export interface DenseSystem {
  /** All movements: 3 a node, then one for each pinned end. */
  size: number
  whole: Matrix
  free: number[]
  held: number[]
  /** shape (6): place of each of a member's movements */
  places: number[][]
}

export interface DenseCase {
  /** shape (b), m, down */
  settlement?: ArrayLike<number>
  /** rad, clockwise */
  tilt?: number
  loads?: FrameLoads
}

/** The same keys and signs as one case of a FrameResponse. */
export interface DenseResult {
  momentFrom: number[]
  momentTo: number[]
  axial: number[]
  right: number[]
  down: number[]
  rotation: number[]
  reactionUp: number[]
  reactionRight: number[]
  reactionMoment: number[]
}

export function denseSystem(frame: FrameArrays): DenseSystem {
  const n = frame.x.length
  const places: number[][] = []
  let size = 3 * n
  for (let i = 0; i < frame.from.length; i++) {
    const [a, b] = [frame.from[i]!, frame.to[i]!]
    places.push([
      3 * a,
      3 * a + 1,
      frame.pinFrom[i] ? size++ : 3 * a + 2,
      3 * b,
      3 * b + 1,
      frame.pinTo[i] ? size++ : 3 * b + 2,
    ])
  }
  const whole = Matrix.zeros(size, size)
  for (let i = 0; i < frame.from.length; i++) {
    const T = turn(frame, i)
    const k = T.transpose().mmul(localStiffness(frame, i)).mmul(T)
    places[i]!.forEach((r, p) => places[i]!.forEach((c, q) => whole.set(r, c, whole.get(r, c) + k.get(p, q))))
  }
  const held: number[] = []
  frame.base.forEach((node, b) => {
    held.push(3 * node, 3 * node + 1)
    const spring = frame.baseSpring[b]!
    const place = 3 * node + 2
    if (spring === Infinity) held.push(place)
    else whole.set(place, place, whole.get(place, place) + spring)
  })
  const free: number[] = []
  for (let place = 0; place < size; place++) {
    if (held.includes(place)) continue
    free.push(place)
    // Nothing turns a rotation without stiffness; any number on the diagonal keeps it at rest.
    if (place % 3 === 2 && place < 3 * n && whole.get(place, place) === 0) whole.set(place, place, 1)
  }
  return { size, whole, free, held, places }
}

export function denseResponse(frame: FrameArrays, cases: DenseCase): DenseResult {
  const system = denseSystem(frame)
  const { size, whole, free, held, places } = system
  const m = frame.from.length
  const { settlement, tilt = 0, loads } = cases
  const moved = Matrix.zeros(size, 1)
  const mean = frame.base.reduce((sum, node) => sum + frame.z[node]!, 0) / frame.base.length
  const force = Matrix.zeros(size, 1)
  frame.base.forEach((node, b) => {
    moved.set(3 * node, 0, tilt * (frame.z[node]! - mean))
    moved.set(3 * node + 1, 0, -(settlement?.[b] ?? 0))
    const spring = frame.baseSpring[b]!
    if (spring === Infinity) moved.set(3 * node + 2, 0, -tilt)
    else force.set(3 * node + 2, 0, -tilt * spring)
  })
  const fixedEnd = Array.from({ length: m }, () => [0, 0, 0, 0, 0, 0])
  loads?.nodeDown.forEach((P, node) => force.set(3 * node + 1, 0, force.get(3 * node + 1, 0) - P))
  for (const load of loads?.onMembers ?? []) {
    const f = fixedEndForces(frame, load.member, load)
    f.forEach((v, p) => (fixedEnd[load.member]![p]! += v))
    const back = turn(frame, load.member).transpose().mmul(Matrix.columnVector(f))
    places[load.member]!.forEach((r, p) => force.set(r, 0, force.get(r, 0) - back.get(p, 0)))
  }
  if (free.length) {
    const stiffness = whole.subMatrixRow(free).subMatrixColumn(free)
    const known = held.length
      ? whole.subMatrixRow(free).subMatrixColumn(held).mmul(moved.subMatrixRow(held))
      : undefined
    const right = force.subMatrixRow(free)
    const solution = new LuDecomposition(stiffness).solve(known ? right.sub(known) : right)
    free.forEach((place, i) => moved.set(place, 0, solution.get(i, 0)))
  }

  const result: DenseResult = {
    momentFrom: [],
    momentTo: [],
    axial: [],
    right: [],
    down: [],
    rotation: [],
    reactionUp: [],
    reactionRight: [],
    reactionMoment: [],
  }
  for (let node = 0; node < frame.x.length; node++) {
    result.right.push(moved.get(3 * node, 0))
    result.down.push(-moved.get(3 * node + 1, 0))
    result.rotation.push(-moved.get(3 * node + 2, 0))
  }
  const held3 = Array.from({ length: frame.x.length }, () => [0, 0, 0])
  for (let i = 0; i < m; i++) {
    const own = Matrix.columnVector(places[i]!.map((place) => moved.get(place, 0)))
    const T = turn(frame, i)
    const f = localStiffness(frame, i).mmul(T).mmul(own).add(Matrix.columnVector(fixedEnd[i]!))
    result.axial.push(-f.get(0, 0))
    result.momentFrom.push(-f.get(2, 0))
    result.momentTo.push(-f.get(5, 0))
    const F = T.transpose().mmul(f)
    for (let p = 0; p < 3; p++) {
      held3[frame.from[i]!]![p]! += F.get(p, 0)
      held3[frame.to[i]!]![p]! += F.get(3 + p, 0)
    }
  }
  frame.base.forEach((node) => {
    result.reactionRight.push(held3[node]![0]!)
    result.reactionUp.push(held3[node]![1]! + (loads?.nodeDown[node] ?? 0))
    result.reactionMoment.push(-held3[node]![2]!)
  })
  return result
}

/** Rows and columns that move freely, and the right-hand sides of a unit settlement of each base. */
export function denseInfluenceProblem(frame: FrameArrays): { stiffness: Matrix; sides: Matrix } {
  const { whole, free } = denseSystem(frame)
  const stiffness = whole.subMatrixRow(free).subMatrixColumn(free)
  return {
    // Cholesky asks for symmetry to the last digit, which assembly by products does not keep.
    stiffness: Matrix.add(stiffness, stiffness.transpose()).mul(0.5),
    sides: whole.subMatrixRow(free).subMatrixColumn(Array.from(frame.base, (node) => 3 * node + 1)),
  }
}

function direction(frame: FrameArrays, i: number): { L: number; c: number; s: number } {
  const dx = frame.x[frame.to[i]!]! - frame.x[frame.from[i]!]!
  const dz = frame.z[frame.to[i]!]! - frame.z[frame.from[i]!]!
  const L = Math.sqrt(dx * dx + dz * dz)
  return { L, c: dx / L, s: dz / L }
}

function turn(frame: FrameArrays, i: number): Matrix {
  const { c, s } = direction(frame, i)
  return new Matrix([
    [c, s, 0, 0, 0, 0],
    [-s, c, 0, 0, 0, 0],
    [0, 0, 1, 0, 0, 0],
    [0, 0, 0, c, s, 0],
    [0, 0, 0, -s, c, 0],
    [0, 0, 0, 0, 0, 1],
  ])
}

/** By flexibility: the tip of a cantilever under axial force, shear and moment, inverted; then equilibrium. */
function localStiffness(frame: FrameArrays, i: number): Matrix {
  const { L } = direction(frame, i)
  const [EI, EA, GAs] = [frame.EI[i]!, frame.EA[i]!, frame.GAs[i]!]
  const tip = inverse(
    new Matrix([
      [L / EA, 0, 0],
      [0, L ** 3 / (3 * EI) + L / GAs, L ** 2 / (2 * EI)],
      [0, L ** 2 / (2 * EI), L / EI],
    ]),
  )
  const equilibrium = new Matrix([
    [-1, 0, 0],
    [0, -1, 0],
    [0, -L, -1],
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ])
  return equilibrium.mmul(tip).mmul(equilibrium.transpose())
}

/** Forces of fixed ends on the member, in its own axes: along, across (to the left), anticlockwise. */
function fixedEndForces(frame: FrameArrays, i: number, load: FrameLoads['onMembers'][number]): number[] {
  const { L, c, s } = direction(frame, i)
  if (load.kind === 'uniform') {
    const along = (load.w * s * L) / 2
    const across = (load.w * c * L) / 2
    const moment = (load.w * c * L * L) / 12
    return [along, across, moment, along, across, -moment]
  }
  const { P, a } = load
  const b = L - a
  const phi = (12 * frame.EI[i]!) / (frame.GAs[i]! * L * L)
  const from = (((P * c * a * b) / L ** 2) * (b + (phi * L) / 2)) / (1 + phi)
  const to = (((-P * c * a * b) / L ** 2) * (a + (phi * L) / 2)) / (1 + phi)
  const acrossTo = (P * c * a - from - to) / L
  return [(P * s * b) / L, P * c - acrossTo, from, (P * s * a) / L, acrossTo, to]
}
