/**
 * A symmetric matrix kept by its profile: of row i the entries from column first[i] to the diagonal, row after
 * row in one typed array. Its factors L D L' fit into the same place (George and Liu 1981, ch. 4, from
 * memory). Rows that are next to each other in memory are all that the inner loops touch.
 */

export interface Profile {
  /** Order of the matrix. */
  rows: number
  /** shape (rows), first column kept of each row */
  first: Int32Array
  /** shape (rows), place of column 0 of row i in `lower` (may be negative): entry (i, j) is lower[at[i] + j] */
  at: Int32Array
  /** Below the diagonal: the matrix, then L (its unit diagonal is not kept). */
  lower: Float64Array
  /** shape (rows): the matrix's diagonal, then D */
  diagonal: Float64Array
}

export function emptyProfile(first: Int32Array): Profile {
  const rows = first.length
  const at = new Int32Array(rows)
  let size = 0
  for (let i = 0; i < rows; i++) {
    at[i] = size - first[i]
    size += i - first[i]
  }
  return { rows, first, at, lower: new Float64Array(size), diagonal: new Float64Array(rows) }
}

/**
 * Overwrites the matrix by its factors L and D.
 *
 * @param judge asked at each row, with L known down to this row: the pivot to go on with
 */
export function factoriseProfile(profile: Profile, judge: (row: number, pivot: number) => number): void {
  const { rows, first, at, lower, diagonal } = profile
  for (let i = 0; i < rows; i++) {
    const own = at[i]
    const start = first[i]
    // Row i becomes L_ij d_j from left to right; the division by d_j waits until the row is done.
    for (let j = start + 1; j < i; j++) {
      const begin = first[j] > start ? first[j] : start
      lower[own + j] -= dot(lower, own + begin, at[j] + begin, j - begin)
    }
    let pivot = diagonal[i]
    for (let j = start; j < i; j++) {
      const scaled = lower[own + j]
      const factor = scaled / diagonal[j]
      lower[own + j] = factor
      pivot -= scaled * factor
    }
    diagonal[i] = judge(i, pivot)
  }
}

/** Four sums side by side, so that no addition waits for the one before it. */
function dot(values: Float64Array, a: number, b: number, length: number): number {
  let s0 = 0
  let s1 = 0
  let s2 = 0
  let s3 = 0
  let k = 0
  for (; k + 3 < length; k += 4) {
    s0 += values[a + k] * values[b + k]
    s1 += values[a + k + 1] * values[b + k + 1]
    s2 += values[a + k + 2] * values[b + k + 2]
    s3 += values[a + k + 3] * values[b + k + 3]
  }
  for (; k < length; k++) s0 += values[a + k] * values[b + k]
  return s0 + s1 + (s2 + s3)
}

/** Right-hand sides that are solved together in one pass over the factors. */
export const LANES = 4

/**
 * Solves for LANES right-hand sides at once.
 *
 * @param x shape (rows, LANES), row-major: right-hand sides, overwritten by the solutions
 */
export function solveProfile(profile: Profile, x: Float64Array): void {
  const { rows, first, at, lower, diagonal } = profile
  for (let i = 0; i < rows; i++) {
    const own = at[i]
    let x0 = x[4 * i]
    let x1 = x[4 * i + 1]
    let x2 = x[4 * i + 2]
    let x3 = x[4 * i + 3]
    for (let j = first[i]; j < i; j++) {
      const factor = lower[own + j]
      x0 -= factor * x[4 * j]
      x1 -= factor * x[4 * j + 1]
      x2 -= factor * x[4 * j + 2]
      x3 -= factor * x[4 * j + 3]
    }
    x[4 * i] = x0
    x[4 * i + 1] = x1
    x[4 * i + 2] = x2
    x[4 * i + 3] = x3
  }
  for (let i = 0; i < rows; i++) {
    const pivot = diagonal[i]
    for (let lane = 4 * i; lane < 4 * i + 4; lane++) x[lane] /= pivot
  }
  for (let i = rows - 1; i >= 0; i--) {
    const own = at[i]
    const x0 = x[4 * i]
    const x1 = x[4 * i + 1]
    const x2 = x[4 * i + 2]
    const x3 = x[4 * i + 3]
    for (let j = first[i]; j < i; j++) {
      const factor = lower[own + j]
      x[4 * j] -= factor * x0
      x[4 * j + 1] -= factor * x1
      x[4 * j + 2] -= factor * x2
      x[4 * j + 3] -= factor * x3
    }
  }
}

/**
 * The movement in which row `row` moves by 1, the rows before it follow without force, and those after it
 * rest: L' v = e. Its energy v'Av is the pivot of the row. L is needed down to this row only.
 */
export function followingMotion(profile: Profile, row: number): Float64Array {
  const { first, at, lower } = profile
  const v = new Float64Array(profile.rows)
  v[row] = 1
  for (let i = row; i > 0; i--) {
    const own = at[i]
    const moved = v[i]
    if (moved !== 0) for (let j = first[i]; j < i; j++) v[j] -= lower[own + j] * moved
  }
  return v
}
