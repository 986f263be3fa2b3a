/** The member's closed forms, and what a frame must do that can be worked out by hand. */
import { describe, expect, it } from 'vitest'
import {
  baseInfluence,
  factorFrame,
  loadResponse,
  memberStiffness,
  settlementEndMoments,
  SolverFault,
  tiltResponse,
  type Member,
} from '../../solver/index.ts'
import { apart, arraysOf, continuousBeam, FIXED, gridFrame, PINNED } from '../support/made-frames.ts'

const BEAM: Member = { L: 5, EI: 40_000, GAs: Infinity }
const ROUNDING = 1e-12

function faultOf(act: () => unknown): unknown {
  try {
    act()
  } catch (fault) {
    if (fault instanceof SolverFault) return [fault.code, fault.what, ...fault.at]
    throw fault
  }
  return 'no fault'
}

describe('a prismatic member', () => {
  // Slope-deflection: common practice; Maney 1915 (facts.md section 5).
  it.each([
    ['both ends fixed: 4 EI/L and 2 EI/L', {}, [4, 2, 4]],
    ['pinned at the far end: 3 EI/L', { pinTo: true }, [3, 0, 0]],
    ['pinned at the near end: 3 EI/L at the other', { pinFrom: true }, [0, 0, 3]],
    ['pinned at both ends: nothing', { pinFrom: true, pinTo: true }, [0, 0, 0]],
  ])('%s', (_, pins, coefficients) => {
    const found = memberStiffness({ ...BEAM, ...pins }).map((k) => (k * BEAM.L) / BEAM.EI)
    expect(apart(found, coefficients)).toBeLessThan(ROUNDING)
  })

  it('6 EI/L for a unit chord rotation, 3 EI/L with one end pinned, none with two', () => {
    function unit(member: Partial<Member>): number[] {
      return Array.from(settlementEndMoments({ ...BEAM, ...member }, [0, BEAM.L]), (M) => (M * BEAM.L) / BEAM.EI)
    }
    expect([unit({}), unit({ pinTo: true }), unit({ pinFrom: true }), unit({ pinFrom: true, pinTo: true })]).toEqual([
      [-6, -6],
      [-3, 0],
      [0, -3],
      [0, 0],
    ])
  })

  it('with shear has the coefficients of Timoshenko theory', () => {
    // facts.md section 6 (computed): L 3 m, 0.3 x 0.6 m, nu 0.2: phi 0.1152; 3.6901, 1.6901; chord 5.3802
    const E = 30e6
    const deep = { L: 3, EI: (E * 0.3 * 0.6 ** 3) / 12, GAs: (E / 2.4) * (5 / 6) * 0.18 }
    const [kii, kij] = Array.from(memberStiffness(deep), (k) => (k * deep.L) / deep.EI)
    const chord = (-settlementEndMoments(deep, [0, 3])[0]! * deep.L) / deep.EI
    expect([kii, kij, chord].map((v) => v!.toFixed(4))).toEqual(['3.6901', '1.6901', '5.3802'])
    // and 3 EI/L / (1 + phi/4) where the far end is pinned
    const pinned = memberStiffness({ ...deep, pinTo: true })[0]!
    expect((pinned * deep.L) / deep.EI).toBeCloseTo(3 / (1 + 0.1152 / 4), 12)
  })

  it('takes no moment from a settlement that is nothing but the tilt', () => {
    expect(Array.from(settlementEndMoments(BEAM, [0.01, 0.035], 0.005))).toEqual([
      expect.closeTo(0, 9),
      expect.closeTo(0, 9),
    ])
  })

  it.each([
    ['length 0', () => memberStiffness({ ...BEAM, L: 0 }), ['not-positive', 'L']],
    ['negative stiffness', () => settlementEndMoments({ ...BEAM, EI: -1 }, [0, 0]), ['not-positive', 'EI']],
    ['shear stiffness that is no number', () => memberStiffness({ ...BEAM, GAs: NaN }), ['not-finite', 'GAs']],
    ['infinite stiffness', () => memberStiffness({ ...BEAM, EI: Infinity }), ['not-finite', 'EI']],
    ['one settlement only', () => settlementEndMoments(BEAM, [0]), ['shape', 'settlement']],
    ['a settlement that is no number', () => settlementEndMoments(BEAM, [0, NaN]), ['not-finite', 'settlement', 1]],
    ['a tilt that is no number', () => settlementEndMoments(BEAM, [0, 0], NaN), ['not-finite', 'tilt']],
    ['no room for the answer', () => settlementEndMoments(BEAM, [0, 0], 0, new Float64Array(1)), ['shape', 'out']],
    ['no room for the stiffness', () => memberStiffness(BEAM, new Float64Array(2)), ['shape', 'out']],
  ])('is refused with %s', (_, act, fault) => {
    expect(faultOf(act)).toEqual(fault)
  })
})

