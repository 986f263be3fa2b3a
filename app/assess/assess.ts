/** Building and readings to findings: the whole chain. */
import type { Building, Round } from '../model/building.ts'
import { CAUTIONS, RED_CAUTION } from '../model/cautions.ts'
import { Fault } from '../model/faults.ts'
import {
  worse,
  type Findings,
  type FrameLineFinding,
  type NodeFinding,
  type PointFinding,
  type ReactionFinding,
  type RoundFindings,
  type Status,
  type SupportFinding,
} from '../model/findings.ts'
import { lineMovement, sdOf, spanFindings, stretchFindings, weigh, type LineMovement } from './line-movement.ts'
import type { LevelledRound } from './levels.ts'
import { lineMoments, memberFindings, respondedValue, type LineMoments } from './members.ts'
import { levelled, prepare, type Prepared } from './prepare.ts'
import { settlementsOf, type Settlements, type StudsApart } from './settlement.ts'

/** Findings of all rounds but the baseline, by date; of one round where it is named. */
export function assessBuilding(building: Building, round?: string): Findings {
  return assessPrepared(prepare(building), round)
}

/** As assessBuilding, of a building already prepared; `before` is told of each round, and may stop the work by throwing. */
export function assessPrepared(
  prepared: Prepared,
  round?: string,
  before: (done: number, of: number, id: string) => void = () => undefined,
): Findings {
  const { building } = prepared
  const { baseline, rounds } = building.survey
  if (round !== undefined) roundOf(prepared, round)
  const chosen = byDate(rounds).filter((r) => r.id !== baseline && (round === undefined || r.id === round))
  const found = chosen.map((r, i) => {
    before(i, chosen.length, r.id)
    return assessRound(prepared, r.id)
  })
  const isRed = found.some((r) => r.status === 'red')
  return {
    format: 'levelstead-findings',
    version: 1,
    building: building.name,
    ...(baseline === undefined ? {} : { baseline }),
    rounds: found,
    cautions: [...(isRed ? [RED_CAUTION] : []), ...CAUTIONS],
  }
}

/** Findings of one round. Throws a Fault where its levels or settlements cannot be had. */
export function assessRound(prepared: Prepared, roundId: string): RoundFindings {
  const { settlements, moments } = movedLines(prepared, roundId)
  const { round } = settlements
  const isEstimated = settlements.estimatedFrom.map((from) => from !== undefined)
  const frame_lines = moments.map(({ movement }, i): FrameLineFinding => ({
    id: movement.prepared.line.id,
    tilt_rad: movement.tilt.value,
    spans: spanFindings(prepared, movement, settlements),
    stretches: stretchFindings(prepared, movement, settlements),
    members: memberFindings(prepared, moments, i, isEstimated),
    reactions: reactionsOf(prepared, movement),
    nodes: nodesOf(prepared, movement),
  }))
  const status = frame_lines
    .flatMap((line): Status[] => [...line.members, ...line.spans].map((x) => x.status))
    .reduce(worse, 'none')
  return {
    id: round.id,
    date: round.date,
    status,
    ...(round.levelling ? { levelling: round.levelling } : {}),
    points: pointsOf(prepared, roundId),
    supports: supportFindings(prepared, settlements),
    tilt: tiltOf(settlements),
    frame_lines,
  }
}

/** Levels of the studs read in a round, in the order of the building's points. */
export function pointsOf(prepared: Prepared, roundId: string): PointFinding[] {
  const round = levelled(prepared, roundOf(prepared, roundId))
  return prepared.building.survey.points.flatMap((point): PointFinding[] => {
    const row = round.row.get(point.id)
    if (point.kind !== 'stud' || row === undefined) return []
    const sd = sdOf(round.factor.subarray(row * round.q, (row + 1) * round.q))
    return [{ point: point.id, level_m: round.level[row]!, sd_mm: sd * 1000 }]
  })
}

/** A round's settlements and what they do to every line: what the findings and the reasons are made from. */
export function movedLines(prepared: Prepared, roundId: string): { settlements: Settlements; moments: LineMoments[] } {
  const settlements = roundSettlements(prepared, roundId)
  const moments = prepared.lines.map((line) => lineMoments(lineMovement(prepared, line, settlements)))
  return { settlements, moments }
}

