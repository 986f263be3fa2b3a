import { describe, expect, it } from 'vitest'
import { assessBuilding } from '../../app/assess/assess.ts'
import { elevation } from '../../app/drawing/elevation.ts'
import { plan } from '../../app/drawing/plan.ts'
import { svg } from '../../app/drawing/svg.ts'
import { darkTheme, lightTheme, printTheme } from '../../app/drawing/theme.ts'
import { trend } from '../../app/drawing/trend.ts'
import { hall, settledGrid } from '../support/drawn.ts'
import { expectDrawing, firstDifference } from '../support/stored-drawing.ts'

const A4 = { width: 170, height: 102 }
const block = settledGrid(
  [6, 5.4, 6],
  [5.6, 5.6],
  [3.6, 3.2, 3.2],
  [0.6, 1, 2.1, 4.9, 0.7, 1.3, NaN, 8.6, 0.5, 0.9, 2.4, 5.6],
)
const moved = assessBuilding(block, 'R1').rounds[0]!
const shed = hall()
const shedMoved = assessBuilding(shed, 'R1').rounds[0]!
const line = shed.frame_lines[0]!.id

describe('the drawings that are stored', () => {
  it('a block of three storeys whose one corner sinks, as an elevation for the report', () => {
    expectDrawing('block-elevation', svg(elevation({ building: block, line: 'B', findings: moved, ...A4 }), printTheme))
  })

  it('the same block in plan, on paper', () => {
    const selected = { kind: 'support', id: 'B4' } as const
    expectDrawing(
      'block-plan',
      svg(plan({ building: block, findings: moved, width: 170, height: 122, selected }), lightTheme),
    )
  })

  it('a pitched hall with a brace and stepped bases, in the dark', () => {
    const selected = { kind: 'member', line, id: 'R2' } as const
    expectDrawing(
      'hall-elevation',
      svg(elevation({ building: shed, line, findings: shedMoved, ...A4, selected }), darkTheme),
    )
  })

  it('the same hall as described, with its loads', () => {
    expectDrawing('hall-described', svg(elevation({ building: shed, line, ...A4, show: { loads: true } }), lightTheme))
  })

  it('an oblique plan with a support that has risen', () => {
    expectDrawing('hall-plan', svg(plan({ building: shed, findings: shedMoved, width: 170, height: 122 }), darkTheme))
  })

  it('a settlement against time, downwards, with a neighbour in grey', () => {
    const days = ['2026-01-12', '2026-03-02', '2026-04-20', '2026-07-13', '2026-11-30']
    function points(values: number[]) {
      return values.map((value, i) => ({ date: days[i]!, value, sd: 0.3 }))
    }
    const scene = trend({
      quantity: 'settlement',
      series: [
        { name: 'B4', points: points([0, 1.2, 3.9, 6.4, 8.6]) },
        { name: 'A1', points: points([0, 0.2, 0.1, 0.5, 0.6]) },
      ],
      z: 1.96,
      date: '2026-07-13',
      width: 150,
      height: 70,
    })
    expectDrawing('trend-settlement', svg(scene, lightTheme))
  })

  it('a member on its way to its triggers, with a fit ahead and a value that rests on an estimate', () => {
    const scene = trend({
      quantity: 'induced fraction',
      series: [
        {
          name: 'B3-B4/2',
          points: [
            { date: '2026-01-12', value: 0.01, sd: 0.01 },
            { date: '2026-04-20', value: 0.06, sd: 0.05, estimated: true },
            { date: '2026-07-13', value: 0.09, sd: 0.01 },
          ],
          fit: [
            { date: '2026-01-12', value: 0.012, low: 0, high: 0.03 },
            { date: '2026-07-13', value: 0.088, low: 0.07, high: 0.11 },
            { date: '2026-12-31', value: 0.16, low: 0.11, high: 0.21 },
          ],
        },
      ],
      triggers: { amber: 0.1, red: 0.25 },
      z: 1.96,
      width: 150,
      height: 70,
    })
    expectDrawing('trend-fraction', svg(scene, printTheme))
  })
})

describe('the comparison with a stored drawing', () => {
  it('forgives the rounding of a last digit and nothing else', () => {
    const stored = '<line x1="10.123" y2="4"/>'
    expect(firstDifference(stored, '<line x1="10.124" y2="4"/>')).toBeUndefined()
    expect(firstDifference(stored, '<line x1="10.13" y2="4"/>')).toContain('line 1')
    expect(firstDifference(stored, '<line x1="10.123" y2="4" fill="none"/>')).toContain('line 1')
    expect(firstDifference(stored, `${stored}\n<circle/>`)).toContain('line 2')
  })
})
