/**
 * Finds out from a small pivot whether a frame can move freely, and which nodes do.
 *
 * A pivot is the energy of one motion: its row moves by 1 and the rows before follow without force. It is
 * held against what the same movements would take if each were made alone, against the node's full stiffness
 * (both directions together, so that the turn of the axes plays no part). That share is 0 but for
 * rounding where the frame is a mechanism; below MECHANISM the results would be noise, so that a
 * near-mechanism is refused as well.
 */
import { SolverFault } from '../types.ts'
import { followingMotion, type Profile } from './profile.ts'

/** Share of energy below which a motion counts as free. A sound column cut into 400 pieces has 2e-11. */
const MECHANISM = 1e-11

/** Pivots above this share of their own stiffness are not looked into. */
const SUSPECT = 1e-5

/** A node that moves less than this share of the most moved one is not named. */
const NAMED = 1e-3

/** Free movement of each row: its node, and 0 right, 1 down, 2 turning. */
export interface Freedoms {
  node: Int32Array
  direction: Uint8Array
}

export interface PivotJudge {
  judge: (row: number, pivot: number) => number
  /** Throws `mechanism` with the nodes of every free motion that was found. */
  requireStable: () => void
}

/**
 * @param stiffness shape (rows): what each movement alone takes, before the factorisation
 */
export function pivotJudge(profile: Profile, freedoms: Freedoms, stiffness: Float64Array): PivotJudge {
  const named = new Set<number>()

  function judge(row: number, pivot: number): number {
    const alone = stiffness[row]
    if (pivot > SUSPECT * alone) return pivot
    const motion = followingMotion(profile, row)
    let apart = 0
    for (let i = 0; i <= row; i++) apart += motion[i] * motion[i] * stiffness[i]
    if (pivot > MECHANISM * apart) return pivot
    nameNodes(motion)
    // Held here, the rest of the frame can be looked into for further free motions.
    return alone > 0 ? alone : 1
  }

  function nameNodes(motion: Float64Array): void {
    let most = 0
    for (let i = 0; i < motion.length; i++) if (freedoms.direction[i] < 2) most = Math.max(most, Math.abs(motion[i]))
    for (let i = 0; i < motion.length; i++) {
      const moves = freedoms.direction[i] < 2 ? Math.abs(motion[i]) > NAMED * most : most === 0 && motion[i] !== 0
      if (moves) named.add(freedoms.node[i])
    }
  }

  function requireStable(): void {
    if (named.size)
      throw new SolverFault(
        'mechanism',
        'node',
        Array.from(named).sort((a, b) => a - b),
      )
  }

  return { judge, requireStable }
}
