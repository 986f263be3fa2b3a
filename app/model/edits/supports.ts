/** One support at a time: put down, moved, renamed, taken away. */
import type { Building, FrameLine, Support } from '../building.ts'
import type { Edit } from '../changes.ts'
import { editOf, filled } from './difference.ts'
import { beamName, columnName, nodeName } from './frame-grid.ts'
import { freeName } from './refs.ts'
import { withMovedSupports, withoutSupports } from './support-cascade.ts'

export function addSupport(building: Building, support: Support): Edit {
  const id = freeName({ kind: 'support', id: support.id }, building.supports)
  const supports = [...building.supports, filled({ ...support, id })]
  return editOf(`Add support ${id}`, building, { ...building, supports })
}

/** Moves a support in plan or sets the level of its base; frame lines through it follow. */
export function moveSupport(building: Building, id: string, to: Partial<Omit<Support, 'id'>>): Edit {
  const supports = building.supports.map((s) => (s.id === id ? filled({ ...s, ...to }) : s))
  const what = 'x_m' in to || 'y_m' in to ? `Move support ${id}` : `Set base level of ${id}`
  return editOf(what, building, withMovedSupports(building, supports))
}

/** Sets the level of the base of many supports at once. */
export function setBaseLevels(building: Building, ids: readonly string[], base_m: number | undefined): Edit {
  const wanted = new Set(ids)
  const supports = building.supports.map((s) => (wanted.has(s.id) ? filled({ ...s, base_m }) : s))
  const what = ids.length === 1 ? `Set base level of ${ids[0]}` : `Set base level of ${ids.length} supports`
  return editOf(what, building, withMovedSupports(building, supports))
}

export function removeSupports(building: Building, ids: readonly string[]): Edit {
  const what = ids.length === 1 ? `Remove support ${ids[0]}` : `Remove ${ids.length} supports`
  return editOf(what, building, withoutSupports(building, ids))
}

/** Renames a support, and with it the nodes and members named after it. Studs keep their names: they were read. */
export function renameSupport(building: Building, id: string, name: string): Edit {
  const others = building.supports.filter((support) => support.id !== id)
  const next = freeName({ kind: 'support', id: name }, others)
  return editOf(`Rename support ${id} to ${next}`, building, {
    ...building,
    supports: building.supports.map((support) => (support.id === id ? { ...support, id: next } : support)),
    frame_lines: building.frame_lines.map((line) => renamedAxis(line, id, next)),
    survey: {
      ...building.survey,
      points: building.survey.points.map((point) =>
        point.kind === 'stud' && point.support === id ? { ...point, support: next } : point,
      ),
    },
  })
}

function renamedAxis(line: FrameLine, id: string, next: string): FrameLine {
  if (!line.nodes.some((node) => node.support === id)) return line
  const taken = new Set(line.nodes.map((node) => node.id))
  const names = new Map<string, string>()
  for (const node of line.nodes) {
    const floor = floorOf(node.id, id)
    const wanted = floor === undefined ? undefined : floor === 0 ? next : nodeName(next, floor)
    if (wanted !== undefined && !taken.has(wanted)) names.set(node.id, wanted)
  }
  function renamed(node: string): string {
    return names.get(node) ?? node
  }
  return {
    ...line,
    nodes: line.nodes.map((node) => ({
      ...node,
      id: renamed(node.id),
      ...(node.support === id ? { support: next } : {}),
    })),
    members: line.members.map((member) => {
      const [from, to] = [renamed(member.from), renamed(member.to)]
      const own = customName(member.kind, member.from, member.to)
      const wanted = own === member.id ? customName(member.kind, from, to) : undefined
      const free = wanted !== undefined && !line.members.some((m) => m.id === wanted)
      return { ...member, id: free ? wanted : member.id, from, to }
    }),
  }
}

/** The floor of a node named after its support, 0 for its base; undefined for any other name. */
function floorOf(node: string, support: string): number | undefined {
  if (node === support) return 0
  const floor = node.startsWith(`${support}-`) ? node.slice(support.length + 1) : ''
  return /^\d+$/.test(floor) ? Number(floor) : undefined
}

/** The name that a member between two nodes named by custom has by custom. */
function customName(kind: string, from: string, to: string): string | undefined {
  const ends = [from, to].map((node) => /^(.*)-(\d+)$/.exec(node))
  const [a, b] = ends
  if (kind === 'column') return b ? columnName(b[1]!, Number(b[2])) : undefined
  if (kind === 'beam' && a && b && a[2] === b[2]) return beamName(a[1]!, b[1]!, Number(a[2]))
  return undefined
}
