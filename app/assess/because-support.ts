/** Where the settlement of a support comes from: levels then and now. */
import type { SupportFinding } from '../model/findings.ts'
import type { Because } from './because.ts'
import { fixed } from './figures.ts'
import { sdOf } from './line-movement.ts'
import type { LevelledRound } from './levels.ts'
import { levelled, type Prepared } from './prepare.ts'
import type { Settlements } from './settlement.ts'

export function becauseSupport(prepared: Prepared, settlements: Settlements, finding: SupportFinding): Because {
  const { points, rounds, baseline: baselineId } = prepared.building.survey
  const baseline = levelled(
    prepared,
    rounds.find((r) => r.id === baselineId)!,
  )
  const studs = points.filter((p) => p.kind === 'stud' && p.support === finding.support).map((p) => p.id)
  const limit = prepared.z * finding.sd_mm
  const size = Math.abs(finding.settlement_mm)
  const moved = `Support ${finding.support} has ${finding.settlement_mm < 0 ? 'risen' : 'settled'} ${fixed(size, 1)} mm since ${baseline.date}`
  return {
    title: `Settlement of support ${finding.support}`,
    sentences: [
      finding.significant
        ? `${moved}, more than the ${fixed(limit, 1)} mm that this survey can tell from none.`
        : `${moved}, which this survey cannot tell from none: its limit is ${fixed(limit, 1)} mm.`,
      ...(finding.estimated ? [`It is an estimate: ${finding.estimated_from}.`] : []),
    ],
    formula: [
      ...studs.flatMap((stud) => studLine(stud, baseline, settlements.round)),
      `settlement = ${fixed(finding.settlement_mm, 2)} mm, sd ${fixed(finding.sd_mm, 2)} mm, limit ${prepared.z.toFixed(2)} \u00d7 ${fixed(finding.sd_mm, 2)} = ${fixed(limit, 2)} mm`,
    ],
    value: finding.settlement_mm,
    sd: finding.sd_mm,
    unit: 'mm',
    shares: [
      {
        support: finding.support,
        settlement_mm: finding.settlement_mm,
        beyond_mm: finding.settlement_mm,
        share: finding.settlement_mm,
      },
    ],
  }
}

function studLine(stud: string, baseline: LevelledRound, round: LevelledRound): string[] {
  const then = reading(stud, baseline)
  const now = reading(stud, round)
  if (!then && !now) return []
  if (!then) return [`${stud}: ${round.id} ${now!.text}; not in ${baseline.id}, its series is joined later`]
  if (!now) return [`${stud}: ${baseline.id} ${then.text}; not read in ${round.id}`]
  return [
    `${stud}: ${baseline.id} ${then.text} \u2212 ${round.id} ${now.text} = ${fixed((then.level - now.level) * 1000, 2)} mm`,
  ]
}

function reading(stud: string, round: LevelledRound): { level: number; text: string } | undefined {
  const row = round.row.get(stud)
  if (row === undefined) return undefined
  const sd = sdOf(round.factor.subarray(row * round.q, (row + 1) * round.q)) * 1000
  return { level: round.level[row]!, text: `${fixed(round.level[row]!, 5)} m (sd ${fixed(sd, 2)} mm)` }
}
