/**
 * Worked examples and closed forms for settlement in frames; numbers and marks as in the design's facts, section 5.
 * Units of the first and fourth are kip and foot: the solver takes any one set of units.
 */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  baseInfluence,
  factorFrame,
  loadResponse,
  memberStiffness,
  settlementEndMoments,
  type FrameResponse,
} from '../../solver/index.ts'
import { arraysOf, continuousBeam, FIXED, PINNED, type MadeFrame } from '../support/made-frames.ts'

/** M_from, M_to of every member in turn, case c. */
function endMoments(response: FrameResponse, c = 0): number[] {
  const m = response.momentFrom.length / response.cases
  return Array.from({ length: m }, (_, i) => [response.momentFrom[c * m + i]!, response.momentTo[c * m + i]!]).flat()
}

function sum(a: readonly number[], b: readonly number[], factor: number): number[] {
  return a.map((v, i) => v + factor * b[i]!)
}

function near(values: readonly number[], digits: number): unknown[] {
  return values.map((v) => expect.closeTo(v, digits))
}

describe('published continuous beams', () => {
  it('Hibbeler, Structural Analysis, example 11.4 (from memory, recomputed): load on one span, one support sinks', () => {
    const EI = (29_000 * 1500) / 144
    const f = factorFrame(arraysOf(continuousBeam([0, 24, 44, 59], EI, [FIXED, FIXED])))
    const load = loadResponse(f, [
      { nodeDown: new Float64Array(4), onMembers: [{ member: 0, kind: 'uniform', w: 1.5 }] },
    ])
    const found = sum(endMoments(load), endMoments(baseInfluence(f), 2), 0.1)
    expect(found).toEqual(near([38.22, 292.45, -292.45, -528.58, 528.58, 667.07], 2))
    expect(found.map((M) => Number(M.toPrecision(3)))).toEqual([38.2, 292, -292, -529, 529, 667])
  })

  it('Kassimali, Structural Analysis, examples 15.5 and 16.5 (answers from memory, recomputed): support B sinks 20 mm', () => {
    const EI = 70e6 * 800e-6
    const f = factorFrame(arraysOf(continuousBeam([0, 8, 16, 24], EI, [FIXED, FIXED])))
    const influence = baseInfluence(f)
    // fixed-end moments 105 (seen in the source), then the answers with anticlockwise positive
    expect(settlementEndMoments({ L: 8, EI, GAs: Infinity }, [0, 0.02])[0]).toBeCloseTo(-105, 10)
    const anticlockwise = endMoments(influence, 1).map((M) => -0.02 * M)
    expect(anticlockwise).toEqual(near([98, 91, -91, -56, 56, 28], 9))
    const reactions = Array.from(influence.reactionUp.subarray(4, 8), (R) => 0.02 * R)
    expect(reactions).toEqual(near([23.625, -42, 28.875, -10.5], 9))
  })

  it('Kassimali, appendix D, example D.3 (seen in the source): three moments with an overhang', () => {
    const made: MadeFrame = {
      nodes: [
        [0, 0],
        [20, 0],
        [50, 0],
        [60, 0],
      ],
      members: [0, 1, 2].map((i) => ({ from: i, to: i + 1, EI: 1e5, EA: 1e6 })),
      bases: [
        [0, FIXED],
        [1, PINNED],
        [2, PINNED],
      ],
    }
    const response = loadResponse(factorFrame(arraysOf(made)), [
      {
        nodeDown: Float64Array.of(0, 0, 0, 9),
        onMembers: [
          { member: 0, kind: 'point', P: 45, a: 10 },
          { member: 1, kind: 'uniform', w: 1.8 },
        ],
      },
    ])
    expect(endMoments(response)).toEqual(near([-97.5, 142.5, -142.5, 90, -90, 0], 9))
  })

  it('propped cantilever: the reaction falls by 3EI/L^3 and the fixed end changes by 3EI/L^2 (handbook)', () => {
    const [EI, L] = [4e4, 5]
    const r = baseInfluence(factorFrame(arraysOf(continuousBeam([0, L], EI, [FIXED, PINNED]))))
    expect([r.reactionUp[3], r.momentFrom[1]]).toEqual(near([(-3 * EI) / L ** 3, (-3 * EI) / L ** 2], 9))
  })

  it('equal spans on pins: the middle support sinks 1 (facts section 5, computed)', () => {
    const [EI, L] = [3e4, 6]
    const two = baseInfluence(factorFrame(arraysOf(continuousBeam([0, L, 2 * L], EI, [PINNED, PINNED]))))
    expect((-endMoments(two, 1)[1]! * L * L) / EI).toBeCloseTo(3, 9)
    const three = endMoments(
      baseInfluence(factorFrame(arraysOf(continuousBeam([0, L, 2 * L, 3 * L], EI, [PINNED, PINNED])))),
      1,
    )
    expect([three[1]!, three[3]!].map((M) => (-M * L * L) / EI)).toEqual(near([3.6, -2.4], 9))
  })

  it('every inner support of any continuous beam satisfies the equation of three moments (Clapeyron)', () => {
    const span = fc.record({
      L: fc.integer({ min: 20, max: 120 }).map((v) => v / 10),
      w: fc.integer({ min: -30, max: 30 }),
      P: fc.integer({ min: -90, max: 90 }),
      k: fc.integer({ min: 0, max: 20 }).map((v) => v / 20),
      settlement: fc.integer({ min: -50, max: 50 }).map((v) => v / 1000),
    })
    const ends = fc.tuple(fc.constantFrom(FIXED, PINNED), fc.constantFrom(FIXED, PINNED))
    fc.assert(
      fc.property(fc.array(span, { minLength: 2, maxLength: 6 }), ends, (spans, fixity) => {
        const EI = 5e4
        const places = spans.reduce((xs, s) => [...xs, xs.at(-1)! + s.L], [0])
        const f = factorFrame(arraysOf(continuousBeam(places, EI, fixity)))
        const onMembers = spans.flatMap(({ w, P, k, L }, member) => [
          { member, kind: 'uniform' as const, w },
          { member, kind: 'point' as const, P, a: Math.min(k * L, places[member + 1]! - places[member]!) },
        ])
        const influence = baseInfluence(f)
        let moments = endMoments(loadResponse(f, [{ nodeDown: new Float64Array(places.length), onMembers }]))
        const down = [0, ...spans.map((s) => s.settlement)]
        down.forEach((w, b) => (moments = sum(moments, endMoments(influence, b), w)))
        for (let c = 1; c < spans.length; c++) {
          const [l, r] = [spans[c - 1]!, spans[c]!]
          const [left, here, right] = [moments[2 * c - 2]!, -moments[2 * c - 1]!, -moments[2 * c + 1]!]
          const turn = 6 * EI * ((down[c - 1]! - down[c]!) / l.L + (down[c + 1]! - down[c]!) / r.L)
          // k counts from the outer end of each span
          const points = l.P * l.L ** 2 * l.k * (1 - l.k ** 2) + r.P * r.L ** 2 * (1 - r.k) * (1 - (1 - r.k) ** 2)
          const uniform = (l.w * l.L ** 3 + r.w * r.L ** 3) / 4
          const carried = left * l.L + 2 * here * (l.L + r.L) + right * r.L
          expect(carried + points + uniform + turn).toBeCloseTo(0, 5)
        }
      }),
    )
  })
})

