/** Members struck out and put back, and what is set on one or many of them at once. */
import type { Building, Capacity, FrameLine, FrameNode, Member, MemberKind } from '../building.ts'
import type { Edit } from '../changes.ts'
import { Fault } from '../faults.ts'
import { editOf, filled } from './difference.ts'
import {
  axesOf,
  beamName,
  columnName,
  levelsOf,
  near,
  nodeAt,
  nodeName,
  unused,
  withoutLooseNodes,
} from './frame-grid.ts'
import { freeName, named, withLine, withMembers, type MemberRef } from './refs.ts'
import { usualSection } from './storeys.ts'

/** Takes members out of the description because they are not there in the building. */
export function strikeOut(building: Building, refs: readonly MemberRef[]): Edit {
  const lines = new Set(refs.map((ref) => ref.line))
  function isStruck(line: string, id: string): boolean {
    return refs.some((ref) => ref.line === line && ref.id === id)
  }
  return editOf(`Strike out ${named(refs, 'members')}`, building, {
    ...building,
    frame_lines: building.frame_lines.map((line) =>
      lines.has(line.id)
        ? withoutLooseNodes({ ...line, members: line.members.filter((m) => !isStruck(line.id, m.id)) })
        : line,
    ),
  })
}

/** A place of a line's grid where a member could stand and none does. */
export interface AbsentMember {
  id: string
  kind: 'beam' | 'column'
  from: End
  to: End
}

interface End {
  id: string
  x_m: number
  z_m: number
}

/** The places of a line's grid of axes and floors that no member fills. */
export function absentMembers(line: FrameLine): AbsentMember[] {
  const axes = axesOf(line)
  const levels = levelsOf(line)
  const absent: AbsentMember[] = []
  function end(axis: number, floor: number): End {
    const { support, base, x_m } = axes[axis]!
    if (floor === 0) return { id: base.id, x_m, z_m: base.z_m }
    const z_m = levels[floor - 1]!
    return { id: nodeAt(line, x_m, z_m)?.id ?? unused(nodeName(support, floor), line.nodes), x_m, z_m }
  }
  levels.forEach((_, k) => {
    axes.forEach((axis, i) => {
      const column = { from: end(i, k), to: end(i, k + 1) }
      if (!isFilled(line, column)) absent.push({ id: columnName(axis.support, k + 1), kind: 'column', ...column })
    })
    for (let i = 1; i < axes.length; i++) {
      const beam = { from: end(i - 1, k + 1), to: end(i, k + 1) }
      const id = beamName(axes[i - 1]!.support, axes[i]!.support, k + 1)
      if (!isFilled(line, beam)) absent.push({ id, kind: 'beam', ...beam })
    }
  })
  return absent
}

/** Puts members back in places of the grid where none stands. */
export function restore(building: Building, line: string, members: readonly AbsentMember[]): Edit {
  return editOf(
    `Put back ${named(members, 'members')}`,
    building,
    withLine(building, line, (before) =>
      members.reduce((now, member) => {
        const nodes: FrameNode[] = [...now.nodes]
        for (const end of [member.from, member.to]) {
          if (!nodes.some((node) => node.id === end.id)) nodes.push({ ...end })
        }
        const section = usualSection(now, member.kind) ?? now.members[0]?.section ?? building.sections[0]?.id
        if (section === undefined) throw new Fault('section.none', { element: { kind: 'line', id: line } })
        const added = {
          id: unused(member.id, now.members),
          kind: member.kind,
          from: member.from.id,
          to: member.to.id,
          section,
        }
        return { ...now, nodes, members: [...now.members, added] }
      }, before),
    ),
  )
}

/** Adds a member between two nodes that are there, as a brace is. */
export function addMember(building: Building, line: string, member: Member): Edit {
  const frame = building.frame_lines.find((f) => f.id === line)
  const id = freeName({ kind: 'member', id: member.id, within: line }, frame?.members ?? [])
  return editOf(
    `Add ${member.kind} ${id}`,
    building,
    withLine(building, line, (before) => ({ ...before, members: [...before.members, { ...member, id }] })),
  )
}

export function setSection(building: Building, refs: readonly MemberRef[], section: string): Edit {
  return edited(building, refs, 'section', (member) => ({ ...member, section }))
}

export function setKind(building: Building, refs: readonly MemberRef[], kind: MemberKind): Edit {
  return edited(building, refs, 'kind', (member) => ({ ...member, kind }))
}

/** Pins or joins the ends of members; `from` is the left or lower end. */
export function setPin(building: Building, refs: readonly MemberRef[], end: 'from' | 'to', pinned: boolean): Edit {
  const key = end === 'from' ? 'pin_from' : 'pin_to'
  return edited(building, refs, 'pins', (member) => filled({ ...member, [key]: pinned || undefined }))
}

/** Sets one capacity of members above their section's; undefined gives the section's back. */
export function setCapacity(
  building: Building,
  refs: readonly MemberRef[],
  key: keyof Capacity,
  value: number | undefined,
): Edit {
  return edited(building, refs, 'capacity', (member) => {
    const capacity = filled({ ...member.capacity, [key]: value })
    return filled({ ...member, capacity: Object.keys(capacity).length ? capacity : undefined })
  })
}

function edited(building: Building, refs: readonly MemberRef[], what: string, change: (m: Member) => Member): Edit {
  return editOf(`Set ${what} of ${named(refs, 'members')}`, building, withMembers(building, refs, change))
}

/** Whether a member runs along any part of the way between two ends on one axis or floor. */
function isFilled(line: FrameLine, { from, to }: { from: End; to: End }): boolean {
  const nodes = new Map(line.nodes.map((node) => [node.id, node]))
  const upright = near(from.x_m, to.x_m)
  return line.members.some((member) => {
    const [a, b] = [nodes.get(member.from), nodes.get(member.to)]
    if (!a || !b) return false
    if (upright) return near(a.x_m, from.x_m) && near(b.x_m, from.x_m) && overlap([a.z_m, b.z_m], [from.z_m, to.z_m])
    return near(a.z_m, from.z_m) && near(b.z_m, from.z_m) && overlap([a.x_m, b.x_m], [from.x_m, to.x_m])
  })
}

function overlap(a: readonly [number, number], b: readonly [number, number]): boolean {
  const shared = Math.min(Math.max(...a), Math.max(...b)) - Math.max(Math.min(...a), Math.min(...b))
  return shared > 1e-4
}
