/** Names and days that a new round is offered with. */

/** The next name of the kind in use: R0, R1, ... */
export function nextRoundName(taken: readonly string[]): string {
  for (let k = 0; ; k++) if (!taken.includes(`R${k}`)) return `R${k}`
}

/** The calendar day at this place, yyyy-mm-dd. */
export function today(now: Date): string {
  const two = (n: number) => String(n).padStart(2, '0')
  return `${now.getFullYear()}-${two(now.getMonth() + 1)}-${two(now.getDate())}`
}
