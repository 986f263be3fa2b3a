/** Dimensions of the grid: along the bottom and up the right-hand side. */
import { fixed } from '../../model/numbers.ts'
import type { Building } from '../../model/building.ts'
import type { Primitive } from '../scene.ts'
import { line, text } from '../shapes.ts'
import { SMALL } from '../sizes.ts'
import { textWidth } from '../text-width.ts'
import { gridPlaces, type PlanFit } from './fit.ts'

/** From the outermost support to the dimension line. */
export const DIMENSION_AWAY = 11
/** Beyond so many places the supports stand in no grid, and only the whole is dimensioned. */
const MOST_PLACES = 24

export function gridDimensions({ supports }: Building, fit: PlanFit, awayRight: number): Primitive[] {
  const { box, place } = fit
  const across = dimensioned(
    supports.map((s) => s.x_m),
    supports.length,
  )
  const up = dimensioned(
    supports.map((s) => s.y_m),
    supports.length,
  )
  const y = box.y + box.height + DIMENSION_AWAY
  const x = box.x + box.width + awayRight
  const drawn: Primitive[] = []
  if (across.length > 1) {
    const at = across.map((v) => place(v, 0)[0])
    drawn.push(line('dimension', [at[0]! - 1.6, y], [at.at(-1)! + 1.6, y]))
    for (const a of at)
      drawn.push(
        line('dimension', [a - 0.9, y + 0.9], [a + 0.9, y - 0.9]),
        line('dimension', [a, y - 2.2], [a, y + 1.4]),
      )
    at.slice(1).forEach((b, i) => {
      const words = fixed(across[i + 1]! - across[i]!, 2)
      if (textWidth(words, SMALL) < b - at[i]! - 1)
        drawn.push(text('dimension', [(at[i]! + b) / 2, y - 0.9], words, SMALL))
    })
  }
  if (up.length > 1) {
    const at = up.map((v) => place(0, v)[1])
    drawn.push(line('dimension', [x, at[0]! + 1.6], [x, at.at(-1)! - 1.6]))
    for (const a of at)
      drawn.push(
        line('dimension', [x - 0.9, a + 0.9], [x + 0.9, a - 0.9]),
        line('dimension', [x - 2.2, a], [x + 1.4, a]),
      )
    at.slice(1).forEach((b, i) => {
      const words = fixed(up[i + 1]! - up[i]!, 2)
      if (textWidth(words, SMALL) < at[i]! - b - 1)
        drawn.push(text('dimension', [x - 0.9, (at[i]! + b) / 2], words, SMALL, 'middle', { turn: -90 }))
    })
  }
  return drawn
}

function dimensioned(values: readonly number[], supports: number): number[] {
  const places = gridPlaces(values)
  const isGrid = places.length <= MOST_PLACES && (places.length < supports || supports <= 3)
  return isGrid ? places : [places[0]!, places.at(-1)!]
}
