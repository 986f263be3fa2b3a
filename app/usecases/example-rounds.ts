/**
 * The example's level books: the invented movement of the ground, read through an invented level whose
 * readings scatter as those of a digital level with a fibreglass staff do. The scatter is the same each time.
 */
import type { BookRow, Round } from '../model/building.ts'

const VISITS: readonly { id: string; date: string; share: number }[] = [
  { id: 'R0', date: '2025-11-10', share: 0 },
  { id: 'R1', date: '2026-01-19', share: 0.03 },
  { id: 'R2', date: '2026-03-16', share: 0.16 },
  { id: 'R3', date: '2026-05-18', share: 0.38 },
  { id: 'R4', date: '2026-07-20', share: 0.63 },
  { id: 'R5', date: '2026-09-14', share: 0.86 },
  { id: 'R6', date: '2026-11-16', share: 1 },
]

/** Settlement at the last visit in mm, rows A to C, grid lines 1 to 4. */
const SETTLEMENT_MM = [
  [0.6, 1.0, 2.1, 4.9],
  [0.7, 1.3, 3.6, 8.6],
  [0.5, 0.9, 2.4, 5.6],
]

/** Levels at the baseline, in m: studs are never set at one height. */
const STUD_M = [
  [42.7314, 42.7289, 42.7402, 42.7351],
  [42.7297, 42.7266, 42.7318, 42.7395],
  [42.7341, 42.7278, 42.7309, 42.7327],
]

const SD_MM_PER_SQRT_KM = 0.7

type Stop = { point: string; sight_m: number } | { change: string; fore_m: number; back_m: number }

/** The way round: from BM1 over four setups to BM2, then back to BM1. */
const WAY: readonly Stop[] = [
  { point: 'S-A1', sight_m: 14.2 },
  { point: 'S-B1', sight_m: 12.7 },
  { point: 'S-C1', sight_m: 15.9 },
  { point: 'S-A2', sight_m: 17.3 },
  { change: 'TP1', fore_m: 21.4, back_m: 20.9 },
  { point: 'S-A3', sight_m: 9.6 },
  { point: 'S-A4', sight_m: 12.1 },
  { point: 'S-B4', sight_m: 14.8 },
  { change: 'TP2', fore_m: 19.2, back_m: 19.8 },
  { point: 'S-C4', sight_m: 10.4 },
  { point: 'S-C3', sight_m: 8.8 },
  { point: 'S-C2', sight_m: 13.6 },
  { change: 'BM2', fore_m: 22.5, back_m: 22.1 },
  { point: 'S-B2', sight_m: 16.2 },
  { point: 'S-B3', sight_m: 18.4 },
  { change: 'TP3', fore_m: 20.3, back_m: 20.6 },
]

const FIXED_M: Record<string, number> = { BM1: 42.5, BM2: 42.1873, TP1: 42.0467, TP2: 41.9835, TP3: 42.2218 }

export function exampleRounds(): Round[] {
  const scatter = normalScatter(20251110)
  return VISITS.map(({ id, date, share }) => ({
    id,
    date,
    book: { sd_mm_per_sqrt_km: SD_MM_PER_SQRT_KM, rows: book(id, share, scatter) },
  }))
}

function book(round: string, share: number, scatter: () => number): BookRow[] {
  const rows: BookRow[] = []
  let collimation = 0
  function read(point: string, sight_m: number): number {
    const error_mm = scatter() * SD_MM_PER_SQRT_KM * Math.sqrt(sight_m / 1000)
    return Math.round((collimation - levelOf(point, share) + error_mm / 1000) * 1e5) / 1e5
  }
  function setUpBehind(point: string): void {
    collimation = Math.round((levelOf(point, share) + 1.35 + 0.12 * scatter()) * 1e5) / 1e5
  }
  setUpBehind('BM1')
  rows.push({ point: 'BM1', back_m: read('BM1', 21.8), sight_m: 21.8 })
  for (const stop of WAY) {
    if ('point' in stop) {
      if (round === 'R3' && stop.point === 'S-B3') continue // behind stacked boards that day
      rows.push({ point: stop.point, mid_m: read(stop.point, stop.sight_m), sight_m: stop.sight_m })
      continue
    }
    const fore_m = read(stop.change, stop.fore_m)
    setUpBehind(stop.change)
    rows.push({
      point: stop.change,
      fore_m,
      back_m: read(stop.change, stop.back_m),
      sight_m: stop.fore_m,
      back_sight_m: stop.back_m,
    })
  }
  rows.push({ point: 'BM1', fore_m: read('BM1', 22.3), sight_m: 22.3 })
  return rows
}

function levelOf(point: string, share: number): number {
  const fixed = FIXED_M[point]
  if (fixed !== undefined) return fixed
  const row = point.charCodeAt(2) - 'A'.charCodeAt(0)
  const column = Number(point[3]) - 1
  return STUD_M[row]![column]! - (share * SETTLEMENT_MM[row]![column]!) / 1000
}

/** Standard normal values from a fixed start: Park and Miller's generator, Box and Muller's transformation. */
function normalScatter(start: number): () => number {
  let state = start
  function uniform(): number {
    state = (state * 48271) % 2147483647
    return state / 2147483647
  }
  return () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform())
}
