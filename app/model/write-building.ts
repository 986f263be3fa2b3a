/**
 * A building as the text of a building file: keys in the order of the format's description, short entries on one
 * line, so that two versions of a file can be compared line by line. The same building gives the same text.
 */
import type { Building, FrameLine, Round } from './building.ts'

const ORDER = [
  ...['format', 'version', 'name', 'reference', 'client', 'address', 'notes'],
  ...['supports', 'sections', 'frame_lines', 'survey', 'criteria'],
  ...['id', 'date', 'point', 'kind', 'from', 'to', 'section', 'support', 'material'],
  ...['x_m', 'y_m', 'z_m', 'base_m', 'base', 'load_kN', 'level_m', 'sd_mm', 'released'],
  ...['E_GPa', 'I_cm4', 'A_cm2', 'shear_area_cm2', 'G_over_E', 'stiffness_factor'],
  ...['pin_from', 'pin_to', 'loads', 'capacity', 'sagging_kNm', 'hogging_kNm', 'shear_kN'],
  ...['kN_per_m', 'kN', 'at_m', 'action', 'nodes', 'members'],
  ...[
    'points',
    'baseline',
    'rounds',
    'levels',
    'book',
    'sd_mm_per_sqrt_km',
    'sd_mm_per_setup',
    'collimation_mm_per_10_m',
    'rows',
  ],
  ...['back_m', 'mid_m', 'fore_m', 'sight_m', 'back_sight_m'],
  ...['induced_fraction', 'utilisation', 'angular_distortion', 'combination', 'base_rotation', 'confidence'],
  ...['amber', 'red', 'permanent', 'variable', 'settlement', 'rotation_kNm_per_rad'],
]
const RANK = new Map(ORDER.map((key, i) => [key, i]))
const WIDTH = 120

/** The text of the building file, ending with a line break. Only keys of the format are written. */
export function writeBuilding(building: Building): string {
  return `${written(ownKeys(building), '')}\n`
}

/** The building without what its rounds may carry besides readings in a project: that is no part of the file. */
function ownKeys(building: Building): Building {
  const { format, version, name, reference, client, address, notes } = building
  const { supports, sections, frame_lines, survey, criteria } = building
  return {
    ...{ format, version, name, reference, client, address, notes },
    ...{ supports, sections, frame_lines: frame_lines.map(ownLine), criteria },
    survey: { points: survey.points, baseline: survey.baseline, rounds: survey.rounds.map(ownRound) },
  }
}

function ownLine({ id, nodes, members }: FrameLine): FrameLine {
  return { id, nodes, members }
}

function ownRound({ id, date, levels, book }: Round): Round {
  return { id, date, levels, book }
}

function written(value: unknown, indent: string): string {
  if (typeof value !== 'object' || value === null) return JSON.stringify(value)
  const short = inOneLine(value)
  if (short !== undefined && short.length + indent.length <= WIDTH) return short
  const inner = `${indent}  `
  const parts = Array.isArray(value)
    ? value.map((item) => written(item, inner))
    : entriesOf(value).map(([key, item]) => `${JSON.stringify(key)}: ${written(item, inner)}`)
  const [open, close] = Array.isArray(value) ? '[]' : '{}'
  return `${open}\n${parts.map((part) => inner + part).join(',\n')}\n${indent}${close}`
}

/** Undefined for a list of objects, which always stands line by line, and for what holds one. */
function inOneLine(value: object): string | undefined {
  if (Array.isArray(value)) return value.length === 0 ? '[]' : undefined
  const parts: string[] = []
  for (const [key, item] of entriesOf(value)) {
    const text = typeof item === 'object' && item !== null ? inOneLine(item) : JSON.stringify(item)
    if (text === undefined) return undefined
    parts.push(`${JSON.stringify(key)}: ${text}`)
  }
  return parts.length === 0 ? '{}' : `{ ${parts.join(', ')} }`
}

function entriesOf(value: object): [string, unknown][] {
  return Object.entries(value)
    .filter(([, item]) => item !== undefined)
    .sort(([a], [b]) => (RANK.get(a) ?? Infinity) - (RANK.get(b) ?? Infinity))
}