describe('published frames', () => {
  it('Kassimali 6th ed., problem 15.22 (terms seen in the source; answers with D fixed computed): a column sinks under two beams', () => {
    const EI = 200e6 * 1360e-6
    const member = { L: 5, EI, GAs: Infinity }
    const [kii, kij] = memberStiffness(member)
    const chord = settlementEndMoments(member, [0, 0.006])[0]!
    expect([kii, kij, -chord, -chord + (18 * 25) / 12]).toEqual(near([217_600, 108_800, 391.7, 429.2], 1))
    const made: MadeFrame = {
      nodes: [
        [5, -5],
        [0, 0],
        [5, 0],
        [10, 0],
      ],
      members: [
        [0, 2],
        [1, 2],
        [2, 3],
      ].map(([from, to]) => ({ from: from!, to: to!, EI, EA: 1e12 })),
      bases: [
        [0, FIXED],
        [1, FIXED],
        [3, FIXED],
      ],
    }
    const f = factorFrame(arraysOf(made))
    const load = loadResponse(f, [
      { nodeDown: new Float64Array(4), onMembers: [{ member: 1, kind: 'uniform', w: 18 }] },
    ])
    const anticlockwise = sum(endMoments(load), endMoments(baseInfluence(f), 0), 0.006).map((M) => -M)
    expect(anticlockwise).toEqual(near([6.25, 12.5, 435.43, 366.68, -379.18, -385.43], 2))
  })

  function portal(spring: number): MadeFrame {
    return {
      nodes: [
        [0, 0],
        [0, 4],
        [6, 4],
        [6, 0],
      ],
      members: [
        { from: 0, to: 1, EI: 20_000, EA: 1e11 },
        { from: 1, to: 2, EI: 30_000, EA: 1e11 },
        { from: 3, to: 2, EI: 20_000, EA: 1e11 },
      ],
      bases: [
        [0, spring],
        [3, spring],
      ],
    }
  }

  it('portal on fixed bases, one sinks (closed form, computed two ways): the same moment at all four sections', () => {
    const r = baseInfluence(factorFrame(arraysOf(portal(FIXED))))
    const k = (30 / 20) * (4 / 6)
    const M = (6 * 30_000 * 0.02) / 6 ** 2 / (1 + 6 * k)
    expect(M).toBeCloseTo(100 / 7, 10)
    expect(endMoments(r, 1).map((v) => 0.02 * v)).toEqual(near([-M, M, -M, -M, -M, M], 5))
    expect([r.right[5]! * 20, r.right[6]! * 20]).toEqual(near([5.714, 5.714], 3))
    expect([r.reactionUp[2]! * 0.02, r.reactionUp[3]! * 0.02]).toEqual(near([4.762, -4.762], 3))
  })

  it('portal on pinned bases, one sinks (closed form): it sways and takes no moment', () => {
    const r = baseInfluence(factorFrame(arraysOf(portal(PINNED))))
    expect(endMoments(r, 1).map((v) => 0.02 * v)).toEqual(near([0, 0, 0, 0, 0, 0], 6))
    expect(r.right[5]).toBeCloseTo(4 / 6, 8)
  })

  it('two bays on fixed bases, the centre sinks (closed form): theta = 6 k_b psi / (4 k_b + 4 k_c)', () => {
    const made: MadeFrame = {
      nodes: [
        [0, 0],
        [6, 0],
        [12, 0],
        [0, 4],
        [6, 4],
        [12, 4],
      ],
      members: [
        ...[0, 1, 2].map((i) => ({ from: i, to: i + 3, EI: 20_000, EA: 1e11 })),
        ...[3, 4].map((i) => ({ from: i, to: i + 1, EI: 30_000, EA: 1e11 })),
      ],
      bases: [
        [0, FIXED],
        [1, FIXED],
        [2, FIXED],
      ],
    }
    const moments = endMoments(baseInfluence(factorFrame(arraysOf(made))), 1).map((v) => 0.02 * v)
    const [kb, kc, psi] = [30_000 / 6, 20_000 / 4, 0.02 / 6]
    const top = 4 * kc * ((6 * kb * psi) / (4 * kb + 4 * kc))
    expect(top).toBeCloseTo(50, 10)
    expect(moments).toEqual(near([25, 50, 0, 0, -25, -50, -50, -75, 75, 50], 4))
  })
})
