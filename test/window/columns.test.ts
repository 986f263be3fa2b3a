import { expect, test } from 'vitest'
import { pastedTable } from '../../app/model/pasted-table.ts'
import { columnsOf, takenTable } from '../../renderer/log/columns.ts'

test('columns of a pasted book are found by their headings, in whatever order', () => {
  const table = pastedTable('FS\tpoint\tBS\tremarks\n\tBM1\t1.2345\tdry\n1.1\tTP1\t1.3\t\n')
  expect(takenTable(table)).toEqual({
    rows: [
      { fore_m: '', point: 'BM1', back_m: '1.2345' },
      { fore_m: '1.1', point: 'TP1', back_m: '1.3' },
    ],
    headings: [
      { heading: 'FS', column: 'fore_m' },
      { heading: 'point', column: 'point' },
      { heading: 'BS', column: 'back_m' },
      { heading: 'remarks', column: null },
    ],
    rounds: [],
    kind: 'book',
  })
})

test('of a table of several rounds the wanted one is taken', () => {
  const table = pastedTable(
    'round;date;point;level_m;sd_mm\nR1;2026-04-02;S-A1;10,4301;0,3\nR2;2026-05-02;S-A1;10,4290;0,3\n',
  )
  const { rows, rounds, kind } = takenTable(table, 'R2')
  expect(rounds).toEqual(['R1', 'R2'])
  expect(kind).toBe('levels')
  expect(rows).toEqual([{ point: 'S-A1', level_m: '10,4290', sd_mm: '0,3' }])
})

test('lengths of backsights of their own have a column when they are wanted', () => {
  expect(
    columnsOf('book', true)
      .map((c) => c.key)
      .at(-1),
  ).toBe('back_sight_m')
  expect(columnsOf('book', false).map((c) => c.key)).not.toContain('back_sight_m')
})
