/**
 * A value, of whatever form, as a building: every fault is found and listed with its path, and a building is
 * given only where there is none. Mechanisms are found where frames are solved, in app/assess.
 */
import type { Building, Round } from './building.ts'
import { checkCriteria } from './check/check-criteria.ts'
import { checkFrameLines } from './check/check-frame-lines.ts'
import { checkRoundEntry, roundEntry } from './check/check-round.ts'
import { checkSections, checkSupports } from './check/check-sections.ts'
import { checkSurvey, pointsByName } from './check/check-survey.ts'
import { Entry } from './check/entry.ts'
import { FaultsFound } from './check/faults-found.ts'
import { filled } from './edits/difference.ts'
import { InputFault } from './faults.ts'
import { slips } from './nearest.ts'

const FORMAT = 'levelstead-building'
const NEWEST = 1
const TEXTS = ['reference', 'client', 'address', 'notes'] as const
const PARTS = ['supports', 'sections', 'frame_lines', 'survey', 'criteria'] as const
const KEYS = ['format', 'version', 'name', ...TEXTS, ...PARTS]
const VISIT = ['observer', 'instrument', 'weather', 'note'] as const

export interface CheckOptions {
  /** A description that is still being typed: parts may hang on no support, rounds may lack a baseline. */
  unfinished?: boolean
}

/** The building. Throws an InputFault that lists all faults of the value. */
export function checkBuilding(value: unknown, file?: string, { unfinished = false }: CheckOptions = {}): Building {
  const faults = new FaultsFound(file)
  if (!isOurs(value, faults)) throw new InputFault(faults.all)
  const entry = Entry.of(faults, '', value, KEYS)
  if (!entry) throw new InputFault(faults.all)
  entry.element = { kind: 'building', id: '' }
  entry.choice('format', [FORMAT])
  entry.number('version')
  const head = { name: entry.name('name'), ...Object.fromEntries(TEXTS.map((key) => [key, entry.text(key)])) }
  entry.element = undefined
  const supports = checkSupports(entry)
  const sections = checkSections(entry)
  const known = { supports: byName(supports), sections: byName(sections), unfinished }
  const building: Building = filled({
    format: FORMAT,
    version: NEWEST,
    ...head,
    supports,
    sections,
    frame_lines: checkFrameLines(entry, known),
    survey: checkSurvey(entry, known.supports, unfinished),
    criteria: checkCriteria(entry),
  })
  if (faults.all.length > 0) throw new InputFault(faults.all)
  return building
}

/** What is known of the visit besides its readings. */
export type Visit = Partial<Record<(typeof VISIT)[number], string>>

/** One round, with what is known of the visit. Throws an InputFault that lists all its faults. */
export function checkRound(value: unknown, building: Pick<Building, 'survey'>, file?: string): Round & Visit {
  const faults = new FaultsFound(file)
  const entry = roundEntry(faults, '', value, VISIT)
  const round = entry && {
    ...checkRoundEntry(entry, pointsByName(building.survey.points)),
    ...filled(Object.fromEntries(VISIT.map((key) => [key, entry.text(key)]))),
  }
  if (!round || faults.all.length > 0) throw new InputFault(faults.all)
  return round
}

/** A file of another kind or of a newer version has only that one fault: its other keys mean nothing here. */
function isOurs(value: unknown, faults: FaultsFound): boolean {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return true
  const { format, version } = value as Record<string, unknown>
  const isNear = typeof format !== 'string' || slips(format.toLowerCase(), FORMAT) <= 2
  if (Object.hasOwn(value, 'format') && format !== FORMAT && !isNear)
    faults.add('file.foreign', { path: 'format', value: format })
  else if (typeof version === 'number' && version > NEWEST)
    faults.add('file.newer', { path: 'version', value: version, detail: { newest: NEWEST } })
  else if (typeof version === 'number' && version < NEWEST)
    faults.add('file.version', { path: 'version', value: version })
  return faults.all.length === 0
}

function byName<T extends { id: string }>(entities: readonly T[]): ReadonlyMap<string, T> {
  return new Map(entities.filter((entity) => entity.id !== '').map((entity) => [entity.id, entity]))
}
