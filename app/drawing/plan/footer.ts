/** Below the plan: scale bar, tilt of the whole with its direction, benchmarks. */
import type { Building } from '../../model/building.ts'
import type { Tilt } from '../../model/findings.ts'
import { fixed, ratio } from '../../model/numbers.ts'
import { niceBelow } from '../nice.ts'
import type { Primitive } from '../scene.ts'
import { arrow, baselineFor, circle, line, text } from '../shapes.ts'
import { SMALL, TEXT } from '../sizes.ts'
import { fitText, textWidth } from '../text-width.ts'

export const FOOTER = 12

export function scaleBar(scale: number, x: number, y: number, most: number): Primitive[] {
  const metres = niceBelow(most / scale, [1, 2, 5])
  const length = metres * scale
  const half = metres / 2
  function tick(at: number, words: string) {
    return [
      line('dimension', [at, y - 1], [at, y + 1]),
      text('text-quiet', [at, y - 1.8], words, SMALL, at === x ? 'start' : 'middle'),
    ]
  }
  return [
    line('dimension', [x, y], [x + length, y]),
    ...tick(x, '0'),
    ...(length > 24 ? tick(x + length / 2, String(half)) : []),
    ...tick(x + length, `${metres} m`),
  ]
}

/** An arrow that points to where the building goes down, with slope and direction in words. */
export function tiltArrow(tilt: Tilt, z: number, right: number, y: number, width: number): Primitive[] {
  const size = Math.hypot(tilt.x_rad, tilt.y_rad)
  const [full, short] = tiltWords(tilt, z)
  const words = textWidth(full, TEXT) <= width - 13 ? full : short
  const centre: [number, number] = [right - 6, y]
  const label = `Movement of the whole: ${full}`
  const shapes: Primitive[] = [text('text', [right - 13, baselineFor(y, TEXT)], words, TEXT, 'end', { label })]
  if (!isTilted(tilt, z)) return [...shapes, circle('tilt', centre, 0.5, { label })]
  const [ux, uy] = [tilt.x_rad / size, -tilt.y_rad / size]
  shapes.push(
    circle('leader', centre, 5.2),
    line('leader', [centre[0], centre[1] - 5.2], [centre[0], centre[1] - 4]),
    arrow('tilt', [centre[0] - ux * 4.4, centre[1] - uy * 4.4], [centre[0] + ux * 4.6, centre[1] + uy * 4.6], 2.4, {
      label,
    }),
  )
  return shapes
}

/** Slope and direction, at full length and for a narrow sheet. */
export function tiltWords(tilt: Tilt, z: number): [full: string, short: string] {
  if (!isTilted(tilt, z)) return ['no tilt beyond the measuring noise', 'no tilt measured']
  const slope = `tilt ${ratio(Math.hypot(tilt.x_rad, tilt.y_rad))}`
  const direction = `${bearing(tilt)}\u00b0`
  return [`${slope}, down towards ${direction} from +y`, `${slope}, ${direction}`]
}

/** Degrees clockwise from the y axis of the plan, 0 to 359. */
export function bearing({ x_rad, y_rad }: Tilt): string {
  const degrees = (Math.atan2(x_rad, y_rad) * 180) / Math.PI
  return fixed(Math.round(degrees + 360) % 360, 0)
}

/** Whether the tilt is beyond its own interval. Axes are taken as independent: the survey's plane nearly makes them so. */
function isTilted({ x_rad, y_rad, sd_x_rad = 0, sd_y_rad = 0 }: Tilt, z: number): boolean {
  const size = Math.hypot(x_rad, y_rad)
  return size > 1e-7 && size * size > z * Math.hypot(x_rad * sd_x_rad, y_rad * sd_y_rad)
}

/** Benchmarks have a level but no place on the plan; they are named beside it. */
export function benchmarkNote({ survey }: Building, x: number, y: number, width: number): Primitive[] {
  const names = survey.points.flatMap((p) => (p.kind === 'benchmark' ? [`${p.id} ${fixed(p.level_m, 3)}`] : []))
  if (names.length === 0) return []
  const words = fitText(`benchmarks off the plan: ${names.join(', ')} m`, width - 4, SMALL)
  if (words === '' || textWidth(words, SMALL) < 12) return []
  return [text('benchmark', [x, baselineFor(y, SMALL)], words, SMALL, 'start')]
}
