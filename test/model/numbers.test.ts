import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { fixed, level, millimetres, moment, parseNumber, percent, ratio } from '../../app/model/numbers.ts'

function read(text: string, decimal?: '.' | ','): number | string {
  const parsed = parseNumber(text, decimal)
  return parsed.ok ? parsed.value : parsed.code
}

describe('a typed number', () => {
  test.each<[string, number]>([
    ['1.2345', 1.2345],
    ['1,2345', 1.2345],
    ['0,123', 0.123],
    ['1.234', 1.234],
    [' 12 ', 12],
    ['.5', 0.5],
    ['5.', 5],
    ['+3', 3],
    ['-3.2', -3.2],
    ['\u22123,2', -3.2],
    ['- 3', -3],
    ['1e3', 1000],
    ['2,5E-3', 0.0025],
    ['1.5e\u22122', 0.015],
    ['12 345,6', 12345.6],
    ['12\u202f345.6', 12345.6],
    ["12'345.6", 12345.6],
    ['1,234.5', 1234.5],
    ['1.234,5', 1234.5],
    ['1.234.567', 1234567],
    ['1,234,567', 1234567],
    ['-0', 0],
  ])('%s is read as %d', (text, value) => {
    expect(read(text)).toBe(value)
  })

  test.each([
    ['', 'number.empty'],
    ['  ', 'number.empty'],
    ['x', 'number.malformed'],
    ['1.2 m', 'number.malformed'],
    ['1..2', 'number.ambiguous'],
    ['1,2,3', 'number.ambiguous'],
    ['1,234', 'number.ambiguous'],
    ['-12,345', 'number.ambiguous'],
    ['1.2.3,4', 'number.ambiguous'],
    ['0x10', 'number.malformed'],
    ['NaN', 'number.malformed'],
    ['Infinity', 'number.malformed'],
    ['1e999', 'number.large'],
    ['--1', 'number.malformed'],
    ['1-2', 'number.malformed'],
  ])('%j is refused as %s', (text, code) => {
    expect(read(text)).toBe(code)
  })

  test('with three figures behind its only comma is a decimal where a comma is known to stand before decimals', () => {
    expect([read('1,234', ','), read('1.234', ','), read('1.2345', ',')]).toEqual([1.234, 'number.ambiguous', 1.2345])
  })

  test('is read back from the way the program writes it, with point and with comma', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e15, max: 1e15 }), (value) => {
        expect(read(String(value))).toBe(value + 0)
        expect(read(String(value).replace('.', ','), ',')).toBe(value + 0)
      }),
    )
  })

  test('of any text is a number or a code, never an error', () => {
    fc.assert(fc.property(fc.string({ unit: 'binary' }), (text) => ['number', 'string'].includes(typeof read(text))))
  })
})

describe('a number is written', () => {
  test('with the minus of typography, and none before zero', () => {
    expect([fixed(-1.25, 1), fixed(-0.04, 1), fixed(0.04, 1), fixed(NaN, 1)]).toEqual([
      '\u22121.3',
      '0.0',
      '0.0',
      '\u2013',
    ])
  })

  test('as a level to a tenth of a millimetre and as millimetres to a tenth', () => {
    expect([level(10.43208), millimetres(-2.04), millimetres(0.423, 2)]).toEqual(['10.4321', '\u22122.0', '0.42'])
  })

  test('as a moment to three figures, never finer than a hundredth', () => {
    expect([-1234.5, -270.4, 21.43, 9.996, 0.123, 0.004].map(moment)).toEqual([
      '\u22121230',
      '\u2212270',
      '21.4',
      '10.0',
      '0.12',
      '0',
    ])
  })

  test('as a ratio of one to a number of three figures', () => {
    expect([0.002, -0.00667, 1 / 1234, 5e-6, 0.4].map(ratio)).toEqual([
      '1/500',
      '\u22121/150',
      '1/1230',
      'none',
      '1/2.5',
    ])
  })

  test('as a percentage with a decimal below 100', () => {
    expect([0.1024, 0.9994, 1.234, -0.05].map(percent)).toEqual([
      '10.2\u00a0%',
      '99.9\u00a0%',
      '123\u00a0%',
      '\u22125.0\u00a0%',
    ])
  })
})
