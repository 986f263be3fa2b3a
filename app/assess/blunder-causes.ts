/**
 * What a gross error in a staff reading looks like: the slips of field work that would make just this reading off by just
 * this much. A hint where to look, never a correction.
 */

/** A staff is divided in these; a figure misread or misheard is off by one or a few of them. */
const STEPS = [
  { step_m: 1, name: 'a metre' },
  { step_m: 0.1, name: '100 mm' },
  { step_m: 0.01, name: '10 mm' },
]

/** Decimals that readings are booked to. */
const DECIMALS = [3, 4, 5]

/**
 * Causes, the likeliest first; none where the size is like none of them.
 *
 * @param reading   as booked, m
 * @param error     reading less what the rest of the book says, m
 * @param tolerance how well the rest of the book knows that, m (a few standard deviations)
 */
export function blunderCauses(reading: number, error: number, tolerance: number): string[] {
  return [...swappedDigits(reading, error, tolerance), ...misreadSteps(error, tolerance)]
}

function misreadSteps(error: number, tolerance: number): string[] {
  return STEPS.flatMap(({ step_m, name }) => {
    const count = Math.round(Math.abs(error) / step_m)
    if (count < 1 || count > 9 || step_m < 4 * tolerance) return []
    if (Math.abs(Math.abs(error) - count * step_m) > tolerance) return []
    const size = count === 1 ? name : `${count} times ${name}`
    return [`the staff read ${size} too ${error > 0 ? 'high' : 'low'}`]
  })
}

/** Two figures next to each other written down in the wrong order. */
function swappedDigits(reading: number, error: number, tolerance: number): string[] {
  const meant = reading - error
  for (const decimals of DECIMALS) {
    const text = reading.toFixed(decimals)
    if (Math.abs(Number(text) - reading) > 1e-9) continue
    for (let i = 0; i + 1 < text.length; i++) {
      const j = text[i + 1] === '.' ? i + 2 : i + 1
      const [a, b] = [text[i]!, text[j]]
      if (a === '.' || b === undefined || a === b) continue
      const swapped = Number(text.slice(0, i) + b + text.slice(i + 1, j) + a + text.slice(j + 1))
      const change = Math.abs(swapped - reading)
      // What is lost in the scatter anyway explains nothing.
      if (change > 2 * tolerance && Math.abs(swapped - meant) <= tolerance)
        return [`figures swapped: ${swapped.toFixed(decimals)} written as ${text}`]
    }
  }
  return []
}

/** A change point's two readings booked in each other's column, seen from the misclosure that this leaves, m. */
export function looksExchanged(back: number, fore: number, misclosure: number, tolerance: number): boolean {
  return Math.abs(back - fore) > 4 * tolerance && Math.abs(misclosure - 2 * (back - fore)) <= tolerance
}
