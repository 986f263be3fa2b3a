/** The loads as described: a comb of short arrows over the member, point and node loads as arrows with their size. */
import type { Action, MemberLoad } from '../../model/building.ts'
import type { Point, Primitive } from '../scene.ts'
import { arrow, between, line, text, type Extra } from '../shapes.ts'
import { SMALL } from '../sizes.ts'
import { textWidth } from '../text-width.ts'
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

export function drawLoads(frame: DrawnFrame): Primitive[] {
  return [
    ...frame.members.flatMap((m) => [...uniformLoads(frame, m), ...pointLoads(frame, m)]),
    ...frame.line.nodes.flatMap((node) => {
      if (!node.load_kN) return []
      const { permanent, variable } = node.load_kN
      const words = together({ permanent: permanent ?? 0, variable: variable ?? 0 })
      return force(frame.place(node.x_m, node.z_m), words, {
        target: { kind: 'node', line: frame.line.id, id: node.id },
      })
    }),
  ]
}

function uniformLoads(frame: DrawnFrame, { member, from, to }: DrawnMember): Primitive[] {
  const uniform = (member.loads ?? []).filter((l) => l.kind === 'uniform')
  const run = Math.abs(to[0] - from[0])
  if (uniform.length === 0 || run < 2) return []
  const words = together(summed(uniform, (l) => (l.kind === 'uniform' ? l.kN_per_m : 0)))
  const extra: Extra = { target: memberTarget(frame.line.id, member.id), label: `${member.id}: ${words} kN/m` }
  const up = (p: Point): Point => [p[0], p[1] - COMB]
  const count = Math.max(2, Math.round(run / 3))
  const comb = Array.from({ length: count + 1 }, (_, i) => {
    const foot = between(from, to, i / count)
    return arrow('load', up(foot), [foot[0], foot[1] - 0.5], 0.9, extra)
  })
  const [x, y] = between(from, to, 0.5)
  const isWide = textWidth(words, SMALL) < run - 2
  return [
    line('load', up(from), up(to), extra),
    ...comb,
    ...(isWide ? [text('load', [x, y - COMB - 0.9], words, SMALL, 'middle', extra)] : []),
  ]
}

function pointLoads(frame: DrawnFrame, { member, from, to, length }: DrawnMember): Primitive[] {
  return (member.loads ?? []).flatMap((load) => {
    if (load.kind !== 'point' || length === 0) return []
    const share = Math.min(1, Math.max(0, (load.at_m * frame.scale) / length))
    const words = `${LETTER[load.action]} ${load.kN}`
    return force(between(from, to, share), words, { target: memberTarget(frame.line.id, member.id) })
  })
}

function force(at: Point, words: string, extra: Extra): Primitive[] {
  if (words === '') return []
  return [
    arrow('load', [at[0], at[1] - ARROW], [at[0], at[1] - 0.5], 1.4, extra),
    text('load', [at[0], at[1] - ARROW - 0.7], words, SMALL, 'middle', extra),
  ]
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
