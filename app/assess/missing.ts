/**
 * What is still missing before results can be had, and what would make them say more: each a sentence and the
 * place where it is mended. It looks at the description as a whole; what is wrong with a single value is told
 * where the value is typed.
 */
import { capacityOf, heldBenchmarks, type Building, type Member, type Round } from '../model/building.ts'
import type { ElementRef } from '../model/faults.ts'

/** Part of the place in which the thing is given. */
export type MissingPart = 'grid' | 'lines' | 'sections' | 'members' | 'loads' | 'capacities' | 'points' | 'rounds'

export interface Missing {
  text: string
  place: 'describe' | 'log'
  target: { part: MissingPart; element?: ElementRef }
  /** True where there can be no results without it; else they only say less. */
  needed: boolean
}

/** What is missing, in the order in which one would give it. */
export function missing(building: Building, drafts: readonly Pick<Round, 'id'>[]): Missing[] {
  return [...frames(building), ...survey(building, drafts), ...strength(building)]
}

function frames(building: Building): Missing[] {
  const { supports, sections, frame_lines } = building
  const found: Missing[] = []
  if (supports.length < 2) found.push(needed('grid', 'There are no supports yet: type the spacings of the grid.'))
  if (sections.length === 0)
    found.push(needed('sections', 'There is no section yet: add those of the beams and columns.'))
  if (frame_lines.length === 0)
    found.push(needed('lines', 'There is no frame line yet: pick supports and type storey heights.'))
  for (const line of frame_lines) {
    const element = { kind: 'line', id: line.id } as const
    if (line.members.length === 0) found.push(needed('lines', `Frame line ${line.id} has no member left.`, element))
  }
  const standing = new Set(frame_lines.flatMap((line) => line.nodes.map((node) => node.support)))
  const alone = supports.filter((support) => !standing.has(support.id)).map((support) => support.id)
  if (frame_lines.length > 0 && alone.length > 0) {
    found.push(
      advised('lines', `${list(alone)} ${stands(alone)} on no frame line: settlement is found, bending is not.`),
    )
  }
  return found
}

function survey(building: Building, drafts: readonly Pick<Round, 'id'>[]): Missing[] {
  const { points, rounds, baseline } = building.survey
  const found: Missing[] = []
  const studs = points.flatMap((point) => (point.kind === 'stud' ? [point.support] : []))
  const bare = building.supports.filter((support) => !studs.includes(support.id)).map((support) => support.id)
  if (building.supports.length > 0) {
    if (studs.length === 0) found.push(needed('points', 'There is no levelling stud yet: place one at every support.'))
    else if (bare.length > 0) {
      const text = `${list(bare)} ${bare.length === 1 ? 'has' : 'have'} no stud: the settlement there is estimated.`
      found.push(advised('points', text, { kind: 'support', id: bare[0]! }))
    }
    const given = rounds.some((round) => round.levels)
    if (!given && heldBenchmarks(building).length === 0)
      found.push(advised('points', 'There is no benchmark: a level book needs one, given levels do not.'))
  }
  if (studs.length === 0) return found
  const open = [...drafts].sort((a, b) => (a.id < b.id ? -1 : 1))[0]
  if (rounds.length === 0)
    found.push(round(open, 'There is no baseline yet: book the first round.', 'to make it the baseline'))
  else if (!rounds.some((r) => r.id === baseline))
    found.push(round(undefined, 'No round is the baseline: say which one settlement is counted from.', ''))
  else if (rounds.length === 1)
    found.push(round(open, 'There is one round only: settlement needs a second.', 'and its results are kept'))
  return found
}

function round(open: Pick<Round, 'id'> | undefined, text: string, accepted: string): Missing {
  if (!open) return { text, place: 'log', target: { part: 'rounds' }, needed: true }
  return {
    text: `Round ${open.id} is a draft: accept it ${accepted}.`,
    place: 'log',
    target: { part: 'rounds', element: { kind: 'round', id: open.id } },
    needed: true,
  }
}

function strength(building: Building): Missing[] {
  const sections = new Map(building.sections.map((section) => [section.id, section]))
  const members = building.frame_lines.flatMap((line) => line.members.map((member) => ({ line: line.id, member })))
  if (members.length === 0) return []
  function isBare(member: Member): boolean {
    return capacityOf(member, sections.get(member.section) ?? {}).sagging_kNm === undefined
  }
  const found: Missing[] = []
  const bare = members.filter(({ member }) => isBare(member))
  if (bare.length > 0) {
    const { line, member } = bare[0]!
    const who =
      bare.length === members.length
        ? 'No member has'
        : `${list(bare.map((b) => b.member.id))} ${bare.length === 1 ? 'has' : 'have'} no`
    const text = `${who}${bare.length === members.length ? ' a' : ''} moment capacity: moments are found, flags are not.`
    found.push(advised('capacities', text, { kind: 'member', id: member.id, within: line }))
  }
  if (!members.some(({ member }) => member.loads?.length))
    found.push(advised('loads', 'No member carries a load: utilisation counts what settlement induces alone.'))
  return found
}

function needed(part: MissingPart, text: string, element?: ElementRef): Missing {
  return { text, place: 'describe', target: element ? { part, element } : { part }, needed: true }
}

function advised(part: MissingPart, text: string, element?: ElementRef): Missing {
  return { ...needed(part, text, element), needed: false }
}

function stands(ids: readonly string[]): string {
  return ids.length === 1 ? 'stands' : 'stand'
}

function list(ids: readonly string[]): string {
  return ids.length > 4 ? `${ids.slice(0, 3).join(', ')} and ${ids.length - 3} more` : ids.join(', ')
}
