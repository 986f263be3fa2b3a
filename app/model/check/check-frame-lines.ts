/** Frame lines of a building file: nodes, members and loads, each held to what it refers to. */
import type { Action, Base, FrameLine, FrameNode, Member, MemberKind, MemberLoad, Support } from '../building.ts'
import { filled } from '../edits/difference.ts'
import { checkCapacity, COORDINATE } from './check-sections.ts'
import { noteHanging } from './connection.ts'
import { Entry, noteRepeated } from './entry.ts'

const KINDS: readonly MemberKind[] = ['beam', 'column', 'brace']
const ACTIONS: readonly Action[] = ['permanent', 'variable']
const MEMBER_KEYS = ['id', 'kind', 'from', 'to', 'section', 'pin_from', 'pin_to', 'loads', 'capacity']

/** No member of a building is longer; a frame typed in millimetres is. */
const LONGEST_M = 1000

export interface Known {
  supports: ReadonlyMap<string, Support>
  sections: ReadonlyMap<string, unknown>
  /** Parts that are joined to no support yet are let through: the description is being typed. */
  unfinished: boolean
}

export function checkFrameLines(building: Entry, known: Known): FrameLine[] {
  const names: { id: string; path: string }[] = []
  const lines = building.list('frame_lines', (value, path): FrameLine => {
    const entry = Entry.of(building.faults, path, value, ['id', 'nodes', 'members'])
    if (!entry) return { id: '', nodes: [], members: [] }
    const id = entry.name('id')
    entry.element = { kind: 'line', id }
    names.push({ id, path: entry.at('id') })
    const before = building.faults.all.length
    const nodes = checkNodes(entry, id, known)
    const members = checkMembers(entry, id, nodes, known)
    const line = { id, nodes, members }
    if (!known.unfinished && building.faults.all.length === before) noteHanging(entry, line)
    return line
  })
  noteRepeated(building.faults, 'line', names)
  return lines
}

function checkNodes(line: Entry, within: string, known: Known): FrameNode[] {
  const names: { id: string; path: string }[] = []
  const standing = new Map<string, string>()
  const nodes = line.list('nodes', (value, path): FrameNode => {
    const entry = Entry.of(line.faults, path, value, ['id', 'x_m', 'z_m', 'support', 'base', 'load_kN'], line.element)
    if (!entry) return { id: '', x_m: NaN, z_m: NaN }
    const id = entry.name('id')
    entry.element = { kind: 'node', id, within }
    names.push({ id, path: entry.at('id') })
    const node = filled({
      id,
      x_m: entry.number('x_m', COORDINATE),
      z_m: entry.number('z_m', COORDINATE),
      support: entry.has('support') ? entry.reference('support', 'support', known.supports) : undefined,
      base: entry.has('base') ? checkBase(entry) : undefined,
      load_kN: checkNodeLoad(entry),
    })
    if (node.support !== undefined) {
      const other = standing.get(node.support)
      if (other !== undefined) entry.fault('support.shared', 'support', { other })
      else if (known.supports.has(node.support)) standing.set(node.support, id)
    }
    return node
  })
  noteRepeated(line.faults, 'node', names, within)
  noteScale(line, nodes, known)
  return nodes
}

function checkBase(node: Entry): Base | undefined {
  if (!node.has('support')) {
    node.fault('base.supportless', 'base')
    return undefined
  }
  const value = node.value('base')
  if (typeof value !== 'object' || value === null) return node.choice<'fixed' | 'pinned'>('base', ['fixed', 'pinned'])
  const entry = node.entry('base', ['rotation_kNm_per_rad'])
  if (!entry) return undefined
  const remedy = 'Give the stiffness in kNm per radian, or write "pinned" for a base that turns freely.'
  return { rotation_kNm_per_rad: entry.number('rotation_kNm_per_rad', { above: 0, remedy }) }
}

function checkNodeLoad(node: Entry): FrameNode['load_kN'] {
  const entry = node.entry('load_kN', ACTIONS)
  return entry && filled({ permanent: entry.maybeNumber('permanent'), variable: entry.maybeNumber('variable') })
}

