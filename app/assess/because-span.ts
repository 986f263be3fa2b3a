/** Where the angular distortion of a span comes from. */
import type { SpanFinding } from '../model/findings.ts'
import { angularDistortion } from '../../solver/index.ts'
import type { Because } from './because.ts'
import { figure, fixed, slope, term } from './figures.ts'
import type { LineMovement } from './line-movement.ts'
import type { Prepared } from './prepare.ts'
import type { Settlements } from './settlement.ts'
import { driverSentence, estimateSentences, flagSentence, sharesOf } from './shares.ts'

export function becauseSpan(
  prepared: Prepared,
  settlements: Settlements,
  movement: LineMovement,
  span: SpanFinding,
): Because {
  const { supports, line } = movement.prepared
  const right = supports.findIndex(
    (s, i) =>
      i > 0 && nameOf(prepared, s.support) === span.to && nameOf(prepared, supports[i - 1]!.support) === span.from,
  )
  const from = supports[right - 1]!.support
  const to = supports[right]!.support
  const weights = angularDistortion(movement.tiltWeights, from, to, span.length_m)
  const { shares, beyond } = sharesOf(prepared, settlements, weights)
  const lower = span.differential_mm < 0 ? span.from : span.to
  const { z, criteria } = prepared
  const value = span.angular_distortion_rad
  return {
    title: `Angular distortion of span ${span.from} to ${span.to}, frame line ${line.id}`,
    sentences: [
      `Support ${lower} has settled ${fixed(Math.abs(span.differential_mm), 1)} mm more than the other over ${fixed(span.length_m, 2)} m; the tilt of the frame line, ${slope(movement.tilt.value)}, is taken out.`,
      driverSentence(shares, beyond, value),
      flagSentence('angular distortion', Math.abs(value), span.sd_rad, z, criteria.angular_distortion, slope),
      ...estimateSentences(
        prepared,
        settlements,
        shares.filter((s) => s.support === span.from || s.support === span.to),
      ),
    ].filter((s) => s !== ''),
    formula: [
      `chord rotation = (${term(settlements.value[to]! * 1000)} \u2212 ${term(settlements.value[from]! * 1000)}) mm / ${fixed(span.length_m * 1000, 0)} mm = ${figure(span.chord_rotation_rad * 1000)} mm/m`,
      `tilt along the line = ${figure(movement.tilt.value * 1000)} mm/m`,
      `angular distortion = ${term(span.chord_rotation_rad * 1000)} \u2212 ${term(movement.tilt.value * 1000)} = ${figure(value * 1000)} mm/m = ${slope(value)}, sd ${figure(span.sd_rad * 1000, 2)} mm/m`,
    ],
    value,
    sd: span.sd_rad,
    unit: 'rad',
    shares,
  }
}

function nameOf(prepared: Prepared, support: number): string {
  return prepared.building.supports[support]!.id
}
