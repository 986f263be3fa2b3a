import { describe, expect, it } from 'vitest'
import { assessBuilding } from '../../app/assess/assess.ts'
import { prepare } from '../../app/assess/prepare.ts'
import { rateOf, type Rate } from '../../app/assess/series.ts'
import { exampleBuilding } from '../../app/usecases/example-building.ts'
import { ledgerRows, reachText } from '../../renderer/assess/rows.ts'
import { triggerWords } from '../../renderer/assess/trigger-words.ts'

const building = exampleBuilding()
const { rounds } = assessBuilding(building)
const prepared = prepare(building)

describe('the ledger of supports', () => {
  it('has what each moved since the visit before, so that the column adds up to the settlement', () => {
    const support = 'B4'
    const moved = rounds.map((round) => {
      const row = ledgerRows('supports', round, prepared, rounds).find((r) => r.name === support)!
      return Number(row.share.replace('\u2212', '-').replace('+', ''))
    })
    const settled = rounds.at(-1)!.supports.find((s) => s.support === support)!.settlement_mm
    // Each is rounded to a tenth.
    expect(Math.abs(moved.reduce((sum, mm) => sum + mm, 0) - settled)).toBeLessThan(0.05 * moved.length)
  })

  it('writes a rise with its sign', () => {
    const [a, b] = [rounds[0]!, rounds[1]!]
    const risen = { ...b, supports: a.supports.map((s) => ({ ...s, settlement_mm: s.settlement_mm - 0.4 })) }
    expect(new Set(ledgerRows('supports', risen, prepared, [a, risen]).map((r) => r.share))).toEqual(
      new Set(['\u22120.4']),
    )
  })
})

describe('going on at that rate', () => {
  function rate(sd: number): Rate {
    const points = [0, 1, 2].map((month, i) => ({
      round: `R${i}`,
      date: `2026-0${month + 1}-01`,
      value: 0.02 * month,
      sd,
      estimated: false,
    }))
    return rateOf({ points })!
  }

  it('says about when, and how soon that may be with what is not known of the rate', () => {
    // 0.02 in a month, 0.04 on 1 March: 0.06 left of 0.10 are about three months.
    expect(reachText('amber', rate(0.001), 0.1, 1.96)).toMatch(
      /^amber about \d+ (May|Jun) 26, at the earliest \d+ May 26$/,
    )
    const [about, soonest] = reachText('red', rate(0.01), 0.25, 1.96)!.match(/\d+ \w+ \d\d/g)!
    expect(Date.parse(soonest!)).toBeLessThan(Date.parse(about!))
  })

  it('says nothing of a trigger that is behind, or that it does not go to', () => {
    expect(reachText('amber', rate(0.001), 0.03, 1.96)).toBeUndefined()
    const still = rateOf({
      points: ['2026-01-01', '2026-02-01'].map((date) => ({
        round: date,
        date,
        value: 0.1,
        sd: 0.01,
        estimated: false,
      })),
    })!
    expect(reachText('red', still, 0.25, 1.96)).toBeUndefined()
  })
})

describe('what a value is held against', () => {
  it('is said of members and spans, in the units of their triggers', () => {
    expect(triggerWords({ kind: 'span', line: '4', from: 'A4', to: 'B4' }, building)).toBe(
      'amber from 1/500, red from 1/150',
    )
    expect(triggerWords({ kind: 'member', line: '4', id: 'A4-B4/2' }, building)).toBe(
      'amber from 10\u00a0%, red from 25\u00a0% of capacity; utilisation amber from 85\u00a0%, red from 100\u00a0%',
    )
    expect(triggerWords({ kind: 'support', id: 'A4' }, building)).toBe('')
  })
})
