import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { blunderCauses, looksExchanged } from '../../app/assess/blunder-causes.ts'
import { bookView } from '../../app/assess/level-book.ts'
import { exampleBuilding } from '../../app/usecases/example-building.ts'

const TOLERANCE = 0.001

describe('a gross error in a staff reading (slips of field work, common practice)', () => {
  it.each([
    [1.345, 0.0102, ['the staff read 10 mm too high']],
    [1.345, -0.0998, ['the staff read 100 mm too low']],
    [2.345, 1.0004, ['the staff read a metre too high']],
    [1.345, 0.0301, ['the staff read 3 times 10 mm too high']],
    [1.354, 0.009, ['figures swapped: 1.345 written as 1.354']],
    [1.3457, 0.0053, []],
  ])('of %f m, off by %f m, looks like: %j', (reading, error, causes) => {
    expect(blunderCauses(reading, error, TOLERANCE)).toEqual(causes)
  })

  it('is found again whatever figures were swapped', () => {
    const digits = fc.array(fc.integer({ min: 0, max: 9 }), { minLength: 5, maxLength: 5 })
    fc.assert(
      fc.property(digits, fc.integer({ min: 1, max: 3 }), ([a, b, c, d, e], at) => {
        const right = [a, b, c, d, e]
        const wrong = [...right]
        ;[wrong[at], wrong[at + 1]] = [wrong[at + 1]!, wrong[at]!]
        const [meant, written] = [right, wrong].map(([m, ...rest]) => Number(`${m}.${rest.join('')}`))
        fc.pre(Math.abs(meant! - written!) > 2.5 * TOLERANCE)
        expect(blunderCauses(written!, written! - meant!, TOLERANCE)[0]).toContain('figures swapped')
      }),
    )
  })

  it('back and fore booked in each other’s column leave twice their difference', () => {
    expect(looksExchanged(1.7, 1.2, 1.0003, TOLERANCE)).toBe(true)
    expect(looksExchanged(1.7, 1.2, 0.9, TOLERANCE)).toBe(false)
  })
})

describe('the page of a level book with a slip in it', () => {
  function slip(change: (rows: ReturnType<typeof exampleBuilding>['survey']['rounds'][0]['book'] & object) => void) {
    const building = exampleBuilding()
    const round = building.survey.rounds.at(-1)!
    change(round.book!)
    return bookView(building, round)
  }

  it('says that a foresight looks 10 mm too high', () => {
    const page = slip(({ rows }) => (rows.find((r) => r.point === 'TP2')!.fore_m! += 0.01))
    expect(page.suspects.length).toBeGreaterThan(0)
    expect(page.suspects.flatMap((s) => s.causes ?? [])).toContain('the staff read 10 mm too high')
  })

  it('says which change point looks booked in the wrong columns', () => {
    const page = slip(({ rows }) => {
      const row = rows.find((r) => r.point === 'TP1')!
      ;[row.back_m, row.fore_m] = [row.fore_m, row.back_m]
    })
    expect(page.hints).toEqual([expect.stringContaining('TP1')])
  })

  it('says nothing of a book that closes', () => {
    const page = slip(() => undefined)
    expect([page.suspects, page.hints]).toEqual([[], []])
  })

  it('says that two studs look exchanged, or read on the wrong point', () => {
    const page = slip(({ rows }) => {
      const [a, b] = ['S-B2', 'S-B4'].map((id) => rows.find((r) => r.point === id)!)
      ;[a!.point, b!.point] = [b!.point, a!.point]
    })
    expect(page.hints.join(' ')).toMatch(/S-B4 reads as S-\w\d did at the last visit/)
  })

  it('estimates a collimation error where back and fore sights are unequal', () => {
    const page = slip((book) => {
      // 30 mm in 100 m: a level badly out of adjustment, sights made unequal on purpose.
      const c = 0.0003
      for (const row of book.rows) {
        if (row.fore_m !== undefined) row.sight_m = 8
        if (row.back_m !== undefined && row.fore_m !== undefined) row.back_sight_m = 35
        if (row.back_m !== undefined && row.fore_m === undefined) row.sight_m = 35
        if (row.back_m !== undefined) row.back_m += c * 35
        if (row.fore_m !== undefined) row.fore_m += c * 8
        if (row.mid_m !== undefined) row.mid_m += c * row.sight_m!
      }
    })
    expect(page.collimation?.mm_in_10_m).toBeGreaterThan(2.5)
    expect(page.collimation?.mm_in_10_m).toBeLessThan(3.5)
    expect(page.collimation?.explains).toBe(true)
  })
})
