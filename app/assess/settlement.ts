/**
 * Settlement of every support in a round, as a linear functional of levels of several rounds, so that value
 * and covariance come from the same weights. Rounds are independent of each other; benchmarks are held.
 *
 * - A stud read in the baseline gives `baseline level - level`. Several studs on a support: mean weighted by the
 *   inverse of their variances.
 * - A stud not read in the baseline (set late, or in place of a lost one) joins its support's series at the first
 *   round that has it: settlement of the support there by its other studs, plus the stud's own fall since.
 * - A support with no such stud is estimated: along its frame line between the nearest measured supports, else
 *   from the plane through the measured ones. The estimate's own allowance is a standard deviation of 2 mm or
 *   half the neighbours' difference, whichever is greater, independent of everything else.
 * - A series joined on an estimate stays an estimate. Estimates never enter the plane or another estimate.
 */
import type { Building } from '../model/building.ts'
import { Fault } from '../model/faults.ts'
import { planeAt, planeMap, tiltAlong, type PlaneMap } from '../../solver/index.ts'
import {
  allowance,
  combine,
  factorOf,
  levelOf,
  valueOf,
  varianceOf,
  weightedMean,
  type Functional,
} from './functional.ts'
import type { LevelledRound } from './levels.ts'

/** Least standard deviation allowed for what an estimate cannot know, m. */
export const ALLOWANCE = 0.002

/** Two studs of one support, and by how much more the first has settled, m. */
export interface StudsApart {
  studs: [string, string]
  difference: number
  sd: number
}

export interface Settlements {
  round: LevelledRound
  /** shape (n), m, down positive; n supports of the building in its order */
  value: Float64Array
  /** shape (n, q), m: C = factor factor' */
  factor: Float64Array
  q: number
  /** What the estimate of a support rests on; undefined where it was measured. */
  estimatedFrom: (string | undefined)[]
  /** Of a support with several studs: the two that differ most for what the survey can tell. */
  apart: (StudsApart | undefined)[]
  plane: PlaneMap
  /** Weights over all n supports; 0 for those not measured. */
  mean: Float64Array
  tiltX: Float64Array
  tiltY: Float64Array
}

export interface SettlementSource {
  building: Building
  baseline: LevelledRound
  /** All rounds that can be levelled, by date. */
  rounds: readonly LevelledRound[]
}

/** Keeps the settlements of rounds already worked out, so that a joined series costs nothing twice. */
export type SettlementMemo = Map<LevelledRound, Settlements & { functionals: Functional[] }>

/** Settlements of a round. Throws `round.unmeasured` where no support can be measured in it. */
export function settlementsOf(source: SettlementSource, round: LevelledRound, memo: SettlementMemo): Settlements {
  return settle(source, round, memo)
}

function settle(source: SettlementSource, round: LevelledRound, memo: SettlementMemo) {
  const known = memo.get(round)
  if (known) return known
  const { supports } = source.building
  const functionals: (Functional | undefined)[] = []
  const estimatedFrom: (string | undefined)[] = []
  const apart: (StudsApart | undefined)[] = []
  supports.forEach((support) => {
    const own = bySeries(source, round, support.id, memo)
    functionals.push(own?.functional)
    estimatedFrom.push(own?.restsOn)
    apart.push(own?.apart)
  })
  const measured = supports.flatMap((_, i) => (functionals[i] && estimatedFrom[i] === undefined ? [i] : []))
  if (measured.length === 0)
    throw new Fault('round.unmeasured', { element: { kind: 'round', id: round.id }, detail: { round: round.id } })
  const plane = planeMap(
    measured.map((i) => supports[i]!.x_m),
    measured.map((i) => supports[i]!.y_m),
  )
  supports.forEach((_, i) => {
    if (functionals[i]) return
    const guess = estimate(source.building, round, i, functionals, measured, plane)
    functionals[i] = guess.functional
    estimatedFrom[i] = guess.restsOn
  })
  const complete = functionals as Functional[]
  const { q, factor } = factorOf(complete)
  const result = {
    round,
    value: Float64Array.from(complete, valueOf),
    factor,
    q,
    estimatedFrom,
    apart,
    plane,
    mean: spread(plane.mean, measured, supports.length),
    tiltX: spread(plane.tiltX, measured, supports.length),
    tiltY: spread(plane.tiltY, measured, supports.length),
    functionals: complete,
  }
  memo.set(round, result)
  return result
}

function spread(weights: Float64Array, at: readonly number[], n: number): Float64Array {
  const out = new Float64Array(n)
  at.forEach((i, k) => (out[i] = weights[k]!))
  return out
}

/** Weights over all supports of the tilt along a direction in plan. */
export function tiltWeights({ tiltX, tiltY, mean, plane }: Settlements, dx: number, dy: number): Float64Array {
  return tiltAlong({ ...plane, tiltX, tiltY, mean }, dx, dy)
}

