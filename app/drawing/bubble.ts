/** Grid bubbles, and the status mark with its ring for a borderline value: the same in plan and elevation. */
import type { Certainty, Status } from '../model/findings.ts'
import type { Point, Primitive, Role } from './scene.ts'
import { baselineFor, circle, mark, text, type Extra } from './shapes.ts'
import { MARK, TEXT } from './sizes.ts'
import { fitText, textWidth } from './text-width.ts'

export const BUBBLE = 3.6
/** A name is never given more than this, mm. */
const LONGEST = 34

export interface Bubble {
  words: string
  size: number
  /** Half of its width and of its height. */
  half: number
  radius: number
}

/** A bubble for a name in a room of so many mm; a long name makes it longer, and is cut where there is no room. */
export function bubbleFor(name: string, room: number): Bubble {
  const radius = Math.min(BUBBLE, room / 2)
  const inner = Math.min(room - 1.4, LONGEST)
  const largest = Math.min(TEXT, radius * 0.95)
  // A little smaller is better than cut.
  const size = textWidth(name, largest) > inner ? largest * 0.85 : largest
  const words = fitText(name, inner, size)
  const width = textWidth(words, size)
  return { words, size, radius, half: width <= 2 * radius - 1.4 ? radius : Math.min(width / 2 + 1.2, room / 2) }
}

export function drawBubble(bubble: Bubble, [x, y]: Point, extra: Extra, isSelected = false): Primitive[] {
  const { words, size, half, radius } = bubble
  return [
    ...(isSelected ? [pill('selection', x, y, half, radius, {})] : []),
    pill('grid', x, y, half, radius, extra),
    text('text', [x, baselineFor(y, size)], words, size, 'middle', extra),
  ]
}

/** A circle, drawn out to a rounded bar where it is wider than high. */
function pill(role: Role, x: number, y: number, half: number, radius: number, extra: Extra): Primitive {
  if (half <= radius + 0.01) return circle(role, [x, y], radius, extra)
  const [l, r, k] = [x - half + radius, x + half - radius, radius * 0.5523]
  return {
    shape: 'path',
    role,
    d: [
      { to: 'move', at: [l, y - radius] },
      { to: 'line', at: [r, y - radius] },
      { to: 'curve', c1: [r + k, y - radius], c2: [r + radius, y - k], at: [r + radius, y] },
      { to: 'curve', c1: [r + radius, y + k], c2: [r + k, y + radius], at: [r, y + radius] },
      { to: 'line', at: [l, y + radius] },
      { to: 'curve', c1: [l - k, y + radius], c2: [l - radius, y + k], at: [l - radius, y] },
      { to: 'curve', c1: [l - radius, y - k], c2: [l - k, y - radius], at: [l, y - radius] },
      { to: 'close' },
    ],
    ...extra,
  }
}

/** A status mark; a ring round it says that the value is borderline. */
export function statusMark(
  status: Status,
  certainty: Certainty,
  at: Point,
  extra: Extra = {},
  size = MARK,
): Primitive[] {
  if (certainty === 'clear' || status === 'none') return [mark(status, at, size, extra)]
  return [mark(status, at, size * 0.72, extra), ring(`status-${status}`, at, size * 0.64, extra)]
}

/** A circle that has no filling, whatever its role: a path that is not closed. */
export function ring(role: Role, [x, y]: Point, r: number, extra: Extra = {}): Primitive {
  const k = r * 0.5523
  return {
    shape: 'path',
    role,
    d: [
      { to: 'move', at: [x, y - r] },
      { to: 'curve', c1: [x + k, y - r], c2: [x + r, y - k], at: [x + r, y] },
      { to: 'curve', c1: [x + r, y + k], c2: [x + k, y + r], at: [x, y + r] },
      { to: 'curve', c1: [x - k, y + r], c2: [x - r, y + k], at: [x - r, y] },
      { to: 'curve', c1: [x - r, y - k], c2: [x - k, y - r], at: [x, y - r] },
    ],
    ...extra,
  }
}
