/** Days as the window shows them; files keep yyyy-mm-dd. */
const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec']

/** `16 Nov 26`; what is no day is shown as it stands. */
export function shortDate(date: string): string {
  const parts = /^(\d{4})-(\d{2})-(\d{2})/.exec(date)
  const month = parts && MONTHS[Number(parts[2]) - 1]
  return parts && month ? `${Number(parts[3])} ${month} ${parts[1]!.slice(2)}` : date
}

/** A day that is reckoned, as finely as it can be known: `Dec 28` when it is more than a year after `from`. */
export function reckonedDate(date: string, from: string): string {
  const years = (Date.parse(date) - Date.parse(from)) / (365.25 * 86_400_000)
  const short = shortDate(date)
  return years > 1 ? short.replace(/^\d+ /, '') : short
}
