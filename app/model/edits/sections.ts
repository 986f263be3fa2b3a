/** The sections that members are made of. */
import type { Building, Capacity, Section } from '../building.ts'
import type { Edit } from '../changes.ts'
import { Fault } from '../faults.ts'
import { editOf, filled } from './difference.ts'
import { freeName } from './refs.ts'

export function addSection(building: Building, section: Section): Edit {
  const id = freeName({ kind: 'section', id: section.id }, building.sections)
  const sections = [...building.sections, filled({ ...section, id })]
  return editOf(`Add section ${id}`, building, { ...building, sections })
}

/** Sets values of a section; a key that is undefined takes its default again. */
export function changeSection(building: Building, id: string, values: Partial<Omit<Section, 'id'>>): Edit {
  const sections = building.sections.map((s) => (s.id === id ? filled({ ...s, ...values }) : s))
  return editOf(`Change section ${id}`, building, { ...building, sections })
}

export function setSectionCapacity(
  building: Building,
  id: string,
  key: keyof Capacity,
  value: number | undefined,
): Edit {
  const sections = building.sections.map((section) => {
    if (section.id !== id) return section
    const capacity = filled({ ...section.capacity, [key]: value })
    return filled({ ...section, capacity: Object.keys(capacity).length ? capacity : undefined })
  })
  return editOf(`Set capacity of section ${id}`, building, { ...building, sections })
}

/** Renames a section, and it in every member that has it. */
export function renameSection(building: Building, id: string, name: string): Edit {
  const others = building.sections.filter((section) => section.id !== id)
  const next = freeName({ kind: 'section', id: name }, others)
  return editOf(`Rename section ${id} to ${next}`, building, {
    ...building,
    sections: building.sections.map((section) => (section.id === id ? { ...section, id: next } : section)),
    frame_lines: building.frame_lines.map((line) => ({
      ...line,
      members: line.members.map((member) => (member.section === id ? { ...member, section: next } : member)),
    })),
  })
}

/** Takes a section away that no member has any more. */
export function removeSection(building: Building, id: string): Edit {
  const users = building.frame_lines.flatMap((line) => line.members.filter((member) => member.section === id))
  if (users.length) {
    throw new Fault('section.used', {
      element: { kind: 'section', id },
      value: id,
      detail: { members: users.map((member) => member.id) },
    })
  }
  return editOf(`Remove section ${id}`, building, {
    ...building,
    sections: building.sections.filter((section) => section.id !== id),
  })
}
