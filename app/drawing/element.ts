/**
 * One primitive as one element with its attributes: what svg.ts writes out and what the window's Sheet draws, so
 * that both show the same. Only attributes that browsers and pdfmake were found to draw alike.
 */
import type { PathStep, Primitive } from './scene.ts'
import type { Style, Theme } from './theme.ts'

export interface DrawnElement {
  tag: 'line' | 'polyline' | 'polygon' | 'path' | 'circle' | 'text' | 'g'
  attributes: Record<string, string | number>
  text?: string
  children?: readonly Primitive[]
}

/** The typeface has no weight between regular and medium; pdfmake takes 600 for its bold, which is Medium. */
const STRONG = 600

export function elementOf(primitive: Primitive, theme: Theme): DrawnElement {
  const style = weighted(theme.styles[primitive.role], primitive.weight)
  switch (primitive.shape) {
    case 'line': {
      const { from, to } = primitive
      const ends = { x1: mm(from[0]), y1: mm(from[1]), x2: mm(to[0]), y2: mm(to[1]) }
      return { tag: 'line', attributes: { ...ends, ...inked(style, false) } }
    }
    case 'polyline': {
      const closed = primitive.closed === true
      const points = primitive.points.map(([x, y]) => `${mm(x)},${mm(y)}`).join(' ')
      return { tag: closed ? 'polygon' : 'polyline', attributes: { points, ...inked(style, closed) } }
    }
    case 'path': {
      const closed = primitive.d.some((step) => step.to === 'close')
      return { tag: 'path', attributes: { d: primitive.d.map(stepText).join(''), ...inked(style, closed) } }
    }
    case 'circle':
      return circle(primitive.centre, primitive.radius, style)
    case 'mark':
      return markElement(primitive, style)
    case 'text':
      return textElement(primitive, style, theme)
    case 'group':
      return { tag: 'g', attributes: {}, children: primitive.children }
  }
}

/** Green a disc, amber a triangle, red a square, none a ring: told apart without colour. */
function markElement({ status, centre: [x, y], size }: Primitive & { shape: 'mark' }, style: Style): DrawnElement {
  const r = size / 2
  if (status === 'green') return circle([x, y], r, style)
  if (status === 'none') return circle([x, y], r * 0.85, style)
  const h = r * 0.88
  const points =
    status === 'amber'
      ? `${mm(x)},${mm(y - r)} ${mm(x + r)},${mm(y + r * 0.8)} ${mm(x - r)},${mm(y + r * 0.8)}`
      : `${mm(x - h)},${mm(y - h)} ${mm(x + h)},${mm(y - h)} ${mm(x + h)},${mm(y + h)} ${mm(x - h)},${mm(y + h)}`
  return { tag: 'polygon', attributes: { points, ...inked(style, true) } }
}

function textElement(text: Primitive & { shape: 'text' }, style: Style, theme: Theme): DrawnElement {
  const [x, y] = [mm(text.at[0]), mm(text.at[1])]
  return {
    tag: 'text',
    attributes: {
      x,
      y,
      'font-family': theme.font,
      'font-size': mm(text.size),
      ...(style.strong ? { 'font-weight': STRONG } : {}),
      ...(text.anchor === 'start' ? {} : { 'text-anchor': text.anchor }),
      fill: style.ink ?? theme.styles.text.ink ?? 'none',
      ...(text.turn ? { transform: `rotate(${mm(text.turn)} ${x} ${y})` } : {}),
    },
    text: text.text,
  }
}

function circle([x, y]: readonly [number, number], radius: number, style: Style): DrawnElement {
  return { tag: 'circle', attributes: { cx: mm(x), cy: mm(y), r: mm(radius), ...inked(style, true) } }
}

function inked({ stroke, width, fill, dash, cap }: Style, closed: boolean): Record<string, string | number> {
  return {
    fill: (closed ? fill : undefined) ?? 'none',
    ...(stroke && width ? { stroke, 'stroke-width': width } : {}),
    ...(stroke && dash ? { 'stroke-dasharray': dash.join(' ') } : {}),
    ...(stroke && cap === 'round' ? { 'stroke-linecap': 'round' } : {}),
    ...(stroke && !closed && cap !== 'round' ? {} : stroke ? { 'stroke-linejoin': 'round' } : {}),
  }
}

function weighted(style: Style, weight = 1): Style {
  if (weight === 1 || !style.width) return style
  return { ...style, width: mm(style.width * weight), dash: style.dash?.map((d) => mm(d * Math.sqrt(weight))) }
}

function stepText(step: PathStep): string {
  if (step.to === 'close') return 'Z'
  function pair([x, y]: readonly [number, number]) {
    return `${mm(x)} ${mm(y)}`
  }
  if (step.to === 'curve') return `C${pair(step.c1)} ${pair(step.c2)} ${pair(step.at)}`
  return `${step.to === 'move' ? 'M' : 'L'}${pair(step.at)}`
}

/** To a thousandth of a millimetre; rounding happens here and nowhere before. */
function mm(value: number): number {
  return Math.round(value * 1000) / 1000 + 0
}
