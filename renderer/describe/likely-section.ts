/** The section that a new frame line is offered with. */
import type { Building, MemberKind } from '../../app/model/building.ts'
import { usualSection } from '../../app/model/edits/storeys.ts'

/** The one that most members of the kind have; before there are any, the first that its name does not speak against. */
export function likelySection(building: Building, kind: Extract<MemberKind, 'beam' | 'column'>): string | undefined {
  const members = building.frame_lines.flatMap((line) => line.members)
  const names = building.sections.map((section) => section.id)
  const usual = usualSection({ id: '', nodes: [], members }, kind)
  if (usual !== undefined) return usual
  const isColumn = (name: string) => /col|pier|stanchion|post/i.test(name)
  return names.find((name) => isColumn(name) === (kind === 'column')) ?? names[0]
}