function checkMembers(line: Entry, within: string, nodes: readonly FrameNode[], known: Known): Member[] {
  const places = new Map(nodes.filter((node) => node.id !== '').map((node) => [node.id, node]))
  const names: { id: string; path: string }[] = []
  const members = line.list('members', (value, path): Member => {
    const entry = Entry.of(line.faults, path, value, MEMBER_KEYS, line.element)
    if (!entry) return { id: '', kind: 'beam', from: '', to: '', section: '' }
    const id = entry.name('id')
    entry.element = { kind: 'member', id, within }
    names.push({ id, path: entry.at('id') })
    const kind = entry.choice('kind', KINDS)
    const from = entry.reference('from', 'node', places)
    const to = entry.reference('to', 'node', places)
    const length = checkLength(entry, { line: within, member: id }, places.get(from), places.get(to))
    return filled({
      id,
      kind,
      from,
      to,
      section: entry.reference('section', 'section', known.sections),
      pin_from: entry.flag('pin_from'),
      pin_to: entry.flag('pin_to'),
      loads: entry.has('loads') ? entry.list('loads', (load, at) => checkLoad(entry, load, at, length)) : undefined,
      capacity: checkCapacity(entry),
    })
  })
  noteRepeated(line.faults, 'member', names, within)
  return members
}

/** Length in m; NaN where it cannot be had. */
function checkLength(
  member: Entry,
  names: { line: string; member: string },
  from: FrameNode | undefined,
  to: FrameNode | undefined,
): number {
  if (!from || !to) return NaN
  if (from === to) {
    member.fault('member.looped', 'to')
    return NaN
  }
  const length = Math.hypot(to.x_m - from.x_m, to.z_m - from.z_m)
  const place = { path: member.path, value: rounded(length), element: member.element!, detail: names }
  if (length === 0) member.faults.add('member.lengthless', place)
  else if (length > LONGEST_M) member.faults.add('member.long', place)
  else return length
  return NaN
}

function checkLoad(member: Entry, value: unknown, path: string, length: number): MemberLoad {
  const none: MemberLoad = { kind: 'uniform', kN_per_m: NaN, action: 'permanent' }
  const isPoint = typeof value === 'object' && value !== null && (value as { kind?: unknown }).kind === 'point'
  const keys = isPoint ? ['kind', 'kN', 'at_m', 'action'] : ['kind', 'kN_per_m', 'action']
  const entry = Entry.of(member.faults, path, value, keys, member.element)
  if (!entry) return none
  const kind = entry.choice('kind', ['uniform', 'point'])
  const action = entry.choice('action', ACTIONS)
  if (kind === 'uniform') return entry.has('kind') ? { kind, kN_per_m: entry.number('kN_per_m'), action } : none
  const at_m = entry.number('at_m', { least: 0, remedy: 'Give the distance in metres from the node of "from".' })
  if (at_m > length * (1 + 1e-9)) entry.fault('load.beyond', 'at_m', { length: rounded(length) })
  return { kind, kN: entry.number('kN'), at_m, action }
}

/** Plan and frame line tell the same distances; where one is a hundred times the other, the units differ. */
function noteScale(line: Entry, nodes: readonly FrameNode[], known: Known): void {
  const standing = nodes.flatMap((node, i) => {
    const support = node.support === undefined ? undefined : known.supports.get(node.support)
    return support ? [{ node, support, path: `${line.at('nodes')}[${i}].x_m` }] : []
  })
  const [first, ...others] = standing
  for (const { node, support, path } of others) {
    const plan = Math.hypot(support.x_m - first!.support.x_m, support.y_m - first!.support.y_m)
    const along = Math.abs(node.x_m - first!.node.x_m)
    if (!(plan > 0 && along > 0) || (plan < 100 * along && along < 100 * plan)) continue
    const supports = [first!.support.id, support.id]
    const detail = { line: line.element!.id, supports, plan: rounded(plan), along: rounded(along) }
    line.faults.add('support.scaled', { path, value: node.x_m, element: line.element!, detail })
  }
}

function rounded(length: number): number {
  return Number(length.toPrecision(6))
}
