/** The profile solver against a dense solution assembled by another road (test/support/dense-frame.ts). */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { baseInfluence, factorFrame, loadResponse, tiltResponse, type FrameResponse } from '../../solver/index.ts'
import { denseResponse, type DenseResult } from '../support/dense-frame.ts'
import { apart, arraysOf, gridFrame, largest, loadedFrame, soundFrame } from '../support/made-frames.ts'

/** Both solutions lose the frame's condition number in digits: 1e4 to 1e6 of 1e-16. */
const CLOSE = 1e-8

function worstDifference(response: FrameResponse, c: number, dense: DenseResult): Record<string, number> {
  const found: Record<string, number> = {}
  // Either of forces and moments may be 0 but for rounding, and all of them where a part only turns: they are held
  // against each other over 1 m, and against 100 kN, which is little for 1 m of settlement.
  const forces = Math.max(100, largest(Object.values(dense).slice(0, 3).flat()))
  for (const kinds of [
    ['momentFrom', 'momentTo', 'reactionMoment'],
    ['axial', 'reactionUp', 'reactionRight'],
    ['right', 'down'],
    ['rotation'],
  ] as const) {
    const rows = kinds.map((kind) => {
      const size = response[kind].length / response.cases
      return [response[kind].subarray(c * size, (c + 1) * size), dense[kind]] as const
    })
    const own = Math.max(...rows.map(([, expected]) => largest(expected)))
    const scale = kinds[0] === 'rotation' ? Math.max(own, largest(dense.right), largest(dense.down)) : own
    const isForce = kinds[0] === 'momentFrom' || kinds[0] === 'axial'
    kinds.forEach((kind, i) => {
      const difference = apart(rows[i]![0], rows[i]![1], isForce ? forces : scale)
      if (!(difference < CLOSE)) found[kind] = difference
    })
  }
  return found
}

describe('the profile solver agrees with a dense solution by another road', () => {
  it('for a settlement of each base and for the tilt, on frames of every kind', () => {
    fc.assert(
      fc.property(soundFrame, (made) => {
        const frame = arraysOf(made)
        const f = factorFrame(frame)
        const influence = baseInfluence(f)
        for (let b = 0; b < frame.base.length; b++) {
          const settlement = Array.from(frame.base, (_, i) => Number(i === b))
          expect(worstDifference(influence, b, denseResponse(frame, { settlement }))).toEqual({})
        }
        expect(worstDifference(tiltResponse(f), 0, denseResponse(frame, { tilt: 1 }))).toEqual({})
      }),
      { numRuns: 60 },
    )
  })

  it('for loads at nodes and on members of any slope, with pins and shear', () => {
    fc.assert(
      fc.property(loadedFrame, ({ made, loads }) => {
        const frame = arraysOf(made)
        const response = loadResponse(factorFrame(frame), [loads])
        expect(worstDifference(response, 0, denseResponse(frame, { loads }))).toEqual({})
      }),
      { numRuns: 60 },
    )
  })

  it('for more cases than are solved in one pass', () => {
    const frame = arraysOf(gridFrame(6, 4))
    const influence = baseInfluence(factorFrame(frame))
    const settlement = [0, 0, 0, 0, 0, 1]
    expect(worstDifference(influence, 5, denseResponse(frame, { settlement }))).toEqual({})
  })
})
