/**
 * Built-in checks: the code that assesses buildings, held to published results and to the practice of the trade.
 * They run on demand and before every report, and are printed in its appendix.
 */
import type { VerifyRow } from '../model/verification.ts'
import { frameChecks } from './verify/frames.ts'
import { groundChecks } from './verify/ground.ts'
import { memberChecks } from './verify/members.ts'
import { surveyChecks } from './verify/survey.ts'
import { wholeChecks } from './verify/whole.ts'

export function runVerification(): VerifyRow[] {
  return [...surveyChecks(), ...groundChecks(), ...memberChecks(), ...frameChecks(), ...wholeChecks()].map(
    ({ tolerance = 1e-9, ...row }) => ({ ...row, tolerance, agrees: Math.abs(row.found - row.expected) <= tolerance }),
  )
}
