/** Where the visits stand on the strip: to a time scale, no two marks on each other, dates where there is room. */
import type { Status } from '../../app/model/findings.ts'

/** A mark on the strip of visits. */
export interface Visit {
  id: string
  date: string
  isDraft: boolean
  isBaseline: boolean
  status: Status
}

/** Marks closer than this could not be hit; dates need more, px. */
const LEAST = 18
const DATE = 74

export interface LaidVisit {
  visit: Visit
  x: number
  isDated: boolean
}

export function places(visits: readonly Visit[], width: number): LaidVisit[] {
  const times = visits.map((v) => Date.parse(v.date))
  const known = times.filter((t) => Number.isFinite(t))
  const [first, last] = [Math.min(...known), Math.max(...known)]
  const span = last - first
  const laid = visits.map((visit, i) => {
    const time = Number.isFinite(times[i]!) ? times[i]! : last
    return { visit, x: span > 0 ? ((time - first) / span) * width : 0, isDated: true }
  })
  spread(laid, width)
  let end = -Infinity
  for (const one of laid) {
    one.isDated = one.x - end >= DATE
    if (one.isDated) end = one.x
  }
  // The latest is always dated, a draft in longer words; those that it would run into make room.
  const latest = laid.at(-1)
  if (latest) {
    latest.isDated = true
    const room = latest.visit.isDraft ? 1.3 * DATE : DATE
    for (const one of laid.slice(0, -1)) if (latest.x - one.x < room) one.isDated = false
  }
  return laid
}

/** Pushes marks apart to the right, then back from the right edge; where there is no room at all they share it evenly. */
function spread(laid: { x: number }[], width: number): void {
  const gap = Math.min(LEAST, laid.length > 1 ? width / (laid.length - 1) : LEAST)
  for (let i = 1; i < laid.length; i++) laid[i]!.x = Math.max(laid[i]!.x, laid[i - 1]!.x + gap)
  for (let i = laid.length - 1, most = width; i >= 0; i--, most -= gap)
    laid[i]!.x = Math.min(laid[i]!.x, Math.max(0, most))
}
