import { expect, test } from 'vitest'
import { checkRound } from '../../app/model/check-building.ts'
import { InputFault } from '../../app/model/faults.ts'
import { cellKey, readRound, textOf, withoutBlankRows, type RoundText } from '../../renderer/log/round-cells.ts'
import { smallBuilding } from '../support/made.ts'

const HEAD = {
  date: '2026-04-02',
  observer: '',
  instrument: '',
  weather: '',
  sd_mm_per_sqrt_km: '0.7',
  sd_mm_per_setup: '',
  collimation_mm_per_10_m: '',
}

function book(...rows: Record<string, string>[]): RoundText {
  return { id: 'R7', kind: 'book', head: HEAD, rows }
}

test('a booked page becomes a level book, decimal comma and point alike', () => {
  const { typed, faults } = readRound(
    book({ point: 'BM1', back_m: '1,2345', sight_m: '22' }, { point: ' S-A1 ', mid_m: '0.8812', sight_m: '18,5' }),
  )
  expect(faults.size).toBe(0)
  expect(typed).toEqual({
    id: 'R7',
    date: '2026-04-02',
    book: {
      sd_mm_per_sqrt_km: 0.7,
      rows: [
        { point: 'BM1', back_m: 1.2345, sight_m: 22 },
        { point: 'S-A1', mid_m: 0.8812, sight_m: 18.5 },
      ],
    },
  })
})

test('a comma before three decimals is a decimal comma on a staff, and doubtful in a level', () => {
  expect(readRound(book({ point: 'BM1', back_m: '1,234' })).typed.book?.rows[0]?.back_m).toBe(1.234)
  const levels = readRound({
    id: 'R7',
    kind: 'levels',
    head: HEAD,
    rows: [{ point: 'S-A1', level_m: '1,234', sd_mm: '0.3' }],
  })
  expect(levels.faults.get(cellKey(0, 'level_m'))?.code).toBe('number.ambiguous')
})

test('what is no number yet is kept in its place and keeps the round from being accepted', () => {
  const text = book({ point: 'BM1', back_m: '1.23x5', sight_m: '22' })
  const { stored, typed, faults } = readRound(text)
  expect(faults.get(cellKey(0, 'back_m'))).toEqual({
    code: 'number.malformed',
    place: { path: 'back_m', value: '1.23x5', element: { kind: 'row', id: '1', within: 'R7' } },
  })
  expect(typed.book?.rows).toEqual([{ point: 'BM1', sight_m: 22 }])
  const again = textOf(JSON.parse(JSON.stringify(stored)))
  expect(again.rows[0]).toEqual({ point: 'BM1', back_m: '1.23x5', sight_m: '22.0' })
  expect(() => checkRound(stored, smallBuilding())).toThrow(InputFault)
})

test('while rows are half typed, only the whole ones are assessed', () => {
  const { whole, typed } = readRound(
    book({ point: 'BM1', back_m: '1.2' }, { point: 'S-A1' }, {}, { point: '', mid_m: '1.1' }),
  )
  expect(whole.book?.rows.map((row) => row.point)).toEqual(['BM1'])
  expect(typed.book?.rows).toHaveLength(4)
})

test('blank rows are left out when a round is accepted', () => {
  expect(withoutBlankRows(book({ point: 'BM1' }, {}, { point: ' ' }, { point: 'S-A1' })).rows).toHaveLength(2)
})

test('given levels come back as they were typed, to the tenth of a millimetre', () => {
  const round = { id: 'R0', date: '2026-03-02', levels: [{ point: 'S-A1', level_m: 10.43, sd_mm: 0.25 }] }
  const text = textOf(round)
  expect(text.rows).toEqual([{ point: 'S-A1', level_m: '10.4300', sd_mm: '0.25' }])
  expect(readRound(text).stored).toEqual(round)
})
