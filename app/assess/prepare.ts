/**
 * Everything about a building that does not hang on the readings of one round: frames factorised, their
 * response to each base and to the loads, spans, columns that stand in two lines. Made once a description;
 * what has not changed since a previous preparation is taken over, so that typing a reading factorises nothing.
 */
import {
  capacityOf,
  criteriaOf,
  heldBenchmarks,
  type Building,
  type Criteria,
  type FrameLine,
  type Round,
} from '../model/building.ts'
import { Fault, InputFault, type FaultRecord } from '../model/faults.ts'
import {
  baseInfluence,
  factorFrame,
  loadResponse,
  normalQuantile,
  SolverFault,
  type BendingCapacity,
  type FrameResponse,
  type LoadAlong,
} from '../../solver/index.ts'
import { combinedLoads, lineArrays, namedFault, sectionsUsed, type LineArrays } from './frame-line.ts'
import { levelRound, type LevelledRound } from './levels.ts'
import type { SettlementMemo } from './settlement.ts'
import { columnsInTwoLines, planPositions, type Partner } from './shared-columns.ts'

/** A frame solved once: its response to 1 m at each base, and to its loads. */
export interface SolvedLine {
  arrays: LineArrays
  /** b cases */
  influence: FrameResponse
  /** One case: the loads combined as the criteria say; absent where nothing is loaded. */
  existing?: FrameResponse
  /** Combined loads of each member, for what happens between its ends. */
  loads: LoadAlong[][]
  /** shape (m), m */
  length: Float64Array
}

export interface MemberCapacity extends BendingCapacity {
  shear?: number
}

export interface LineSupport {
  /** Index of the support in the building. */
  support: number
  x: number
}

export interface PreparedLine {
  line: FrameLine
  /** Absent where the line has no members yet. */
  solved?: SolvedLine
  /** shape (b): index in the building of the support under each base. */
  bases: number[]
  /** Supports of the line from left to right. */
  supports: LineSupport[]
  /** Direction in plan from the first to the last support; [0, 0] where there is only one. */
  towards: [number, number]
  capacities: MemberCapacity[]
  /** shape (m): the same column in other lines. */
  partners: Partner[][]
  /** What the solved part was made from. */
  key: string
}

export interface Prepared {
  building: Building
  criteria: Criteria
  /** Two-sided normal quantile at the criteria's confidence. */
  z: number
  lines: PreparedLine[]
  /** Levels of rounds already adjusted, by what they were made from. */
  levelled: Map<string, LevelledRound>
  settled: SettlementMemo
}

/**
 * Prepares a building. An unfinished one gives what it can: a line without members has spans but no frame.
 * Throws one InputFault with every frame that cannot be solved.
 */
export function prepare(building: Building, previous?: Prepared): Prepared {
  const criteria = criteriaOf(building)
  const faults: FaultRecord[] = []
  const supportAt = new Map(building.supports.map((s, i) => [s.id, i]))
  const before = new Map(previous?.lines.map((l) => [l.line.id, l]))
  const lines = building.frame_lines.flatMap((line) => {
    try {
      return [prepareLine(building, criteria, line, supportAt, before.get(line.id))]
    } catch (error) {
      if (!(error instanceof Fault)) throw error
      faults.push(error.record)
      return []
    }
  })
  if (faults.length) throw new InputFault(faults)
  if (previous && sameFrames(lines, previous.lines, building, previous.building))
    lines.forEach((l, i) => (l.partners = previous.lines[i]!.partners))
  else {
    const places = lines.map((l) => planPositions(l, building.supports))
    lines.forEach((l, i) => (l.partners = columnsInTwoLines(lines, places, i)))
  }
  const z = normalQuantile(0.5 + criteria.confidence / 2)
  return { building, criteria, z, lines, levelled: levelledOf(building, criteria, previous), settled: new Map() }
}

