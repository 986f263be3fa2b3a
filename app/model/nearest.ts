/** The right word that a misspelt one most likely stands for. */

/** Longer words are not held against each other letter by letter: they are no misspelling of ours. */
const LONGEST = 60

/** The candidate that is fewest slips away from the word; undefined where none is near. */
export function nearest(word: string, candidates: Iterable<string>): string | undefined {
  if (word.length > LONGEST) return undefined
  const plain = plainly(word)
  let best: string | undefined
  let fewest = Infinity
  for (const candidate of candidates) {
    if (candidate.length > LONGEST) continue
    const other = plainly(candidate)
    const allowed = Math.max(1, Math.floor(Math.max(plain.length, other.length) / 3))
    if (Math.abs(plain.length - other.length) > allowed) continue
    const count = slips(plain, other)
    if (count <= allowed && count < fewest && count < other.length) {
      best = candidate
      fewest = count
    }
  }
  return best
}

/** Case, hyphens, underscores and blanks are what people mix up most. */
function plainly(word: string): string {
  return word.toLowerCase().replace(/[\s_-]+/g, '')
}

/** Letters put in, left out, changed, or two neighbours exchanged (optimal string alignment). */
export function slips(a: string, b: string): number {
  let before: number[] = []
  let last = Array.from({ length: b.length + 1 }, (_, j) => j)
  for (let i = 1; i <= a.length; i++) {
    const row = [i]
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1]
      let count = Math.min(last[j]! + 1, row[j - 1]! + 1, last[j - 1]! + (same ? 0 : 1))
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) count = Math.min(count, before[j - 2]! + 1)
      row.push(count)
    }
    before = last
    last = row
  }
  return last[b.length]!
}
