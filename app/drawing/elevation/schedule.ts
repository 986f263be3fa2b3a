/**
 * The rows below a frame: settlement of each support, dimensions, grid bubbles, angular distortion of each bay.
 * How a row is set is decided once for the whole row, by its narrowest bay, so that it reads as one row.
 */
import type { SpanFinding, SupportFinding } from '../../model/findings.ts'
import { fixed, millimetres, ratio } from '../../model/numbers.ts'
import { bubbleFor, BUBBLE, drawBubble, statusMark } from '../bubble.ts'
import type { Point, Primitive, Target } from '../scene.ts'
import { arrow, baselineFor, line, polygon, sameTarget, text, type Extra } from '../shapes.ts'
import { EDGE, MARK, SMALL, TEXT } from '../sizes.ts'
import { textWidth } from '../text-width.ts'
import { leastBay, type DrawnFrame } from './frame.ts'

export interface Row {
  drawn: Primitive[]
  height: number
  /** Where the row's title has its middle, from the top of the row. */
  middle: number
  title: string
}

const ARROW = 7
const LINE = 3.9

/** Turned figures nearer than this lie on each other. */
const TURNED_PITCH = 3

/** Of figures too near to each other the greatest are kept. */
function keepApart(places: readonly { x: number; weight: number }[]): (x: number) => boolean {
  const kept: number[] = []
  for (const { x } of [...places].sort((a, b) => b.weight - a.weight))
    if (kept.every((k) => Math.abs(k - x) >= TURNED_PITCH)) kept.push(x)
  return (x) => kept.includes(x)
}

/** Arrows in the ratio of the settlements, the value ± its interval below each. */
export function settlementRow(
  frame: DrawnFrame,
  found: ReadonlyMap<string, SupportFinding>,
  z: number,
  top: number,
): Row | undefined {
  const shown = frame.bases.flatMap((base) => {
    const finding = found.get(base.support)
    return finding
      ? [{ base, finding, value: valueOf(finding), interval: `\u00b1 ${millimetres(z * finding.sd_mm)}` }]
      : []
  })
  if (shown.length === 0) return undefined
  const room = leastBay(frame) - 1
  const wide = Math.max(...shown.map((s) => textWidth(s.value, TEXT, 'medium') + 0.8 + textWidth(s.interval, SMALL)))
  const tall = Math.max(...shown.map((s) => Math.max(textWidth(s.value, TEXT, 'medium'), textWidth(s.interval, SMALL))))
  const setting = wide <= room ? 'one line' : tall <= room ? 'two lines' : 'turned'
  const most = Math.max(...shown.map((s) => Math.abs(s.finding.settlement_mm)))
  const isKept = keepApart(shown.map((s) => ({ x: s.base.at[0], weight: Math.abs(s.finding.settlement_mm) })))
  const drawn = shown.flatMap(({ base, finding, value, interval }): Primitive[] => {
    const x = base.at[0]
    const target: Target = { kind: 'support', id: base.support }
    const extra: Extra = { target, label: settlementLabel(finding, z) }
    const shape: Primitive[] = []
    const length = most > 0 ? (ARROW * Math.abs(finding.settlement_mm)) / most : 0
    if (length > 0.25)
      shape.push(
        finding.settlement_mm >= 0
          ? arrow('settlement', [x, top], [x, top + length], 2, extra)
          : arrow('settlement', [x, top + length], [x, top], 2, extra),
      )
    else shape.push(line('settlement', [x - 1, top], [x + 1, top], extra))
    const y = top + ARROW + LINE
    if (setting === 'one line') {
      const both = textWidth(value, TEXT, 'medium') + 0.8 + textWidth(interval, SMALL)
      shape.push(text('text-strong', [x - both / 2, y], value, TEXT, 'start', extra))
      shape.push(text('text-quiet', [x + both / 2, y], interval, SMALL, 'end', extra))
    } else if (setting === 'two lines') {
      shape.push(text('text-strong', [x, y], value, TEXT, 'middle', extra))
      shape.push(text('text-quiet', [x, y + LINE - 0.3], interval, SMALL, 'middle', extra))
    } else if (isKept(x)) {
      const at: Point = [baselineFor(x, TEXT), top + ARROW + 1.2]
      shape.push(text('text-strong', at, value, TEXT, 'end', { ...extra, turn: -90 }))
    }
    return shape
  })
  const below =
    setting === 'one line'
      ? LINE + 1.4
      : setting === 'two lines'
        ? 2 * LINE + 1
        : Math.max(...shown.map((s) => textWidth(s.value, TEXT, 'medium'))) + 2
  return { drawn, height: ARROW + below, middle: ARROW + LINE - TEXT * 0.36, title: 'settlement, mm' }
}

