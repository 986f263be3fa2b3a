/**
 * The building and its survey as types, with the keys of the building file itself, so that no mapping
 * layer stands between file, database, window and findings. Units are in the keys; signs are those of
 * the README: levels up positive, along a frame line x to the right and z upwards.
 */

export type Material = 'concrete' | 'steel' | 'timber' | 'masonry' | 'other'
export type MemberKind = 'beam' | 'column' | 'brace'
export type Action = 'permanent' | 'variable'
export type BaseRotation = 'follows-tilt' | 'held'

export interface Support {
  id: string
  x_m: number
  y_m: number
  /** Level of the base of the footing; 0 where left out. */
  base_m?: number
}

export interface Capacity {
  sagging_kNm?: number
  /** As sagging where left out. */
  hogging_kNm?: number
  shear_kN?: number
}

export interface Section {
  id: string
  material: Material
  E_GPa: number
  I_cm4: number
  A_cm2: number
  /** Given: shear deformation is counted. */
  shear_area_cm2?: number
  /** Used with the shear area; 1/2.4 where left out. */
  G_over_E?: number
  /** Multiplies EI (cracking); 1 where left out. */
  stiffness_factor?: number
  capacity?: Capacity
}

export type Base = 'fixed' | 'pinned' | { rotation_kNm_per_rad: number }

export interface FrameNode {
  id: string
  x_m: number
  z_m: number
  support?: string
  /** Only at a support; 'fixed' where left out. */
  base?: Base
  /** Down positive. */
  load_kN?: { permanent?: number; variable?: number }
}

export type MemberLoad =
  { kind: 'uniform'; kN_per_m: number; action: Action } | { kind: 'point'; kN: number; at_m: number; action: Action }

export interface Member {
  id: string
  kind: MemberKind
  from: string
  to: string
  section: string
  pin_from?: boolean
  pin_to?: boolean
  loads?: MemberLoad[]
  /** Overrides the section's, key by key. */
  capacity?: Capacity
}

export interface FrameLine {
  id: string
  nodes: FrameNode[]
  members: Member[]
}

export interface Benchmark {
  id: string
  kind: 'benchmark'
  level_m: number
  /** Why it is held no more (it moved, it is doubted): then it is levelled like any other point, in every round. */
  released?: string
}

export interface Stud {
  id: string
  kind: 'stud'
  support: string
}

export type SurveyPoint = Benchmark | Stud

export interface GivenLevel {
  point: string
  level_m: number
  sd_mm: number
}

/** One line of a level book. A change point has a foresight and a backsight on one row. */
export interface BookRow {
  point: string
  back_m?: number
  mid_m?: number
  fore_m?: number
  /** Length of the sight of the row's reading; of both where `back_sight_m` is left out. */
  sight_m?: number
  /** Length of the backsight where the row has a foresight as well. */
  back_sight_m?: number
}

/** At least one of the two standard deviations is given. */
export interface LevelBook {
  sd_mm_per_sqrt_km?: number
  sd_mm_per_setup?: number
  /** Collimation error of the instrument, positive where its line of sight rises: readings are corrected by it over their sights. */
  collimation_mm_per_10_m?: number
  rows: BookRow[]
}

/** One visit: either given levels or a level book. */
export interface Round {
  id: string
  /** Calendar day, yyyy-mm-dd. */
  date: string
  levels?: GivenLevel[]
  book?: LevelBook
}

export interface Survey {
  points: SurveyPoint[]
  /** The round that all settlements are counted from; left out only while there is no round. */
  baseline?: string
  rounds: Round[]
}

export interface Triggers {
  amber: number
  red: number
}

export interface Criteria {
  induced_fraction: Triggers
  utilisation: Triggers
  angular_distortion: Triggers
  combination: { permanent: number; variable: number; settlement: number }
  base_rotation: BaseRotation
  confidence: number
}

/** As in the file: whatever is left out takes its default. */
export interface GivenCriteria {
  induced_fraction?: Partial<Triggers>
  utilisation?: Partial<Triggers>
  angular_distortion?: Partial<Triggers>
  combination?: Partial<Criteria['combination']>
  base_rotation?: BaseRotation
  confidence?: number
}

export interface Building {
  format: 'levelstead-building'
  version: 1
  name: string
  reference?: string
  client?: string
  address?: string
  notes?: string
  supports: Support[]
  sections: Section[]
  frame_lines: FrameLine[]
  survey: Survey
  criteria?: GivenCriteria
}

/**
 * The triggers and factors used where a building states none. Fractions and utilisation: common practice;
 * angular distortion 1/500 and 1/150: Skempton and MacDonald, Proc. ICE 5 (III), 1956, 727-768; the
 * quasi-permanent share 0.3 of variable load: EN 1990 Annex A1 (offices, dwellings), from memory.
 */
export const DEFAULT_CRITERIA: Criteria = {
  induced_fraction: { amber: 0.1, red: 0.25 },
  utilisation: { amber: 0.85, red: 1.0 },
  angular_distortion: { amber: 0.002, red: 0.00667 },
  combination: { permanent: 1.0, variable: 0.3, settlement: 1.0 },
  base_rotation: 'follows-tilt',
  confidence: 0.95,
}

/** The building's criteria with every default filled in. */
export function criteriaOf(building: Pick<Building, 'criteria'>): Criteria {
  const given = building.criteria ?? {}
  const d = DEFAULT_CRITERIA
  return {
    induced_fraction: { ...d.induced_fraction, ...given.induced_fraction },
    utilisation: { ...d.utilisation, ...given.utilisation },
    angular_distortion: { ...d.angular_distortion, ...given.angular_distortion },
    combination: { ...d.combination, ...given.combination },
    base_rotation: given.base_rotation ?? d.base_rotation,
    confidence: given.confidence ?? d.confidence,
  }
}

/** A member's capacity: its own where given, else its section's; hogging defaults to sagging. */
export function capacityOf(member: Pick<Member, 'capacity'>, section: Pick<Section, 'capacity'>): Capacity {
  const capacity: Capacity = { ...section.capacity, ...member.capacity }
  if (capacity.hogging_kNm === undefined && capacity.sagging_kNm !== undefined)
    capacity.hogging_kNm = capacity.sagging_kNm
  return capacity
}

/** The benchmarks that levels are held at. */
export function heldBenchmarks({ survey }: Pick<Building, 'survey'>): Benchmark[] {
  return survey.points.filter((p): p is Benchmark => p.kind === 'benchmark' && p.released === undefined)
}

/** A building with a name and nothing in it yet. */
export function emptyBuilding(name: string): Building {
  return {
    format: 'levelstead-building',
    version: 1,
    name,
    supports: [],
    sections: [],
    frame_lines: [],
    survey: { points: [], rounds: [] },
  }
}