function sameFrames(a: readonly PreparedLine[], b: readonly PreparedLine[], now: Building, then: Building): boolean {
  return (
    a.length === b.length &&
    a.every((line, i) => line.key === b[i]!.key) &&
    JSON.stringify(now.supports) === JSON.stringify(then.supports)
  )
}

function prepareLine(
  building: Building,
  criteria: Criteria,
  line: FrameLine,
  supportAt: ReadonlyMap<string, number>,
  before: PreparedLine | undefined,
): PreparedLine {
  const sections = sectionsUsed(line, building)
  const key = JSON.stringify([line, sections, criteria.combination])
  const solved = before?.key === key ? before.solved : solveLine(line, sections, criteria)
  const supports = line.nodes
    .filter((n) => n.support !== undefined)
    .map((n): LineSupport => ({ support: indexOf(supportAt, n.support!, line), x: n.x_m }))
    .sort((a, b) => a.x - b.x)
  const first = building.supports[supports[0]?.support ?? -1]
  const last = building.supports[supports.at(-1)?.support ?? -1]
  const capacities = (solved?.arrays.members ?? []).map((member, i): MemberCapacity => {
    const { sagging_kNm, hogging_kNm, shear_kN } = capacityOf(member, solved!.arrays.sections[i]!)
    return { sagging: sagging_kNm, hogging: hogging_kNm, shear: shear_kN }
  })
  return {
    line,
    solved,
    bases: (solved?.arrays.supports ?? []).map((id) => indexOf(supportAt, id, line)),
    supports,
    towards: first && last ? [last.x_m - first.x_m, last.y_m - first.y_m] : [0, 0],
    capacities,
    partners: [],
    key,
  }
}

function indexOf(supportAt: ReadonlyMap<string, number>, id: string, line: FrameLine): number {
  const index = supportAt.get(id)
  if (index === undefined)
    throw new Fault('frame.baseless', { element: { kind: 'line', id: line.id }, value: id, detail: { line: line.id } })
  return index
}

function solveLine(line: FrameLine, sections: Building['sections'], criteria: Criteria): SolvedLine | undefined {
  const arrays = lineArrays(line, sections)
  if (!arrays) return undefined
  try {
    const factored = factorFrame(arrays.frame)
    const loads = combinedLoads(arrays, criteria.combination)
    const along: LoadAlong[][] = arrays.members.map(() => [])
    for (const load of loads?.onMembers ?? []) along[load.member]!.push(load)
    const { x, z, from, to } = arrays.frame
    return {
      arrays,
      influence: baseInfluence(factored),
      ...(loads ? { existing: loadResponse(factored, [loads]) } : {}),
      loads: along,
      length: Float64Array.from(from, (a, i) => Math.hypot(x[to[i]!]! - x[a]!, z[to[i]!]! - z[a]!)),
    }
  } catch (error) {
    if (!(error instanceof SolverFault)) throw error
    const { code, place } = namedFault(error, line, arrays)
    throw new Fault(code, place, { cause: error })
  }
}

/** The levels of a round, adjusted once and kept. Throws a Fault where they cannot be had. */
export function levelled(prepared: Prepared, round: Round): LevelledRound {
  const key = keyOf(prepared.building, prepared.criteria, round)
  let found = prepared.levelled.get(key)
  if (!found) {
    found = levelRound(prepared.building, round, prepared.criteria.confidence, prepared.z)
    prepared.levelled.set(key, found)
  }
  return found
}

function keyOf(building: Building, criteria: Criteria, round: Round): string {
  const benchmarks = round.book ? heldBenchmarks(building) : []
  return JSON.stringify([round, benchmarks, criteria.confidence])
}

/** Levels kept by a previous preparation that still hold. */
function levelledOf(
  building: Building,
  criteria: Criteria,
  previous: Prepared | undefined,
): Map<string, LevelledRound> {
  const kept = new Map<string, LevelledRound>()
  if (previous)
    for (const round of building.survey.rounds) {
      const key = keyOf(building, criteria, round)
      const found = previous.levelled.get(key)
      if (found) kept.set(key, found)
    }
  return kept
}
