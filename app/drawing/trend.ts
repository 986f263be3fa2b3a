/**
 * One quantity against time: the values with their intervals, triggers as lines, a fit with its band. The first
 * series is the one spoken of; others stand beside it in grey.
 */
import { fitText, textWidth } from './text-width.ts'
import { ring } from './bubble.ts'
import { multiples, niceStep } from './nice.ts'
import { placeLabels } from './place-labels.ts'
import type { Point, Primitive, Role, Scene, Target } from './scene.ts'
import { baselineFor, circle, line, mark, polygon, polyline, text, type Extra } from './shapes.ts'
import { EDGE, MARK, SMALL, TEXT } from './sizes.ts'
import { dateTicks, dayOf } from './trend/dates.ts'
import { axisWords, KINDS, type Quantity } from './trend/quantity.ts'

export interface TrendPoint {
  /** yyyy-mm-dd */
  date: string
  value: number
  sd: number
  /** Rests on a support that was not measured on that day: drawn open. */
  estimated?: boolean
}

export interface BandPoint {
  date: string
  value: number
  low: number
  high: number
}

export interface TrendSeries {
  name: string
  points: readonly TrendPoint[]
  /** A fit through the points, going on beyond them; drawn of the first series only. */
  fit?: readonly BandPoint[]
  target?: Target
}

export interface TrendInput {
  quantity: Quantity
  series: readonly TrendSeries[]
  /** Standard deviations that an interval reaches to either side. */
  z: number
  triggers?: { amber?: number; red?: number }
  /** Day of the visit that is looked at. */
  date?: string
  /** Drawing mm. */
  width: number
  height: number
}

interface Axes {
  x: (day: number) => number
  y: (value: number) => number
  left: number
  right: number
  top: number
  bottom: number
}

/** A trigger further off than so many times the largest value would press the values flat. */
const FAR = 3

export function trend(input: TrendInput): Scene {
  const { quantity, series, width, height, z } = input
  const points = series.flatMap((s) => s.points)
  const title = `${sentenceCase(quantity)} against time: ${series.map((s) => s.name).join(', ')}`
  if (points.length === 0) {
    const words = 'No rounds to show yet'
    return { width, height, title, primitives: [text('text-quiet', [width / 2, height / 2], words, TEXT)] }
  }
  const kind = KINDS[quantity]
  const [first] = series
  const fit = first?.fit ?? []
  const days = [...points, ...fit].map((p) => dayOf(p.date))
  const [from, to] = [Math.min(...days), Math.max(...days)]
  const said = first?.points ?? []
  const reach = [
    0,
    ...points.map((p) => p.value),
    ...said.flatMap((p) => intervalOf(p, z, kind.isMagnitude)),
    ...fit.flatMap((p) => [p.low, p.high]),
  ]
  const largest = Math.max(...reach.map(Math.abs))
  const triggers = (['amber', 'red'] as const).flatMap((status) => {
    const value = input.triggers?.[status]
    return value === undefined ? [] : [{ status, value, isNear: value <= FAR * largest }]
  })
  const near = triggers.filter((t) => t.isNear).map((t) => t.value * 1.04)
  const scaled = [...reach, ...near].map((v) => v * kind.factor)
  const rows = Math.max(2, Math.floor((height - 22) / 9))
  const span = Math.max(...scaled) - Math.min(...scaled)
  const step = niceStep(span > 0 ? span / rows : 1)
  const low = Math.floor(Math.min(...scaled) / step + 1e-9) * step
  const high = Math.max(low + step, Math.ceil(Math.max(...scaled) / step - 1e-9) * step)
  const ticks = multiples(step, low, high).map((v) => ({ value: v / kind.factor, words: axisWords(v, step) }))

  const names = series.map((s) => ({ s, words: fitText(s.name, width * 0.22, SMALL) }))
  const left = EDGE + Math.max(...ticks.map((t) => textWidth(t.words, SMALL))) + 2
  const right = width - EDGE - (series.length > 1 ? Math.max(...names.map((n) => textWidth(n.words, SMALL))) + 3 : 4)
  const top = EDGE + 7
  const bottom = height - EDGE - 9
  const pad = Math.min(4, (right - left) * 0.04)
  function share(day: number) {
    return to > from ? (day - from) / (to - from) : 0.5
  }
  function part(value: number) {
    return (value * kind.factor - low) / (high - low)
  }
  const axes: Axes = {
    x: (day) => left + pad + share(day) * (right - left - 2 * pad),
    y: (value) => (kind.isDown ? top + part(value) * (bottom - top) : bottom - part(value) * (bottom - top)),
    left,
    right,
    top,
    bottom,
  }
  const far = triggers.filter((t) => !t.isNear).map((t) => `${t.status} ${kind.words(t.value)}`)
  const fullHeading = `${quantity === 'end moment' ? 'induced end moment' : quantity}${series.length === 1 ? ` of ${first!.name}` : ''}, ${kind.unit}`
  const heading = fitText(fullHeading, width * 0.6, SMALL)
  const room = width - 2 * EDGE - textWidth(heading, SMALL) - 3
  const nearTriggers = triggers
    .filter((t) => t.isNear)
    .map((t) => ({ status: t.status, words: `${t.status} ${kind.words(t.value)}`, at: axes.y(t.value) }))
  const spoken = said.map((p): Point => [axes.x(dayOf(p.date)), axes.y(p.value)])
  const primitives: Primitive[] = [
    text('text-quiet', [EDGE, baselineFor(EDGE + 2, SMALL)], heading, SMALL, 'start'),
    ...(far.length > 0
      ? [
          text(
            'text-quiet',
            [width - EDGE, baselineFor(EDGE + 2, SMALL)],
            beyondWords(far.join(', '), room),
            SMALL,
            'end',
          ),
        ]
      : []),
    ...drawAxes(axes, ticks, from, to),
    ...(fit.length > 1 ? drawFit(fit, axes) : []),
    ...(input.date === undefined ? [] : current(dayOf(input.date), axes)),
    ...triggerLines(nearTriggers, spoken, axes),
    ...[...series].reverse().flatMap((s) => drawSeries(s, s === first ? kind.role : 'series-other', input, axes)),
    ...(series.length > 1 ? endNames(names, kind.role, axes) : []),
  ]
  return { width, height, title, primitives }
}

