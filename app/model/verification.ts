/** One built-in check: a value found by the program's own code beside one that stands outside of it. */
export interface VerifyRow {
  /** Where the expected value stands, and how far it was seen there. */
  source: string
  check: string
  expected: number
  found: number
  unit: string
  /** Absolute, in the unit: the rounding of the published figure, or that of the arithmetic. */
  tolerance: number
  agrees: boolean
}
