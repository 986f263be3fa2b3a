/** The loads as described: a comb of short arrows over the member, point and node loads as arrows with their size. */
import type { Action, MemberLoad } from '../../model/building.ts'
import { placeLabels, type Box, type Wanted } from '../place-labels.ts'
import type { Point, Primitive, Target } from '../scene.ts'
import { arrow, between, line, text, type Extra } from '../shapes.ts'
import { SMALL } from '../sizes.ts'
import { CAP_HEIGHT, textWidth } from '../text-width.ts'
import type { DrawnFrame, DrawnMember } from './frame.ts'
import { memberTarget } from './members.ts'

const COMB = 2.2
const ARROW = 4.6
/** Room above the topmost level. */
export const LOADS_HEADROOM = ARROW + SMALL + 1

const LETTER: Record<Action, string> = { permanent: 'G', variable: 'Q' }

export function isLoaded({ line }: DrawnFrame): boolean {
  return line.members.some((m) => m.loads?.length) || line.nodes.some((n) => n.load_kN)
}

interface LoadFigure extends Wanted {
  words: string
  extra: Extra
}

interface Loaded {
  drawn: Primitive[]
  figures: LoadFigure[]
}

export function drawLoads(frame: DrawnFrame, within: Box): { drawn: Primitive[]; boxes: Box[] } {
  const nodes = frame.line.nodes.flatMap((node): Loaded[] => {
    if (!node.load_kN) return []
    const { permanent, variable } = node.load_kN
    const words = together({ permanent: permanent ?? 0, variable: variable ?? 0 })
    const target: Target = { kind: 'node', line: frame.line.id, id: node.id }
    return force(frame.place(node.x_m, node.z_m), words, { target })
  })
  const members = frame.members.flatMap((m) => [...pointLoads(frame, m), ...uniformLoads(frame, m)])
  const all = [...nodes, ...members]
  const figures = all.flatMap((l) => l.figures)
  const boxes = placeLabels(figures, { within }, 0.5)
  return {
    drawn: [
      ...all.flatMap((l) => l.drawn),
      ...figures.flatMap(({ words, extra }, i) => {
        const box = boxes[i]
        return box ? [text('load', [box.x + box.width / 2, box.y + box.height], words, SMALL, 'middle', extra)] : []
      }),
    ],
    boxes: boxes.filter((b) => b !== undefined),
  }
}

function uniformLoads(frame: DrawnFrame, { member, from, to }: DrawnMember): Loaded[] {
  const uniform = (member.loads ?? []).filter((l) => l.kind === 'uniform')
  const run = Math.abs(to[0] - from[0])
  if (uniform.length === 0 || run < 2) return []
  const words = together(summed(uniform, (l) => (l.kind === 'uniform' ? l.kN_per_m : 0)))
  const extra: Extra = { target: memberTarget(frame.line.id, member.id), label: `${member.id}: ${words} kN/m` }
  function up(p: Point): Point {
    return [p[0], p[1] - COMB]
  }
  const count = Math.max(2, Math.round(run / 3))
  const comb = Array.from({ length: count + 1 }, (_, i) => {
    const foot = between(from, to, i / count)
    return arrow('load', up(foot), [foot[0], foot[1] - 0.5], 0.9, extra)
  })
  const places = [0.5, 0.3, 0.7].map((s) => up(between(from, to, s)))
  const figures = textWidth(words, SMALL) < run - 2 ? [figure(words, places, 0.9, extra)] : []
  return [{ drawn: [line('load', up(from), up(to), extra), ...comb], figures }]
}

function pointLoads(frame: DrawnFrame, { member, from, to, length }: DrawnMember): Loaded[] {
  return (member.loads ?? []).flatMap((load) => {
    if (load.kind !== 'point' || length === 0) return []
    const share = Math.min(1, Math.max(0, (load.at_m * frame.scale) / length))
    const words = `${LETTER[load.action]} ${round(load.kN)}`
    return force(between(from, to, share), words, { target: memberTarget(frame.line.id, member.id) })
  })
}

function force(at: Point, words: string, extra: Extra): Loaded[] {
  if (words === '') return []
  const tail: Point = [at[0], at[1] - ARROW]
  return [
    {
      drawn: [arrow('load', tail, [at[0], at[1] - 0.5], 1.4, extra)],
      figures: [figure(words, [tail], 0.7, extra)],
    },
  ]
}

/** A figure whose foot stands some way over one of the places. */
function figure(words: string, feet: readonly Point[], over: number, extra: Extra): LoadFigure {
  const height = SMALL * CAP_HEIGHT
  const places = feet.map(([x, y]): Point => [x, y - over - height / 2])
  return { words, extra, places, height, width: textWidth(words, SMALL) }
}

function summed(loads: readonly MemberLoad[], size: (load: MemberLoad) => number): Record<Action, number> {
  const total: Record<Action, number> = { permanent: 0, variable: 0 }
  for (const load of loads) total[load.action] += size(load)
  return total
}

/** "G 20 + Q 8": permanent and variable as they were given, nothing combined. */
function together({ permanent, variable }: Record<Action, number>): string {
  return [permanent === 0 ? '' : `G ${round(permanent)}`, variable === 0 ? '' : `Q ${round(variable)}`]
    .filter(Boolean)
    .join(' + ')
}

function round(value: number): string {
  return String(Number(value.toPrecision(4))).replace('-', '\u2212')
}
