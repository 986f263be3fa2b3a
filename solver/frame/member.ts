/**
 * What one prismatic member does at its two ends. kN, m, rad; rotations and end moments clockwise positive,
 * settlement down positive.
 *
 * A member is known to the rest of the solver by three numbers, its end stiffness against the chord:
 *
 *     M_from = kii (t_from - psi) + kij (t_to - psi)
 *     M_to   = kij (t_from - psi) + kjj (t_to - psi)
 *
 * so that pins, shear flexibility and whatever makes a member other than prismatic only change these three.
 */
import { SolverFault } from '../types.ts'

export interface Member {
  /** m, above 0 */
  L: number
  /** kNm^2, above 0 */
  EI: number
  /** kN, above 0; Infinity leaves shear deformation out */
  GAs: number
  pinFrom?: boolean
  pinTo?: boolean
}

/**
 * End stiffness of a prismatic member against its chord.
 *
 *     phi = 12 EI / (GAs L^2)                       shear flexibility; 0 for GAs = Infinity
 *     kii = kjj = (4 + phi) / (1 + phi) EI / L      2 pins: 0; 1 pin: 3 EI / (L (1 + phi / 4)) at the other end
 *     kij       = (2 - phi) / (1 + phi) EI / L      any pin: 0
 *
 * A pinned end is taken out by static condensation of the three numbers.
 *
 * @param member L > 0 [m]; EI > 0 [kNm^2]; GAs > 0 [kN], Infinity to leave shear out; pinFrom, pinTo
 * @param out    shape (3), overwritten and returned; allocated when left out
 * @returns      shape (3): kii, kij, kjj [kNm/rad]
 * @throws SolverFault `not-positive` or `not-finite` naming L, EI or GAs; `shape` when out is not of length 3
 * @source  G. A. Maney, Studies in Engineering No. 1, Univ. of Minnesota, 1915 (4, 2, 3);
 *          J. S. Przemieniecki, Theory of Matrix Structural Analysis, 1968 (shear term); both from memory
 * @example
 *     memberStiffness({ L: 6, EI: 162e3, GAs: Infinity })                   // [108000, 54000, 108000]
 *     memberStiffness({ L: 6, EI: 162e3, GAs: Infinity, pinFrom: true })    // [0, 0, 81000]
 *     memberStiffness({ L: 3, EI: 1, GAs: 12 / (0.1152 * 9) })              // [1.23003, 0.56337, 1.23003]
 */
export function memberStiffness(member: Member, out: Float64Array = new Float64Array(3)): Float64Array {
  const { L, EI, GAs } = member
  requirePositive('L', L)
  requirePositive('EI', EI)
  if (GAs !== Infinity) requirePositive('GAs', GAs)
  if (out.length !== 3) throw new SolverFault('shape', 'out')
  return endStiffness(L, EI, GAs, member.pinFrom === true, member.pinTo === true, out, 0)
}

/** The same without checks, written to out[at], out[at + 1], out[at + 2]. */
export function endStiffness(
  L: number,
  EI: number,
  GAs: number,
  pinFrom: boolean,
  pinTo: boolean,
  out: Float64Array,
  at: number,
): Float64Array {
  const phi = GAs === Infinity ? 0 : (12 * EI) / (GAs * L * L)
  const unit = EI / (L * (1 + phi))
  let kii = (4 + phi) * unit
  let kij = (2 - phi) * unit
  let kjj = kii
  if (pinFrom) {
    kjj -= (kij * kij) / kii
    kii = kij = 0
  }
  if (pinTo) {
    kii = pinFrom ? 0 : kii - (kij * kij) / kjj
    kij = kjj = 0
  }
  out[at] = kii
  out[at + 1] = kij
  out[at + 2] = kjj
  return out
}

/**
 * End moments that the settlement of a member's two ends alone induces, ends held against the tilt.
 *
 *     psi = (w_to - w_from) / L - tilt             chord rotation against the tilt
 *     phi = 12 EI / (GAs L^2)                      shear flexibility; 0 for GAs = Infinity
 *     both ends fixed:  M_from = M_to = -6 EI psi / (L (1 + phi))
 *     one end pinned:   M at the other end = -3 EI psi / (L (1 + phi / 4))
 *
 * Elastic, small displacements, prismatic, no load between the ends. Frames are solved by stiffness
 * (respond.ts); this closed form stays because it can be checked by hand and tests hold the two together.
 *
 * Signs: settlement down +; rotation and end moments clockwise +, acting on the member's ends. A right
 * end that settles more gives two negative moments: hogging at the left end, sagging at the right.
 *
 * @param member     L > 0 [m]; EI > 0 [kNm^2]; GAs > 0 [kN], Infinity to leave shear out; pinFrom, pinTo
 * @param settlement shape (2): w_from, w_to [m], down +, finite
 * @param tilt       rotation of the ground plane along the member [rad], clockwise +; default 0
 * @param out        shape (2), overwritten and returned; allocated when left out
 * @returns          shape (2): M_from, M_to [kNm], clockwise +
 * @throws SolverFault `shape` when settlement or out is not of length 2; `not-positive` naming L, EI or
 *                   GAs; `not-finite` naming the entry
 * @source  G. A. Maney, Studies in Engineering No. 1, Univ. of Minnesota, 1915 (slope-deflection);
 *          J. S. Przemieniecki, Theory of Matrix Structural Analysis, 1968 (shear term)
 * @example
 *     settlementEndMoments({ L: 6, EI: 162e3, GAs: Infinity }, [0, 0.010])                 // [-270, -270]
 *     settlementEndMoments({ L: 6, EI: 162e3, GAs: Infinity, pinTo: true }, [0, 0.010])    // [-135, 0]
 *     settlementEndMoments({ L: 6, EI: 162e3, GAs: 1.875e6 }, [0, 0.010])                  // [-262.442, -262.442]
 */
export function settlementEndMoments(
  member: Member,
  settlement: ArrayLike<number>,
  tilt = 0,
  out: Float64Array = new Float64Array(2),
): Float64Array {
  if (settlement.length !== 2) throw new SolverFault('shape', 'settlement')
  if (out.length !== 2) throw new SolverFault('shape', 'out')
  const { L, EI, GAs, pinFrom = false, pinTo = false } = member
  requirePositive('L', L)
  requirePositive('EI', EI)
  if (GAs !== Infinity) requirePositive('GAs', GAs)
  for (let end = 0; end < 2; end++)
    if (!Number.isFinite(settlement[end])) throw new SolverFault('not-finite', 'settlement', [end])
  if (!Number.isFinite(tilt)) throw new SolverFault('not-finite', 'tilt')

  const psi = (settlement[1]! - settlement[0]!) / L - tilt
  const phi = GAs === Infinity ? 0 : (12 * EI) / (GAs * L * L)
  const pins = Number(pinFrom) + Number(pinTo)
  const moment = pins === 0 ? (-6 * EI * psi) / (L * (1 + phi)) : (-3 * EI * psi) / (L * (1 + phi / 4))
  out[0] = pinFrom || pins === 2 ? 0 : moment
  out[1] = pinTo || pins === 2 ? 0 : moment
  return out
}

function requirePositive(what: string, value: number): void {
  if (!Number.isFinite(value)) throw new SolverFault('not-finite', what)
  if (!(value > 0)) throw new SolverFault('not-positive', what)
}
