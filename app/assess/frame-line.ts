/**
 * A frame line of the building as the solver's arrays: units converted here and nowhere else, and a way back
 * from indices to the names of nodes and members. A node with no member, no support and no load takes no part.
 */
import type { Building, FrameLine, FrameNode, Member, Section } from '../model/building.ts'
import { Fault, type FaultRecord } from '../model/faults.ts'
import type { FrameArrays, FrameLoads, MemberLoadValue, SolverFault } from '../../solver/index.ts'

export interface LineArrays {
  frame: FrameArrays
  /** Nodes in the order of the arrays. */
  nodes: FrameNode[]
  members: Member[]
  sections: Section[]
  /** Ids of the supports in the order of the bases. */
  supports: string[]
}

/** The arrays of a line; undefined where it has no members yet. */
export function lineArrays(line: FrameLine, sections: readonly Section[]): LineArrays | undefined {
  if (line.members.length === 0) return undefined
  const used = new Set(line.members.flatMap((m) => [m.from, m.to]))
  const nodes = line.nodes.filter((n) => used.has(n.id) || n.support !== undefined || n.load_kN !== undefined)
  const nodeAt = new Map(nodes.map((n, i) => [n.id, i]))
  const sectionOf = new Map(sections.map((s) => [s.id, s]))
  const m = line.members.length
  const bases = nodes.filter((n) => n.support !== undefined)
  const frame: FrameArrays = {
    x: Float64Array.from(nodes, (n) => n.x_m),
    z: Float64Array.from(nodes, (n) => n.z_m),
    from: new Int32Array(m),
    to: new Int32Array(m),
    EI: new Float64Array(m),
    EA: new Float64Array(m),
    GAs: new Float64Array(m),
    pinFrom: Uint8Array.from(line.members, (b) => (b.pin_from ? 1 : 0)),
    pinTo: Uint8Array.from(line.members, (b) => (b.pin_to ? 1 : 0)),
    base: Int32Array.from(bases, (n) => nodeAt.get(n.id)!),
    baseSpring: Float64Array.from(bases, springOf),
  }
  const memberSections = line.members.map((member, i) => {
    const section = sectionOf.get(member.section)
    const from = nodeAt.get(member.from)
    const to = nodeAt.get(member.to)
    if (section === undefined) throw unknown(line, member, 'section', member.section)
    if (from === undefined) throw unknown(line, member, 'node', member.from)
    if (to === undefined) throw unknown(line, member, 'node', member.to)
    frame.from[i] = from
    frame.to[i] = to
    // GPa = 1e6 kN/m2, cm4 = 1e-8 m4, cm2 = 1e-4 m2
    frame.EI[i] = section.E_GPa * section.I_cm4 * (section.stiffness_factor ?? 1) * 1e-2
    frame.EA[i] = section.E_GPa * section.A_cm2 * 1e2
    frame.GAs[i] =
      section.shear_area_cm2 === undefined
        ? Infinity
        : (section.G_over_E ?? 1 / 2.4) * section.E_GPa * section.shear_area_cm2 * 1e2
    return section
  })
  return { frame, nodes, members: line.members, sections: memberSections, supports: bases.map((n) => n.support!) }
}

function springOf({ base }: FrameNode): number {
  if (base === 'pinned') return 0
  return typeof base === 'object' ? base.rotation_kNm_per_rad : Infinity
}

/** The loads on the line combined with their factors; undefined where nothing is loaded. */
export function combinedLoads(
  { nodes, members }: LineArrays,
  factors: { permanent: number; variable: number },
): FrameLoads | undefined {
  let loaded = false
  const nodeDown = Float64Array.from(nodes, ({ load_kN: load }) => {
    if (load === undefined) return 0
    loaded = true
    return factors.permanent * (load.permanent ?? 0) + factors.variable * (load.variable ?? 0)
  })
  const onMembers = members.flatMap((member, i): MemberLoadValue[] =>
    (member.loads ?? []).map((load) => {
      loaded = true
      const factor = factors[load.action]
      return load.kind === 'uniform'
        ? { member: i, kind: 'uniform', w: factor * load.kN_per_m }
        : { member: i, kind: 'point', P: factor * load.kN, a: load.at_m }
    }),
  )
  return loaded ? { nodeDown, onMembers } : undefined
}

function unknown(line: FrameLine, member: Member, kind: 'section' | 'node', id: string): Fault {
  return new Fault('member.incomplete', {
    value: id,
    element: { kind: 'member', id: member.id, within: line.id },
    detail: { line: line.id, member: member.id, kind },
  })
}

/** What the solver refused, in the names of the line. */
export function namedFault(fault: SolverFault, line: FrameLine, arrays: LineArrays): FaultRecord {
  const nodes = fault.at.map((i) => arrays.nodes[i]?.id ?? '?')
  const element = { kind: 'line', id: line.id } as const
  switch (fault.code) {
    case 'mechanism':
      return { code: 'frame.mechanism', place: { element, detail: { line: line.id, nodes } } }
    case 'unsupported':
      return { code: 'frame.unsupported', place: { element, detail: { line: line.id, nodes } } }
    case 'zero-length':
      return memberFault('member.lengthless', fault, line, arrays)
    case 'not-positive':
    case 'not-finite':
    case 'shape':
    case 'untied':
      if (fault.what === 'x' || fault.what === 'z' || fault.what.startsWith('base') || fault.at.length === 0)
        return { code: 'frame.unusable', place: { element, value: fault.what, detail: { line: line.id, nodes } } }
      return memberFault('member.unusable', fault, line, arrays)
  }
}

function memberFault(
  code: 'member.lengthless' | 'member.unusable',
  fault: SolverFault,
  line: FrameLine,
  arrays: LineArrays,
): FaultRecord {
  // A fault of a load names its case first, then the member.
  const member = arrays.members[fault.at.at(-1) ?? 0]?.id ?? '?'
  const element = { kind: 'member', id: member, within: line.id } as const
  return { code, place: { value: fault.what, element, detail: { line: line.id, member } } }
}

/** The sections that a line uses, for telling whether anything about it changed. */
export function sectionsUsed(line: FrameLine, building: Pick<Building, 'sections'>): Section[] {
  const used = new Set(line.members.map((m) => m.section))
  return building.sections.filter((s) => used.has(s.id))
}
