import fc from 'fast-check'
import { expect, test } from 'vitest'
import type { Edit } from '../../app/model/changes.ts'
import { axesOf, distancesAlong, near, supportsByName } from '../../app/model/edits/frame-grid.ts'
import { addGridLines } from '../../app/model/edits/frame-lines.ts'
import { layOutGrid, spacingsOf } from '../../app/model/edits/grid.ts'
import { moveSupport } from '../../app/model/edits/supports.ts'
import { Fault } from '../../app/model/faults.ts'
import { applied, reversed } from '../support/applied.ts'
import { anyEdit, choice, length, lengths, pick, START } from '../support/made-edits.ts'

test('whatever is edited, every step keeps its references whole and taking all of it back gives the first building', () => {
  fc.assert(
    fc.property(fc.array(anyEdit, { maxLength: 12 }), (steps) => {
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
