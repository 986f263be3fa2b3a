/**
 * Shapes that go in and out of the solver. Inside the solver everything is kN, m, rad and kNm; names are
 * bare. Signs: settlement and vertical displacement down positive, x to the right, rotations and end
 * moments clockwise positive and acting on the member's ends, axial force tension positive, reactions up positive.
 */

/** A plane frame as arrays. n nodes, m members, b bases (nodes that stand on a support). */
export interface FrameArrays {
  /** shape (n), m */
  x: Float64Array
  /** shape (n), m, upwards */
  z: Float64Array
  /** shape (m), node index */
  from: Int32Array
  /** shape (m), node index */
  to: Int32Array
  /** shape (m), kNm^2, above 0; stiffness factor included */
  EI: Float64Array
  /** shape (m), kN, above 0 */
  EA: Float64Array
  /** shape (m), kN, above 0; Infinity leaves shear deformation out */
  GAs: Float64Array
  /** shape (m), 1 where the member is pinned at its from end */
  pinFrom: Uint8Array
  /** shape (m), 1 where the member is pinned at its to end */
  pinTo: Uint8Array
  /** shape (b), node index; each node at most once */
  base: Int32Array
  /** shape (b), kNm/rad: Infinity fixed, 0 pinned, between: a rotational spring to the ground */
  baseSpring: Float64Array
}

/**
 * Response of a frame to c cases; every array is row-major, case by case.
 * A case is a unit settlement of one base (per m), the unit tilt (per rad) or a set of loads.
 */
export interface FrameResponse {
  cases: number
  /** shape (c, m), kNm */
  momentFrom: Float64Array
  /** shape (c, m), kNm */
  momentTo: Float64Array
  /** shape (c, m), kN, tension positive; at the from end where loads act along the member */
  axial: Float64Array
  /** shape (c, n), m, to the right */
  right: Float64Array
  /** shape (c, n), m, down positive */
  down: Float64Array
  /** shape (c, n), rad, clockwise; of a node at which nothing resists turning: 0 */
  rotation: Float64Array
  /** shape (c, b), kN, up positive, acting on the frame */
  reactionUp: Float64Array
  /** shape (c, b), kN, to the right, acting on the frame */
  reactionRight: Float64Array
  /** shape (c, b), kNm, clockwise, acting on the frame */
  reactionMoment: Float64Array
}

/** Loads of one case on a frame of n nodes. Gravity, down positive. */
export interface FrameLoads {
  /** shape (n), kN down */
  nodeDown: Float64Array
  /** Loads on members, in any order. */
  onMembers: readonly MemberLoadValue[]
}

export type MemberLoadValue =
  /** w in kN per metre of member, down positive, over the whole member */
  | { member: number; kind: 'uniform'; w: number }
  /** P in kN, down positive, at distance a from the from end, 0 <= a <= L */
  | { member: number; kind: 'point'; P: number; a: number }

/** A levelling network as arrays. r readings, s setups, p points. */
export interface SurveyArrays {
  /** shape (r), index of the setup that the reading belongs to */
  setup: Int32Array
  /** shape (r), index of the point read */
  point: Int32Array
  /** shape (r), staff reading in m */
  reading: Float64Array
  /** shape (r), variance in m^2, above 0 */
  variance: Float64Array
  /** shape (p), m: level of a held point, NaN for a point to be found */
  held: Float64Array
}

export type SolverFaultCode =
  /** an array has not the shape asked for */
  | 'shape'
  /** a value that must be above zero is not */
  | 'not-positive'
  /** a value is NaN or infinite where it may not be */
  | 'not-finite'
  /** a member joins a node to itself or has no length */
  | 'zero-length'
  /** nodes that can move freely, or almost freely */
  | 'mechanism'
  /** nodes joined to no base */
  | 'unsupported'
  /** points joined to no held point */
  | 'untied'

/** An expected fault of the solver's input: a code and indices, no words. */
export class SolverFault extends Error {
  readonly code: SolverFaultCode
  /** Which array or quantity. */
  readonly what: string
  /** Indices of the nodes, members, points or entries at fault. */
  readonly at: readonly number[]

  constructor(code: SolverFaultCode, what: string, at: readonly number[] = []) {
    super(`${code}: ${what}${at.length ? ` at ${at.join(', ')}` : ''}`)
    this.name = 'SolverFault'
    this.code = code
    this.what = what
    this.at = at
  }
}
