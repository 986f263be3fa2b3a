/**
 * One frame line as an elevation, to scale: members by their worst flag, the deformed line exaggerated by a stated
 * factor, induced moments on the tension side, and below it what the ground did. Without findings it is the frame
 * as described.
 */
import { intervalFactor } from '../assess/confidence.ts'
import { criteriaOf, type Building, type FrameLine } from '../model/building.ts'
import { Fault } from '../model/faults.ts'
import { worse, type Certainty, type RoundFindings, type Status } from '../model/findings.ts'
import { deformedLine, factorFor, largestFactor } from './elevation/deformed.ts'
import { frameIn, roomBeside, weightOf, type DrawnFrame } from './elevation/frame.ts'
import { depthOf, drawGround, levelMarks, LEVEL_WIDTH, OVERHANG } from './elevation/ground.ts'
import { drawLabels, drawSectionNames, flaggedMembers, flagWords, isUsed } from './elevation/labels.ts'
import {
  borderlineEntry,
  deformedEntry,
  drawLegend,
  legendRows,
  LEGEND_ROW,
  wordsEntry,
  momentEntry,
  statusEntry,
  type Entry,
} from './legend.ts'
import { levelsOf } from './elevation/levels.ts'
import { drawLoads, isLoaded, LOADS_HEADROOM } from './elevation/loads.ts'
import { drawMembers, drawPins, drawSelection } from './elevation/members.ts'
import { drawMoments, momentDiagrams, momentScale, type MomentScale } from './elevation/moments.ts'
import { bubbleRow, dimensionRow, distortionRow, settlementRow, type Row } from './elevation/schedule.ts'
import type { Primitive, Scene, Target } from './scene.ts'
import { baselineFor, text } from './shapes.ts'
import { EDGE, SMALL, TEXT } from './sizes.ts'
import { fitText, textWidth } from './text-width.ts'

export interface ElevationLayers {
  deformed: boolean
  moments: boolean
  loads: boolean
  /** Figures on the frame; names of sections where there are no findings. */
  labels: boolean
}

export interface ElevationInput {
  building: Building
  line: string
  findings?: RoundFindings
  /** Drawing mm. */
  width: number
  height: number
  /** What is left out: deformed, moments and labels are shown, loads are not. */
  show?: Partial<ElevationLayers>
  /** Exaggeration of the deformed line; a round one is found where it is left out. */
  factor?: number
  selected?: Target
}

/** Above the topmost member: room for its diagram and figures. */
const HEADROOM = 8
/** Between the parts below the frame. */
const GAP = 1.6
/** A narrower sheet goes without titles of the rows. */
const TITLES_FROM = 120

/** Everything that a frame at one scale is drawn from, and how much room it takes above and below. */
interface Layout {
  frame: DrawnFrame
  factor: number
  mostFactor: number
  moments: MomentScale
  legend: Entry[][]
  rows: Row[]
  above: number
  below: number
}

export interface ElevationScene extends Scene {
  /** Exaggeration of the deformed line as drawn. */
  factor: number
  /** The largest at which it stays on the sheet: the end of a slider. */
  mostFactor: number
}

export function elevation(input: ElevationInput): ElevationScene {
  const { building, width, height, findings, selected } = input
  const found = building.frame_lines.find((l) => l.id === input.line)
  if (!found) throw new Fault('element.unknown', { value: input.line, element: { kind: 'line', id: input.line } })
  if (found.nodes.length === 0) return empty(input)
  const show = { deformed: true, moments: true, loads: false, labels: true, ...input.show }
  const z = intervalFactor(criteriaOf(building).confidence)
  const { frame, factor, mostFactor, moments, legend, rows } = layOut(input, found, show, z)

  const column = columnWidth(width)
  const left = frame.box.x - OVERHANG
  const right = frame.box.x + frame.box.width + OVERHANG
  const ground = drawGround(frame, left, right, selected)
  const deformed = show.deformed && findings ? deformedLine(frame, factor) : { curves: [], drawn: [] }
  const diagrams = show.moments ? momentDiagrams(frame, moments) : []
  const within = { x: left + 0.5, y: EDGE + legend.length * LEGEND_ROW, width: width - EDGE - left - 0.5, height: 0 }
  within.height = frame.box.y + frame.box.height - within.y
  const loads = show.loads ? drawLoads(frame, within) : { drawn: [], boxes: [] }
  const figures = !show.labels
    ? []
    : findings
      ? drawLabels(frame, criteriaOf(building), diagrams, deformed.curves, within, loads.boxes)
      : drawSectionNames(frame, within, loads.boxes)
  const primitives: Primitive[] = [
    ...drawSelection(frame, selected),
    ...ground.drawn,
    ...drawMoments(found.id, diagrams, weightOf(frame), z),
    ...loads.drawn,
    ...drawMembers(frame, z),
    ...drawPins(frame),
    ...deformed.drawn,
    ...figures,
    ...levelMarks(levelsOf(frame, ground.depths, TEXT + 1.4), left - column, TEXT),
    ...rows.flatMap((r) => r.drawn),
    ...drawLegend(legend, EDGE, EDGE),
  ]
  return { width, height, title: titleOf(input, found), primitives, factor, mostFactor }
}