/** An estimate is never printed as if it were measured. */
function valueOf({ settlement_mm, estimated }: SupportFinding): string {
  return `${estimated ? '\u2248 ' : ''}${millimetres(settlement_mm)}`
}

export function settlementLabel(finding: SupportFinding, z: number): string {
  const moved = finding.settlement_mm < 0 ? 'risen' : 'settled'
  const size = `${millimetres(Math.abs(finding.settlement_mm))} \u00b1 ${millimetres(z * finding.sd_mm)} mm`
  const kind = finding.estimated
    ? `, estimated${finding.estimated_from ? ` (${finding.estimated_from})` : ''}`
    : finding.significant
      ? ''
      : ', within the measuring noise'
  return `Support ${finding.support} has ${moved} ${size}${kind}`
}

/** A dimension line with ticks from base to base, the lengths above it. */
export function dimensionRow(frame: DrawnFrame, top: number): Row | undefined {
  const { bases } = frame
  if (bases.length < 2) return undefined
  const y = top + 5
  const bays = bases.slice(1).map((right, i) => ({ left: bases[i]!, right }))
  const drawn: Primitive[] = [
    line('dimension', [bases[0]!.at[0] - 1.6, y], [bases.at(-1)!.at[0] + 1.6, y]),
    ...bases.flatMap(({ at: [x] }) => [
      line('dimension', [x - 0.9, y + 0.9], [x + 0.9, y - 0.9]),
      line('dimension', [x, y - 2.2], [x, y + 2.4]),
    ]),
  ]
  const lengths = bays.map(({ left, right }) => fixed(right.node.x_m - left.node.x_m, 2))
  if (bays.some(({ left, right }, i) => textWidth(lengths[i]!, SMALL) > right.at[0] - left.at[0] - 1)) {
    // Too many to print each: how many alike, or the whole.
    const whole = fixed(bases.at(-1)!.node.x_m - bases[0]!.node.x_m, 2)
    const words = lengths.every((l) => l === lengths[0]) ? `${bays.length} \u00d7 ${lengths[0]}` : whole
    drawn.push(text('dimension', [(bases[0]!.at[0] + bases.at(-1)!.at[0]) / 2, y - 2.9], words, SMALL))
    return { drawn, height: 7, middle: 3.2, title: 'bays, m' }
  }
  for (const { left, right } of bays) {
    const words = fixed(right.node.x_m - left.node.x_m, 2)
    if (textWidth(words, SMALL) > right.at[0] - left.at[0] - 1) continue
    drawn.push(text('dimension', [(left.at[0] + right.at[0]) / 2, y - 0.9], words, SMALL))
  }
  return { drawn, height: 7, middle: 4.6 - 1.4, title: 'bays, m' }
}

