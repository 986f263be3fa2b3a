/** The building's head, the criteria it is held against, and how its frames stand on the ground. */
import type { Base, Building, GivenCriteria } from '../building.ts'
import type { BuildingHead, Edit } from '../changes.ts'
import { Fault } from '../faults.ts'
import { editOf, filled } from './difference.ts'

/** Sets the name, reference, client, address or notes; empty text takes one of the last four away. */
export function setHead(building: Building, values: Partial<BuildingHead>): Edit {
  const head = Object.fromEntries(
    Object.entries(values).map(([key, value]) => [key, value?.trim() === '' ? undefined : value?.trim()]),
  )
  const next = filled({ ...building, ...head })
  if (!next.name)
    throw new Fault('name.empty', { element: { kind: 'building', id: building.name }, value: values.name })
  return editOf(`Set ${Object.keys(values).join(', ')} of the building`, building, next)
}

/** Sets criteria; a value that is undefined takes its default again. */
export function setCriteria(building: Building, values: GivenCriteria): Edit {
  const given: Record<string, unknown> = { ...building.criteria }
  for (const [key, value] of Object.entries(values)) {
    if (typeof value !== 'object') given[key] = value
    else {
      const whole = filled({ ...(given[key] as object | undefined), ...value })
      given[key] = Object.keys(whole).length ? whole : undefined
    }
  }
  const criteria = filled(given) as GivenCriteria
  return editOf(
    'Set criteria',
    building,
    filled({ ...building, criteria: Object.keys(criteria).length ? criteria : undefined }),
  )
}

/** Sets how frames are held at supports, in every frame line that stands on them. */
export function setBase(building: Building, supports: readonly string[], base: Base): Edit {
  const wanted = new Set(supports)
  const what = supports.length === 1 ? `Set base of ${supports[0]}` : `Set base of ${supports.length} supports`
  return editOf(what, building, {
    ...building,
    frame_lines: building.frame_lines.map((line) => ({
      ...line,
      nodes: line.nodes.map((node) =>
        node.support !== undefined && wanted.has(node.support) ? { ...node, base } : node,
      ),
    })),
  })
}