/** By the support's own studs; undefined where none of them says anything in this round. */
function bySeries(
  source: SettlementSource,
  round: LevelledRound,
  support: string,
  memo: SettlementMemo,
): { functional: Functional; restsOn?: string; apart?: StudsApart } | undefined {
  const sound: Functional[] = []
  const names: string[] = []
  const doubtful: { functional: Functional; restsOn: string }[] = []
  const index = source.building.supports.findIndex((s) => s.id === support)
  for (const stud of source.building.survey.points) {
    if (stud.kind !== 'stud' || stud.support !== support) continue
    const row = round.row.get(stud.id)
    if (row === undefined) continue
    const first = source.baseline.row.get(stud.id)
    if (first !== undefined) {
      sound.push(combine([[1, levelOf(source.baseline, first)], [-1, levelOf(round, row)]])) // prettier-ignore
      names.push(stud.id)
      continue
    }
    const join = joinOf(source, stud.id)
    if (join === undefined || join === round) continue
    const there = settle(source, join, memo)
    const functional = combine([
      [1, there.functionals[index]!],
      [1, levelOf(join, join.row.get(stud.id)!)],
      [-1, levelOf(round, row)],
    ])
    if (there.estimatedFrom[index] === undefined) {
      sound.push(functional)
      names.push(stud.id)
    } else
      doubtful.push({
        functional,
        restsOn: `stud ${stud.id}, joined in round ${join.id} to an estimate (${there.estimatedFrom[index]})`,
      })
  }
  if (sound.length) return { functional: weightedMean(sound), apart: farthest(sound, names) }
  if (doubtful.length)
    return {
      functional: weightedMean(doubtful.map((d) => d.functional)),
      restsOn: doubtful.map((d) => d.restsOn).join('; '),
    }
  return undefined
}

/** The pair of studs that differ most, by the standard deviation of their difference. */
function farthest(sound: readonly Functional[], names: readonly string[]): StudsApart | undefined {
  let worst: StudsApart | undefined
  sound.forEach((a, i) =>
    sound.slice(i + 1).forEach((b, k) => {
      const between = combine([[1, a], [-1, b]]) // prettier-ignore
      const difference = valueOf(between)
      const sd = Math.sqrt(varianceOf(between))
      if (!worst || Math.abs(difference) * worst.sd > Math.abs(worst.difference) * sd)
        worst = { studs: [names[i]!, names[i + 1 + k]!], difference, sd }
    }),
  )
  return worst
}

/** The round at which a stud that the baseline does not have joins: the first after it, else the last before. */
function joinOf({ baseline, rounds }: SettlementSource, stud: string): LevelledRound | undefined {
  const having = rounds.filter((r) => r !== baseline && r.row.has(stud))
  return having.find((r) => r.date >= baseline.date) ?? having.at(-1)
}

function estimate(
  building: Building,
  round: LevelledRound,
  index: number,
  functionals: readonly (Functional | undefined)[],
  measured: readonly number[],
  plane: PlaneMap,
): { functional: Functional; restsOn: string } {
  const support = building.supports[index]!
  const between = bracket(building, index, measured)
  const key = `${round.id}/${support.id}`
  if (between?.to !== undefined) {
    const a = functionals[between.from]!
    const b = functionals[between.to]!
    const sd = Math.max(ALLOWANCE, Math.abs(valueOf(a) - valueOf(b)) / 2)
    const names = `${building.supports[between.from]!.id} and ${building.supports[between.to]!.id}`
    return {
      functional: combine([[1 - between.share, a], [between.share, b], [1, allowance(key, sd)]]), // prettier-ignore
      restsOn: `interpolated along frame line ${between.line} between ${names}, with an allowance of ${inMm(sd)} mm (sd)`,
    }
  }
  const weights = planeAt(plane, support.x_m, support.y_m)
  const onPlane = combine(measured.map((i, k) => [weights[k]!, functionals[i]!]))
  const near = between ? functionals[between.from]! : undefined
  const sd = Math.max(ALLOWANCE, near ? Math.abs(valueOf(onPlane) - valueOf(near)) / 2 : 0)
  const count =
    measured.length === 1 ? 'the one measured support' : `the plane through ${measured.length} measured supports`
  return {
    functional: combine([[1, onPlane], [1, allowance(key, sd)]]), // prettier-ignore
    restsOn: `from ${count}, with an allowance of ${inMm(sd)} mm (sd)`,
  }
}

function inMm(sd: number): string {
  return (sd * 1000).toFixed(1)
}

interface Bracket {
  line: string
  from: number
  to?: number
  /** share of the way from `from` to `to` */
  share: number
}

/** The nearest measured supports on both sides along a frame line, the closest pair of all lines; else the nearest one. */
function bracket(building: Building, index: number, measured: readonly number[]): Bracket | undefined {
  const id = building.supports[index]!.id
  const at = new Map(measured.map((i) => [building.supports[i]!.id, i]))
  let best: (Bracket & { width: number }) | undefined
  for (const line of building.frame_lines) {
    const own = line.nodes.find((n) => n.support === id)
    if (!own) continue
    const others = line.nodes
      .filter((n) => n.support !== undefined && at.has(n.support))
      .map((n) => ({ x: n.x_m - own.x_m, index: at.get(n.support!)! }))
    const left = others.filter((o) => o.x < 0).sort((a, b) => b.x - a.x)[0]
    const right = others.filter((o) => o.x > 0).sort((a, b) => a.x - b.x)[0]
    const near = left ?? right
    if (!near) continue
    const found =
      left && right
        ? {
            line: line.id,
            from: left.index,
            to: right.index,
            share: -left.x / (right.x - left.x),
            width: right.x - left.x,
          }
        : { line: line.id, from: near.index, share: 0, width: Math.abs(near.x) }
    if (!best || isCloser(found, best)) best = found
  }
  return best
}

/** Between two supports before beside one; then the shorter distance. */
function isCloser(a: Bracket & { width: number }, b: Bracket & { width: number }): boolean {
  const isBetween = a.to !== undefined
  return isBetween === (b.to !== undefined) ? a.width < b.width : isBetween
}
