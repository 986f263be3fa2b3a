/** What is typed into a field of the description, as a number or a reason why it is none. */
import { Fault, InputFault, type ElementRef, type Place } from '../../app/model/faults.ts'
import { parseNumber } from '../../app/model/numbers.ts'

/** The number typed. Throws a Fault that names the key and the element it stands at. */
export function numberTyped(text: string, key: string, element?: ElementRef): number {
  const parsed = parseNumber(text)
  if (parsed.ok) return parsed.value
  throw new Fault(parsed.code, placeOf(text, key, element))
}

/** As numberTyped; an emptied field gives undefined, which takes the value away or its default back. */
export function numberOrNothing(text: string, key: string, element?: ElementRef): number | undefined {
  return text.trim() === '' ? undefined : numberTyped(text, key, element)
}

/** A slope typed as `1/500` or as a number. */
export function slopeTyped(text: string, key: string, element?: ElementRef): number | undefined {
  const parts = /^\s*1\s*\/(.+)$/.exec(text)
  if (!parts) return numberOrNothing(text, key, element)
  const n = numberTyped(parts[1]!, key, element)
  if (n > 0) return Number((1 / n).toPrecision(6))
  throw new Fault('number.low', { ...placeOf(n, key, element), detail: { above: 0, remedy: 'Write it as 1/500.' } })
}

/** A number as it would be typed: no more digits than it has; nothing for undefined. */
export function numberText(value: number | undefined): string {
  return value === undefined ? '' : String(value)
}

/** A slope as 1/n where n comes out round, else as the number it is. */
export function slopeText(value: number): string {
  const n = 1 / value
  return value > 0 && Math.abs(n - Math.round(n)) < n * 2e-3 ? `1/${Math.round(n)}` : String(value)
}

export interface Rectangle {
  A_cm2: number
  I_cm4: number
  shear_area_cm2: number
}

/** Area, second moment and shear area (5/6 of the area) of a rectangle typed as `300 x 600`, width by depth in mm. */
export function rectangleTyped(text: string): Rectangle {
  const sides = text.split(/[x×*]/iu)
  const place = { path: 'rectangle', value: text }
  if (sides.length !== 2) throw new Fault('number.malformed', place)
  const [b, h] = sides.map((side) => numberTyped(side, 'rectangle')) as [number, number]
  const wrong = [b, h].filter((side) => !(side > 0))
  if (wrong.length)
    throw new InputFault([
      {
        code: 'number.low',
        place: { ...place, value: wrong[0], detail: { above: 0, remedy: 'Write it as 300 x 600.' } },
      },
    ])
  const A_cm2 = (b * h) / 100
  return { A_cm2: rounded(A_cm2), I_cm4: rounded((b * h ** 3) / 12e4), shear_area_cm2: rounded((A_cm2 * 5) / 6) }
}

function rounded(value: number): number {
  return Number(value.toPrecision(6))
}

function placeOf(value: unknown, path: string, element: ElementRef | undefined): Place {
  return element ? { value, path, element } : { value, path }
}