/** Finds the scale at which the frame and all that stands above and below it fill the sheet and no more. */
function layOut(input: ElevationInput, found: FrameLine, show: ElevationLayers, z: number): Layout {
  const { width, height } = input
  const column = columnWidth(width)
  const across = { x: EDGE + column + OVERHANG, width: width - 2 * EDGE - column - 2 * OVERHANG }
  let above = EDGE + LEGEND_ROW + HEADROOM
  let below = 30
  // A smaller frame can want higher rows, never the other way round for long: the most that was wanted is kept.
  for (let turn = 0; ; turn++) {
    const room = { ...across, y: above, height: Math.max(4, height - above - below) }
    const frame = frameIn(input.building, found, room, input.findings)
    const layout = dress(input, frame, show, z)
    if (turn === 6 || (layout.above <= above + 0.01 && layout.below <= below + 0.01)) return layout
    above = Math.max(above, layout.above)
    below = turn === 0 ? layout.below : Math.max(below, layout.below)
  }
}

function dress(
  { building, findings, width, height, factor: given, selected }: ElevationInput,
  frame: DrawnFrame,
  show: ElevationLayers,
  z: number,
): Layout {
  const room = roomBeside(frame)
  const nodes = frame.finding?.nodes ?? []
  const mostFactor = largestFactor(frame, { x: EDGE, y: EDGE, width: width - 2 * EDGE, height: height - 2 * EDGE })
  const factor = Math.min(mostFactor, given ?? factorFor(nodes, frame.scale, room * 0.35))
  const moments = momentScale(frame, room)
  const legend = legendRows(entriesOf(frame, { building, findings }, show, factor, moments), width - 2 * EDGE)
  const supports = new Map(findings?.supports.map((s) => [s.support, s]))
  const floor = frame.box.y + frame.box.height
  const ground = Math.max(0, ...frame.bases.map((b) => b.at[1] + depthOf(b, frame.scale) - floor))
  const rows: Row[] = []
  let top = floor + ground + GAP
  function add(row: Row | undefined): void {
    if (!row) return
    rows.push(width >= TITLES_FROM ? titled(row, frame.box.x - OVERHANG - columnWidth(width), top) : row)
    top += row.height
  }
  add(settlementRow(frame, supports, z, top))
  add(dimensionRow(frame, top))
  add(bubbleRow(frame, supports, z, top, width, selected))
  add(distortionRow(frame, frame.finding?.spans ?? [], z, top, selected))
  const headroom = Math.max(HEADROOM, show.loads && isLoaded(frame) ? LOADS_HEADROOM : 0)
  return {
    frame,
    factor,
    mostFactor,
    moments,
    legend,
    rows,
    above: EDGE + legend.length * LEGEND_ROW + headroom,
    below: top - floor + EDGE,
  }
}

function columnWidth(width: number): number {
  return width >= TITLES_FROM ? Math.max(LEVEL_WIDTH, textWidth('angular distortion', SMALL) + 1) : LEVEL_WIDTH
}

function titled(row: Row, x: number, top: number): Row {
  const title = text('text-quiet', [x, baselineFor(top + row.middle, SMALL)], row.title, SMALL, 'start')
  return { ...row, drawn: row.title === '' ? row.drawn : [...row.drawn, title] }
}

function entriesOf(
  frame: DrawnFrame,
  { building, findings }: Pick<ElevationInput, 'building' | 'findings'>,
  show: ElevationLayers,
  factor: number,
  moments: MomentScale,
): Entry[] {
  const criteria = criteriaOf(building)
  const { finding } = frame
  const entries: Entry[] = []
  if (finding && show.deformed) entries.push(deformedEntry(factor))
  if (finding && show.moments && moments.mmPerKNm > 0) entries.push(momentEntry(moments.bar_kNm, moments.mmPerKNm))
  if (show.loads && isLoaded(frame)) entries.push(wordsEntry('G permanent, Q variable: kN/m, kN'))
  if (finding) {
    const held = [...finding.members, ...finding.spans]
    const shown = new Set(held.map((x) => x.status))
    for (const status of ['red', 'amber', 'green', 'none'] as const)
      if (shown.has(status)) entries.push(statusEntry(status, status === 'none' ? 'no capacity given' : status))
    const isBorderline =
      finding.spans.some(borderline) || (show.labels && flaggedMembers(frame).some((m) => borderline(m.finding)))
    if (isBorderline) entries.push(borderlineEntry())
    const figures = show.labels ? flaggedMembers(frame).map((m) => flagWords(m.finding, criteria)) : []
    if (figures.some((f) => f !== '' && !isUsed(f))) entries.push(wordsEntry('% of capacity, induced'))
    if (figures.some(isUsed)) entries.push(wordsEntry('% used: with the loads'))
  }
  const estimated = new Set(findings?.supports.filter((s) => s.estimated).map((s) => s.support))
  if (frame.bases.some((b) => estimated.has(b.support))) entries.push(wordsEntry('\u2248 estimated, not measured'))
  return entries
}

function borderline({ status, certainty }: { status: Status; certainty: Certainty }): boolean {
  return certainty === 'borderline' && status !== 'none'
}

function titleOf({ line, findings }: ElevationInput, frame: FrameLine): string {
  const what = `Elevation of frame line ${line}: ${frame.members.length} members`
  const finding = findings?.frame_lines.find((f) => f.id === line)
  if (!findings || !finding) return `${what}, as described`
  const status = [...finding.members, ...finding.spans].reduce<Status>((s, x) => worse(s, x.status), 'none')
  return `${what}, round ${findings.id}; worst flag ${status}`
}

function empty({ line, width, height }: ElevationInput): ElevationScene {
  const words = `Frame line ${line} has no nodes yet`
  return {
    width,
    height,
    title: words,
    factor: 1,
    mostFactor: 1,
    primitives: [text('text-quiet', [width / 2, height / 2], fitText(words, width - 2 * EDGE, TEXT), TEXT)],
  }
}
