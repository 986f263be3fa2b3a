/** One member against the slope-deflection values that every engineer knows. */
import { memberStiffness, settlementEndMoments } from '../../../solver/index.ts'
import type { Check } from './check.ts'

const MANEY = 'G. A. Maney, Studies in Engineering No. 1, Univ. of Minnesota, 1915: slope-deflection (from memory)'
const SHEAR = 'J. S. Przemieniecki, Theory of Matrix Structural Analysis, 1968: shear flexibility (from memory)'

export function memberChecks(): Check[] {
  const member = { L: 6, EI: 162e3, GAs: Infinity }
  const rigidity = member.EI / member.L
  const [near, carried] = memberStiffness(member)
  const [, , pinned] = memberStiffness({ ...member, pinFrom: true })
  const settlement = [0, 0.01]
  const perChord = -member.EI * 0.01 * (1 / member.L ** 2)
  const both = settlementEndMoments(member, settlement)
  const one = settlementEndMoments({ ...member, pinTo: true }, settlement)
  const none = settlementEndMoments({ ...member, pinFrom: true, pinTo: true }, settlement)
  const phi = 0.5
  const [sheared] = memberStiffness({ ...member, GAs: (12 * member.EI) / (phi * member.L ** 2) })
  return [
    { source: MANEY, check: 'moment at the end turned, in EI/L', expected: 4, found: near! / rigidity, unit: '' },
    { source: MANEY, check: 'moment carried to the fixed far end, in EI/L', expected: 2, found: carried! / rigidity, unit: '' }, // prettier-ignore
    { source: MANEY, check: 'moment at the end turned, far end pinned, in EI/L', expected: 3, found: pinned! / rigidity, unit: '' }, // prettier-ignore
    { source: MANEY, check: 'both ends fixed, one sinks: end moment in EI \u00d7 settlement / L\u00b2', expected: 6, found: both[0]! / perChord, unit: '' }, // prettier-ignore
    { source: MANEY, check: 'one end pinned, one sinks: end moment in EI \u00d7 settlement / L\u00b2', expected: 3, found: one[0]! / perChord, unit: '' }, // prettier-ignore
    { source: 'Common practice: a simply supported beam only turns', check: 'both ends pinned, one sinks: end moment', expected: 0, found: Math.abs(none[0]!) + Math.abs(none[1]!), unit: 'kNm' }, // prettier-ignore
    { source: SHEAR, check: 'end stiffness with shear flexibility 0.5: (4 + 0.5) / (1 + 0.5), in EI/L', expected: 3, found: sheared! / rigidity, unit: '' }, // prettier-ignore
  ]
}
