/**
 * What an assessment finds, as types with the keys of the findings file. Keys beyond the first version's
 * are additions (nodes, governing section, levelling details); none is ever renamed. Signs: settlement down
 * positive; rotations and end moments clockwise positive; tension positive; reactions up positive.
 */

export type Status = 'green' | 'amber' | 'red' | 'none'
export type Certainty = 'clear' | 'borderline'

export interface PointFinding {
  point: string
  level_m: number
  sd_mm: number
}

export interface SupportFinding {
  support: string
  settlement_mm: number
  sd_mm: number
  /** True where the support was not measured in this round and was estimated from others. */
  estimated: boolean
  significant: boolean
  /** With `estimated`: what the estimate rests on, in words. */
  estimated_from?: string
  /** Of a support with several studs: those two differ by more than the survey's uncertainty. */
  studs_disagree?: { studs: [string, string]; difference_mm: number; sd_mm: number }
}

export interface SpanFinding {
  from: string
  to: string
  length_m: number
  differential_mm: number
  chord_rotation_rad: number
  angular_distortion_rad: number
  sd_rad: number
  status: Status
  certainty: Certainty
}

/** Where along a member the utilisation is greatest. */
export interface Governing {
  effect: 'bending' | 'shear'
  /** Distance from the member's `from` end. */
  at_m: number
  /** Total effect there: bending in kNm (sagging positive) or shear in kN. */
  total: number
  /** Capacity of its sense, in the same unit. */
  capacity: number
  /** The other frame line of a column that stands in two, whose share is counted as well. */
  with_line?: string
}

export interface MemberFinding {
  member: string
  moment_from_kNm: number
  moment_to_kNm: number
  sd_from_kNm: number
  sd_to_kNm: number
  shear_kN: number
  axial_kN: number
  existing_from_kNm?: number
  existing_to_kNm?: number
  induced_fraction?: number
  sd_induced_fraction?: number
  /** Which end has the greater fraction of its capacity. */
  fraction_end?: 'from' | 'to'
  utilisation?: number
  sd_utilisation?: number
  governing?: Governing
  status: Status
  certainty: Certainty
}

export interface ReactionFinding {
  support: string
  vertical_kN: number
  moment_kNm: number
}

/** Displacement of a node by the measured settlement: x to the right, z down positive, rotation clockwise. */
export interface NodeFinding {
  node: string
  x_mm: number
  down_mm: number
  rotation_rad: number
}

/** A sagging or hogging stretch of a line's settlement: the largest offset from its chord over its length. */
export interface StretchFinding {
  kind: 'sagging' | 'hogging'
  from: string
  to: string
  /** Support with the largest offset. */
  at: string
  length_m: number
  deflection_mm: number
  deflection_ratio: number
  sd_ratio: number
}

export interface FrameLineFinding {
  id: string
  tilt_rad: number
  spans: SpanFinding[]
  /** By length along the line; none where fewer than three supports stand on it. */
  stretches: StretchFinding[]
  members: MemberFinding[]
  reactions: ReactionFinding[]
  nodes: NodeFinding[]
}

/** A misclosure of the book: a loop back to its benchmark or a line to another. */
export interface Misclosure {
  from: string
  to: string
  setups: number
  /** Present where every sight of the loop or line is booked. */
  length_km?: number
  misclosure_mm: number
  /** What the instrument's sd predicts at the criteria's confidence. */
  predicted_mm: number
}

/** A reading whose standardised residual exceeds 3.29 (Baarda, 0.1 %). */
export interface SuspectReading {
  /** Row of the book, from 1. */
  row: number
  point: string
  sight: 'back' | 'mid' | 'fore'
  standardised_residual: number
  /** Estimated size of the error, reading minus what the rest of the book says. */
  error_mm: number
  /** Slips that would make just this reading off by just this much. */
  causes?: string[]
}

/** A benchmark freed and found again from the others. */
export interface BenchmarkCheck {
  point: string
  level_m: number
  found_m: number
  /** Found less published. */
  difference_mm: number
  sd_mm: number
  /** Within its interval at the criteria's confidence. */
  agrees: boolean
}

export interface Levelling {
  degrees_of_freedom: number
  /** Absent with no redundancy. */
  variance_factor?: number
  /** True where the variance factor exceeds its chi-square limit and the covariance was scaled up. */
  scaled?: boolean
  misclosures?: Misclosure[]
  suspects?: SuspectReading[]
  /** Rows (from 1) of readings that nothing checks. */
  uncontrolled_rows?: number[]
}

/** A member or a span that a trigger is held against. */
export type Triggered =
  { kind: 'member'; line: string; id: string } | { kind: 'span'; line: string; from: string; to: string }

/** A trigger reached after further settlement of one support alone. */
export interface Reach {
  left_mm: number
  /** From the survey's uncertainty of the value that reaches the trigger. */
  sd_mm: number
  target: Triggered
}

/** Millimetres left at a support until the first member or span below a trigger reaches it; absent: not within 1 m. */
export interface SupportHeadroom {
  support: string
  amber?: Reach
  red?: Reach
}

export interface Tilt {
  x_rad: number
  y_rad: number
  mean_mm: number
  sd_x_rad?: number
  sd_y_rad?: number
}

export interface RoundFindings {
  id: string
  date: string
  status: Status
  levelling?: Levelling
  points: PointFinding[]
  supports: SupportFinding[]
  tilt: Tilt
  frame_lines: FrameLineFinding[]
}

export interface Findings {
  format: 'levelstead-findings'
  version: 1
  building: string
  baseline?: string
  /** Every accepted round but the baseline, in order of date. */
  rounds: RoundFindings[]
  /** Always said with the results. */
  cautions: string[]
}

const ORDER: Record<Status, number> = { none: 0, green: 1, amber: 2, red: 3 }

/** The worse of two statuses: none, green, amber, red in this order. */
export function worse(a: Status, b: Status): Status {
  return ORDER[a] >= ORDER[b] ? a : b
}

/** Compares two statuses for sorting, worst first. */
export function byWorst(a: Status, b: Status): number {
  return ORDER[b] - ORDER[a]
}
