/**
 * Supports on a grid: rows are lettered from the near side, columns numbered from the left, so that A1 is the
 * near left support. What is read back from a building is found from the places of its supports alone.
 */
import type { Building, Support } from '../building.ts'
import type { Edit } from '../changes.ts'
import { Fault } from '../faults.ts'
import { editOf } from './difference.ts'
import { near, roundLength } from './frame-grid.ts'
import { withMovedSupports, withoutSupports } from './support-cascade.ts'

/** The most supports that one grid lays out. */
const MOST = 2000

/** Supports on one grid line, in their order along it. */
export interface NamedRow {
  id: string
  supports: Support[]
}

/**
 * Lays the supports out anew. Those of the same name are moved, with the frame lines through them; those of
 * an earlier grid that have no place in this one are taken away; supports by other names stay.
 */
export function layOutGrid(building: Building, spacings: { x: readonly number[]; y: readonly number[] }): Edit {
  const x = gridLines(spacings.x)
  const y = gridLines(spacings.y)
  if (x.length * y.length > MOST) throw new Fault('grid.large', { value: x.length * y.length, detail: { most: MOST } })
  const wanted = y.flatMap((y_m, row) => x.map((x_m, column) => ({ id: `${rowLetters(row)}${column + 1}`, x_m, y_m })))
  const names = new Set(wanted.map((support) => support.id))
  const gone = building.supports.filter((support) => isGridName(support.id) && !names.has(support.id))
  const kept = withoutSupports(
    building,
    gone.map((support) => support.id),
  )
  const old = new Map(kept.supports.map((support) => [support.id, support]))
  const placed: Support[] = [
    ...wanted.map((support) => ({ ...old.get(support.id), ...support })),
    ...kept.supports.filter((support) => !names.has(support.id)),
  ]
  return editOf(`Lay out ${wanted.length} supports on a grid`, building, withMovedSupports(kept, placed))
}

/** Letters of a row counted from 0: A to Z, then AA, AB. */
export function rowLetters(row: number): string {
  const last = String.fromCharCode(65 + (row % 26))
  return row < 26 ? last : rowLetters(Math.floor(row / 26) - 1) + last
}

/** Rows of supports with the same y, near side first. */
export function rowsOf(supports: readonly Support[]): NamedRow[] {
  return alike(
    supports,
    (s) => s.y_m,
    (s) => s.x_m,
    /^[^\d]+/,
    rowLetters,
  )
}

/** Columns of supports with the same x, from the left. */
export function columnsOf(supports: readonly Support[]): NamedRow[] {
  return alike(
    supports,
    (s) => s.x_m,
    (s) => s.y_m,
    /\d+$/,
    (column) => String(column + 1),
  )
}

/** The spacings of the grid that the supports stand on, as they would be typed. */
export function spacingsOf(supports: readonly Support[]): { x: number[]; y: number[] } {
  return {
    x: spaces(columnsOf(supports).map((c) => c.supports[0]!.x_m)),
    y: spaces(rowsOf(supports).map((r) => r.supports[0]!.y_m)),
  }
}

function isGridName(id: string): boolean {
  return /^[A-Z]+\d+$/.test(id)
}

function gridLines(spacings: readonly number[]): number[] {
  const lines = [0]
  for (const spacing of spacings) lines.push(roundLength(lines[lines.length - 1]! + spacing))
  return lines
}

function spaces(places: readonly number[]): number[] {
  return places.slice(1).map((place, i) => roundLength(place - places[i]!))
}

function alike(
  supports: readonly Support[],
  across: (s: Support) => number,
  along: (s: Support) => number,
  namePart: RegExp,
  fallback: (index: number) => string,
): NamedRow[] {
  const rows: Support[][] = []
  for (const support of [...supports].sort((a, b) => across(a) - across(b))) {
    const row = rows.find((r) => near(across(r[0]!), across(support)))
    if (row) row.push(support)
    else rows.push([support])
  }
  const used = new Set<string>()
  return rows.map((row, index) => {
    const parts = new Set(row.map((support) => namePart.exec(support.id)?.[0] ?? ''))
    const [shared] = parts
    let id = parts.size === 1 && shared && !used.has(shared) ? shared : fallback(index)
    for (let k = 2; used.has(id); k++) id = `${fallback(index)}.${k}`
    used.add(id)
    return { id, supports: row.sort((a, b) => along(a) - along(b)) }
  })
}
