import { expect, test } from 'vitest'
import {
  asKnown,
  completed,
  withBlock,
  withCell,
  withoutRow,
  withRowAt,
  type Cells,
} from '../../renderer/log/grid-cells.ts'
import { moved } from '../../renderer/log/grid-motion.ts'

const SIZE = { rows: 4, columns: 3 }
const KEYS = ['point', 'back', 'fore']

function pressed(key: string, from: [number, number], { shift = false, control = false, start = from[1] } = {}) {
  const spot = moved({ row: from[0], column: from[1] }, { key, shift, control }, SIZE, start)
  return spot && [spot.row, spot.column]
}

test('Enter goes down, Tab right and on to the next row', () => {
  expect(pressed('Enter', [0, 1])).toEqual([1, 1])
  expect(pressed('Tab', [0, 1])).toEqual([0, 2])
  expect(pressed('Tab', [0, 2])).toEqual([1, 0])
  expect(pressed('Tab', [1, 0], { shift: true })).toEqual([0, 2])
})

test('Enter after a run of Tabs goes back to the column in which the run began', () => {
  expect(pressed('Enter', [0, 2], { start: 0 })).toEqual([1, 0])
  expect(pressed('Enter', [1, 2], { shift: true, start: 0 })).toEqual([0, 2])
})

test('Tab leaves the grid at its two ends, so that the keyboard is never caught in it', () => {
  expect(pressed('Tab', [3, 2])).toBeUndefined()
  expect(pressed('Tab', [0, 0], { shift: true })).toBeUndefined()
})

test('arrows stop at the edges, with Ctrl they go there', () => {
  expect(pressed('ArrowUp', [0, 1])).toBeUndefined()
  expect(pressed('ArrowDown', [1, 1], { control: true })).toEqual([3, 1])
  expect(pressed('ArrowLeft', [1, 2], { control: true })).toEqual([1, 0])
  expect(pressed('Home', [2, 2])).toEqual([2, 0])
  expect(pressed('End', [0, 0], { control: true })).toEqual([3, 2])
  expect(pressed('PageDown', [0, 1])).toEqual([3, 1])
})

test('a letter moves nowhere', () => {
  expect(pressed('a', [1, 1])).toBeUndefined()
})

test('a cell beyond the last row brings the rows up to it, and a cleared last row goes', () => {
  const rows = withCell([], 1, 'back', '1.2')
  expect(rows).toEqual([{}, { back: '1.2' }])
  expect(withCell(rows, 1, 'back', '')).toEqual([])
})

test('a pasted block goes down from the cell to the right and over the edge of nothing', () => {
  const rows: Cells[] = [{ point: 'BM1', back: '1.1', fore: '' }]
  const next = withBlock(rows, KEYS, { row: 0, column: 1 }, [
    ['2.2', '', 'lost'],
    ['', '3.3'],
  ])
  expect(next).toEqual([
    { point: 'BM1', back: '2.2', fore: '' },
    { back: '', fore: '3.3' },
  ])
})

test('rows are put in and taken out without touching the others', () => {
  const rows: Cells[] = [{ point: 'BM1' }, { point: 'S-A1' }]
  expect(withRowAt(rows, 1)).toEqual([{ point: 'BM1' }, {}, { point: 'S-A1' }])
  expect(withRowAt(rows, 2)).toEqual(rows)
  expect(withoutRow(rows, 0)).toEqual([{ point: 'S-A1' }])
})

test('a name is completed to the first point not booked yet, and kept as it is written', () => {
  const names = ['BM1', 'S-A1', 'S-A2']
  expect(completed('s', names, new Set(['S-A1']))).toBe('S-A2')
  expect(completed('S-A1', names, new Set())).toBeUndefined()
  expect(completed('', names, new Set())).toBeUndefined()
  expect(asKnown(' s-a2', names)).toBe('S-A2')
  expect(asKnown('TP1', names)).toBe('TP1')
})
