/** Storey heights of a frame line that already stands: floors move, come and go. */
import type { Building, FrameLine, FrameNode, Member, MemberKind } from '../building.ts'
import type { Edit } from '../changes.ts'
import { Fault } from '../faults.ts'
import { editOf } from './difference.ts'
import {
  axesOf,
  beamName,
  columnName,
  datumOf,
  levelsOf,
  near,
  nodeAt,
  nodeName,
  roundLength,
  unused,
  without,
} from './frame-grid.ts'
import { withLine } from './refs.ts'

/** Sets the storey heights of a line; storeys added take the sections of the one below them. */
export function setStoreys(building: Building, id: string, heights: readonly number[]): Edit {
  if (heights.length === 0) throw new Fault('line.storeyless', { element: { kind: 'line', id } })
  return editOf(
    `Set storey heights of frame line ${id}`,
    building,
    withLine(building, id, (line) => withStoreys(line, heights)),
  )
}

/** The section most members of a kind have in a line, where there is one. */
export function usualSection(line: FrameLine, kind: MemberKind): string | undefined {
  const counts = new Map<string, number>()
  for (const member of line.members) {
    if (member.kind === kind) counts.set(member.section, (counts.get(member.section) ?? 0) + 1)
  }
  return [...counts].sort((a, b) => b[1] - a[1])[0]?.[0]
}

function withStoreys(line: FrameLine, heights: readonly number[]): FrameLine {
  const old = levelsOf(line)
  const levels: number[] = []
  for (const height of heights) levels.push(roundLength((levels[levels.length - 1] ?? datumOf(line)) + height))

  const lowered = without(line, (node) => node.support === undefined && levelOf(node, old) >= levels.length)
  const moved: FrameLine = {
    ...lowered,
    nodes: lowered.nodes.map((node) =>
      node.support === undefined ? { ...node, z_m: levels[levelOf(node, old)] ?? node.z_m } : node,
    ),
  }
  return levels.slice(old.length).reduce((tall, z_m, k) => withFloor(tall, z_m, old.length + k + 1), moved)
}

function levelOf(node: FrameNode, levels: readonly number[]): number {
  return levels.findIndex((z) => near(z, node.z_m))
}

/** One more floor on top, over every axis that reaches the floor below. */
function withFloor(line: FrameLine, z_m: number, floor: number): FrameLine {
  const below = levelsOf(line).at(-1)
  const column = usualSection(line, 'column')
  const beam = usualSection(line, 'beam')
  const nodes: FrameNode[] = [...line.nodes]
  const members: Member[] = [...line.members]
  let left: { node: FrameNode; support: string } | undefined
  for (const axis of axesOf(line)) {
    const foot = below === undefined ? axis.base : nodeAt(line, axis.x_m, below)
    if (!foot) {
      left = undefined
      continue
    }
    const head: FrameNode = { id: unused(nodeName(axis.support, floor), nodes), x_m: axis.x_m, z_m }
    nodes.push(head)
    const like = members.find((m) => m.kind === 'column' && m.to === foot.id)
    const section = like?.section ?? column ?? beam
    if (section !== undefined) {
      const id = unused(columnName(axis.support, floor), members)
      members.push({ id, kind: 'column', from: foot.id, to: head.id, section })
    }
    if (left && (beam ?? section) !== undefined) {
      const under = members.find((m) => m.kind === 'beam' && m.to === foot.id)
      const id = unused(beamName(left.support, axis.support, floor), members)
      members.push({ id, kind: 'beam', from: left.node.id, to: head.id, section: under?.section ?? beam ?? section! })
    }
    left = { node: head, support: axis.support }
  }
  return { ...line, nodes, members }
}
