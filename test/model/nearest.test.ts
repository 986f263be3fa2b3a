import fc from 'fast-check'
import { expect, test } from 'vitest'
import { nearest, slips } from '../../app/model/nearest.ts'

const KEYS = ['E_GPa', 'I_cm4', 'A_cm2', 'stiffness_factor', 'x_m', 'z_m', 'base_m']

test.each([
  ['E_Gpa', 'E_GPa'],
  ['e-gpa', 'E_GPa'],
  ['I_cm', 'I_cm4'],
  ['stifness factor', 'stiffness_factor'],
  ['sitffness_factor', 'stiffness_factor'],
  ['xm', 'x_m'],
])('%s most likely stands for %s', (word, meant) => {
  expect(nearest(word, KEYS)).toBe(meant)
})

test('a word that is like none of them stands for none', () => {
  expect(['colour', 'q', '', 'E'.repeat(1000)].map((word) => nearest(word, KEYS))).toEqual(Array(4).fill(undefined))
})

test('slips are counted alike in both directions, none for the same word, and never more than its letters', () => {
  const word = fc.string({ maxLength: 12 })
  fc.assert(
    fc.property(word, word, (a, b) => {
      expect(slips(a, b)).toBe(slips(b, a))
      expect(slips(a, a)).toBe(0)
      expect(slips(a, b)).toBeLessThanOrEqual(Math.max(a.length, b.length))
      expect(slips(a, b) === 0).toBe(a === b)
    }),
  )
})

test.each([
  ['kitten', 'sitting', 3],
  ['sights', 'sihgts', 1],
  ['ca', 'abc', 3],
])('%s and %s are %i slips apart (from memory: textbook cases of edit distance)', (a, b, count) => {
  expect(slips(a, b)).toBe(count)
})
