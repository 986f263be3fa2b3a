import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { shortDate } from '../../renderer/strip/dates.ts'
import { places, type Visit } from '../../renderer/strip/places.ts'

function visit(date: string, isDraft = false): Visit {
  return { id: date, date, isDraft, isBaseline: false, status: 'green' }
}

describe('the strip of visits', () => {
  it('is to a time scale where there is room', () => {
    const laid = places([visit('2026-01-01'), visit('2026-02-01'), visit('2026-07-01')], 1810)
    expect(laid.map((v) => Math.round(v.x))).toEqual([0, 310, 1810])
    expect(laid.every((v) => v.isDated)).toBe(true)
  })

  it('keeps every mark apart and on the strip, however many there are', () => {
    const days = fc.array(fc.integer({ min: 0, max: 3000 }), { minLength: 1, maxLength: 150 })
    fc.assert(
      fc.property(days, fc.integer({ min: 300, max: 2000 }), (offsets, width) => {
        const dates = offsets.sort((a, b) => a - b).map((d) => new Date(d * 864e5).toISOString().slice(0, 10))
        const laid = places(dates.map((d) => visit(d)), width) // prettier-ignore
        const least = Math.min(18, laid.length > 1 ? width / (laid.length - 1) : 18)
        laid.forEach((v, i) => {
          expect(v.x).toBeGreaterThanOrEqual(-1e-9)
          expect(v.x).toBeLessThanOrEqual(width + 1e-9)
          if (i > 0) expect(v.x - laid[i - 1]!.x).toBeGreaterThanOrEqual(least - 1e-6)
        })
      }),
    )
  })

  it('dates the latest always, and none that runs into another', () => {
    const laid = places([visit('2026-01-01'), visit('2026-11-16'), visit('2026-12-01', true)], 800)
    expect(laid.map((v) => v.isDated)).toEqual([true, false, true])
  })

  it('writes days as they are read, and leaves what is no day as it stands', () => {
    expect([shortDate('2026-11-06'), shortDate('soon')]).toEqual(['6 Nov 26', 'soon'])
  })
})
