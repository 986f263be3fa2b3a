import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { multiples, niceBelow, niceStep } from '../../app/drawing/nice.ts'
import { crosses, isInside, overlap, placeLabels } from '../../app/drawing/place-labels.ts'
import type { Point } from '../../app/drawing/scene.ts'
import { MEDIUM, REGULAR, UNITS_PER_EM } from '../../app/drawing/roboto-advances.ts'
import { fitText, textWidth } from '../../app/drawing/text-width.ts'
import { advances, openFont } from '../support/roboto-advances.ts'

describe('the width of a text', () => {
  const words = [
    'Frame line B',
    '\u221221.4 \u00b1 0.5 kNm',
    'Stahltr\u00e4ger HEB 260',
    '1/1870',
    'AVATAR To Wa',
    '\u2248 8.6',
  ]

  it.each(['Regular', 'Medium'] as const)('is that which the font file itself gives, kerning apart: %s', (weight) => {
    const font = openFont(weight)
    for (const text of words) {
      const shaped = (font.layout(text).advanceWidth / font.unitsPerEm) * 3.1
      const table = textWidth(text, 3.1, weight === 'Medium' ? 'medium' : 'regular')
      expect(table).toBeGreaterThanOrEqual(shaped - 1e-9)
      expect(table).toBeLessThan(shaped * 1.08)
    }
  })

  it('is kept in a table that the font files still agree with', () => {
    expect([REGULAR, MEDIUM]).toEqual([advances(openFont('Regular')), advances(openFont('Medium'))])
    expect(UNITS_PER_EM).toBe(openFont('Regular').unitsPerEm)
  })

  it('never exceeds the room that a text is fitted into, and a text that fits is left whole', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'grapheme', maxLength: 40 }), fc.integer({ min: 0, max: 60 }), (text, width) => {
        const fitted = fitText(text, width, 3)
        expect(textWidth(fitted, 3)).toBeLessThanOrEqual(width)
        if (textWidth(text, 3) <= width) expect(fitted).toBe(text)
      }),
    )
  })
})

const place = fc.tuple(fc.integer({ min: -5, max: 65 }), fc.integer({ min: -5, max: 45 }))
const wanted = fc.record({
  width: fc.integer({ min: 1, max: 15 }),
  height: fc.integer({ min: 1, max: 4 }),
  places: fc.array(place, { maxLength: 6 }),
})

describe('placed labels', () => {
  it('lie inside, on no line and nowhere on each other', () => {
    fc.assert(
      fc.property(
        fc.array(wanted, { maxLength: 30 }),
        fc.array(fc.tuple(place, place), { maxLength: 6 }),
        (labels, segments) => {
          const within = { x: 0, y: 0, width: 60, height: 40 }
          const boxes = placeLabels(labels, { within, segments }).filter((b) => b !== undefined)
          boxes.forEach((box, i) => {
            expect(isInside(box, within)).toBe(true)
            expect(boxes.slice(i + 1).some((other) => overlap(box, other))).toBe(false)
            expect(segments.some(([a, b]) => crosses(box, a, b))).toBe(false)
          })
        },
      ),
    )
  })

  it('take their first place where it is free, and another rather than a soft line', () => {
    const within = { x: 0, y: 0, width: 60, height: 40 }
    const label = {
      width: 6,
      height: 2,
      places: [
        [20, 20],
        [20, 30],
      ] as Point[],
    }
    const soft = [
      [
        [0, 20],
        [60, 20],
      ],
    ] as [Point, Point][]
    expect(placeLabels([label], { within })[0]).toMatchObject({ x: 17, y: 19 })
    expect(placeLabels([label], { within, soft })[0]).toMatchObject({ y: 29 })
    const only = { ...label, places: label.places.slice(0, 1) }
    expect(placeLabels([only, { ...only, isShy: true }], { within, soft })).toEqual([
      { x: 17, y: 19, width: 6, height: 2 },
      undefined,
    ])
    expect(placeLabels([{ ...only, isShy: true }], { within, soft })).toEqual([undefined])
  })
})

describe('round figures', () => {
  it('are just below, just above, and count', () => {
    expect([niceBelow(163), niceBelow(0.99), niceBelow(1000)]).toEqual([150, 0.8, 1000])
    expect([niceStep(1.8), niceStep(0.21), niceStep(50)]).toEqual([2, 0.25, 50])
    expect(multiples(0.5, -0.5, 1.2)).toEqual([-0.5, 0, 0.5, 1])
  })
})
