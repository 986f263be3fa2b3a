import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { assessBuilding } from '../../app/assess/assess.ts'
import { elevation } from '../../app/drawing/elevation.ts'
import { plan } from '../../app/drawing/plan.ts'
import { svg } from '../../app/drawing/svg.ts'
import { darkTheme, printTheme } from '../../app/drawing/theme.ts'
import { textsOf, collisions, madeDrawing, strays } from '../support/drawn.ts'

const RUNS = { numRuns: 60 }

describe('an elevation of any frame', () => {
  it('stays on its sheet and lets no two texts lie on each other', () => {
    fc.assert(
      fc.property(madeDrawing, fc.boolean(), ({ building, line, width, height }, loads) => {
        const findings = assessBuilding(building, 'R1').rounds[0]
        for (const scene of [
          elevation({ building, line, findings, width, height, show: { loads } }),
          elevation({ building, line, width, height, show: { loads } }),
        ]) {
          expect(strays(scene)).toEqual([])
          expect(collisions(scene)).toEqual([])
        }
      }),
      RUNS,
    )
  })

  it('keeps the deformed line on the sheet at whatever factor is asked for', () => {
    fc.assert(
      fc.property(madeDrawing, fc.integer({ min: 1, max: 100_000 }), ({ building, line, width, height }, factor) => {
        const findings = assessBuilding(building, 'R1').rounds[0]
        const scene = elevation({ building, line, findings, width, height, factor })
        expect(scene.factor).toBe(Math.min(factor, scene.mostFactor))
        expect(strays(scene)).toEqual([])
      }),
      RUNS,
    )
  })

  it('prints no text too small to be read', () => {
    fc.assert(
      fc.property(madeDrawing, ({ building, line, width, height }) => {
        const findings = assessBuilding(building, 'R1').rounds[0]
        const texts = textsOf(elevation({ building, line, findings, width, height }))
        expect(Math.min(...texts.map((t) => t.size))).toBeGreaterThanOrEqual(1.7)
      }),
      RUNS,
    )
  })
})

describe('a plan of any building', () => {
  it('stays on its sheet and lets no two texts lie on each other, with findings and without', () => {
    fc.assert(
      fc.property(madeDrawing, ({ building, width, height }) => {
        const findings = assessBuilding(building, 'R1').rounds[0]
        for (const scene of [plan({ building, findings, width, height }), plan({ building, width, height })]) {
          expect(strays(scene)).toEqual([])
          expect(collisions(scene)).toEqual([])
        }
      }),
      RUNS,
    )
  })
})

describe('a scene as SVG', () => {
  it('holds no number that is none and no colour that a theme left open', () => {
    fc.assert(
      fc.property(madeDrawing, ({ building, line, width, height }) => {
        const findings = assessBuilding(building, 'R1').rounds[0]
        const drawn =
          svg(elevation({ building, line, findings, width, height }), darkTheme) +
          svg(plan({ building, findings, width, height }), printTheme)
        expect(drawn).not.toMatch(/NaN|Infinity|undefined|var\(|currentColor/)
      }),
      { numRuns: 20 },
    )
  })
})
