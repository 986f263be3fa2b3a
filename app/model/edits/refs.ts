/** How edits name what they act on, and the few faults that stop one before it is made. */
import type { Building, FrameLine, Member } from '../building.ts'
import { Fault, type ElementRef } from '../faults.ts'

/** A member by its frame line and its name there. */
export interface MemberRef {
  line: string
  id: string
}

/** The name of the one, or the number of the many: "A1-A2/1", "3 members". */
export function named(refs: readonly { id: string }[], many: string): string {
  const [first] = refs
  return refs.length === 1 && first ? first.id : `${refs.length} ${many}`
}

/** A name as it is kept: without space around it; refused where it is empty or already in use. */
export function freeName(element: ElementRef, taken: readonly { id: string }[]): string {
  const id = element.id.trim()
  if (id === '') throw new Fault('name.empty', { element, value: element.id })
  if (taken.some((entity) => entity.id === id)) throw new Fault('name.taken', { element, value: id })
  return id
}

/** The building with one frame line changed. */
export function withLine(building: Building, id: string, change: (line: FrameLine) => FrameLine): Building {
  return { ...building, frame_lines: building.frame_lines.map((line) => (line.id === id ? change(line) : line)) }
}

/** The building with every member of the list changed. */
export function withMembers(building: Building, refs: readonly MemberRef[], change: (m: Member) => Member): Building {
  const wanted = new Map<string, Set<string>>()
  for (const { line, id } of refs) wanted.set(line, (wanted.get(line) ?? new Set()).add(id))
  return {
    ...building,
    frame_lines: building.frame_lines.map((line) => {
      const ids = wanted.get(line.id)
      return ids ? { ...line, members: line.members.map((m) => (ids.has(m.id) ? change(m) : m)) } : line
    }),
  }
}

/** The rounds in which a point was read. */
export function roundsReading(building: Building, point: string): string[] {
  return building.survey.rounds
    .filter(
      (round) =>
        round.levels?.some((level) => level.point === point) || round.book?.rows.some((row) => row.point === point),
    )
    .map((round) => round.id)
}
