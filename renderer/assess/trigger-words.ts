/** What a value of the drawing is held against, as it is said when one points at it. */
import type { Target } from '../../app/drawing/scene.ts'
import { criteriaOf, type Building, type Triggers } from '../../app/model/building.ts'
import { ratio } from '../../app/model/numbers.ts'

export function triggerWords(target: Target, building: Building): string {
  const criteria = criteriaOf(building)
  if (target.kind === 'span') return bounds(criteria.angular_distortion, ratio)
  if (target.kind !== 'member') return ''
  const fraction = bounds(criteria.induced_fraction, wholePercent)
  return `${fraction} of capacity; utilisation ${bounds(criteria.utilisation, wholePercent)}`
}

function bounds({ amber, red }: Triggers, text: (value: number) => string): string {
  return `amber from ${text(amber)}, red from ${text(red)}`
}

function wholePercent(fraction: number): string {
  return `${Math.round(fraction * 100)}\u00a0%`
}
