import { normalQuantile } from '../../solver/index.ts'

/** How many standard deviations an interval reaches to either side at a two-sided confidence. */
export function intervalFactor(confidence: number): number {
  return normalQuantile(0.5 + confidence / 2)
}
