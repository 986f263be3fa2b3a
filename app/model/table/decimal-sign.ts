/** Which sign stands before decimals in a table, from the cells in which it can stand for nothing else. */

/** The sign, or undefined where no cell tells, or where cells tell different things. */
export function decimalSign(cells: Iterable<string>): '.' | ',' | undefined {
  let points = 0
  let commas = 0
  for (const cell of cells) {
    const digits = cell.trim().replace(/^[-+\u2212]\s*/, '')
    const [, sign] = /^(?:\d{1,3}[.,])*\d*([.,])\d*$/.exec(digits) ?? []
    if (!sign || /^[1-9]\d{0,2}[.,]\d{3}$/.test(digits)) continue
    if (digits.split(sign).length > 2) continue
    if (sign === '.') points += 1
    else commas += 1
  }
  if (points > 0 && commas > 0) return undefined
  return points > 0 ? '.' : commas > 0 ? ',' : undefined
}
