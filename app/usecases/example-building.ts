/**
 * The example: an invented building of 1962 on shallow footings, with a basement being dug beyond its eastern
 * end. Three storeys of concrete frames in two directions, twelve supports, seven rounds over a year. All
 * names and numbers are our own; it is for looking at, never a reference.
 */
import type {
  Building,
  FrameLine,
  FrameNode,
  Member,
  MemberLoad,
  Section,
  Support,
  SurveyPoint,
} from '../model/building.ts'
import { exampleRounds } from './example-rounds.ts'

const ROWS = ['A', 'B', 'C']
const COLUMNS = ['1', '2', '3', '4']
const X_M = [0, 6, 11.4, 17.4]
const Y_M = [0, 5.6, 11.2]
const FLOORS_M = [3.6, 6.8, 10]

/** Opened up in 2026: cover spalled, bottom bars corroded. */
const WEAK_BEAM = 'A4-B4/2'

const SECTIONS: Section[] = [
  {
    id: 'column 350x350',
    material: 'concrete',
    E_GPa: 30,
    I_cm4: 125052,
    A_cm2: 1225,
    stiffness_factor: 0.7,
    capacity: { sagging_kNm: 120 },
  },
  {
    id: 'beam 300x550',
    material: 'concrete',
    E_GPa: 30,
    I_cm4: 415938,
    A_cm2: 1650,
    shear_area_cm2: 1375,
    stiffness_factor: 0.5,
    capacity: { sagging_kNm: 165, hogging_kNm: 190, shear_kN: 190 },
  },
  {
    id: 'roof beam 300x450',
    material: 'concrete',
    E_GPa: 30,
    I_cm4: 227813,
    A_cm2: 1350,
    shear_area_cm2: 1125,
    stiffness_factor: 0.5,
    capacity: { sagging_kNm: 110, hogging_kNm: 130, shear_kN: 150 },
  },
]

/** The example as a building with its seven rounds. */
export function exampleBuilding(): Building {
  const supports: Support[] = ROWS.flatMap((row, j) =>
    COLUMNS.map((column, i) => ({ id: row + column, x_m: X_M[i]!, y_m: Y_M[j]!, base_m: -1.2 })),
  )
  const points: SurveyPoint[] = [
    { id: 'BM1', kind: 'benchmark', level_m: 42.5 },
    { id: 'BM2', kind: 'benchmark', level_m: 42.1873 },
    ...supports.map((s): SurveyPoint => ({ id: `S-${s.id}`, kind: 'stud', support: s.id })),
  ]
  return {
    format: 'levelstead-building',
    version: 1,
    name: 'Tannery Row, block 2',
    reference: 'TR-014',
    client: 'Tannery Row Housing Trust',
    address: '2 Tannery Row, Millgate',
    notes:
      'Three-storey concrete frame of 1962 on pad footings. A basement is being dug 4 m beyond grid line 4 since February 2026. Capacities from the reinforcement drawings, checked at two opened-up beams; beam A4-B4/2 has corroded bottom bars and is given less.',
    supports,
    sections: SECTIONS,
    frame_lines: [
      ...ROWS.map((row) =>
        frameLine(
          row,
          COLUMNS.map((column) => row + column),
          X_M,
        ),
      ),
      ...COLUMNS.map((column) =>
        frameLine(
          column,
          ROWS.map((row) => row + column),
          Y_M,
        ),
      ),
    ],
    survey: { points, baseline: 'R0', rounds: exampleRounds() },
    criteria: { induced_fraction: { amber: 0.1, red: 0.25 } },
  }
}

function frameLine(id: string, supports: readonly string[], x: readonly number[]): FrameLine {
  const nodes: FrameNode[] = supports.map((support, i) => ({ id: support, x_m: x[i]!, z_m: 0, support, base: 'fixed' }))
  const members: Member[] = []
  FLOORS_M.forEach((z_m, floor) => {
    const storey = floor + 1
    supports.forEach((support, i) => {
      nodes.push({ id: `${support}-${storey}`, x_m: x[i]!, z_m })
      members.push({
        id: `C${support}/${storey}`,
        kind: 'column',
        from: floor === 0 ? support : `${support}-${floor}`,
        to: `${support}-${storey}`,
        section: 'column 350x350',
      })
    })
    for (let i = 1; i < supports.length; i++) {
      const from = supports[i - 1]!
      const to = supports[i]!
      if (id === '2' && from === 'B2' && storey === 1) continue // the stair well: no beam here
      members.push({
        id: `${from}-${to}/${storey}`,
        kind: 'beam',
        from: `${from}-${storey}`,
        to: `${to}-${storey}`,
        section: storey === FLOORS_M.length ? 'roof beam 300x450' : 'beam 300x550',
        loads: floorLoads(id, storey),
        ...(`${from}-${to}/${storey}` === WEAK_BEAM ? { capacity: { sagging_kNm: 105 } } : {}),
      })
    }
  })
  return { id, nodes, members }
}

/** Floors span along the numbered lines, so the lettered lines carry them; the others carry walls. */
function floorLoads(line: string, storey: number): MemberLoad[] {
  const roof = storey === FLOORS_M.length
  const carries = ROWS.includes(line)
  const inner = line === 'B'
  const permanent = carries ? (inner ? 26 : 18) * (roof ? 0.7 : 1) : roof ? 5 : 12
  const loads: MemberLoad[] = [{ kind: 'uniform', kN_per_m: Math.round(permanent * 10) / 10, action: 'permanent' }]
  if (carries) loads.push({ kind: 'uniform', kN_per_m: (inner ? 10 : 6) * (roof ? 0.5 : 1), action: 'variable' })
  return loads
}
