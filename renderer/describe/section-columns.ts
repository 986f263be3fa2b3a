/** Columns of the table of sections: what each value is called, its unit, and the edit that sets it. */
import type { Building, Capacity, Section } from '../../app/model/building.ts'
import type { Edit } from '../../app/model/changes.ts'
import { changeSection, setSectionCapacity } from '../../app/model/edits/sections.ts'

export interface SectionColumn {
  key: string
  heading: string
  unit?: string
  /** What the field shows while it is empty: the default that then holds. */
  empty: string
  needed: boolean
  value: (section: Section) => number | undefined
  set: (building: Building, id: string, value: number | undefined) => Edit
}

type Stiffness = 'E_GPa' | 'I_cm4' | 'A_cm2' | 'shear_area_cm2' | 'stiffness_factor'

export const SECTION_COLUMNS: readonly SectionColumn[] = [
  stiffness('E_GPa', 'E', 'GPa', true),
  stiffness('I_cm4', 'I', 'cm⁴', true),
  stiffness('A_cm2', 'A', 'cm²', true),
  stiffness('shear_area_cm2', 'shear area', 'cm²', false, 'rigid'),
  stiffness('stiffness_factor', 'factor on EI', undefined, false, '1'),
  strength('sagging_kNm', 'sagging', 'kNm', 'none'),
  strength('hogging_kNm', 'hogging', 'kNm', 'same'),
  strength('shear_kN', 'shear', 'kN', 'none'),
]

function stiffness(
  key: Stiffness,
  heading: string,
  unit: string | undefined,
  needed: boolean,
  empty = '',
): SectionColumn {
  return {
    key,
    heading,
    ...(unit === undefined ? {} : { unit }),
    empty,
    needed,
    value: (section) => section[key],
    set: (building, id, value) => changeSection(building, id, { [key]: value }),
  }
}

function strength(key: keyof Capacity, heading: string, unit: string, empty: string): SectionColumn {
  return {
    key,
    heading,
    unit,
    empty,
    needed: false,
    value: (section) => section.capacity?.[key],
    set: (building, id, value) => setSectionCapacity(building, id, key, value),
  }
}
