/**
 * Millimetres left at each support: how far it may settle further, alone, until the first member or span that is
 * still below a trigger reaches it, and which one that is. Every moment and rotation is linear in that further
 * settlement and what is held against the triggers is convex in it, so the place of the crossing is found exactly.
 */
import type { SupportHeadroom, Reach, RoundFindings, Triggered } from '../model/findings.ts'
import { angularDistortion, firstReach } from '../../solver/index.ts'
import { assessRound, movedLines } from './assess.ts'
import type { LineMovement } from './line-movement.ts'
import { inducedFraction, type LineMoments } from './members.ts'
import type { Prepared } from './prepare.ts'
import { utilisation, type EndMoments } from './utilisation.ts'

/** Nobody waits for a settlement beyond this, m. */
export const MOST = 1
/** Where the search for a crossing begins, m. */
const FIRST = 0.001
const NOTHING = new Float64Array(0)

/** A value held against triggers, as a function of the further settlement in m. */
interface Effect {
  target: Triggered
  at: (x: number) => number
  /** at(0), known from the findings. */
  now: number
  /** No faster than this does it grow, 1/m: tells without a search which effects cannot be first. */
  steepest: number
  sd: number
  amber: number
  red: number
}

/** Change of the end moments of every member of a line for 1 m more at one support. */
interface Slopes {
  from: Float64Array
  to: Float64Array
}

/** Headroom of every support of the building, in its order. */
export function headroomOf(prepared: Prepared, round: string | RoundFindings): SupportHeadroom[] {
  const findings = typeof round === 'string' ? assessRound(prepared, round) : round
  const { moments } = movedLines(prepared, findings.id)
  return prepared.building.supports.map((support, j): SupportHeadroom => {
    const effects = effectsOf(prepared, moments, findings, j)
    const amber = firstOf(effects, 'amber')
    const red = firstOf(effects, 'red')
    return { support: support.id, ...(amber ? { amber } : {}), ...(red ? { red } : {}) }
  })
}

function firstOf(effects: readonly Effect[], trigger: 'amber' | 'red'): Reach | undefined {
  let best: { x: number; effect: Effect } | undefined
  function soonest(effect: Effect): number {
    return effect.now >= effect[trigger] ? Infinity : (effect[trigger] - effect.now) / effect.steepest
  }
  function consider(effect: Effect): void {
    const limit = effect[trigger]
    if (soonest(effect) > (best?.x ?? MOST) || (best && effect.at(best.x) < limit)) return
    const x = firstReach(effect.at, limit, FIRST, MOST)
    if (x !== Infinity && (!best || x < best.x)) best = { x, effect }
  }
  // The likeliest first: after it most others are told at a glance to come later.
  const likeliest = effects.reduce<Effect | undefined>((a, b) => (!a || soonest(b) < soonest(a) ? b : a), undefined)
  if (likeliest) consider(likeliest)
  effects.forEach(consider)
  if (!best) return undefined
  const { x, effect } = best
  const step = x / 1000
  const slope = (effect.at(x + step) - effect.at(x)) / step
  return { left_mm: x * 1000, sd_mm: (effect.sd / slope) * 1000, target: effect.target }
}

function effectsOf(
  prepared: Prepared,
  moments: readonly LineMoments[],
  findings: RoundFindings,
  support: number,
): Effect[] {
  const slopes = moments.map(({ movement }) => slopesOf(movement, support))
  return findings.frame_lines.flatMap(({ id, spans, members }, l) => {
    const found: Effect[] = []
    const { movement } = moments[l]!
    const at = new Map(movement.prepared.supports.map((s) => [prepared.building.supports[s.support]!.id, s]))
    for (const span of spans) {
      const [left, right] = [at.get(span.from)!, at.get(span.to)!]
      const slope = angularDistortion(movement.tiltWeights, left.support, right.support, span.length_m)[support]!
      if (slope === 0) continue
      found.push({
        target: { kind: 'span', line: id, from: span.from, to: span.to },
        at: (x) => Math.abs(span.angular_distortion_rad + slope * x),
        now: Math.abs(span.angular_distortion_rad),
        steepest: Math.abs(slope),
        sd: span.sd_rad,
        ...prepared.criteria.angular_distortion,
      })
    }
    members.forEach((member, i) => {
      const target: Triggered = { kind: 'member', line: id, id: member.member }
      function shifted(x: number): EndMoments {
        return (line, index) => ({
          from: { value: moments[line]!.from[index]!.value + slopes[line]!.from[index]! * x, factor: NOTHING },
          to: { value: moments[line]!.to[index]!.value + slopes[line]!.to[index]! * x, factor: NOTHING },
        })
      }
      if (member.induced_fraction !== undefined)
        found.push({
          target,
          at: (x) => fractionAt(prepared, shifted(x), l, i),
          now: member.induced_fraction,
          steepest: bendingGrowth(prepared, slopes, l, i),
          sd: member.sd_induced_fraction ?? 0,
          ...prepared.criteria.induced_fraction,
        })
      if (member.utilisation !== undefined)
        found.push({
          target,
          at: (x) => utilisation(prepared, shifted(x), l, i)!.utilisation,
          now: member.utilisation,
          steepest: utilisationGrowth(prepared, slopes, l, i),
          sd: member.sd_utilisation ?? 0,
          ...prepared.criteria.utilisation,
        })
    })
    return found
  })
}

/** The most that the fraction of a member's capacity grows by, 1/m. */
function bendingGrowth(prepared: Prepared, slopes: readonly Slopes[], line: number, member: number): number {
  const { sagging, hogging } = prepared.lines[line]!.capacities[member]!
  const least = Math.min(sagging ?? Infinity, hogging ?? Infinity)
  const most = Math.max(Math.abs(slopes[line]!.from[member]!), Math.abs(slopes[line]!.to[member]!))
  return most === 0 ? 0 : most / least
}

/** The most that its utilisation grows by: of the bending in all its lines, or of the shear. */
function utilisationGrowth(prepared: Prepared, slopes: readonly Slopes[], line: number, member: number): number {
  const { partners, capacities, solved } = prepared.lines[line]!
  const bending = partners[member]!.reduce(
    (sum, p) => sum + bendingGrowth(prepared, slopes, p.line, p.member),
    bendingGrowth(prepared, slopes, line, member),
  )
  const { shear } = capacities[member]!
  const change = Math.abs(slopes[line]!.from[member]! + slopes[line]!.to[member]!) / solved!.length[member]!
  const shearing = shear === undefined || change === 0 ? 0 : change / shear
  return prepared.criteria.combination.settlement * Math.max(bending, shearing)
}

function fractionAt(prepared: Prepared, moments: EndMoments, line: number, member: number): number {
  const { from, to } = moments(line, member)
  const ends = { moment_from_kNm: from.value, moment_to_kNm: to.value, sd_from_kNm: 0, sd_to_kNm: 0 }
  return inducedFraction(ends, prepared.lines[line]!.capacities[member]!)?.induced_fraction ?? 0
}

function slopesOf({ prepared: line, strainWeights }: LineMovement, support: number): Slopes {
  const m = line.solved?.arrays.members.length ?? 0
  const slopes: Slopes = { from: new Float64Array(m), to: new Float64Array(m) }
  strainWeights.forEach((weights, b) => {
    const w = weights[support]!
    if (w === 0) return
    const { momentFrom, momentTo } = line.solved!.influence
    for (let i = 0; i < m; i++) {
      slopes.from[i]! += momentFrom[b * m + i]! * w
      slopes.to[i]! += momentTo[b * m + i]! * w
    }
  })
  return slopes
}
