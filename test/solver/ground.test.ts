/** Plane, tilt, angular distortion and deflection ratio. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { angularDistortion, certaintyOf, deflectionRatios, planeMap, statusOf, tiltAlong } from '../../solver/index.ts'

function weigh(weights: ArrayLike<number>, values: readonly number[]): number {
  return values.reduce((sum, v, i) => sum + weights[i]! * v, 0)
}

describe('the least-squares plane', () => {
  it('along one line is the straight line of least squares: NIST StRD Norris, certified slope and intercept', () => {
    const x = [0.2, 337.4, 118.2, 884.6, 10.1, 226.5, 666.3, 996.3, 448.6, 777.0, 558.2, 0.4, 0.6, 775.5, 666.9, 338.0, 447.5, 11.6, 556.0, 228.1, 995.8, 887.6, 120.2, 0.3, 0.3, 556.8, 339.1, 887.2, 999.0, 779.0, 11.1, 118.3, 229.2, 669.1, 448.9, 0.5] // prettier-ignore
    const y = [0.1, 338.8, 118.1, 888.0, 9.2, 228.1, 668.5, 998.5, 449.1, 778.9, 559.2, 0.3, 0.1, 778.1, 668.8, 339.3, 448.9, 10.8, 557.7, 228.3, 998.0, 888.8, 119.6, 0.3, 0.6, 557.6, 339.3, 888.0, 998.5, 778.9, 10.2, 117.6, 228.9, 668.4, 449.2, 0.2] // prettier-ignore
    const plane = planeMap(x, new Float64Array(x.length))
    const slope = weigh(plane.tiltX, y)
    expect(plane.rank).toBe(1)
    expect(slope).toBeCloseTo(1.00211681802045, 12)
    expect(weigh(plane.mean, y) - slope * plane.centreX).toBeCloseTo(-0.262323073774029, 10)
  })

  it('is exact for settlements that lie in a plane, and leaves no angular distortion in any direction', () => {
    const place = fc.tuple(fc.integer({ min: -300, max: 300 }), fc.integer({ min: -300, max: 300 }))
    const slopes = fc.tuple(fc.integer({ min: -50, max: 50 }), fc.integer({ min: -50, max: 50 }))
    fc.assert(
      fc.property(
        fc.uniqueArray(place, { minLength: 3, maxLength: 12, selector: String }),
        slopes,
        (places, [a, b]) => {
          const x = places.map((p) => p[0] / 10)
          const y = places.map((p) => p[1] / 10)
          const s = x.map((_, i) => 0.01 + (a / 1e4) * x[i]! + (b / 1e4) * y[i]!)
          const plane = planeMap(x, y)
          fc.pre(plane.rank === 2)
          for (let i = 1; i < places.length; i++) {
            const [dx, dy] = [x[i]! - x[0]!, y[i]! - y[0]!]
            const distortion = angularDistortion(tiltAlong(plane, dx, dy), 0, i, Math.hypot(dx, dy))
            expect(weigh(distortion, s)).toBeCloseTo(0, 10)
          }
        },
      ),
    )
  })

  it('of supports in one straight line gives their slope along it and none across, whichever way it runs', () => {
    const [c, s] = [Math.cos(0.7), Math.sin(0.7)]
    const along = [0, 5, 11, 18]
    const plane = planeMap(along.map((d) => d * c), along.map((d) => d * s)) // prettier-ignore
    const settlement = along.map((d) => 0.003 * d)
    expect(weigh(tiltAlong(plane, c, s), settlement)).toBeCloseTo(0.003, 12)
    expect(weigh(tiltAlong(plane, -s, c), settlement)).toBeCloseTo(0, 12)
  })
})

describe('definitions (Burland and Wroth 1974)', () => {
  it('three equally spaced points, the middle lower by d: distortion d/l, deflection ratio half of it, sagging', () => {
    const settlement = [0, 0.012, 0]
    const tilt = tiltAlong(planeMap([0, 6, 12], [0, 0, 0]), 1, 0)
    expect(weigh(angularDistortion(tilt, 0, 1, 6), settlement)).toBeCloseTo(0.002, 12)
    expect(deflectionRatios([0, 6, 12], settlement)).toEqual([{ kind: 'sagging', from: 0, to: 2, at: 1, ratio: expect.closeTo(0.001, 12) }]) // prettier-ignore
  })

  it('a profile that sags and then hogs has a stretch of each, over its own length', () => {
    const stretches = deflectionRatios([0, 5, 10, 15, 20], [0, 0.01, 0.01, 0.0, 0.0])
    expect(stretches.map((s) => [s.kind, s.from, s.to])).toEqual([
      ['sagging', 0, 3],
      ['hogging', 2, 4],
    ])
  })
})

describe('a value against its triggers', () => {
  const triggers = { amber: 0.1, red: 0.25 }

  it('is amber from amber on and red from red on', () => {
    expect([0, 0.0999, 0.1, 0.2499, 0.25, 9].map((v) => statusOf(v, triggers))).toEqual([
      'green',
      'green',
      'amber',
      'amber',
      'red',
      'red',
    ])
  })

  it('is clear only when its interval lies on one side of every trigger', () => {
    const interval = fc.tuple(
      fc.double({ min: 0, max: 0.5, noNaN: true }),
      fc.double({ min: 0, max: 0.2, noNaN: true }),
    )
    fc.assert(
      fc.property(interval, ([value, sd]) => {
        const ends = [value - 1.96 * sd, value + 1.96 * sd].map((v) => statusOf(v, triggers))
        expect(certaintyOf(value, sd, 1.96, triggers)).toBe(ends[0] === ends[1] ? 'clear' : 'borderline')
      }),
    )
  })
})
