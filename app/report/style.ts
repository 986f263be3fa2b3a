/** The report's page type and table rules: paper, ink and thin lines, as in the window. */
import type { Content, ContentTable, CustomTableLayout, StyleDictionary, TableCell } from 'pdfmake/interfaces.js'
import { svg } from '../drawing/svg.ts'
import { printTheme } from '../drawing/theme.ts'
import type { Scene } from '../drawing/scene.ts'
import type { Certainty, Status } from '../model/findings.ts'
import { POINTS } from './input.ts'

export const INK = '#1e2730'
export const QUIET = '#5c656d'
export const RULE = '#b9b4a7'

export const styles: StyleDictionary = {
  title: { fontSize: 24, bold: true, lineHeight: 1.1 },
  subtitle: { fontSize: 13, color: QUIET },
  heading: { fontSize: 14, bold: true, margin: [0, 14, 0, 6] },
  subheading: { fontSize: 10.5, bold: true, margin: [0, 8, 0, 3] },
  body: { margin: [0, 0, 0, 5], lineHeight: 1.2 },
  quiet: { color: QUIET, fontSize: 8.5 },
  caution: { fontSize: 9.5, lineHeight: 1.25 },
  column: { fontSize: 8, color: QUIET },
  formula: { fontSize: 9, margin: [10, 0, 0, 2], color: INK },
}

/** A rule under the heading row, hair lines between rows, none at the sides. */
export const ruled: CustomTableLayout = {
  hLineWidth: (row, node) => (row === node.table.headerRows ? 0.8 : row === 0 ? 0 : 0.3),
  hLineColor: (row, node) => (row === node.table.headerRows ? INK : RULE),
  vLineWidth: () => 0,
  paddingLeft: (column) => (column === 0 ? 0 : 4),
  paddingRight: () => 4,
  paddingTop: () => 2.2,
  paddingBottom: () => 2.2,
}

/** A frame of one line, for the caution. */
export const framed: CustomTableLayout = {
  hLineWidth: () => 0.8,
  vLineWidth: () => 0.8,
  hLineColor: () => INK,
  vLineColor: () => INK,
  paddingLeft: () => 10,
  paddingRight: () => 10,
  paddingTop: () => 8,
  paddingBottom: () => 8,
}

export interface Column {
  heading: string
  width: number | 'auto' | '*'
  align?: 'left' | 'right' | 'center'
}

/** A table with a repeated heading row; a row is never split over two pages. */
export function table(columns: readonly Column[], rows: readonly (readonly TableCell[])[]): ContentTable {
  const heading = columns.map((c) => ({ text: c.heading, style: 'column', alignment: c.align ?? 'left' }))
  const body = rows.map((row) =>
    row.map((cell, i) => {
      const content = typeof cell === 'string' || typeof cell === 'number' ? { text: String(cell) } : cell
      return { alignment: columns[i]?.align ?? 'left', ...(content as object) } as TableCell
    }),
  )
  return {
    table: { headerRows: 1, dontBreakRows: true, widths: columns.map((c) => c.width), body: [heading, ...body] },
    layout: ruled,
    fontSize: 8.5,
    margin: [0, 2, 0, 8],
  }
}

/** A list of names and what they stand for, without rules. */
export function facts(rows: readonly (readonly [string, Content])[]): ContentTable {
  return {
    table: {
      widths: [120, '*'],
      body: rows.map(([name, value]) => [
        { text: name, color: QUIET },
        typeof value === 'string' ? { text: value } : value,
      ]),
    },
    layout: { ...ruled, hLineWidth: () => 0 },
    margin: [0, 0, 0, 6],
  }
}

/** A drawing at the given width in mm. */
export function drawing(scene: Scene): Content {
  return { svg: svg(scene, printTheme), width: scene.width * POINTS, margin: [0, 4, 0, 4] }
}

/** The status as a shape, the same one as in the window. */
export function mark(status: Status, size = 3): Content {
  const scene: Scene = {
    width: size,
    height: size,
    title: status,
    primitives: [{ shape: 'mark', role: `status-${status}`, status, centre: [size / 2, size / 2], size: size * 0.8 }],
  }
  return { svg: svg(scene, printTheme), width: size * POINTS }
}

/** Status never without its certainty. */
export function statusWords(status: Status, certainty?: Certainty): string {
  if (status === 'none') return 'no capacity given'
  return certainty ? `${status}, ${certainty}` : status
}

/** Shape and words of a status side by side. */
export function statusCell(status: Status, certainty?: Certainty): Content {
  return {
    columns: [
      { width: 12, stack: [mark(status, 2.6)], margin: [0, 1, 0, 0] },
      { width: '*', text: statusWords(status, certainty) },
    ],
  }
}
