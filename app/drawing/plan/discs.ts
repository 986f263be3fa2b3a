/** Supports on the plan: a column, a stud where one is set, and a disc whose area goes by the settlement. */
import type { Building } from '../../model/building.ts'
import type { SupportFinding } from '../../model/findings.ts'
import { millimetres } from '../../model/numbers.ts'
import { settlementLabel } from '../elevation/schedule.ts'
import { placeLabels, type Box, type Obstacles } from '../place-labels.ts'
import type { Point, Primitive, Role, Target } from '../scene.ts'
import { circle, corners, polygon, sameTarget, text, type Extra } from '../shapes.ts'
import { SMALL, TEXT } from '../sizes.ts'
import { CAP_HEIGHT, fitText, textWidth } from '../text-width.ts'
import type { PlanFit } from './fit.ts'

const LARGEST = 4.4
const COLUMN = 1.5
const STUD = 0.5
/** From baseline to baseline over the text size. */
const LEADING = 1.22
/** A name on the plan is never given more than this, mm. */
const LONGEST_NAME = 24

export interface PlanSupport {
  id: string
  at: Point
  radius: number
  finding?: SupportFinding
  hasStud: boolean
  extra: Extra
}

export function planSupports(
  building: Building,
  fit: PlanFit,
  z: number,
  findings: readonly SupportFinding[] = [],
): PlanSupport[] {
  const found = new Map(findings.map((f) => [f.support, f]))
  const studs = new Set(building.survey.points.flatMap((p) => (p.kind === 'stud' ? [p.support] : [])))
  const most = Math.max(0, ...findings.map((f) => Math.abs(f.settlement_mm)))
  const largest = Math.min(LARGEST, 0.3 * fit.nearest)
  return fit.supports.map(({ id, at }) => {
    const finding = found.get(id)
    const share = finding && most > 0 ? Math.abs(finding.settlement_mm) / most : 0
    return {
      id,
      at,
      finding,
      radius: finding ? Math.max(COLUMN * 0.75, largest * Math.sqrt(share)) : COLUMN * 0.75,
      hasStud: studs.has(id),
      extra: {
        target: { kind: 'support', id },
        label: finding ? settlementLabel(finding, z) : `Support ${id}${studs.has(id) ? '' : ', no stud'}`,
      },
    }
  })
}

export function drawSupports(supports: readonly PlanSupport[], selected?: Target): Primitive[] {
  return supports.flatMap(({ id, at, radius, finding, hasStud, extra }): Primitive[] => {
    const [x, y] = at
    const half = COLUMN / 2
    const isSelected = sameTarget(selected, extra.target)
    return [
      ...(isSelected ? [circle('selection', at, radius + 0.6)] : []),
      ...(finding ? [circle(discRole(finding), at, radius, extra)] : []),
      polygon('column', corners(x - half, y - half, COLUMN, COLUMN), { ...extra, id: `support/${id}` }),
      ...(hasStud && !finding ? [circle('stud', [x + 1.5, y + 1.5], STUD, extra)] : []),
    ]
  })
}

function discRole({ estimated, settlement_mm }: SupportFinding): Role {
  return estimated ? 'settlement-estimated' : settlement_mm < 0 ? 'settlement-rise' : 'settlement-disc'
}

interface Run {
  words: string
  role: Role
  size: number
}

/** What share of the supports may miss a way to label, so that it is still taken for the plan. */
const MISSED = 0.26

/**
 * Name over value ± interval at a corner of the disc. Where that has no room for most, all supports get less: a
 * figure must be told at once to be its support's own, which figures in many forms and places are not.
 */
export function supportLabels(
  supports: readonly PlanSupport[],
  z: number,
  obstacles: Obstacles,
): { drawn: Primitive[]; boxes: Box[] } {
  const boxes: Box[] = []
  const drawn: Primitive[] = []
  let left = [...supports].sort((a, b) => severity(b) - severity(a))
  for (const rows of [fullRows, valueRows, shortRows]) {
    const wanted = left.map((support) => {
      const lines = rows(support, z)
      const width = Math.max(...lines.map((runs) => runsWidth(runs)))
      const height = (lines.length - 1) * TEXT * LEADING + TEXT * CAP_HEIGHT
      return { support, lines, width, height, places: cornersOf(support, width, height) }
    })
    const placed = placeLabels(wanted, { ...obstacles, boxes: [...(obstacles.boxes ?? []), ...boxes] })
    const missed = wanted.filter((_, i) => !placed[i]).map((w) => w.support)
    if (rows !== shortRows && missed.length > Math.max(1, MISSED * supports.length)) continue
    wanted.forEach(({ support, lines }, i) => {
      const box = placed[i]
      if (!box) return
      boxes.push(box)
      drawn.push(...rowsAt(lines, box, box.x + box.width / 2 < support.at[0], support.extra))
    })
    left = missed
  }
  return { drawn, boxes }
}

function fullRows({ id, finding }: PlanSupport, z: number): Run[][] {
  const name: Run = { words: fitText(id, LONGEST_NAME, SMALL), role: 'text-quiet', size: SMALL }
  if (!finding) return [[{ ...name, role: 'text', size: TEXT, words: fitText(id, LONGEST_NAME, TEXT) }]]
  return [
    [name],
    [valueRun(finding), { words: `\u00b1 ${millimetres(z * finding.sd_mm)}`, role: 'text-quiet', size: SMALL }],
  ]
}

function valueRows(support: PlanSupport, z: number): Run[][] {
  return support.finding ? fullRows(support, z).slice(1) : shortRows(support)
}

function shortRows({ id, finding }: PlanSupport): Run[][] {
  return [[finding ? valueRun(finding) : { words: fitText(id, 10, SMALL), role: 'text', size: SMALL }]]
}

function valueRun({ settlement_mm, estimated }: SupportFinding): Run {
  return { words: `${estimated ? '\u2248 ' : ''}${millimetres(settlement_mm)}`, role: 'text-strong', size: TEXT }
}

function runsWidth(runs: readonly Run[]): number {
  return runs.reduce((sum, r) => sum + runWidth(r), 0) + 0.9 * (runs.length - 1)
}

function runWidth({ words, role, size }: Run): number {
  return textWidth(words, size, role === 'text-strong' ? 'medium' : 'regular')
}

function rowsAt(lines: readonly Run[][], box: Box, toTheLeft: boolean, extra: Extra): Primitive[] {
  return lines.flatMap((runs, i) => {
    let x = toTheLeft ? box.x + box.width - runsWidth(runs) : box.x
    const y = box.y + TEXT * CAP_HEIGHT + i * TEXT * LEADING
    return runs.map((run) => {
      const at: Point = [x, y]
      x += runWidth(run) + 0.9
      return text(run.role, at, run.words, run.size, 'start', extra)
    })
  })
}

function cornersOf({ at: [x, y], radius }: PlanSupport, width: number, height: number): Point[] {
  const away = Math.max(radius * 0.75, COLUMN * 0.5) + 0.9
  const [w, h] = [width / 2, height / 2]
  return [
    [x + away + w, y - away - h],
    [x + away + w, y + away + h],
    [x - away - w, y - away - h],
    [x - away - w, y + away + h],
  ]
}

function severity({ finding }: PlanSupport): number {
  return finding ? Math.abs(finding.settlement_mm) : 0
}