describe('a frame of one member', () => {
  it.each([
    ['fixed at both ends', FIXED, FIXED, {}],
    ['propped: pinned on its right support', FIXED, PINNED, { pinTo: true }],
    ['simply supported', PINNED, PINNED, { pinFrom: true, pinTo: true }],
  ])('%s has the end moments of the closed form', (_, left, right, pins) => {
    const response = baseInfluence(factorFrame(arraysOf(continuousBeam([0, 5], BEAM.EI, [left, right]))))
    const expected = [
      settlementEndMoments({ ...BEAM, ...pins }, [1, 0]),
      settlementEndMoments({ ...BEAM, ...pins }, [0, 1]),
    ]
    expect(apart(response.momentFrom, [expected[0]![0]!, expected[1]![0]!], BEAM.EI)).toBeLessThan(ROUNDING)
    expect(apart(response.momentTo, [expected[0]![1]!, expected[1]![1]!], BEAM.EI)).toBeLessThan(ROUNDING)
  })

  it('sinking at one end only: 6EI/L^2 at both ends and 12EI/L^3 in shear', () => {
    // facts.md 5.4, handbook case
    const response = baseInfluence(factorFrame(arraysOf(continuousBeam([0, 5], BEAM.EI, [FIXED, FIXED]))))
    expect([response.momentFrom[1], response.momentTo[1]]).toEqual([-9600, -9600])
    expect([response.reactionUp[2], response.reactionUp[3]]).toEqual([3840, -3840])
    expect([response.reactionMoment[2], response.reactionMoment[3]]).toEqual([-9600, -9600])
  })

  it('standing up as a column on one fixed base moves with it and takes no moment', () => {
    const made = {
      nodes: [
        [0, 0],
        [0, 3],
      ] as const,
      members: [{ from: 0, to: 1, EI: 1e4, EA: 1e6 }],
      bases: [[0, FIXED]] as const,
    }
    const f = factorFrame(arraysOf(made))
    expect(Array.from(baseInfluence(f).down)).toEqual([1, 1])
    const tilt = tiltResponse(f)
    expect(Array.from(tilt.right)).toEqual([0, expect.closeTo(3, 12)])
    expect(Array.from(tilt.rotation)).toEqual([1, expect.closeTo(1, 12)])
    expect(tilt.momentFrom[0]).toBeCloseTo(0, 9)
  })
})

