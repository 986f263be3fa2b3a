/** Which levels of a frame are marked at its side, and how they read. */
import { fixed } from '../../model/numbers.ts'
import type { DrawnFrame } from './frame.ts'

export interface LevelMark {
  y: number
  words: string
}

/**
 * Levels of the nodes from the lowest to the highest, those that most nodes share first, no two nearer than
 * `gap` on the sheet; and of the undersides of the footings where they are known and alike.
 */
export function levelsOf(frame: DrawnFrame, depths: readonly number[], gap: number): LevelMark[] {
  const counts = new Map<number, number>()
  for (const { z_m } of frame.line.nodes) {
    const z = Math.round(z_m * 100) / 100
    counts.set(z, (counts.get(z) ?? 0) + 1)
  }
  const low = Math.min(...counts.keys())
  const high = Math.max(...counts.keys())
  function rank(z: number) {
    return z === low || z === high ? Infinity : counts.get(z)!
  }
  const kept: number[] = []
  for (const z of [...counts.keys()].sort((a, b) => rank(b) - rank(a) || a - b))
    if (kept.every((k) => Math.abs(k - z) * frame.scale >= gap)) kept.push(z)
  const marks = kept.sort((a, b) => a - b).map((z) => ({ y: frame.place(0, z)[1], words: levelWords(z) }))
  frame.bases.forEach(({ at, node, underside_m }, i) => {
    if (underside_m === undefined) return
    const isToScale = Math.abs(depths[i]! - (node.z_m - underside_m) * frame.scale) < 0.01
    const y = at[1] + depths[i]!
    if (isToScale && marks.every((m) => Math.abs(m.y - y) >= gap)) marks.push({ y, words: levelWords(underside_m) })
  })
  return marks
}

/** A level as the trade writes it: with its sign, two decimals, and plus-minus at zero. */
export function levelWords(z_m: number): string {
  const words = fixed(z_m, 2)
  if (/^\u2212?0\.00$/.test(words)) return '\u00b10.00'
  return z_m > 0 ? `+${words}` : words
}
