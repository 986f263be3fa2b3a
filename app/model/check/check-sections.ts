/** Supports, sections and capacities of a building file. */
import type { Capacity, Material, Section, Support } from '../building.ts'
import { filled } from '../edits/difference.ts'
import { Entry, noteRepeated, type NumberRule } from './entry.ts'

const MATERIALS: readonly Material[] = ['concrete', 'steel', 'timber', 'masonry', 'other']
const STIFFNESS_KEYS = ['E_GPa', 'I_cm4', 'A_cm2', 'shear_area_cm2', 'G_over_E', 'stiffness_factor']
const SECTION_KEYS = ['id', 'material', ...STIFFNESS_KEYS, 'capacity']

/** The coordinates of national grids fit; those of a national grid in millimetres do not. */
export const COORDINATE: NumberRule = { least: -2e7, most: 2e7, remedy: 'Give it in metres.' }
const MODULUS: NumberRule = {
  above: 0,
  most: 1200,
  remedy: "Give Young's modulus in GPa: about 30 for concrete, 210 for steel, 11 for softwood.",
}
const SECOND_MOMENT: NumberRule = { above: 0, remedy: 'Give the second moment of area in cm4.' }
const AREA: NumberRule = { above: 0, remedy: 'Give the area in cm2.' }
const SHEAR_AREA: NumberRule = { above: 0, remedy: 'Give the shear area in cm2, or leave it out.' }
const SHEAR_RATIO: NumberRule = { above: 0, most: 10, remedy: 'Give G/E, about 0.4; left out, 1/2.4 is used.' }
const FACTOR: NumberRule = {
  above: 0,
  most: 10,
  remedy: 'Give it as a factor on the stiffness, as 0.5 and not as 50; left out, 1 is used.',
}
const STRENGTH: NumberRule = {
  above: 0,
  remedy: 'Give what it can take as a value above 0, or leave it out where it is not known.',
}

export function checkSupports(building: Entry): Support[] {
  const names: { id: string; path: string }[] = []
  const supports = building.list('supports', (value, path): Support => {
    const entry = Entry.of(building.faults, path, value, ['id', 'x_m', 'y_m', 'base_m'])
    if (!entry) return { id: '', x_m: NaN, y_m: NaN }
    const id = entry.name('id')
    entry.element = { kind: 'support', id }
    names.push({ id, path: entry.at('id') })
    return filled({
      id,
      x_m: entry.number('x_m', COORDINATE),
      y_m: entry.number('y_m', COORDINATE),
      base_m: entry.maybeNumber('base_m', COORDINATE),
    })
  })
  noteRepeated(building.faults, 'support', names)
  return supports
}

export function checkSections(building: Entry): Section[] {
  const names: { id: string; path: string }[] = []
  const sections = building.list('sections', (value, path): Section => {
    const entry = Entry.of(building.faults, path, value, SECTION_KEYS)
    if (!entry) return { id: '', material: 'other', E_GPa: NaN, I_cm4: NaN, A_cm2: NaN }
    const id = entry.name('id')
    entry.element = { kind: 'section', id }
    names.push({ id, path: entry.at('id') })
    return filled({
      id,
      material: entry.choice('material', MATERIALS),
      E_GPa: entry.number('E_GPa', MODULUS),
      I_cm4: entry.number('I_cm4', SECOND_MOMENT),
      A_cm2: entry.number('A_cm2', AREA),
      shear_area_cm2: entry.maybeNumber('shear_area_cm2', SHEAR_AREA),
      G_over_E: entry.maybeNumber('G_over_E', SHEAR_RATIO),
      stiffness_factor: entry.maybeNumber('stiffness_factor', FACTOR),
      capacity: checkCapacity(entry),
    })
  })
  noteRepeated(building.faults, 'section', names)
  return sections
}

/** Of a section or a member. */
export function checkCapacity(owner: Entry): Capacity | undefined {
  const entry = owner.entry('capacity', ['sagging_kNm', 'hogging_kNm', 'shear_kN'])
  return (
    entry &&
    filled({
      sagging_kNm: entry.maybeNumber('sagging_kNm', STRENGTH),
      hogging_kNm: entry.maybeNumber('hogging_kNm', STRENGTH),
      shear_kN: entry.maybeNumber('shear_kN', STRENGTH),
    })
  )
}
