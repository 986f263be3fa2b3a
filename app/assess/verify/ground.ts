/** Tilt, angular distortion and deflection ratio by their definitions. */
import { angularDistortion, deflectionRatios, planeMap, tiltAlong } from '../../../solver/index.ts'
import { DEFAULT_CRITERIA } from '../../model/building.ts'
import type { Check } from './check.ts'

const DEFINITION = 'J. B. Burland and C. P. Wroth, Settlement of buildings and associated damage, 1974: definitions'
const LIMITS = 'A. W. Skempton and D. H. MacDonald, Proc. ICE 5 (III), 1956, 727\u2013768'

export function groundChecks(): Check[] {
  const x = [0, 6, 12]
  const y = [0, 0, 0]
  const tilt = tiltAlong(planeMap(x, y), 1, 0)
  const distortion = angularDistortion(tilt, 0, 1, 6)
  const leaning = x.map((place) => 0.004 + 0.002 * place)
  const sagging = [0, 0.012, 0]
  const ratios = deflectionRatios(x, sagging)
  return [
    { source: DEFINITION, check: 'a pure tilt of 1/500: the tilt found', expected: 0.002, found: weigh(tilt, leaning), unit: 'rad' }, // prettier-ignore
    { source: DEFINITION, check: 'a pure tilt of 1/500: angular distortion', expected: 0, found: weigh(distortion, leaning), unit: 'rad' }, // prettier-ignore
    { source: DEFINITION, check: 'the middle of three supports 12 mm lower, spans of 6 m: angular distortion', expected: 0.002, found: weigh(distortion, sagging), unit: 'rad' }, // prettier-ignore
    { source: DEFINITION, check: 'the same: deflection ratio, half the angular distortion', expected: 0.001, found: ratios[0]?.ratio ?? NaN, unit: '' }, // prettier-ignore
    { source: LIMITS, check: 'recommended limit of angular distortion, the amber trigger unless chosen otherwise', expected: 1 / 500, found: DEFAULT_CRITERIA.angular_distortion.amber, unit: 'rad' }, // prettier-ignore
    { source: LIMITS, check: 'structural damage of frames, the red trigger unless chosen otherwise', expected: 1 / 150, found: DEFAULT_CRITERIA.angular_distortion.red, unit: 'rad', tolerance: 5e-6 }, // prettier-ignore
  ]
}

function weigh(weights: Float64Array, settlement: readonly number[]): number {
  return weights.reduce((sum, w, i) => sum + w * settlement[i]!, 0)
}
