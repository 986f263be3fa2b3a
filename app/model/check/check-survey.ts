/** The survey of a building file: points, rounds and the baseline among them. */
import type { Round, Survey, SurveyPoint } from '../building.ts'
import { filled } from '../edits/difference.ts'
import { checkPoints } from './check-points.ts'
import { checkRoundEntry, roundEntry } from './check-round.ts'
import { noteRepeated, type Entry } from './entry.ts'

export function checkSurvey(
  building: Entry,
  supports: { has(id: string): boolean; keys(): Iterable<string> },
  unfinished: boolean,
): Survey {
  const entry = building.entry('survey', ['points', 'baseline', 'rounds'], 'needed')
  if (!entry) return { points: [], rounds: [] }
  const points = checkPoints(entry, supports)
  const known = pointsByName(points)
  const names: { id: string; path: string }[] = []
  const rounds = entry.list('rounds', (value, path): Round => {
    const round = roundEntry(entry.faults, path, value)
    if (!round) return { id: '', date: '' }
    const checked = checkRoundEntry(round, known)
    names.push({ id: checked.id, path: round.at('id') })
    return checked
  })
  noteRepeated(entry.faults, 'round', names)
  const isNeeded = rounds.length > 0 && !unfinished
  const ids = new Set(rounds.map((round) => round.id))
  const baseline = isNeeded || entry.has('baseline') ? entry.reference('baseline', 'round', ids) : undefined
  return filled({ points, baseline, rounds })
}

export function pointsByName(points: readonly SurveyPoint[]): ReadonlyMap<string, SurveyPoint> {
  return new Map(points.filter((point) => point.id !== '').map((point) => [point.id, point]))
}
