/** Edits at random, made by the functions that the window makes them with; and the building that they begin from. */
import fc from 'fast-check'
import { emptyBuilding, type Building } from '../../app/model/building.ts'
import type { Edit } from '../../app/model/changes.ts'
import { addGridLines } from '../../app/model/edits/frame-lines.ts'
import { layOutGrid } from '../../app/model/edits/grid.ts'
import { setUniform } from '../../app/model/edits/loads.ts'
import { absentMembers, restore, strikeOut } from '../../app/model/edits/members.ts'
import { placeStuds } from '../../app/model/edits/points.ts'
import { setStoreys } from '../../app/model/edits/storeys.ts'
import { addSupport, moveSupport, removeSupports, renameSupport } from '../../app/model/edits/supports.ts'

export type Step = (building: Building) => Edit

export const length = fc.integer({ min: 10, max: 90 }).map((n) => n / 10)
export const lengths = fc.array(length, { minLength: 1, maxLength: 4 })
export const choice = fc.nat({ max: 1000 })

export function pick<T>(list: readonly T[], n: number): T | undefined {
  return list[n % Math.max(1, list.length)]
}

const none: Edit = { what: 'nothing', changes: [] }

export const anyEdit: fc.Arbitrary<Step> = fc.oneof(
  fc.record({ x: lengths, y: lengths }).map((spacings) => (b: Building) => layOutGrid(b, spacings)),
  lengths.map((storeys) => (b: Building) => addGridLines(b, { storeys, beam: 'beam', column: 'col' })),
  fc.record({ n: choice, heights: lengths }).map(({ n, heights }) => (b: Building) => {
    const line = pick(b.frame_lines, n)
    return line ? setStoreys(b, line.id, heights) : none
  }),
  fc.record({ n: choice, x_m: length, y_m: length }).map(({ n, ...to }) => (b: Building) => {
    const support = pick(b.supports, n)
    return support ? moveSupport(b, support.id, to) : none
  }),
  fc.record({ n: choice, base: length }).map(({ n, base }) => (b: Building) => {
    const support = pick(b.supports, n)
    return support ? moveSupport(b, support.id, { base_m: -base }) : none
  }),
  fc.record({ n: choice, x_m: length, y_m: length }).map(
    ({ n, x_m, y_m }) =>
      (b: Building) =>
        addSupport(b, { id: `P${n}`, x_m, y_m }),
  ),
  fc.array(choice, { minLength: 1, maxLength: 3 }).map((ns) => (b: Building) => {
    const ids = new Set(ns.flatMap((n) => pick(b.supports, n)?.id ?? []))
    return removeSupports(b, [...ids])
  }),
  fc.record({ n: choice, m: choice }).map(({ n, m }) => (b: Building) => {
    const support = pick(b.supports, n)
    return support ? renameSupport(b, support.id, `Q${m}`) : none
  }),
  fc.constant(placeStuds),
  fc.array(choice, { minLength: 1, maxLength: 6 }).map((ns) => (b: Building) => {
    const line = pick(b.frame_lines, ns[0]!)
    const members = new Set(ns.flatMap((n) => pick(line?.members ?? [], n)?.id ?? []))
    return strikeOut(
      b,
      [...members].map((id) => ({ line: line!.id, id })),
    )
  }),
  choice.map((n) => (b: Building) => {
    const line = pick(b.frame_lines, n)
    return line ? restore(b, line.id, absentMembers(line)) : none
  }),
  fc.record({ n: choice, load: length }).map(({ n, load }) => (b: Building) => {
    const line = pick(b.frame_lines, n)
    return setUniform(b, line?.members.map((m) => ({ line: line.id, id: m.id })) ?? [], 'permanent', load)
  }),
)

export const START: Building = {
  ...emptyBuilding('Dye works'),
  sections: ['col', 'beam'].map((id) => ({ id, material: 'concrete', E_GPa: 30, I_cm4: 1e5, A_cm2: 1e3 })),
}