/** In as many words as there is room for. */
function beyondWords(triggers: string, room: number): string {
  const words = `beyond this scale: ${triggers}`
  return textWidth(words, SMALL) <= room ? words : fitText(`beyond: ${triggers}`, room, SMALL)
}

function drawAxes(
  { x, y, left, right, bottom }: Axes,
  ticks: readonly { value: number; words: string }[],
  from: number,
  to: number,
): Primitive[] {
  const dates = dateTicks(from, to, Math.max(1, Math.floor((right - left) / 13)))
  return [
    ...ticks.flatMap(({ value, words }) => [
      line(value === 0 ? 'dimension' : 'axis', [left, y(value)], [right, y(value)]),
      text('text-quiet', [left - 1.4, baselineFor(y(value), SMALL)], words, SMALL, 'end'),
    ]),
    ...dates.flatMap(({ day, words, year }) => [
      line('axis', [x(day), bottom], [x(day), bottom + 1.4]),
      text('text-quiet', [x(day), bottom + 4.4], words, SMALL),
      ...(year === undefined ? [] : [text('text-quiet', [x(day), bottom + 7.9], year, SMALL)]),
    ]),
  ]
}

function drawFit(fit: readonly BandPoint[], { x, y }: Axes): Primitive[] {
  function at(p: BandPoint, value: number): Point {
    return [x(dayOf(p.date)), y(value)]
  }
  return [
    polygon('band', [...fit.map((p) => at(p, p.high)), ...[...fit].reverse().map((p) => at(p, p.low))]),
    polyline(
      'fit',
      fit.map((p) => at(p, p.value)),
    ),
  ]
}

function current(day: number, { x, top, bottom, left, right }: Axes): Primitive[] {
  const at = x(day)
  return at < left || at > right ? [] : [line('axis', [at, top], [at, bottom])]
}

