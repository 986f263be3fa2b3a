/** How far every stud has come down since the round before and since the baseline. */
import type { Building, Round } from '../model/building.ts'
import type { Levels } from './level-book.ts'

export interface StudMovement {
  point: string
  support: string
  /** Absent while it is not read in this round. */
  level_m?: number
  sd_mm?: number
  /** Down positive; with the standard deviation of the difference. */
  since_previous_mm?: number
  sd_previous_mm?: number
  since_baseline_mm?: number
  sd_baseline_mm?: number
}

export function studMovements(
  building: Building,
  round: Round,
  levels: Levels,
  levelsOf: (round: Round) => Levels,
): { studs: StudMovement[]; previous?: string } {
  const { points, rounds, baseline: baselineId } = building.survey
  const earlier = rounds.filter((r) => r.id !== round.id && r.date <= round.date)
  const previous = earlier.reduce<Round | undefined>((last, r) => (!last || r.date >= last.date ? r : last), undefined)
  const baseline = rounds.find((r) => r.id === baselineId && r.id !== round.id)
  const before = previous && levelsOf(previous)
  const first = baseline && (baseline === previous ? before : levelsOf(baseline))
  const studs = points.flatMap((point): StudMovement[] => {
    if (point.kind !== 'stud') return []
    const now = levels.get(point.id)
    const stud: StudMovement = { point: point.id, support: point.support }
    if (!now) return [stud]
    stud.level_m = now.level
    stud.sd_mm = now.sd * 1000
    const then = before?.get(point.id)
    if (then) {
      stud.since_previous_mm = (then.level - now.level) * 1000
      stud.sd_previous_mm = Math.hypot(then.sd, now.sd) * 1000
    }
    const start = first?.get(point.id)
    if (start) {
      stud.since_baseline_mm = (start.level - now.level) * 1000
      stud.sd_baseline_mm = Math.hypot(start.sd, now.sd) * 1000
    }
    return [stud]
  })
  return { studs, ...(previous ? { previous: previous.id } : {}) }
}
