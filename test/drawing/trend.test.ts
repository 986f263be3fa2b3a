import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { trend, type TrendInput } from '../../app/drawing/trend.ts'
import { dateTicks, dayOf } from '../../app/drawing/trend/dates.ts'
import { axisWords } from '../../app/drawing/trend/quantity.ts'
import { collisions, flat, strays, textsOf } from '../support/drawn.ts'

const QUANTITIES: TrendInput['quantity'][] = [
  'settlement',
  'angular distortion',
  'end moment',
  'induced fraction',
  'utilisation',
]

function dated(day: number): string {
  return new Date(day * 86_400_000).toISOString().slice(0, 10)
}

const points = fc.uniqueArray(fc.integer({ min: 20_000, max: 24_000 }), { minLength: 1, maxLength: 30 }).chain((days) =>
  fc.tuple(
    ...days
      .sort((a, b) => a - b)
      .map((day) =>
        fc.record({ value: fc.integer({ min: -900, max: 3000 }), sd: fc.integer({ min: 0, max: 300 }) }).map((p) => ({
          date: dated(day),
          ...p,
        })),
      ),
  ),
)

const inputs: fc.Arbitrary<TrendInput> = fc
  .record({
    quantity: fc.constantFrom(...QUANTITIES),
    series: fc.array(points, { minLength: 1, maxLength: 5 }),
    unit: fc.constantFrom(1, 0.01, 1e-6),
    triggers: fc.record({ amber: fc.integer({ min: 1, max: 9000 }), red: fc.integer({ min: 1, max: 9000 }) }),
    sheet: fc.constantFrom([150, 70], [90, 60], [232, 90]),
  })
  .map(({ quantity, series, unit, triggers, sheet }) => ({
    quantity,
    series: series.map((p, i) => ({
      name: `B${i}`,
      points: p.map(({ date, value, sd }) => ({ date, value: value * unit, sd: sd * unit })),
    })),
    triggers: { amber: triggers.amber * unit, red: triggers.red * unit },
    z: 1.96,
    width: sheet[0]!,
    height: sheet[1]!,
  }))

describe('a trend', () => {
  it('stays on its sheet and lets no two texts lie on each other', () => {
    fc.assert(
      fc.property(inputs, (input) => {
        const scene = trend(input)
        expect(strays(scene)).toEqual([])
        expect(collisions(scene)).toEqual([])
      }),
      { numRuns: 200 },
    )
  })

  const series = [
    {
      name: 'B4',
      points: [
        { date: '2026-01-01', value: 0, sd: 0.2 },
        { date: '2026-07-01', value: 8, sd: 0.2 },
      ],
    },
  ]

  it('draws settlement downwards and moments upwards', () => {
    function heights(quantity: TrendInput['quantity']) {
      return flat(trend({ quantity, series, z: 1.96, width: 150, height: 70 }).primitives).flatMap((p) =>
        p.shape === 'circle' ? [p.centre[1]] : [],
      )
    }
    const [first, last] = heights('settlement')
    expect(last).toBeGreaterThan(first!)
    const [before, after] = heights('end moment')
    expect(after).toBeLessThan(before!)
  })

  it('puts the ends of an interval z standard deviations from the value', () => {
    const scene = trend({ quantity: 'settlement', series, z: 1.96, width: 150, height: 70 })
    const circles = flat(scene.primitives).flatMap((p) => (p.shape === 'circle' ? [p.centre] : []))
    const perMm = (circles[1]![1] - circles[0]![1]) / 8
    const bar = flat(scene.primitives).find((p) => p.shape === 'line' && p.role === 'series' && p.from[0] === p.to[0])
    const length = bar?.shape === 'line' ? Math.abs(bar.to[1] - bar.from[1]) : NaN
    expect(length).toBeCloseTo(2 * 1.96 * 0.2 * perMm, 9)
  })

  it('names a trigger that lies far beyond the values instead of pressing them flat', () => {
    const words = textsOf(
      trend({ quantity: 'settlement', series, triggers: { amber: 10, red: 100 }, z: 1.96, width: 150, height: 70 }),
    ).map((t) => t.text)
    expect(words).toContain('amber 10.0 mm')
    expect(words).toContain('beyond this scale: red 100.0 mm')
  })

  it('without rounds says so', () => {
    expect(textsOf(trend({ quantity: 'settlement', series: [], z: 2, width: 90, height: 60 }))[0]?.text).toBe(
      'No rounds to show yet',
    )
  })
})

describe('the axis of dates', () => {
  it('has its ticks on the first of months, the year under the first of each', () => {
    expect(dateTicks(dayOf('2025-11-10'), dayOf('2026-05-18'), 10).map((t) => [t.words, t.year])).toEqual([
      ['Dec', '2025'],
      ['Jan', '2026'],
      ['Feb', undefined],
      ['Mar', undefined],
      ['Apr', undefined],
      ['May', undefined],
    ])
  })

  it('counts days where the visits are days apart', () => {
    expect(dateTicks(dayOf('2026-02-27'), dayOf('2026-03-05'), 4).map((t) => t.words)).toEqual([
      '27 Feb',
      '1 Mar',
      '3 Mar',
      '5 Mar',
    ])
  })

  it('writes its figures with the decimals of its step', () => {
    expect([axisWords(2.5, 2.5), axisWords(-0.5, 0.25), axisWords(40, 20)]).toEqual(['2.5', '\u22120.50', '40'])
  })
})
