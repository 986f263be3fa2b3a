import fc from 'fast-check'
import { expect, test } from 'vitest'
import { emptyBuilding, type Building } from '../../app/model/building.ts'
import type { Edit } from '../../app/model/changes.ts'
import { axesOf, distancesAlong, near, supportsByName } from '../../app/model/edits/frame-grid.ts'
import { addGridLines } from '../../app/model/edits/frame-lines.ts'
import { layOutGrid, spacingsOf } from '../../app/model/edits/grid.ts'
import { setUniform } from '../../app/model/edits/loads.ts'
import { absentMembers, restore, strikeOut } from '../../app/model/edits/members.ts'
import { placeStuds } from '../../app/model/edits/points.ts'
import { setStoreys } from '../../app/model/edits/storeys.ts'
import { addSupport, moveSupport, removeSupports, renameSupport } from '../../app/model/edits/supports.ts'
import { Fault } from '../../app/model/faults.ts'
import { applied, reversed } from '../support/applied.ts'

type Step = (building: Building) => Edit

const length = fc.integer({ min: 10, max: 90 }).map((n) => n / 10)
const lengths = fc.array(length, { minLength: 1, maxLength: 4 })
const choice = fc.nat({ max: 1000 })

function pick<T>(list: readonly T[], n: number): T | undefined {
  return list[n % Math.max(1, list.length)]
}

const none: Edit = { what: 'nothing', changes: [] }

const step: fc.Arbitrary<Step> = fc.oneof(
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

const START: Building = {
  ...emptyBuilding('Dye works'),
  sections: ['col', 'beam'].map((id) => ({ id, material: 'concrete', E_GPa: 30, I_cm4: 1e5, A_cm2: 1e3 })),
}

test('whatever is edited, every step keeps its references whole and taking all of it back gives the first building', () => {
  fc.assert(
    fc.property(fc.array(step, { maxLength: 12 }), (steps) => {
      const done: Edit[] = []
      let now = START
      for (const make of steps) {
        let edit: Edit
        try {
          edit = make(now)
        } catch (error) {
          if (error instanceof Fault) continue
          throw error
        }
        now = applied(now, edit.changes)
        done.push(edit)
        const names = now.frame_lines.flatMap((line) => [line.nodes.map((n) => n.id), line.members.map((m) => m.id)])
        for (const ids of names) expect(new Set(ids).size).toBe(ids.length)
      }
      for (const edit of done.toReversed()) now = applied(now, reversed(edit.changes))
      expect(now).toEqual(START)
    }),
    { numRuns: 150 },
  )
})

test('a grid reads back as the spacings it was typed with', () => {
  fc.assert(
    fc.property(lengths, lengths, (x, y) => {
      expect(spacingsOf(applied(START, layOutGrid(START, { x, y }).changes).supports)).toEqual({ x, y })
    }),
  )
})

test('the axes of a line stand as far apart as the supports do in plan, however often these move', () => {
  fc.assert(
    fc.property(lengths, fc.array(fc.record({ n: choice, x_m: length }), { maxLength: 4 }), (x, moves) => {
      let now = applied(START, layOutGrid(START, { x, y: [] }).changes)
      now = applied(now, addGridLines(now, { storeys: [3, 3], beam: 'beam', column: 'col' }).changes)
      for (const { n, x_m } of moves) {
        const { id } = pick(now.supports, n)!
        const at = { x_m: x_m + 100 * n }
        now = applied(now, moveSupport(now, id, at).changes)
      }
      const axes = axesOf(now.frame_lines[0]!)
      const byName = supportsByName(now)
      const along = distancesAlong(axes.map((axis) => byName.get(axis.support)!))
      axes.forEach((axis, i) => expect(near(axis.x_m - axes[0]!.x_m, along[i]!)).toBe(true))
    }),
  )
})
