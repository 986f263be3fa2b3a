import { describe, expect, it } from 'vitest'
import { assessBuilding } from '../../app/assess/assess.ts'
import { dateOf, dayNumber, fitAhead, rateOf, reachedOn, seriesOf, type SeriesPoint } from '../../app/assess/series.ts'
import { exampleBuilding } from '../../app/usecases/example-building.ts'
import { fittedLine } from '../../solver/index.ts'

function points(values: readonly number[], sd = 0.2): SeriesPoint[] {
  return values.map((value, i) => ({
    round: `R${i + 1}`,
    date: dateOf(dayNumber('2026-01-01') + 30 * i),
    value,
    sd,
    estimated: false,
  }))
}

describe('a straight line through values in time', () => {
  it('is that of NIST StRD Norris where all values weigh alike: certified slope and intercept', () => {
    const x = [0.2, 337.4, 118.2, 884.6, 10.1, 226.5, 666.3, 996.3, 448.6, 777.0, 558.2, 0.4, 0.6, 775.5, 666.9, 338.0, 447.5, 11.6, 556.0, 228.1, 995.8, 887.6, 120.2, 0.3, 0.3, 556.8, 339.1, 887.2, 999.0, 779.0, 11.1, 118.3, 229.2, 669.1, 448.9, 0.5] // prettier-ignore
    const y = [0.1, 338.8, 118.1, 888.0, 9.2, 228.1, 668.5, 998.5, 449.1, 778.9, 559.2, 0.3, 0.1, 778.1, 668.8, 339.3, 448.9, 10.8, 557.7, 228.3, 998.0, 888.8, 119.6, 0.3, 0.6, 557.6, 339.3, 888.0, 998.5, 778.9, 10.2, 117.6, 228.9, 668.4, 449.2, 0.2] // prettier-ignore
    const line = fittedLine(x, y, x.map(() => 0.884796396144373)) // prettier-ignore
    expect(line.rate).toBeCloseTo(1.00211681802045, 12)
    expect(line.level - line.rate * line.centre).toBeCloseTo(-0.262323073774029, 10)
    expect(line.sdRate).toBeCloseTo(0.000429796848199937, 12)
    expect(Math.hypot(line.sdLevel, line.sdRate * line.centre)).toBeCloseTo(0.232818234301152, 9)
  })
})

describe('the rate of a value', () => {
  it('is that of the last three visits, estimates left out', () => {
    const series = points([9, 1, 2, 3])
    expect(rateOf({ points: series })!.perDay).toBeCloseTo(1 / 30, 12)
    series[3]!.estimated = true
    expect(rateOf({ points: series })!.to).toBe(series[2]!.date)
  })

  it('is none with one visit', () => {
    expect(rateOf({ points: points([1]) })).toBeUndefined()
  })

  it('says on which day a trigger is reached, and nothing where it is not on the way', () => {
    const rate = rateOf({ points: points([1, 2, 3]) })!
    expect(reachedOn(rate, 4)).toBe(dateOf(dayNumber(rate.to) + 30))
    expect(reachedOn(rate, 2.5)).toBeUndefined()
    expect(reachedOn(rateOf({ points: points([3, 2, 1]) })!, 4)).toBeUndefined()
  })

  it('widens its band ahead', () => {
    const widths = fitAhead(rateOf({ points: points([1, 2, 3]) })!, 1.96).map((p) => p.high - p.low)
    expect(widths.at(-1)!).toBeGreaterThan(widths[2]!)
  })
})

describe('the series of the example', () => {
  const building = exampleBuilding()
  const findings = assessBuilding(building)

  it('has every visit, with the estimate of round R3 marked', () => {
    const { points: found } = seriesOf(building, findings, { kind: 'support', id: 'B3' })
    expect(found.map((p) => p.estimated)).toEqual([false, false, true, false, false, false])
    expect(found.at(-1)!.value).toBe(findings.rounds.at(-1)!.supports.find((s) => s.support === 'B3')!.settlement_mm)
  })

  it('holds a member against its triggers', () => {
    const series = seriesOf(building, findings, { kind: 'member', line: '4', id: 'A4-B4/2' })
    expect(series.quantity).toBe('induced fraction')
    expect(series.points.filter((p) => p.value >= series.triggers!.red).map((p) => p.round)).toEqual(['R5', 'R6'])
  })
})
