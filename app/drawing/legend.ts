/** The legend along the top: each entry a sample and its words, set from the left until the line is full. */
import { ring } from './bubble.ts'
import type { Primitive, Role } from './scene.ts'
import { baselineFor, corners, line, mark, polygon, text } from './shapes.ts'
import { MARK, SMALL } from './sizes.ts'
import { textWidth } from './text-width.ts'
import type { Status } from '../model/findings.ts'

export interface Entry {
  width: number
  draw: (x: number, y: number) => Primitive[]
  words: string
}

const BETWEEN = 5
export const LEGEND_ROW = 5

export function deformedEntry(factor: number): Entry {
  return {
    width: 8,
    words: `deformed, \u00d7 ${Number(factor.toPrecision(3))}`,
    draw: (x, y) => [line('deformed', [x, y], [x + 8, y])],
  }
}

/** A patch of the diagram, as long as the moment it names. */
export function momentEntry(bar_kNm: number, mmPerKNm: number): Entry {
  const width = bar_kNm * mmPerKNm
  return {
    width,
    words: `${bar_kNm} kNm induced, on the tension side`,
    draw: (x, y) => [
      polygon('moment-fill', corners(x, y - 1.3, width, 2.6)),
      ...[0.25, 0.5, 0.75].map((s) => line('moment-hatch', [x + s * width, y - 1.3], [x + s * width, y + 1.3])),
      { shape: 'polyline', role: 'moment', closed: true, points: corners(x, y - 1.3, width, 2.6) },
    ],
  }
}

/** A sample of a line in its role. */
export function lineEntry(role: Role, words: string): Entry {
  return { width: 7, words, draw: (x, y) => [line(role, [x, y], [x + 7, y])] }
}

export function statusEntry(status: Status, words: string): Entry {
  return { width: 2.4, words, draw: (x, y) => [mark(status, [x + 1.2, y], 2.4)] }
}

/** A ring round a mark, shown without saying which status. */
export function borderlineEntry(): Entry {
  return { width: 3.2, words: 'borderline', draw: (x, y) => [ring('grid', [x + 1.6, y], MARK * 0.64)] }
}

export function wordsEntry(words: string): Entry {
  return { width: 0, words, draw: () => [] }
}

/** Entries in rows; how many rows they take hangs on the width alone. */
export function legendRows(entries: readonly Entry[], width: number): Entry[][] {
  const rows: Entry[][] = []
  let used = Infinity
  for (const entry of entries) {
    const needed = entryWidth(entry)
    if (used + BETWEEN + needed > width) {
      rows.push([])
      used = -BETWEEN
    }
    rows.at(-1)!.push(entry)
    used += BETWEEN + needed
  }
  return rows
}

export function drawLegend(rows: readonly (readonly Entry[])[], left: number, top: number): Primitive[] {
  return rows.flatMap((row, i) => {
    let x = left
    const y = top + LEGEND_ROW * (i + 0.5)
    return row.flatMap((entry) => {
      const at = x
      x += entryWidth(entry) + BETWEEN
      const start = at + entry.width + (entry.width > 0 ? 1.4 : 0)
      return [...entry.draw(at, y), text('text-quiet', [start, baselineFor(y, SMALL)], entry.words, SMALL, 'start')]
    })
  })
}

function entryWidth({ width, words }: Entry): number {
  return width + (width > 0 ? 1.4 : 0) + textWidth(words, SMALL)
}