/** Lines of the triggers; each has its words over or under it, where they hide neither a value nor each other. */
function triggerLines(
  triggers: readonly { status: 'amber' | 'red'; words: string; at: number }[],
  points: readonly Point[],
  { left, right, top, bottom }: Axes,
): Primitive[] {
  const wanted = triggers.map(({ words, at }) => {
    const width = MARK + 1 + textWidth(words, SMALL)
    const xs = [left + 1 + width / 2, right - 1 - width / 2]
    return {
      width,
      height: MARK,
      places: xs.flatMap((x): Point[] => [
        [x, at - 2.2],
        [x, at + 2.2],
      ]),
    }
  })
  const within = { x: left, y: top - 4, width: right - left, height: bottom - top + 4 }
  const segments = triggers.map(
    ({ at }) =>
      [
        [left, at],
        [right, at],
      ] as const,
  )
  const soft = points.slice(1).map((p, i) => [points[i]!, p] as const)
  const boxes = placeLabels(wanted, { within, segments, soft })
  return triggers.flatMap(({ status, words, at }, i): Primitive[] => {
    const box = boxes[i]
    const rule = line(`trigger-${status}`, [left, at], [right, at], { label: words })
    if (!box) return [rule]
    const y = box.y + box.height / 2
    return [
      rule,
      mark(status, [box.x + MARK / 2, y], MARK, { label: words }),
      text('text', [box.x + MARK + 1, baselineFor(y, SMALL)], words, SMALL, 'start', { label: words }),
    ]
  })
}

function drawSeries(
  { name, points, target }: TrendSeries,
  role: Role,
  { quantity, z }: TrendInput,
  { x, y }: Axes,
): Primitive[] {
  const { words, isMagnitude } = KINDS[quantity]
  function at(p: TrendPoint): Point {
    return [x(dayOf(p.date)), y(p.value)]
  }
  const bars = points.flatMap((p): Primitive[] => {
    const [px, half] = [x(dayOf(p.date)), role === 'series-other' ? 0 : z * p.sd]
    if (half === 0) return []
    const [low, high] = intervalOf(p, z, isMagnitude).map(y) as [number, number]
    return [
      line(role, [px, low], [px, high]),
      line(role, [px - 0.8, low], [px + 0.8, low]),
      line(role, [px - 0.8, high], [px + 0.8, high]),
    ]
  })
  const dots = points.map((p) => {
    const extra: Extra = { target, label: `${name}, ${p.date}: ${words(p.value)} \u00b1 ${words(z * p.sd)}` }
    const radius = role === 'series-other' ? 0.6 : 0.95
    return p.estimated ? ring(role, at(p), radius, extra) : circle(role, at(p), radius, extra)
  })
  return [polyline(role, points.map(at), { target }), ...bars, ...dots]
}

/** What is never negative has no interval below zero. */
function intervalOf({ value, sd }: TrendPoint, z: number, isMagnitude: boolean): [number, number] {
  return [isMagnitude ? Math.max(0, value - z * sd) : value - z * sd, value + z * sd]
}

/** Names at the ends of the lines; those that would lie on each other are moved apart. */
function endNames(
  names: readonly { s: TrendSeries; words: string }[],
  role: Role,
  { y, right, top, bottom }: Axes,
): Primitive[] {
  const wanted = names.map(({ s, words }) => {
    const width = textWidth(words, SMALL)
    const end = s.points.at(-1)
    const middle = end ? y(end.value) : bottom
    const places = [0, 3, -3, 6, -6, 9, -9, 12, -12].map((d): Point => [right + 2 + width / 2, middle + d])
    return { width, height: SMALL * 0.8, places }
  })
  const boxes = placeLabels(wanted, { within: { x: right, y: top - 3, width: 1000, height: bottom - top + 6 } }, 0.3)
  return names.flatMap(({ s, words }, i) => {
    const box = boxes[i]
    if (!box) return []
    const at: Point = [box.x, baselineFor(box.y + box.height / 2, SMALL)]
    return [text(i === 0 ? role : 'series-other', at, words, SMALL, 'start', { target: s.target })]
  })
}

function sentenceCase(words: string): string {
  return words[0]!.toUpperCase() + words.slice(1)
}
