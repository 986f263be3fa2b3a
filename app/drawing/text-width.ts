/**
 * Width of a text without measuring it: from the advance widths of the one typeface, so that a drawing is laid
 * out alike in the window, in the report and where there is no screen at all. Kerning is left out: it only narrows.
 */
import { MEDIUM, REGULAR, UNITS_PER_EM } from './roboto-advances.ts'

export type Weight = 'regular' | 'medium'

/** Height of capitals and figures over the text size; Roboto, units of its em. */
export const CAP_HEIGHT = 1456 / 2048

const advance: Record<Weight, ReadonlyMap<number, number>> = { regular: mapOf(REGULAR), medium: mapOf(MEDIUM) }

/** Width of a text of the given size, in the unit of the size. */
export function textWidth(text: string, size: number, weight: Weight = 'regular'): number {
  let units = 0
  // What the typeface lacks is drawn by another one: an em is the widest that is usual.
  for (const character of text) units += advance[weight].get(character.codePointAt(0)!) ?? UNITS_PER_EM
  return (units / UNITS_PER_EM) * size
}

/** The text, cut with an ellipsis where it is wider than it may be; empty where not even that has room. */
export function fitText(text: string, width: number, size: number, weight: Weight = 'regular'): string {
  if (textWidth(text, size, weight) <= width) return text
  const characters = Array.from(text)
  for (let n = characters.length - 1; n > 0; n--) {
    const cut = `${characters.slice(0, n).join('').trimEnd()}\u2026`
    if (textWidth(cut, size, weight) <= width) return cut
  }
  return ''
}

function mapOf(table: typeof REGULAR): Map<number, number> {
  return new Map(table.flatMap(([first, widths]) => widths.split(' ').map((w, i) => [first + i, Number(w)] as const)))
}
