/**
 * One reading typed in a level book, to new findings: a building of 5 frame lines of 6 bays and 5 storeys. What
 * the window does at each keystroke, on the same code; against preparing the same building from nothing.
 */
import { assessRound } from '../../app/assess/assess.ts'
import { bookView } from '../../app/assess/level-book.ts'
import { prepare } from '../../app/assess/prepare.ts'
import type { Building } from '../../app/model/building.ts'
import { exampleBuilding } from '../../app/usecases/example-building.ts'
import { largeBuilding, withReading } from '../support/large-building.ts'

const TYPED = 60

function median(values: number[]): number {
  const sorted = [...values].sort((a, b) => a - b)
  return (sorted[(sorted.length - 1) >> 1]! + sorted[sorted.length >> 1]!) / 2
}

/** Times in ms of each of the reading's keystrokes. */
function typed(building: Building, each: (next: Building) => void): number[] {
  const round = building.survey.rounds.at(-1)!
  const row = round.book!.rows.findIndex((r) => r.mid_m !== undefined)
  return Array.from({ length: TYPED }, (_, i) => {
    const next = withReading(building, round.id, row, round.book!.rows[row]!.mid_m! + (i % 7) * 1e-4)
    const start = performance.now()
    each(next)
    return performance.now() - start
  })
}

function measure(name: string, building: Building): string[] {
  const last = building.survey.rounds.at(-1)!.id
  let prepared = prepare(building)
  assessRound(prepared, last)
  const live = typed(building, (next) => {
    prepared = prepare(next, prepared)
    assessRound(prepared, last)
  })
  const page = typed(building, (next) => void bookView(next, next.survey.rounds.at(-1)!))
  const whole = typed(building, (next) => void assessRound(prepare(next), last))
  const [a, b, c] = [median(live), median(page), median(whole)]
  const members = building.frame_lines.reduce((sum, line) => sum + line.members.length, 0)
  return [
    `${name}: ${building.frame_lines.length} lines, ${members} members, ${building.survey.points.length} points`,
    `  reading to findings ${a.toFixed(2)} ms, level book's page ${b.toFixed(2)} ms, together ${(a + b).toFixed(2)} ms (aim: under 20)`,
    `  ratio: ${(c / a).toFixed(1)} times faster than from nothing (${c.toFixed(1)} ms); slowest keystroke ${(Math.max(...live) / a).toFixed(1)} x the median`,
  ]
}

export function run(): { name: string; lines: string[] } {
  return {
    name: 'keystroke in a level book to new findings',
    lines: [
      ...measure('5 lines x 6 bays x 5 storeys', largeBuilding({ lines: 5, bays: 6, storeys: 5 })),
      ...measure('the example', exampleBuilding()),
    ],
  }
}
