/**
 * Values that are linear in levels of several rounds, as their weights: added up exactly, with a covariance that knows
 * what they share.
 */
import type { LevelledRound } from './levels.ts'

/** Weight of each level, by round and row, and of each allowance in force. */
export interface Functional {
  levels: Map<LevelledRound, Map<number, number>>
  allowances: Map<string, { weight: number; sd: number }>
}

/** The level of one row of a round, as it is. */
export function levelOf(round: LevelledRound, row: number): Functional {
  return { levels: new Map([[round, new Map([[row, 1]])]]), allowances: new Map() }
}

/** What an estimate is allowed, with that sd and independent of everything else; worth nothing itself. */
export function allowance(key: string, sd: number): Functional {
  return { levels: new Map(), allowances: new Map([[key, { weight: 1, sd }]]) }
}

/** A weighted sum. */
export function combine(terms: readonly (readonly [number, Functional])[]): Functional {
  const out: Functional = { levels: new Map(), allowances: new Map() }
  for (const [weight, term] of terms) {
    for (const [round, rows] of term.levels) {
      let into = out.levels.get(round)
      if (!into) out.levels.set(round, (into = new Map()))
      for (const [row, w] of rows) into.set(row, (into.get(row) ?? 0) + weight * w)
    }
    for (const [key, a] of term.allowances)
      out.allowances.set(key, { sd: a.sd, weight: (out.allowances.get(key)?.weight ?? 0) + weight * a.weight })
  }
  return out
}

export function valueOf(f: Functional): number {
  let sum = 0
  for (const [round, rows] of f.levels) for (const [row, w] of rows) sum += w * round.level[row]!
  return sum
}

/** In m2, by the covariance of the rounds involved. */
export function varianceOf(f: Functional): number {
  return factorOf([f]).factor.reduce((sum, x) => sum + x * x, 0)
}

/** Weighted by the inverse of the variances. */
export function weightedMean(of: readonly Functional[]): Functional {
  if (of.length === 1) return of[0]!
  const variances = of.map(varianceOf)
  // Given levels may be stated as free of error; such studs share alike.
  const weights = variances.some((v) => v === 0) ? variances.map((v) => (v === 0 ? 1 : 0)) : variances.map((v) => 1 / v)
  const sum = weights.reduce((a, b) => a + b, 0)
  return combine(of.map((f, i) => [weights[i]! / sum, f]))
}

/** The functionals as one factor over all rounds and allowances involved. */
export function factorOf(functionals: readonly Functional[]): { factor: Float64Array; q: number } {
  const column = new Map<LevelledRound | string, number>()
  let q = 0
  for (const f of functionals) {
    for (const round of f.levels.keys())
      if (!column.has(round)) {
        column.set(round, q)
        q += round.q
      }
    for (const key of f.allowances.keys()) if (!column.has(key)) column.set(key, q++)
  }
  const factor = new Float64Array(functionals.length * q)
  functionals.forEach((f, i) => {
    for (const [round, rows] of f.levels) {
      const begin = i * q + column.get(round)!
      for (const [row, w] of rows)
        for (let k = 0; k < round.q; k++) factor[begin + k]! += w * round.factor[row * round.q + k]!
    }
    for (const [key, a] of f.allowances) factor[i * q + column.get(key)!] = a.weight * a.sd
  })
  return { factor, q }
}
