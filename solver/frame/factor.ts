/** A frame made ready for any number of cases: numbered, ordered, assembled and factorised once. kN, m, rad. */
import type { FrameArrays } from '../types.ts'
import { assemble, freeMovements, memberArrays, numberMovements, type MemberArrays } from './assemble.ts'
import { nodeGraph, requireSupport } from './connect.ts'
import { pivotJudge } from './mechanism.ts'
import { emptyProfile, factoriseProfile, type Profile } from './profile.ts'
import { validateFrame } from './validate.ts'

export interface FactoredFrame {
  /** The arrays given; they are not copied and must not be changed afterwards. */
  readonly frame: FrameArrays
  readonly members: MemberArrays
  /** shape (3n): row of each movement in the matrix; -1 where it is prescribed or left out */
  readonly row: Int32Array
  /** The factors. */
  readonly profile: Profile
}

/**
 * The frame numbered, ordered, assembled and factorised, ready for baseInfluence, tiltResponse and
 * loadResponse.
 *
 * Work grows as number of nodes times the square of the nodes across the frame's narrow side. The arrays are
 * kept, not copied.
 *
 * @param frame shapes, units and signs as FrameArrays; base nodes have right and down prescribed; their
 *              rotation is prescribed where baseSpring is Infinity, sprung above 0, free at 0
 * @throws SolverFault `shape` naming the array (lengths; node indices out of range; a base named twice);
 *         `not-finite`, `not-positive` naming array and entries; `zero-length` with members; `unsupported` with
 *         the nodes that no path of members joins to a base; `mechanism` with the nodes that can
 *         move freely, or so nearly freely that figures would be noise
 * @source  displacement method, common practice; J. S. Przemieniecki, Theory of Matrix Structural Analysis,
 *          1968 (member with shear); A. George and J. W. H. Liu 1981 (profile factorisation); from memory
 */
export function factorFrame(frame: FrameArrays): FactoredFrame {
  validateFrame(frame)
  const graph = nodeGraph(frame)
  requireSupport(graph, frame.base)
  const members = memberArrays(frame)
  const free = freeMovements(frame, members)
  const { row, freedoms, first } = numberMovements(graph, frame, free)
  const profile = emptyProfile(first)
  assemble(profile, frame, members, row)
  const pivots = pivotJudge(profile, freedoms, stiffnessAlone(profile.diagonal, row))
  factoriseProfile(profile, pivots.judge)
  pivots.requireStable()
  return { frame, members, row, profile }
}

/** What each movement alone takes; right and down of a node together, so that the axes play no part. */
function stiffnessAlone(diagonal: Float64Array, row: Int32Array): Float64Array {
  const alone = diagonal.slice()
  for (let node = 0; 3 * node < row.length; node++) {
    const right = row[3 * node]
    const down = row[3 * node + 1]
    if (right >= 0 && down >= 0) alone[right] = alone[down] = diagonal[right] + diagonal[down]
  }
  return alone
}
