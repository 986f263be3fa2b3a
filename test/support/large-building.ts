/** Regular buildings of any size with a baseline and a second round booked as level books; for benchmarks and limits. */
import { addFrameLine } from '../../app/model/edits/frame-lines.ts'
import { layOutGrid, rowsOf } from '../../app/model/edits/grid.ts'
import { emptyBuilding, type BookRow, type Building, type Round } from '../../app/model/building.ts'
import { applied } from './applied.ts'

export interface Size {
  lines: number
  bays: number
  storeys: number
}

const BENCHMARK_M = 20

export function largeBuilding({ lines, bays, storeys }: Size): Building {
  let building: Building = {
    ...emptyBuilding('Large'),
    sections: [
      {
        id: 'beam',
        material: 'concrete',
        E_GPa: 30,
        I_cm4: 540000,
        A_cm2: 1800,
        shear_area_cm2: 1500,
        stiffness_factor: 0.5,
        capacity: { sagging_kNm: 210, hogging_kNm: 260, shear_kN: 240 },
      },
      { id: 'column', material: 'concrete', E_GPa: 30, I_cm4: 213333, A_cm2: 1600, capacity: { sagging_kNm: 180 } },
    ],
  }
  const grid = layOutGrid(building, { x: Array<number>(bays).fill(6), y: Array<number>(lines - 1).fill(5.5) })
  building = applied(building, grid.changes)
  for (const row of rowsOf(building.supports)) {
    const made = addFrameLine(building, {
      id: row.id,
      supports: row.supports.map((s) => s.id),
      storeys: Array<number>(storeys).fill(3.4),
      beam: 'beam',
      column: 'column',
    })
    building = applied(building, made.changes)
  }
  for (const line of building.frame_lines)
    for (const member of line.members)
      if (member.kind === 'beam') member.loads = [{ kind: 'uniform', kN_per_m: 18, action: 'permanent' }]
  building.survey = {
    points: [
      { id: 'BM1', kind: 'benchmark', level_m: BENCHMARK_M },
      ...building.supports.map((s) => ({ id: `S-${s.id}`, kind: 'stud' as const, support: s.id })),
    ],
    baseline: 'R0',
    rounds: [round(building, 'R0', '2026-03-02', 0), round(building, 'R1', '2026-06-02', 1)],
  }
  return building
}

/** The building with one intermediate sight of a round read anew; the rest is shared. */
export function withReading(building: Building, roundId: string, row: number, mid_m: number): Building {
  const rounds = building.survey.rounds.map((r) =>
    r.id === roundId
      ? { ...r, book: { ...r.book!, rows: r.book!.rows.map((x, i) => (i === row ? { ...x, mid_m } : x)) } }
      : r,
  )
  return { ...building, survey: { ...building.survey, rounds } }
}

/** Out from the benchmark, six studs from each setup, and back to it; settlement grows with x and y. */
function round(building: Building, id: string, date: string, share: number): Round {
  const rows: BookRow[] = [{ point: 'BM1', back_m: 1.5, sight_m: 20 }]
  let collimation = BENCHMARK_M + 1.5
  building.supports.forEach((support, i) => {
    if (i > 0 && i % 6 === 0) {
      rows.push({ point: `TP${i / 6}`, fore_m: 1.2, back_m: 1.5, sight_m: 20 })
      collimation += 0.3
    }
    const settled = (share * (0.0004 * support.x_m ** 1.3 + 0.00002 * support.y_m ** 2)) / 5
    const level = BENCHMARK_M + 0.2 + 0.001 * (i % 5) - settled
    rows.push({ point: `S-${support.id}`, mid_m: Math.round((collimation - level) * 1e5) / 1e5, sight_m: 12 + (i % 9) })
  })
  rows.push({ point: 'BM1', fore_m: Math.round((collimation - BENCHMARK_M + 0.0003) * 1e5) / 1e5, sight_m: 20 })
  return { id, date, book: { sd_mm_per_sqrt_km: 0.7, rows } }
}
