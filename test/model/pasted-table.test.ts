import { expect, test } from 'vitest'
import { columnsNamed, pastedTable } from '../../app/model/pasted-table.ts'

test('cells of a spreadsheet come separated by tabs', () => {
  expect(pastedTable('BM1\t1.2345\t\t\nS-A1\t\t0.8812\t\r\n')).toEqual({
    separator: 'tab',
    rows: [
      ['BM1', '1.2345', '', ''],
      ['S-A1', '', '0.8812', ''],
    ],
  })
})

test('a readings file brings its headings and may begin with a byte order mark', () => {
  const table = pastedTable('\uFEFFround;date;point;back_m;mid_m;fore_m;sight_m\nR1;2026-04-02;BM1;1,2345;;;22,0\n')
  expect(table.header).toEqual(['round', 'date', 'point', 'back_m', 'mid_m', 'fore_m', 'sight_m'])
  expect(table.rows).toEqual([['R1', '2026-04-02', 'BM1', '1,2345', '', '', '22,0']])
})

test('a single column with decimal commas is not cut in two', () => {
  expect(pastedTable('1,2345\n0,8812').rows).toEqual([['1,2345'], ['0,8812']])
  expect(pastedTable('BM1,1.2345').rows).toEqual([['BM1', '1.2345']])
  expect(pastedTable('S-A1,10.43,0.3').rows).toEqual([['S-A1', '10.43', '0.3']])
})

test('quotes keep separators and quotes in a cell', () => {
  expect(pastedTable('"A, the first",1.2\n"say ""BM""",3').rows).toEqual([
    ['A, the first', '1.2'],
    ['say "BM"', '3'],
  ])
})

test('headings of the trade are known with unit and in any case; strangers and repeats are nothing', () => {
  expect(columnsNamed(['Point', 'Back sight (m)', 'IS [m]', 'Fore_m', 'Sight', 'Remarks', 'FS', 'SD mm'])).toEqual([
    'point',
    'back_m',
    'mid_m',
    'fore_m',
    'sight_m',
    null,
    null,
    'sd_mm',
  ])
})

test('a first row of readings is no heading', () => {
  expect(pastedTable('S-A1\t1.2\nS-A2\t1.3').header).toBeUndefined()
})
