/**
 * Values held against what they may be: a bending moment against the capacity of its sense, a value against
 * its triggers, and whether the survey's uncertainty leaves the answer clear. Any consistent unit.
 */

export interface TriggerPair {
  amber: number
  red: number
}

/** Capacities by sense, both as positive sizes; undefined where not stated. */
export interface BendingCapacity {
  sagging?: number
  hogging?: number
}

/** What a fraction is where the capacity of its sense is stated as zero: too much, and finite. */
export const BEYOND = 999

/** Green below amber, amber from amber on, red from red on. */
export function statusOf(value: number, triggers: TriggerPair): 'green' | 'amber' | 'red' {
  if (value >= triggers.red) return 'red'
  return value >= triggers.amber ? 'amber' : 'green'
}

/**
 * Whether `value - z sd` to `value + z sd` lies on one side of every trigger.
 *
 * @param value at least 0
 * @param sd    at least 0
 * @param z     two-sided normal quantile at the confidence asked for
 * @example
 *     certaintyOf(0.08, 0.005, 1.96, { amber: 0.1, red: 0.25 }) // 'clear'
 *     certaintyOf(0.08, 0.02, 1.96, { amber: 0.1, red: 0.25 })  // 'borderline'
 */
export function certaintyOf(value: number, sd: number, z: number, triggers: TriggerPair): 'clear' | 'borderline' {
  const low = value - z * sd
  const high = value + z * sd
  const crossed = [triggers.amber, triggers.red].some((t) => low < t && high >= t)
  return crossed ? 'borderline' : 'clear'
}

/** The capacity that a bending moment draws on: sagging (positive) or hogging; undefined where not stated. */
export function capacityFor(bending: number, capacity: BendingCapacity): number | undefined {
  return bending < 0 ? capacity.hogging : capacity.sagging
}

/** |effect| / capacity; a capacity of zero gives BEYOND for any effect and 0 for none. */
export function fractionOf(effect: number, capacity: number): number {
  if (capacity > 0) return Math.min(Math.abs(effect) / capacity, BEYOND)
  return Math.abs(effect) > 1e-9 ? BEYOND : 0
}

/** Standard deviation of a fraction whose effect has the sd given. */
export function fractionSd(effect: number, sd: number, capacity: number): number {
  if (capacity > 0) return sd / capacity
  return Math.abs(effect) > 1e-9 ? (BEYOND * sd) / Math.abs(effect) : 0
}
