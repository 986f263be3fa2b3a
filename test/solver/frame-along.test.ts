/** Bending and shear between a member's ends, and where bending is greatest. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  bendingAt,
  extremeBending,
  factorFrame,
  loadResponse,
  shearAt,
  type LoadAlong,
  type MemberAlong,
} from '../../solver/index.ts'
import { arraysOf, continuousBeam, FIXED, PINNED } from '../support/made-frames.ts'

const L = 8
const uniform: LoadAlong = { kind: 'uniform', w: 12 }

function loadedBeam(ends: readonly [number, number], ...loads: LoadAlong[]): MemberAlong {
  const f = factorFrame(arraysOf(continuousBeam([0, L], 5e4, ends)))
  const onMembers = loads.map((load) => ({ ...load, member: 0 }))
  const r = loadResponse(f, [{ nodeDown: new Float64Array(2), onMembers }])
  return { length: L, dx: L, momentFrom: r.momentFrom[0]!, momentTo: r.momentTo[0]!, loads }
}

function greatest(along: MemberAlong): { s: number; bending: number } {
  return extremeBending(along).reduce((most, point) => (point.bending > most.bending ? point : most))
}

describe('the greatest sagging of a beam', () => {
  // Handbook values, common practice.
  it.each([
    ['simply supported, uniform load: wL^2/8 at midspan', [PINNED, PINNED], [uniform], L / 2, (12 * L * L) / 8],
    [
      'simply supported, load at midspan: PL/4',
      [PINNED, PINNED],
      [{ kind: 'point', P: 30, a: L / 2 }],
      L / 2,
      (30 * L) / 4,
    ],
    [
      'simply supported, load off the middle: Pab/L',
      [PINNED, PINNED],
      [{ kind: 'point', P: 30, a: 3 }],
      3,
      (30 * 3 * 5) / L,
    ],
    ['fixed at both ends, uniform load: wL^2/24', [FIXED, FIXED], [uniform], L / 2, (12 * L * L) / 24],
    [
      'fixed at both ends, load at midspan: PL/8',
      [FIXED, FIXED],
      [{ kind: 'point', P: 30, a: L / 2 }],
      L / 2,
      (30 * L) / 8,
    ],
    [
      'propped on the right: 9wL^2/128 at 3L/8 from the prop',
      [FIXED, PINNED],
      [uniform],
      (5 * L) / 8,
      (9 * 12 * L * L) / 128,
    ],
    [
      'propped on the left: 9wL^2/128 at 3L/8 from the prop',
      [PINNED, FIXED],
      [uniform],
      (3 * L) / 8,
      (9 * 12 * L * L) / 128,
    ],
    [
      'propped, load at midspan: 5PL/32',
      [FIXED, PINNED],
      [{ kind: 'point', P: 30, a: L / 2 }],
      L / 2,
      (5 * 30 * L) / 32,
    ],
  ] as [string, [number, number], LoadAlong[], number, number][])('%s', (_, ends, loads, s, bending) => {
    expect(greatest(loadedBeam(ends, ...loads))).toEqual({
      s: expect.closeTo(s, 9),
      bending: expect.closeTo(bending, 9),
    })
  })

  it('with end moments from a settlement moves towards the end that sags', () => {
    // Shear is zero at L/2 + (M_B - M_A) / wL with bending M_A, M_B at the ends; common practice.
    const along = { length: L, dx: L, momentFrom: -40, momentTo: -24, loads: [uniform] }
    const s = L / 2 + (24 + 40) / (12 * L)
    expect(greatest(along)).toEqual({ s: expect.closeTo(s, 9), bending: expect.closeTo(-40 + (12 * s * s) / 2, 9) })
  })
})

describe('along a member', () => {
  it('bending at the ends is M_from and -M_to, and shear without loads is -(M_from + M_to) / L', () => {
    const along = { length: 6, dx: 6, momentFrom: -21.4, momentTo: -20.8, loads: [] }
    expect([bendingAt(along, 0), bendingAt(along, 6), bendingAt(along, 3)]).toEqual([
      -21.4,
      20.8,
      expect.closeTo(-0.3, 12),
    ])
    expect([shearAt(along, 0), shearAt(along, 6)]).toEqual([expect.closeTo(42.2 / 6, 12), expect.closeTo(42.2 / 6, 12)])
  })

  it('a column takes no bending from gravity, and a rafter by its span in plan', () => {
    const member = { length: 5, momentFrom: 0, momentTo: 0, loads: [uniform] }
    expect(extremeBending({ ...member, dx: 0 }).map((p) => p.bending)).toEqual([0, 0])
    expect(greatest({ ...member, dx: 4 })).toEqual({ s: 2.5, bending: expect.closeTo((12 * 0.8 * 25) / 8, 9) })
  })

  it('drawn from right to left, the right-hand side is the top and sagging turns its sign', () => {
    const loads: LoadAlong[] = [uniform, { kind: 'point', P: 25, a: 2 }]
    const back: LoadAlong[] = [uniform, { kind: 'point', P: 25, a: L - 2 }]
    const there: MemberAlong = { length: L, dx: L, momentFrom: -30, momentTo: 11, loads }
    const away: MemberAlong = { length: L, dx: -L, momentFrom: 11, momentTo: -30, loads: back }
    for (const s of [0, 1, 2, 5, 8]) expect(bendingAt(away, L - s)).toBeCloseTo(-bendingAt(there, s), 9)
  })

  it('a load over either end changes the shear there and no bending', () => {
    for (const a of [0, L]) {
      const along: MemberAlong = { length: L, dx: L, momentFrom: 0, momentTo: 0, loads: [{ kind: 'point', P: 10, a }] }
      expect(extremeBending(along)).toEqual([
        { s: 0, bending: 0 },
        { s: L, bending: 0 },
      ])
      expect([shearAt(along, a, 'before'), shearAt(along, a, 'after'), shearAt(along, L / 2)]).toEqual(
        a === 0 ? [10, 0, 0] : [0, -10, 0],
      )
    }
  })

  it('two loads at one place are one place', () => {
    const load: LoadAlong = { kind: 'point', P: 5, a: 3 }
    const along = { length: L, dx: L, momentFrom: 0, momentTo: 0, loads: [load, load] }
    expect(extremeBending(along).map((p) => p.s)).toEqual([0, 3, L])
  })

  const tenth = fc.integer({ min: -400, max: 400 }).map((v) => v / 10)
  const anyLoad = fc.oneof(
    fc.record({ kind: fc.constant('uniform' as const), w: tenth }),
    fc.record({ kind: fc.constant('point' as const), P: tenth, a: fc.integer({ min: 0, max: 80 }).map((v) => v / 10) }),
  )
  const anyMember = fc.record({
    length: fc.constant(L),
    dx: fc.integer({ min: -8, max: 8 }),
    momentFrom: tenth,
    momentTo: tenth,
    loads: fc.array(anyLoad, { maxLength: 5 }),
  })

  it('nothing between the places listed is greater or less than all of them', () => {
    fc.assert(
      fc.property(anyMember, (along) => {
        const listed = extremeBending(along)
        const places = listed.map((p) => p.s)
        expect(places).toEqual([...new Set(places)].sort((a, b) => a - b))
        const values = listed.map((p) => p.bending)
        const [least, most] = [Math.min(...values) - 1e-9, Math.max(...values) + 1e-9]
        for (let step = 0; step <= 160; step++) {
          const bending = bendingAt(along, (step * L) / 160)
          expect(bending).toBeGreaterThanOrEqual(least)
          expect(bending).toBeLessThanOrEqual(most)
        }
      }),
    )
  })

  it('shear is the slope of the bending', () => {
    fc.assert(
      fc.property(anyMember, fc.integer({ min: 1, max: 79 }), (along, step) => {
        // Half way between the places at which loads stand; a chord of a parabola has the slope of its middle.
        const s = step / 10 + 0.05
        const slope = (bendingAt(along, s + 0.04) - bendingAt(along, s - 0.04)) / 0.08
        expect(slope).toBeCloseTo(shearAt(along, s), 7)
      }),
    )
  })
})
