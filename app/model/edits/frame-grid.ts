/**
 * A frame line read as a grid: vertical axes at its supports and levels at its floors, whichever way its
 * nodes came to be. Names made here are those of the trade's custom: nodes `A1`, `A1-1`, `A1-2` up an axis,
 * columns `CA1/1` by storey, beams `A1-A2/1` by floor.
 */
import type { Building, FrameLine, FrameNode, Member, Support } from '../building.ts'

/** Nodes closer together than this stand on one axis or level, in m. */
const NEAR_M = 1e-4

export interface Axis {
  /** Name of the support, and of the node on it. */
  support: string
  base: FrameNode
  x_m: number
}

export function near(a: number, b: number): boolean {
  return Math.abs(a - b) < NEAR_M
}

/** Lengths and levels are kept to a tenth of a millimetre, so that sums of typed spacings stay round. */
export function roundLength(metres: number): number {
  return Math.round(metres * 1e4) / 1e4 + 0
}

/** The axes of a line from left to right. */
export function axesOf(line: FrameLine): Axis[] {
  return line.nodes
    .flatMap((node) => (node.support === undefined ? [] : [{ support: node.support, base: node, x_m: node.x_m }]))
    .sort((a, b) => a.x_m - b.x_m)
}

/** The floors of a line from the lowest up: the levels of the nodes that stand on no support. */
export function levelsOf(line: FrameLine): number[] {
  const levels: number[] = []
  for (const node of line.nodes) {
    if (node.support === undefined && !levels.some((z) => near(z, node.z_m))) levels.push(node.z_m)
  }
  return levels.sort((a, b) => a - b)
}

/** The level that storey heights are counted from: that of the highest base. */
export function datumOf(line: FrameLine): number {
  const bases = axesOf(line).map((axis) => axis.base.z_m)
  return bases.length ? Math.max(...bases) : 0
}

/** Storey heights from the bottom up. */
export function storeyHeights(line: FrameLine): number[] {
  const levels = levelsOf(line)
  return levels.map((z, k) => roundLength(z - (k === 0 ? datumOf(line) : levels[k - 1]!)))
}

/** The node at a place of the line, if there is one. */
export function nodeAt(line: FrameLine, x_m: number, z_m: number): FrameNode | undefined {
  return line.nodes.find((node) => near(node.x_m, x_m) && near(node.z_m, z_m))
}

/** Name of the node on an axis at the floor counted from 1. */
export function nodeName(support: string, floor: number): string {
  return `${support}-${floor}`
}

/** Name of the column of an axis in the storey counted from 1. */
export function columnName(support: string, storey: number): string {
  return `C${support}/${storey}`
}

/** Name of the beam between two axes at the floor counted from 1. */
export function beamName(from: string, to: string, floor: number): string {
  return `${from}-${to}/${floor}`
}

/** A name not yet taken in the list: the wanted one, else with a letter after it. */
export function unused(name: string, taken: readonly { id: string }[]): string {
  const ids = new Set(taken.map((entity) => entity.id))
  if (!ids.has(name)) return name
  for (let k = 2; ; k++) if (!ids.has(`${name}.${k}`)) return `${name}.${k}`
}

/** The line with its members and nodes changed by a condition; members on a node that goes, go. */
export function without(line: FrameLine, goes: (node: FrameNode) => boolean): FrameLine {
  const gone = new Set(line.nodes.filter(goes).map((node) => node.id))
  return {
    ...line,
    nodes: line.nodes.filter((node) => !gone.has(node.id)),
    members: line.members.filter((member) => !gone.has(member.from) && !gone.has(member.to)),
  }
}

/** The line without the nodes that stand on no support and join no member. */
export function withoutLooseNodes(line: FrameLine): FrameLine {
  const joined = new Set(line.members.flatMap((member) => [member.from, member.to]))
  return { ...line, nodes: line.nodes.filter((node) => node.support !== undefined || joined.has(node.id)) }
}

/** Distances of supports along a line through them in the order given, from the first one on, in m. */
export function distancesAlong(supports: readonly Support[]): number[] {
  let along = 0
  return supports.map((support, i) => {
    const before = supports[i - 1]
    if (before) along += Math.hypot(support.x_m - before.x_m, support.y_m - before.y_m)
    return roundLength(along)
  })
}

/** Levels of the bases of a line's supports against the highest of them: 0 or below, in m. */
export function baseDepths(supports: readonly Support[]): number[] {
  const highest = Math.max(...supports.map((support) => support.base_m ?? 0))
  return supports.map((support) => roundLength((support.base_m ?? 0) - highest))
}

/** The supports of a building by name. */
export function supportsByName(building: Building): Map<string, Support> {
  return new Map(building.supports.map((support) => [support.id, support]))
}

/** The length of a member, in m. */
export function lengthOf(line: FrameLine, member: Pick<Member, 'from' | 'to'>): number {
  const from = line.nodes.find((node) => node.id === member.from)
  const to = line.nodes.find((node) => node.id === member.to)
  return from && to ? Math.hypot(to.x_m - from.x_m, to.z_m - from.z_m) : NaN
}
