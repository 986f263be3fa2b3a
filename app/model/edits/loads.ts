/** Loads on members and nodes, set on one or many at once. Gravity, down positive. */
import type { Action, Building, FrameNode, Member, MemberLoad } from '../building.ts'
import type { Edit } from '../changes.ts'
import { editOf, filled } from './difference.ts'
import { named, withLine, withMembers, type MemberRef } from './refs.ts'

export type PointLoad = Extract<MemberLoad, { kind: 'point' }>

/** The uniform load of one action on a member: the sum where several are described, undefined where none is. */
export function uniformOf(member: Pick<Member, 'loads'>, action: Action): number | undefined {
  const loads = (member.loads ?? []).flatMap((l) => (l.kind === 'uniform' && l.action === action ? [l.kN_per_m] : []))
  return loads.length ? loads.reduce((a, b) => a + b, 0) : undefined
}

/** Puts one uniform load of an action on members in place of what they have of it; undefined takes it off. */
export function setUniform(
  building: Building,
  refs: readonly MemberRef[],
  action: Action,
  kN_per_m: number | undefined,
): Edit {
  return loaded(building, refs, `Set ${action} load on ${named(refs, 'members')}`, (loads) => {
    const first = loads.findIndex((load) => load.kind === 'uniform' && load.action === action)
    const rest = loads.filter((load) => load.kind !== 'uniform' || load.action !== action)
    if (kN_per_m !== undefined) {
      rest.splice(first < 0 ? rest.length : first, 0, { kind: 'uniform', kN_per_m, action })
    }
    return rest
  })
}

export function addPointLoad(building: Building, refs: readonly MemberRef[], load: PointLoad): Edit {
  return loaded(building, refs, `Add point load on ${named(refs, 'members')}`, (loads) => [...loads, load])
}

/** Puts another load in place of one that a member carries; undefined takes it off. */
export function setLoad(building: Building, ref: MemberRef, index: number, load: MemberLoad | undefined): Edit {
  return loaded(building, [ref], `${load ? 'Change' : 'Remove'} load on ${ref.id}`, (loads) =>
    loads.flatMap((old, i) => (i === index ? (load ?? []) : old)),
  )
}

/** Sets the load of an action on a node; undefined takes it off. */
export function setNodeLoad(
  building: Building,
  ref: { line: string; id: string },
  action: Action,
  kN: number | undefined,
): Edit {
  return editOf(
    `Set ${action} load on node ${ref.id}`,
    building,
    withLine(building, ref.line, (line) => ({
      ...line,
      nodes: line.nodes.map((node) => (node.id === ref.id ? withNodeLoad(node, action, kN) : node)),
    })),
  )
}

function withNodeLoad(node: FrameNode, action: Action, kN: number | undefined): FrameNode {
  const load_kN = filled({ ...node.load_kN, [action]: kN })
  return filled({ ...node, load_kN: Object.keys(load_kN).length ? load_kN : undefined })
}

function loaded(
  building: Building,
  refs: readonly MemberRef[],
  what: string,
  change: (loads: MemberLoad[]) => MemberLoad[],
): Edit {
  return editOf(
    what,
    building,
    withMembers(building, refs, (member) => {
      const loads = change([...(member.loads ?? [])])
      return filled({ ...member, loads: loads.length ? loads : undefined })
    }),
  )
}
