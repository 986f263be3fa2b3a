/** Applies an edit's changes one at a time, holding every step to its references, as a file's foreign keys do. For tests. */
import { applyChanges, reverseEdit } from '../../app/model/apply-changes.ts'
import type { Building } from '../../app/model/building.ts'
import type { Change } from '../../app/model/changes.ts'

/** The building after the changes. Throws where a change does not fit what is there or leaves a reference open. */
export function applied(building: Building, changes: readonly Change[]): Building {
  return changes.reduce((before, change) => {
    const next = applyChanges(before, [change])
    const open = openReferences(next)
    if (open.length) throw new Error(`${change.kind}: ${open.join('; ')}`)
    return next
  }, building)
}

/** The changes that take these back. */
export function reversed(changes: readonly Change[]): readonly Change[] {
  return reverseEdit({ what: '', changes }).changes
}

function openReferences(building: Building): string[] {
  const supports = new Set(building.supports.map((s) => s.id))
  const sections = new Set(building.sections.map((s) => s.id))
  const open: string[] = []
  for (const point of building.survey.points)
    if (point.kind === 'stud' && !supports.has(point.support)) open.push(`${point.id} on ${point.support}`)
  for (const line of building.frame_lines) {
    const nodes = new Set(line.nodes.map((n) => n.id))
    for (const node of line.nodes)
      if (node.support !== undefined && !supports.has(node.support)) open.push(`${node.id} on ${node.support}`)
    for (const m of line.members) {
      for (const end of [m.from, m.to]) if (!nodes.has(end)) open.push(`${m.id} to ${end}`)
      if (!sections.has(m.section)) open.push(`${m.id} of ${m.section}`)
    }
  }
  return open
}