/** Name of each support in a bubble; a long name makes it longer, and is cut where there is no room. */
export function bubbleRow(
  frame: DrawnFrame,
  found: ReadonlyMap<string, SupportFinding>,
  z: number,
  top: number,
  width: number,
  selected?: Target,
): Row | undefined {
  if (frame.bases.length === 0) return undefined
  const room = leastBay(frame) - 0.8
  const y = top + BUBBLE
  const every = room < 4.4 ? Math.ceil(4.4 / Math.max(room, 0.1)) : 1
  const drawn = frame.bases.flatMap((base, i) => {
    if (i % every !== 0) return []
    const finding = found.get(base.support)
    const label = finding ? settlementLabel(finding, z) : `Support ${base.support}`
    const target: Target = { kind: 'support', id: base.support }
    const toEdge = 2 * (Math.min(base.at[0], width - base.at[0]) - EDGE)
    const made = bubbleFor(base.support, Math.max(4.4, Math.min(room, toEdge)))
    return drawBubble(made, [base.at[0], y], { target, label }, sameTarget(selected, target))
  })
  return { drawn, height: 2 * BUBBLE + 1, middle: BUBBLE, title: '' }
}

/** Angular distortion of each bay as 1/n with its status; a ring round the mark says borderline. */
export function distortionRow(
  frame: DrawnFrame,
  spans: readonly SpanFinding[],
  z: number,
  top: number,
  selected?: Target,
): Row | undefined {
  const at = new Map(frame.bases.map((b) => [b.support, b.at[0]]))
  const shown = spans.flatMap((span) => {
    const [left, right] = [at.get(span.from), at.get(span.to)]
    if (left === undefined || right === undefined) return []
    return [{ span, left, right, words: ratio(span.angular_distortion_rad).replace('\u2212', '') }]
  })
  if (shown.length === 0) return undefined
  const room = Math.min(...shown.map((s) => s.right - s.left)) - 1.5
  const widest = Math.max(...shown.map((s) => textWidth(s.words, TEXT)))
  const setting = widest + MARK + 1.6 <= room ? 'beside' : widest <= room ? 'below' : 'turned'
  const isKept = keepApart(
    shown.map((s) => ({ x: (s.left + s.right) / 2, weight: Math.abs(s.span.angular_distortion_rad) })),
  )
  const drawn = shown.flatMap(({ span, left, right, words }): Primitive[] => {
    const x = (left + right) / 2
    const target: Target = { kind: 'span', line: frame.line.id, from: span.from, to: span.to }
    const extra: Extra = { target, label: distortionLabel(span, z) }
    const shapes: Primitive[] = []
    if (sameTarget(selected, target))
      shapes.push(
        polygon('selection', [
          [left + 3, top + 0.8],
          [right - 3, top + 0.8],
          [right - 3, top + 3.6],
          [left + 3, top + 3.6],
        ]),
      )
    const width = textWidth(words, TEXT)
    const y = top + 2.2
    if (setting === 'beside') {
      const start = x - (width + MARK + 1.2) / 2
      shapes.push(...statusMark(span.status, span.certainty, [start + MARK / 2, y], extra))
      shapes.push(text('text', [start + MARK + 1.2, baselineFor(y, TEXT)], words, TEXT, 'start', extra))
    } else {
      shapes.push(...statusMark(span.status, span.certainty, [x, y], extra, Math.min(MARK, right - left - 0.5)))
      if (setting === 'below' || isKept(x))
        shapes.push(
          setting === 'below'
            ? text('text', [x, top + 7.2], words, TEXT, 'middle', extra)
            : text('text', [baselineFor(x, TEXT), top + 4.4], words, TEXT, 'end', { ...extra, turn: -90 }),
        )
    }
    return shapes
  })
  const height = setting === 'beside' ? 4.6 : setting === 'below' ? 8.4 : 5.4 + widest
  return { drawn, height, middle: 2.2, title: 'angular distortion' }
}

export function distortionLabel(span: SpanFinding, z: number): string {
  function per(rad: number) {
    return fixed(rad * 1000, 2)
  }
  return `Span ${span.from} to ${span.to}: angular distortion ${ratio(span.angular_distortion_rad)} (${per(span.angular_distortion_rad)} \u00b1 ${per(z * span.sd_rad)} in 1000); ${span.status}, ${span.certainty}`
}