describe('loads on members', () => {
  const L = 6
  const fixedBeam = factorFrame(arraysOf(continuousBeam([0, L], 4e4, [FIXED, FIXED])))
  const propped = factorFrame(arraysOf(continuousBeam([0, L], 4e4, [FIXED, PINNED])))
  const none = new Float64Array(2)

  it('fixed beam, uniform load: wL^2/12 at both ends, hogging', () => {
    // handbook, common practice
    const r = loadResponse(fixedBeam, [{ nodeDown: none, onMembers: [{ member: 0, kind: 'uniform', w: 10 }] }])
    expect([r.momentFrom[0], r.momentTo[0]]).toEqual([expect.closeTo(-30, 10), expect.closeTo(30, 10)])
    expect(Array.from(r.reactionUp)).toEqual([expect.closeTo(30, 10), expect.closeTo(30, 10)])
    expect(Array.from(r.reactionMoment)).toEqual([expect.closeTo(-30, 10), expect.closeTo(30, 10)])
  })

  it('fixed beam, point load: Pab^2/L^2 and Pa^2b/L^2', () => {
    // handbook, common practice
    const r = loadResponse(fixedBeam, [{ nodeDown: none, onMembers: [{ member: 0, kind: 'point', P: 9, a: 2 }] }])
    expect([r.momentFrom[0], r.momentTo[0]]).toEqual([expect.closeTo(-8, 10), expect.closeTo(4, 10)])
  })

  it('propped beam: wL^2/8 and 3PL/16 at the fixed end, 3wL/8 on the prop', () => {
    // handbook, common practice
    const r = loadResponse(propped, [
      { nodeDown: none, onMembers: [{ member: 0, kind: 'uniform', w: 10 }] },
      { nodeDown: none, onMembers: [{ member: 0, kind: 'point', P: 16, a: 3 }] },
    ])
    expect(Array.from(r.momentFrom)).toEqual([expect.closeTo(-45, 10), expect.closeTo(-18, 10)])
    expect(Array.from(r.momentTo)).toEqual([expect.closeTo(0, 10), expect.closeTo(0, 10)])
    expect(r.reactionUp[1]).toBeCloseTo(22.5, 10)
  })

  it('a pinned end has exactly no moment', () => {
    const made = gridFrame(3, 2)
    const pinned = { ...made, members: made.members.map((m) => (m.from >= 3 ? { ...m, pinTo: true } : m)) }
    const f = factorFrame(arraysOf(pinned))
    const onMembers = pinned.members.map((_, member) => ({ member, kind: 'uniform' as const, w: 7.3 }))
    const responses = [
      loadResponse(f, [{ nodeDown: new Float64Array(6), onMembers }]),
      baseInfluence(f),
      tiltResponse(f),
    ]
    for (const r of responses)
      pinned.members.forEach((m, i) => {
        if (!m.pinTo) return
        for (let c = 0; c < r.cases; c++) expect(r.momentTo[c * pinned.members.length + i]).toBe(0)
      })
  })

  it('a sloping beam carries its load across as bending and along as axial force', () => {
    // A 3-4-5 rafter between fixed ends, 10 kN per metre of member: across 8, along 6 kN/m. Common practice.
    const made = {
      nodes: [
        [0, 0],
        [4, 3],
      ] as const,
      members: [{ from: 0, to: 1, EI: 1e4, EA: 1e6 }],
      bases: [
        [0, FIXED],
        [1, FIXED],
      ] as const,
    }
    const r = loadResponse(factorFrame(arraysOf(made)), [
      { nodeDown: none, onMembers: [{ member: 0, kind: 'uniform', w: 10 }] },
      { nodeDown: none, onMembers: [{ member: 0, kind: 'point', P: 10, a: 2 }] },
    ])
    expect([r.momentFrom[0], r.momentTo[0]]).toEqual([
      expect.closeTo((-8 * 25) / 12, 10),
      expect.closeTo((8 * 25) / 12, 10),
    ])
    // The load pulls down towards `from`, so the lower end is pressed: -6 * 5 / 2; the point load's nearer end more.
    expect([r.axial[0], r.axial[1]]).toEqual([expect.closeTo(-15, 10), expect.closeTo((-6 * 3) / 5, 10)])
    expect(Array.from(r.reactionUp.slice(0, 2))).toEqual([expect.closeTo(25, 10), expect.closeTo(25, 10)])
  })

  it('a load on a node that is a base goes straight into the ground', () => {
    const r = loadResponse(fixedBeam, [{ nodeDown: Float64Array.of(12, 0), onMembers: [] }])
    expect(Array.from(r.reactionUp)).toEqual([12, 0])
    expect(Array.from(r.momentFrom)).toEqual([0])
  })

  it('no cases give an empty response', () => {
    expect(loadResponse(fixedBeam, []).momentFrom.length).toBe(0)
  })

  it.each([
    ['for another number of nodes', { nodeDown: new Float64Array(3), onMembers: [] }, ['shape', 'nodeDown', 0]],
    ['that are no number', { nodeDown: Float64Array.of(0, NaN), onMembers: [] }, ['not-finite', 'nodeDown', 0, 1]],
    [
      'on no member',
      { nodeDown: none, onMembers: [{ member: 1, kind: 'uniform', w: 1 } as const] },
      ['shape', 'member', 0, 1],
    ],
    [
      'beyond the end',
      { nodeDown: none, onMembers: [{ member: 0, kind: 'point', P: 1, a: 6.1 } as const] },
      ['shape', 'a', 0, 0],
    ],
    [
      'infinite',
      { nodeDown: none, onMembers: [{ member: 0, kind: 'uniform', w: Infinity } as const] },
      ['not-finite', 'w', 0, 0],
    ],
    [
      'of infinite size',
      { nodeDown: none, onMembers: [{ member: 0, kind: 'point', P: -Infinity, a: 1 } as const] },
      ['not-finite', 'P', 0, 0],
    ],
    [
      'nowhere',
      { nodeDown: none, onMembers: [{ member: 0, kind: 'point', P: 1, a: NaN } as const] },
      ['not-finite', 'a', 0, 0],
    ],
  ])('%s are refused', (_, loads, fault) => {
    expect(faultOf(() => loadResponse(fixedBeam, [loads]))).toEqual(fault)
  })
})
