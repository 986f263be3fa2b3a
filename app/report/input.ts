/** What a report is made from: the findings of one round and everything needed to show its working. */
import type { Prepared } from '../assess/prepare.ts'
import type { ReportOptions, VerifyRow } from '../contract/views.ts'
import type { Building, Criteria, Round } from '../model/building.ts'
import type { PointFinding, RoundFindings } from '../model/findings.ts'

export interface ReportInput {
  building: Building
  criteria: Criteria
  prepared: Prepared
  round: Round
  baseline: Round
  findings: RoundFindings
  /** Levels of the baseline round. */
  baselinePoints: readonly PointFinding[]
  options: ReportOptions
  /** Number and revision, as "TR-014/3 rev A". */
  label: string
  state: 'draft' | 'issued'
  /** Day of issue, yyyy-mm-dd. */
  date: string
  verification: readonly VerifyRow[]
  /** Two-sided normal quantile at the criteria's confidence. */
  z: number
}

/** Drawing width inside the margins, in mm. */
export function textWidthOf(paper: ReportOptions['paper']): number {
  return paper === 'A4' ? 210 - 2 * MARGIN : 215.9 - 2 * MARGIN
}

/** Left and right margin in mm. */
export const MARGIN = 20

/** Points in a millimetre. */
export const POINTS = 72 / 25.4
