/** Benchmarks and studs of a building file. */
import type { SurveyPoint } from '../building.ts'
import { filled } from '../edits/difference.ts'
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
    const keys = isStud ? ['id', 'kind', 'support'] : ['id', 'kind', 'level_m', 'released']
    const entry = Entry.of(survey.faults, path, value, keys)
    if (!entry) return { id: '', kind: 'benchmark', level_m: NaN }
    const id = entry.name('id')
    entry.element = { kind: 'point', id }
    names.push({ id, path: entry.at('id') })
    const kind = entry.choice('kind', ['benchmark', 'stud'])
    if (kind === 'stud') return { id, kind, support: entry.reference('support', 'support', supports) }
    const released = checkReleased(entry)
    return filled({ id, kind, level_m: isKindGiven(entry) ? entry.number('level_m', LEVEL) : NaN, released })
  })
  noteRepeated(survey.faults, 'point', names)
  return points
}

/** A reason, in words: a benchmark is not let go without one. */
function checkReleased(entry: Entry): string | undefined {
  const reason = entry.text('released')
  if (reason === undefined || reason.trim() !== '') return reason
  entry.fault('reason.empty', 'released')
  return undefined
}

/** A point of no known kind is told once, and not also that it lacks what the other kind has. */
function isKindGiven(entry: Entry): boolean {
  return entry.value('kind') === 'benchmark'
}
