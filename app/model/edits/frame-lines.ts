/** Frame lines made from supports and storey heights: nodes, columns and beams appear at once. */
import type { Base, Building, FrameLine, FrameNode, Member, Support } from '../building.ts'
import type { Edit } from '../changes.ts'
import { Fault } from '../faults.ts'
import { editOf } from './difference.ts'
import {
  baseDepths,
  beamName,
  columnName,
  distancesAlong,
  nodeName,
  roundLength,
  supportsByName,
} from './frame-grid.ts'
import { columnsOf, rowsOf, type NamedRow } from './grid.ts'
import { freeName } from './refs.ts'

/** What a frame line is made with, its supports apart. */
export interface FrameMake {
  /** From the bottom up, in m. */
  storeys: readonly number[]
  /** Names of sections. */
  beam: string
  column: string
  base?: Base
}

/** Makes a frame line through the supports picked, whichever way round they were picked. */
export function addFrameLine(building: Building, line: FrameMake & { id: string; supports: readonly string[] }): Edit {
  const id = freeName({ kind: 'line', id: line.id }, building.frame_lines)
  const made = frameLine(building, { ...line, id })
  return editOf(`Make frame line ${id}`, building, { ...building, frame_lines: [...building.frame_lines, made] })
}

/** Makes a frame line for every row and every column of the grid that has none by that name yet. */
export function addGridLines(building: Building, make: FrameMake): Edit {
  const wanted = [...rowsOf(building.supports), ...columnsOf(building.supports)]
  const lines = wanted
    .filter((row) => row.supports.length > 1 && !building.frame_lines.some((line) => line.id === row.id))
    .map((row: NamedRow) => frameLine(building, { ...make, id: row.id, supports: row.supports.map((s) => s.id) }))
  const what = lines.length === 1 ? `Make frame line ${lines[0]!.id}` : `Make ${lines.length} frame lines`
  return editOf(what, building, { ...building, frame_lines: [...building.frame_lines, ...lines] })
}

export function removeFrameLine(building: Building, id: string): Edit {
  return editOf(`Remove frame line ${id}`, building, {
    ...building,
    frame_lines: building.frame_lines.filter((line) => line.id !== id),
  })
}

export function renameFrameLine(building: Building, id: string, name: string): Edit {
  const others = building.frame_lines.filter((line) => line.id !== id)
  const next = freeName({ kind: 'line', id: name }, others)
  const frame_lines = building.frame_lines.map((line) => (line.id === id ? { ...line, id: next } : line))
  return editOf(`Rename frame line ${id} to ${next}`, building, { ...building, frame_lines })
}

/** Supports in their order along the line, from its left or near end. */
export function alongLine(supports: readonly Support[]): Support[] {
  let ends: [Support, Support] | undefined
  let longest = 0
  for (const a of supports) {
    for (const b of supports) {
      const apart = Math.hypot(b.x_m - a.x_m, b.y_m - a.y_m)
      const forwards = b.x_m - a.x_m > 1e-6 || (Math.abs(b.x_m - a.x_m) <= 1e-6 && b.y_m > a.y_m)
      if (forwards && apart > longest) [ends, longest] = [[a, b], apart]
    }
  }
  if (!ends) return [...supports]
  const [a, b] = ends
  function position(s: Support): number {
    return (s.x_m - a.x_m) * (b.x_m - a.x_m) + (s.y_m - a.y_m) * (b.y_m - a.y_m)
  }
  return [...supports].sort((s, t) => position(s) - position(t))
}

function frameLine(building: Building, make: FrameMake & { id: string; supports: readonly string[] }): FrameLine {
  const byName = supportsByName(building)
  const picked = [...new Set(make.supports)].flatMap((id) => byName.get(id) ?? [])
  const element = { kind: 'line', id: make.id } as const
  if (picked.length < 2) throw new Fault('line.short', { element, value: picked.map((s) => s.id) })
  if (make.storeys.length === 0) throw new Fault('line.storeyless', { element })

  const supports = alongLine(picked)
  const x = distancesAlong(supports)
  const depths = baseDepths(supports)
  const nodes: FrameNode[] = supports.map((support, i) => ({
    id: support.id,
    x_m: x[i]!,
    z_m: depths[i]!,
    support: support.id,
    base: make.base ?? 'fixed',
  }))
  const members: Member[] = []
  let level = 0
  make.storeys.forEach((height, k) => {
    level = roundLength(level + height)
    const storey = k + 1
    supports.forEach((support, i) => {
      nodes.push({ id: nodeName(support.id, storey), x_m: x[i]!, z_m: level })
      members.push({
        id: columnName(support.id, storey),
        kind: 'column',
        from: k === 0 ? support.id : nodeName(support.id, k),
        to: nodeName(support.id, storey),
        section: make.column,
      })
    })
    for (let i = 1; i < supports.length; i++) {
      const [from, to] = [supports[i - 1]!.id, supports[i]!.id]
      members.push({
        id: beamName(from, to, storey),
        kind: 'beam',
        from: nodeName(from, storey),
        to: nodeName(to, storey),
        section: make.beam,
      })
    }
  })
  return { id: make.id, nodes, members }
}
