/** Continuous beams and a frame against worked examples in print. Moments clockwise positive. */
import {
  baseInfluence,
  factorFrame,
  loadResponse,
  type FrameArrays,
  type FrameLoads,
  type FrameResponse,
} from '../../../solver/index.ts'
import type { Check } from './check.ts'

const KASSIMALI = 'A. Kassimali, Structural Analysis, examples 15.5 and 16.5 (answers from memory, recomputed)'
const OVERHANG = 'A. Kassimali, Structural Analysis, appendix D, example D.3 (seen)'
const HANDBOOK = 'Handbook tables of fixed-end moments, common practice'
const SPANS = 'Equation of three moments with settlements (B. P. E. Clapeyron, 1857), solved by hand'

export function frameChecks(): Check[] {
  return [...sinkingSupport(), ...overhang(), ...fixedEnds(), ...equalSpans(), ...portal()]
}

/** A beam along x; a base spring for each place, NaN for a place that stands on nothing. */
function beam(places: readonly number[], springs: readonly number[], EI: number): FrameArrays {
  const m = places.length - 1
  const bases = springs.flatMap((spring, i) => (Number.isNaN(spring) ? [] : [i]))
  return {
    x: Float64Array.from(places),
    z: new Float64Array(places.length),
    from: Int32Array.from({ length: m }, (_, i) => i),
    to: Int32Array.from({ length: m }, (_, i) => i + 1),
    EI: new Float64Array(m).fill(EI),
    EA: new Float64Array(m).fill(1e6),
    GAs: new Float64Array(m).fill(Infinity),
    pinFrom: new Uint8Array(m),
    pinTo: new Uint8Array(m),
    base: Int32Array.from(bases),
    baseSpring: Float64Array.from(bases, (i) => springs[i]!),
  }
}

function loaded(frame: FrameArrays, loads: Partial<FrameLoads>): FrameResponse {
  return loadResponse(factorFrame(frame), [{ nodeDown: new Float64Array(frame.x.length), onMembers: [], ...loads }])
}

/** Three spans of 8 m, ends fixed, EI = 56 000 kNm2, the second support sinks by 20 mm. */
function sinkingSupport(): Check[] {
  const response = baseInfluence(factorFrame(beam([0, 8, 16, 24], [Infinity, 0, 0, Infinity], 56e3)))
  const from = (member: number) => -0.02 * response.momentFrom[3 + member]!
  const to = (member: number) => -0.02 * response.momentTo[3 + member]!
  const up = (base: number) => 0.02 * response.reactionUp[4 + base]!
  return [
    ['at the fixed end', 98, from(0)],
    ['at the support that sinks', 91, to(0)],
    ['at the third support', -56, to(1)],
    ['at the far fixed end', 28, to(2)],
  ].map(([place, expected, found]) => ({ source: KASSIMALI, check: `three spans, the second support sinks 20 mm: moment ${place}, anticlockwise`, expected: expected as number, found: found as number, unit: 'kNm', tolerance: 1e-6 })) // prettier-ignore
    .concat([{ source: KASSIMALI, check: 'the same: reaction of the support that sinks', expected: -42, found: up(1), unit: 'kN', tolerance: 1e-6 }]) // prettier-ignore
}

function overhang(): Check[] {
  const { momentFrom, momentTo } = loaded(beam([0, 20, 50, 60], [Infinity, 0, 0, NaN], 1e5), {
    nodeDown: Float64Array.of(0, 0, 0, 9),
    onMembers: [
      { member: 0, kind: 'point', P: 45, a: 10 },
      { member: 1, kind: 'uniform', w: 1.8 },
    ],
  })
  return [
    ['fixed end', -97.5, momentFrom[0]!],
    ['second support', 142.5, momentTo[0]!],
    ['third support', 90, momentTo[1]!],
  ].map(([place, expected, found]) => ({ source: OVERHANG, check: `two loaded spans with an overhang: moment at the ${place}`, expected: expected as number, found: found as number, unit: 'k-ft', tolerance: 1e-6 })) // prettier-ignore
}

function fixedEnds(): Check[] {
  const frame = beam([0, 6], [Infinity, Infinity], 5e4)
  const uniform = loaded(frame, { onMembers: [{ member: 0, kind: 'uniform', w: 10 }] })
  const point = loaded(frame, { onMembers: [{ member: 0, kind: 'point', P: 40, a: 3 }] })
  return [
    { source: HANDBOOK, check: 'uniform load, 10 kN/m on 6 m, both ends fixed: wL\u00b2/12', expected: -30, found: uniform.momentFrom[0]!, unit: 'kNm' }, // prettier-ignore
    { source: HANDBOOK, check: 'point load, 40 kN in the middle of 6 m, both ends fixed: PL/8', expected: -30, found: point.momentFrom[0]!, unit: 'kNm' }, // prettier-ignore
  ]
}

function equalSpans(): Check[] {
  const [EI, L] = [3e4, 6]
  const two = baseInfluence(factorFrame(beam([0, L, 2 * L], [0, 0, 0], EI)))
  const three = baseInfluence(factorFrame(beam([0, L, 2 * L, 3 * L], [0, 0, 0, 0], EI)))
  const unit = EI / L ** 2
  return [
    { source: SPANS, check: 'two equal spans on pins, the middle sinks: sagging over it in EI \u00d7 settlement / L\u00b2', expected: 3, found: -two.momentTo[2]! / unit, unit: '' }, // prettier-ignore
    { source: SPANS, check: 'three equal spans on pins, the second support sinks: sagging over it', expected: 3.6, found: -three.momentTo[3]! / unit, unit: '' }, // prettier-ignore
    { source: SPANS, check: 'the same: hogging over the third support', expected: -2.4, found: -three.momentTo[4]! / unit, unit: '' }, // prettier-ignore
  ]
}

/** A portal of one bay, one of whose bases sinks. */
function portal(): Check[] {
  const frame: FrameArrays = {
    x: Float64Array.of(0, 6, 0, 6),
    z: Float64Array.of(0, 0, 4, 4),
    from: Int32Array.of(0, 1, 2),
    to: Int32Array.of(2, 3, 3),
    EI: Float64Array.of(2e4, 2e4, 6e4),
    EA: Float64Array.of(1e7, 1e7, 1e7),
    GAs: new Float64Array(3).fill(Infinity),
    pinFrom: new Uint8Array(3),
    pinTo: new Uint8Array(3),
    base: Int32Array.of(0, 1),
    baseSpring: Float64Array.of(Infinity, Infinity),
  }
  const response = baseInfluence(factorFrame(frame))
  const balance = response.reactionUp[0]! + response.reactionUp[1]!
  return [
    { source: 'Statics: a settlement alone loads nothing', check: 'portal, one base sinks: sum of the changes of reaction', expected: 0, found: balance, unit: 'kN per m', tolerance: 1e-6 }, // prettier-ignore
    { source: 'J. C. Maxwell and E. Betti: reciprocity', check: 'portal: reaction at the second base for the first, less the reverse', expected: 0, found: response.reactionUp[1]! - response.reactionUp[2]!, unit: 'kN per m', tolerance: 1e-6 }, // prettier-ignore
  ]
}
