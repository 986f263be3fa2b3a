import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { InputFault } from '../../app/model/faults.ts'
import { parseSpacings, spacingsText } from '../../app/model/spacings.ts'

function codesOf(text: string): string[] {
  try {
    parseSpacings(text)
  } catch (error) {
    if (error instanceof InputFault) return error.faults.map((fault) => fault.code)
    throw error
  }
  return []
}

describe('spacings', () => {
  test.each<[string, number[]]>([
    ['4 x 6.0, 5.4', [6, 6, 6, 6, 5.4]],
    ['4x6', [6, 6, 6, 6]],
    ['2 × 3.5', [3.5, 3.5]],
    ['2*3.5', [3.5, 3.5]],
    ['6, 5', [6, 5]],
    ['6.0,5.4', [6, 5.4]],
    ['6,0; 5,4', [6, 5.4]],
    ['2 x 4,25; 3', [4.25, 4.25, 3]],
    ['6\n5,5', [6, 5.5]],
    ['', []],
    ['6,', [6]],
  ])('%j are read as typed', (text, lengths) => {
    expect(parseSpacings(text)).toEqual(lengths)
  })

  test.each([
    ['6,5', ['spacings.ambiguous']],
    ['4 x 6,5', ['spacings.ambiguous']],
    ['six', ['spacings.malformed']],
    ['2 x', ['spacings.malformed']],
    ['0 x 6', ['spacings.malformed']],
    ['6000', ['spacings.unusable']],
    ['-6', ['spacings.unusable']],
    ['0', ['spacings.unusable']],
    ['300 x 2', ['spacings.many']],
    ['6.0, x, 0', ['spacings.malformed', 'spacings.unusable']],
  ])('%j are refused, each fault by itself', (text, codes) => {
    expect(codesOf(text)).toEqual(codes)
  })

  test('are written so that they read back', () => {
    const length = fc.integer({ min: 1, max: 9000 }).map((n) => n / 100)
    fc.assert(
      fc.property(fc.array(length, { maxLength: 20 }), (lengths) => {
        const text = spacingsText(lengths)
        expect(parseSpacings(text)).toEqual(lengths)
      }),
    )
  })
})