export function roundSettlements(prepared: Prepared, roundId: string): Settlements {
  const { building } = prepared
  const round = levelled(prepared, roundOf(prepared, roundId))
  const baselineId = building.survey.baseline
  if (baselineId === undefined)
    throw new Fault('round.baseless', { element: { kind: 'round', id: roundId }, detail: { round: roundId } })
  const baseline = levelled(prepared, roundOf(prepared, baselineId))
  return settlementsOf({ building, baseline, rounds: joinRounds(prepared, baseline) }, round, prepared.settled)
}

/** The other rounds are wanted only where a stud was set after the baseline; a round that cannot be levelled joins none. */
function joinRounds(prepared: Prepared, baseline: LevelledRound): LevelledRound[] {
  const { points, rounds } = prepared.building.survey
  const isLate = points.some((p) => p.kind === 'stud' && !baseline.row.has(p.id))
  if (!isLate) return []
  return byDate(rounds).flatMap((round) => {
    try {
      return [levelled(prepared, round)]
    } catch (error) {
      if (error instanceof Fault) return []
      throw error
    }
  })
}

function roundOf(prepared: Prepared, id: string): Round {
  const round = prepared.building.survey.rounds.find((r) => r.id === id)
  if (!round) throw new Fault('round.unknown', { value: id, element: { kind: 'round', id } })
  return round
}

function byDate(rounds: readonly Round[]): Round[] {
  return [...rounds].sort((a, b) => (a.date < b.date ? -1 : a.date > b.date ? 1 : 0))
}

function supportFindings(
  prepared: Prepared,
  { value, factor, q, estimatedFrom, apart }: Settlements,
): SupportFinding[] {
  return prepared.building.supports.map((support, i): SupportFinding => {
    const sd = sdOf(factor.subarray(i * q, (i + 1) * q))
    const from = estimatedFrom[i]
    return {
      support: support.id,
      settlement_mm: value[i]! * 1000,
      sd_mm: sd * 1000,
      estimated: from !== undefined,
      significant: Math.abs(value[i]!) > prepared.z * sd,
      ...(from === undefined ? {} : { estimated_from: from }),
      ...disagreement(apart[i], prepared.z),
    }
  })
}

function disagreement(apart: StudsApart | undefined, z: number): Pick<SupportFinding, 'studs_disagree'> {
  if (!apart || Math.abs(apart.difference) <= z * apart.sd) return {}
  const { studs, difference, sd } = apart
  return { studs_disagree: { studs, difference_mm: difference * 1000, sd_mm: sd * 1000 } }
}

function tiltOf(settlements: Settlements): RoundFindings['tilt'] {
  const x = weigh(settlements.tiltX, settlements)
  const y = weigh(settlements.tiltY, settlements)
  return {
    x_rad: x.value,
    y_rad: y.value,
    mean_mm: weigh(settlements.mean, settlements).value * 1000,
    sd_x_rad: sdOf(x.factor),
    sd_y_rad: sdOf(y.factor),
  }
}

function reactionsOf(prepared: Prepared, { prepared: line, strain }: LineMovement): ReactionFinding[] {
  const b = line.bases.length
  return line.bases.map((support, i) => ({
    support: prepared.building.supports[support]!.id,
    vertical_kN: respondedValue(line.solved!.influence.reactionUp, i, b, strain),
    moment_kNm: respondedValue(line.solved!.influence.reactionMoment, i, b, strain),
  }))
}

/** Displacement of every node: the straining part, and the sinking and turning that strain nothing. */
function nodesOf(prepared: Prepared, movement: LineMovement): NodeFinding[] {
  const { solved } = movement.prepared
  if (!solved || movement.strain.length === 0) return []
  const { nodes, frame } = solved.arrays
  const turn = prepared.criteria.base_rotation === 'follows-tilt' ? movement.tilt.value : 0
  const { influence } = solved
  return nodes.map((node, i): NodeFinding => {
    const right = respondedValue(influence.right, i, nodes.length, movement.strain)
    const down = respondedValue(influence.down, i, nodes.length, movement.strain)
    return {
      node: node.id,
      x_mm: (right + turn * (frame.z[i]! - movement.centreZ)) * 1000,
      down_mm: (down + movement.mean + turn * (frame.x[i]! - movement.centreX)) * 1000,
      rotation_rad: respondedValue(influence.rotation, i, nodes.length, movement.strain) + turn,
    }
  })
}
