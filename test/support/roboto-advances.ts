/**
 * Writes app/drawing/roboto-advances.ts from the typeface in pdfmake's package. Run by hand when pdfmake brings
 * another one: node test/support/roboto-advances.ts
 */
import { writeFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { pathToFileURL } from 'node:url'

interface Font {
  unitsPerEm: number
  characterSet: number[]
  glyphForCodePoint(code: number): { advanceWidth: number }
  layout(text: string): { advanceWidth: number }
}

const load = createRequire(import.meta.url)

export function openFont(weight: 'Regular' | 'Medium'): Font {
  const fontkit = load('fontkit') as { openSync(path: string): Font }
  return fontkit.openSync(load.resolve(`pdfmake/fonts/Roboto/Roboto-${weight}.ttf`))
}

/** Latin with its supplement and first extension, Greek, Cyrillic, and signs of typography and mathematics. */
const RANGES = [
  [0x20, 0x7e],
  [0xa0, 0x17f],
  [0x370, 0x3ff],
  [0x400, 0x45f],
  [0x2010, 0x2026],
  [0x2212, 0x2212],
  [0x221a, 0x221a],
  [0x2248, 0x2248],
  [0x2260, 0x2265],
  [0x25a0, 0x25a0],
  [0x25cb, 0x25cf],
] as const

export function advances(font: Font): [number, string][] {
  return RANGES.map(([first, last]) => [
    first,
    Array.from({ length: last - first + 1 }, (_, i) => font.glyphForCodePoint(first + i).advanceWidth).join(' '),
  ])
}

function source(): string {
  function table(name: string, weight: 'Regular' | 'Medium') {
    return `export const ${name}: readonly (readonly [number, string])[] = [\n${advances(openFont(weight))
      .map(([first, widths]) => `  [${first}, '${widths}'],`)
      .join('\n')}\n]\n`
  }
  return `/**
 * Advance widths of Roboto in units of its em: first code point of a run, then the widths. Written by
 * test/support/roboto-advances.ts; a test holds it against the font files.
 */
export const UNITS_PER_EM = ${openFont('Regular').unitsPerEm}

${table('REGULAR', 'Regular')}
${table('MEDIUM', 'Medium')}`
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href)
  writeFileSync(new URL('../../app/drawing/roboto-advances.ts', import.meta.url), source())
