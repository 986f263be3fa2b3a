/** Rows of the tables as entities of the model and back: NULL for what the building file leaves out, nothing else. */
import type { BookRow, FrameNode, GivenLevel, Member, Section, Support, SurveyPoint } from '../app/model/building.ts'

export type Row = Record<string, unknown>

/** The columns of each table as the keys of its entity, in the order of the building file. */
export const COLUMNS = {
  support: 'id, x_m, y_m, base_m',
  section: 'id, material, E_GPa, I_cm4, A_cm2, shear_area_cm2, G_over_E, stiffness_factor, capacity',
  frame_line: 'id',
  node: 'id, x_m, z_m, support, base, load_kN',
  member: 'id, kind, from_node AS "from", to_node AS "to", section, pin_from, pin_to, loads, capacity',
  point: 'id, kind, level_m, support, released',
}

/** The entity without the keys that are NULL; JSON columns are parsed, 0 and 1 of the named columns are truth values. */
function entity<T>(row: Row, kinds: { json?: readonly string[]; truth?: readonly string[] } = {}): T {
  const made: Row = {}
  for (const [key, value] of Object.entries(row)) {
    if (value === null) continue
    if (kinds.json?.includes(key)) made[key] = JSON.parse(value as string)
    else made[key] = kinds.truth?.includes(key) ? value === 1 : value
  }
  return made as T
}

function json(value: unknown): string | null {
  return value === undefined ? null : JSON.stringify(value)
}

function truth(value: boolean | undefined): number | null {
  return value === undefined ? null : Number(value)
}

export function supportOf(row: Row): Support {
  return entity(row)
}

export function sectionOf(row: Row): Section {
  return entity(row, { json: ['capacity'] })
}

export function nodeOf(row: Row): FrameNode {
  return entity(row, { json: ['base', 'load_kN'] })
}

export function memberOf(row: Row): Member {
  return entity(row, { json: ['loads', 'capacity'], truth: ['pin_from', 'pin_to'] })
}

export function bookRowOf(row: Row): BookRow {
  return entity(row)
}

export function givenLevelOf(row: Row): GivenLevel {
  return entity(row)
}

export function pointOf(row: Row): SurveyPoint {
  return entity(row)
}

export function supportRow(s: Support): Row {
  return { id: s.id, x_m: s.x_m, y_m: s.y_m, base_m: s.base_m ?? null }
}

export function sectionRow(s: Section): Row {
  return {
    id: s.id,
    material: s.material,
    E_GPa: s.E_GPa,
    I_cm4: s.I_cm4,
    A_cm2: s.A_cm2,
    shear_area_cm2: s.shear_area_cm2 ?? null,
    G_over_E: s.G_over_E ?? null,
    stiffness_factor: s.stiffness_factor ?? null,
    capacity: json(s.capacity),
  }
}

export function nodeRow(n: FrameNode): Row {
  return {
    id: n.id,
    x_m: n.x_m,
    z_m: n.z_m,
    support: n.support ?? null,
    base: json(n.base),
    load_kN: json(n.load_kN),
  }
}

export function memberRow(m: Member): Row {
  return {
    id: m.id,
    kind: m.kind,
    from_node: m.from,
    to_node: m.to,
    section: m.section,
    pin_from: truth(m.pin_from),
    pin_to: truth(m.pin_to),
    loads: json(m.loads),
    capacity: json(m.capacity),
  }
}

export function pointRow(p: SurveyPoint): Row {
  return p.kind === 'benchmark'
    ? { id: p.id, kind: p.kind, level_m: p.level_m, support: null, released: p.released ?? null }
    : { id: p.id, kind: p.kind, level_m: null, support: p.support, released: null }
}
