/** Triggers, combination and confidence of a building file. */
import { criteriaOf, type BaseRotation, type GivenCriteria, type Triggers } from '../building.ts'
import { filled } from '../edits/difference.ts'
import type { Entry, NumberRule } from './entry.ts'

const TRIGGERS = ['induced_fraction', 'utilisation', 'angular_distortion'] as const
const BASES: readonly BaseRotation[] = ['follows-tilt', 'held']
const FACTOR: NumberRule = { least: 0, most: 10, remedy: 'Give it as a factor, as 0.3 and not as 30.' }
const LEVEL: NumberRule = {
  above: 0,
  below: 1,
  remedy: 'Give the confidence as a fraction, as 0.95 and not as 95.',
}

export function checkCriteria(building: Entry): GivenCriteria | undefined {
  const entry = building.entry('criteria', [...TRIGGERS, 'combination', 'base_rotation', 'confidence'])
  if (!entry) return undefined
  entry.element = { kind: 'criteria', id: '' }
  const combination = entry.entry('combination', ['permanent', 'variable', 'settlement'])
  const [induced_fraction, utilisation, angular_distortion] = TRIGGERS.map((name) => checkTriggers(entry, name))
  return filled({
    induced_fraction,
    utilisation,
    angular_distortion,
    combination:
      combination &&
      filled({
        permanent: combination.maybeNumber('permanent', FACTOR),
        variable: combination.maybeNumber('variable', FACTOR),
        settlement: combination.maybeNumber('settlement', FACTOR),
      }),
    base_rotation: entry.has('base_rotation') ? entry.choice('base_rotation', BASES) : undefined,
    confidence: entry.maybeNumber('confidence', LEVEL),
  })
}

/** One of the two may be left out; it is then held to the default of the other. */
function checkTriggers(criteria: Entry, name: (typeof TRIGGERS)[number]): Partial<Triggers> | undefined {
  const entry = criteria.entry(name, ['amber', 'red'])
  if (!entry) return undefined
  const remedy =
    name === 'angular_distortion'
      ? 'Give it in radians, as 0.002 for 1/500.'
      : 'Give it as a fraction, as 0.25 and not as 25.'
  const rule: NumberRule = { above: 0, most: name === 'angular_distortion' ? 1 : 10, remedy }
  const given = filled({ amber: entry.maybeNumber('amber', rule), red: entry.maybeNumber('red', rule) })
  const { amber, red } = criteriaOf({ criteria: { [name]: given } })[name]
  if (amber > red) entry.fault('triggers.reversed', entry.has('amber') ? 'amber' : 'red', { red, amber })
  return given
}
