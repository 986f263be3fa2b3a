/**
 * The building in plan: supports by their settlement, contours, frame lines by their worst flag, the tilt of the
 * whole. Without findings it is the plan as described: supports, studs, frame lines, dimensions.
 */
import { intervalFactor } from '../assess/confidence.ts'
import { criteriaOf, type Building } from '../model/building.ts'
import type { RoundFindings } from '../model/findings.ts'
import { bubbleFor } from './bubble.ts'
import {
  borderlineEntry,
  drawLegend,
  legendRows,
  LEGEND_ROW,
  lineEntry,
  statusEntry,
  wordsEntry,
  type Entry,
} from './legend.ts'
import { contourLabels, drawContours, planContours, type DrawnContours } from './plan/contour-lines.ts'
import { drawSupports, planSupports, supportLabels, type PlanSupport } from './plan/discs.ts'
import { planIn } from './plan/fit.ts'
import { benchmarkNote, FOOTER, scaleBar, tiltArrow } from './plan/footer.ts'
import { DIMENSION_AWAY, gridDimensions } from './plan/grid-dimensions.ts'
import { BUBBLE_AWAY, drawLines, lineBubbles, LONGEST_BUBBLE, planLines, type PlanLine } from './plan/lines.ts'
import type { Box } from './place-labels.ts'
import type { Point, Primitive, Scene, Target } from './scene.ts'
import { circle, corners, polygon, text } from './shapes.ts'
import { EDGE, TEXT } from './sizes.ts'

/** Room that the values of the last supports want before the dimension line. */
const VALUES_BESIDE = 11

export interface PlanInput {
  building: Building
  findings?: RoundFindings
  /** Drawing mm. */
  width: number
  height: number
  /** Both are shown where left out. */
  show?: Partial<{ contours: boolean; dimensions: boolean }>
  selected?: Target
}

export function plan(input: PlanInput): Scene {
  const { building, findings, width, height, selected } = input
  if (building.supports.length === 0) return empty(input)
  const show = { contours: true, dimensions: true, ...input.show }
  const z = intervalFactor(criteriaOf(building).confidence)
  const awayRight = DIMENSION_AWAY + (findings ? VALUES_BESIDE : 0)
  const fit = planIn(building, roomFor(input, awayRight))
  const lines = planLines(building, fit, findings)
  const supports = planSupports(building, fit, z, findings?.supports)
  const contour = show.contours ? planContours(supports, z) : undefined
  const legend = legendRows(entriesOf(supports, lines, contour), width - 2 * EDGE)

  const top = EDGE + legend.length * LEGEND_ROW
  const within: Box = { x: EDGE, y: top, width: width - 2 * EDGE, height: height - top - EDGE - FOOTER }
  const dimensions = dimensionBoxes(show.dimensions, fit.box, awayRight)
  const bubbles = lineBubbles(lines, fit, within, dimensions, selected)
  const segments = [...lines.map((l) => [l.from, l.to] as const), ...bubbles.leaders]
  const boxes = [...bubbles.boxes, ...supports.map(discBox), ...dimensions]
  const labels = supportLabels(supports, z, { within, boxes, segments })
  const values = contour
    ? contourLabels(contour, { within, boxes: [...boxes, ...labels.boxes, ...supports.map(aroundDisc)], segments })
    : undefined

  const foot = height - EDGE - FOOTER / 2
  const bar = scaleBar(fit.scale, EDGE, foot + 1.5, Math.min(52, width * 0.26))
  const primitives: Primitive[] = [
    ...(contour ? drawContours(contour) : []),
    ...(values?.drawn ?? []),
    ...(contour ? labels.boxes.map((b) => polygon('paper', corners(b.x, b.y, b.width, b.height))) : []),
    ...bubbles.drawn,
    ...drawLines(lines, selected),
    ...drawSupports(supports, selected),
    ...labels.drawn,
    ...(show.dimensions ? gridDimensions(building, fit, awayRight) : []),
    ...bar,
    ...(findings
      ? tiltArrow(findings.tilt, z, width - EDGE, foot, width * 0.66)
      : benchmarkNote(building, width * 0.4, foot + 1.5, width * 0.6 - EDGE)),
    ...drawLegend(legend, EDGE, EDGE),
  ]
  return { width, height, title: titleOf(input), primitives }
}

/** What is left of the sheet for the supports themselves. */
function roomFor({ building, width, height }: PlanInput, awayRight: number): Box {
  const half = Math.max(0, ...building.frame_lines.map((l) => bubbleFor(l.id, LONGEST_BUBBLE).half))
  const left = EDGE + BUBBLE_AWAY + half + 5
  const top = EDGE + LEGEND_ROW + BUBBLE_AWAY + 9
  const right = EDGE + awayRight + 3
  const bottom = EDGE + FOOTER + DIMENSION_AWAY + 4
  return { x: left, y: top, width: Math.max(4, width - left - right), height: Math.max(4, height - top - bottom) }
}

function entriesOf(supports: readonly PlanSupport[], lines: readonly PlanLine[], contour?: DrawnContours): Entry[] {
  const entries: Entry[] = []
  const found = supports.flatMap((s) => (s.finding ? [s.finding] : []))
  if (found.length > 0) entries.push(wordsEntry('settlement in mm, discs by area'))
  if (found.some((f) => f.estimated)) entries.push(wordsEntry('\u2248 estimated, not measured'))
  if (contour) entries.push(lineEntry('contour', `contours at ${contour.step_mm} mm`))
  const shown = new Set(lines.filter((l) => l.assessed).map((l) => l.status))
  for (const status of ['red', 'amber', 'green', 'none'] as const)
    if (shown.has(status)) entries.push(statusEntry(status, status === 'none' ? 'no capacity given' : status))
  if (lines.some((l) => l.assessed && l.certainty === 'borderline' && l.status !== 'none'))
    entries.push(borderlineEntry())
  if (found.length === 0 && supports.some((s) => s.hasStud))
    entries.push({ width: 1, words: 'levelling stud', draw: (x, y) => [circle('stud', [x + 0.5, y], 0.5)] })
  return entries
}

/** A figure of a contour would be taken for the support's there. */
function aroundDisc({ at: [x, y], radius }: PlanSupport): Box {
  const r = radius + 3
  return { x: x - r, y: y - r, width: 2 * r, height: 2 * r }
}

function discBox({ at: [x, y], radius }: PlanSupport): Box {
  const r = radius * 0.72
  return { x: x - r, y: y - r, width: 2 * r, height: 2 * r }
}

function dimensionBoxes(shown: boolean, plan: Box, awayRight: number): Box[] {
  if (!shown) return []
  const away = DIMENSION_AWAY - 4
  return [
    { x: plan.x - 3, y: plan.y + plan.height + away, width: plan.width + 6, height: 6 },
    { x: plan.x + plan.width + awayRight - 4, y: plan.y - 3, width: 6, height: plan.height + 6 },
  ]
}

function titleOf({ building, findings }: PlanInput): string {
  const what = `Plan of ${building.supports.length} supports and ${building.frame_lines.length} frame lines`
  return findings ? `${what}, round ${findings.id}; worst flag ${findings.status}` : `${what}, as described`
}

function empty({ width, height }: PlanInput): Scene {
  const words = 'No supports yet'
  const at: Point = [width / 2, height / 2]
  return { width, height, title: words, primitives: [text('text-quiet', at, words, TEXT)] }
}
