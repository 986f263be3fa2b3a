/** Benchmarks and studs of a building file. */
import type { SurveyPoint } from '../building.ts'
import { Entry, noteRepeated, type NumberRule } from './entry.ts'

/** Between the deepest mine and the highest town; a level in millimetres lies outside. */
export const LEVEL: NumberRule = { least: -5000, most: 9000, remedy: 'Give the level in metres.' }

export function checkPoints(
  survey: Entry,
  supports: { has(id: string): boolean; keys(): Iterable<string> },
): SurveyPoint[] {
  const names: { id: string; path: string }[] = []
  const points = survey.list('points', (value, path): SurveyPoint => {
    const isStud = typeof value === 'object' && value !== null && (value as { kind?: unknown }).kind === 'stud'
    const keys = isStud ? ['id', 'kind', 'support'] : ['id', 'kind', 'level_m']
    const entry = Entry.of(survey.faults, path, value, keys)
    if (!entry) return { id: '', kind: 'benchmark', level_m: NaN }
    const id = entry.name('id')
    entry.element = { kind: 'point', id }
    names.push({ id, path: entry.at('id') })
    const kind = entry.choice('kind', ['benchmark', 'stud'])
    if (kind === 'stud') return { id, kind, support: entry.reference('support', 'support', supports) }
    return { id, kind, level_m: isKindGiven(entry) ? entry.number('level_m', LEVEL) : NaN }
  })
  noteRepeated(survey.faults, 'point', names)
  return points
}

/** A point of no known kind is told once, and not also that it lacks what the other kind has. */
function isKindGiven(entry: Entry): boolean {
  return entry.value('kind') === 'benchmark'
}
