import { describe, expect, it } from 'vitest'
import { assessBuilding } from '../../app/assess/assess.ts'
import { bookView } from '../../app/assess/level-book.ts'
import { collimationByPegs } from '../../app/assess/two-peg.ts'
import { checkRound } from '../../app/model/check-building.ts'
import { InputFault } from '../../app/model/faults.ts'
import { readBuilding } from '../../app/model/read-building.ts'
import { writeBuilding } from '../../app/model/write-building.ts'
import { exampleBuilding } from '../../app/usecases/example-building.ts'

describe('a two-peg test (common practice, by hand)', () => {
  it('gives the rise of the line of sight from what half-way and near readings differ by', () => {
    // Half-way the difference is 0.250 m, near A it reads 5.8 mm less over sights 40 m unequal.
    const near = { a_m: 1.5012, b_m: 1.257, sight_a_m: 10, sight_b_m: 50 }
    expect(collimationByPegs({ middle: { a_m: 1.4, b_m: 1.15 }, near })).toBeCloseTo(1.45, 9)
    const exact = { a_m: 1.5 + 1.2e-4 * 10, b_m: 1.25 + 1.2e-4 * 50, sight_a_m: 10, sight_b_m: 50 }
    expect(collimationByPegs({ middle: { a_m: 1.4, b_m: 1.15 }, near: exact })).toBeCloseTo(1.2, 9)
  })

  it('gives nothing from sights that are alike', () => {
    const near = { a_m: 1.5, b_m: 1.25, sight_a_m: 30, sight_b_m: 30.5 }
    expect(collimationByPegs({ middle: { a_m: 1.4, b_m: 1.15 }, near })).toBeUndefined()
  })
})

describe('a book read with a level out of adjustment', () => {
  const RISE = 2.4
  /** The example with its last book read with unequal sights by a line of sight that rises 2.4 mm in 10 m. */
  function skewed(collimation_mm_per_10_m?: number) {
    const building = exampleBuilding()
    const { book } = building.survey.rounds.at(-1)!
    for (const row of book!.rows) {
      if (row.back_m !== undefined && row.fore_m !== undefined) [row.sight_m, row.back_sight_m] = [9, 30]
      const over = row.fore_m === undefined ? row.sight_m! : row.back_sight_m!
      if (row.back_m !== undefined) row.back_m += (RISE / 1e4) * (over ?? row.sight_m!)
      if (row.fore_m !== undefined) row.fore_m += (RISE / 1e4) * row.sight_m!
      if (row.mid_m !== undefined) row.mid_m += (RISE / 1e4) * row.sight_m!
    }
    if (collimation_mm_per_10_m !== undefined) book!.collimation_mm_per_10_m = collimation_mm_per_10_m
    return building
  }

  it('gives wrong settlements, and the right ones once it is corrected', () => {
    const truth = assessBuilding(exampleBuilding(), 'R6').rounds[0]!
    const away = (building: ReturnType<typeof skewed>) =>
      Math.max(...assessBuilding(building, 'R6').rounds[0]!.supports.map((s, i) => Math.abs(s.settlement_mm - truth.supports[i]!.settlement_mm))) // prettier-ignore
    expect(away(skewed())).toBeGreaterThan(1.5)
    // The sights were changed, and with them the weights: a little of the scatter is shared otherwise.
    expect(away(skewed(RISE))).toBeLessThan(0.15)
  })

  it('is seen in the book, and seen no more once it is corrected', () => {
    const page = (building: ReturnType<typeof skewed>) => bookView(building, building.survey.rounds.at(-1)!)
    expect(page(skewed()).collimation!.mm_in_10_m).toBeCloseTo(RISE, 0)
    expect(Math.abs(page(skewed(RISE)).collimation!.mm_in_10_m)).toBeLessThan(0.2)
  })

  it('keeps its correction in the building file, and wants the length of every sight for it', () => {
    const building = skewed(RISE)
    expect(readBuilding(writeBuilding(building))).toEqual(building)
    const round = structuredClone(building.survey.rounds.at(-1)!)
    round.book!.sd_mm_per_setup = 0.3
    delete round.book!.rows[1]!.sight_m
    expect(() => checkRound(round, building)).toThrow(InputFault)
    expect(() => checkRound({ ...round, book: { ...round.book!, collimation_mm_per_10_m: 300 } }, building)).toThrow(
      /300/,
    )
  })
})
