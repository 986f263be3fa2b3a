import { describe, expect, test } from 'vitest'
import { applyChanges, reverseEdit } from '../../app/model/apply-changes.ts'
import type { Change, Edit } from '../../app/model/changes.ts'
import { writeBuilding } from '../../app/model/write-building.ts'
import { smallBuilding } from '../support/made.ts'

const building = smallBuilding()
const [first, second] = building.supports

describe('a change', () => {
  test('that puts an entity between others is taken back with its place', () => {
    const added = { id: 'A1a', x_m: 3, y_m: 0 }
    const edit: Edit = {
      what: 'Add support A1a',
      changes: [
        { kind: 'support', id: 'A1a', at: 1, before: null, after: added },
        { kind: 'support', id: 'A2', before: second!, after: { ...second!, x_m: 6.5 } },
      ],
    }
    const after = applyChanges(building, edit.changes)
    expect(after.supports).toEqual([first, added, { ...second!, x_m: 6.5 }])
    expect(applyChanges(after, reverseEdit(edit).changes)).toEqual(building)
    expect(reverseEdit(reverseEdit(edit))).toEqual(edit)
  })

  test('leaves the building before it as it was, and shares what it does not touch', () => {
    const file = writeBuilding(building)
    const after = applyChanges(building, [{ kind: 'criteria', before: building.criteria!, after: null }])
    expect(writeBuilding(building)).toBe(file)
    expect([after.criteria, after.frame_lines]).toEqual([undefined, building.frame_lines])
    expect(after.frame_lines).toBe(building.frame_lines)
  })

  test.each<[string, Change]>([
    ['of what has changed since', { kind: 'support', id: 'A1', before: { ...first!, x_m: 1 }, after: null }],
    ['that adds what is there', { kind: 'support', id: 'A1', before: null, after: first! }],
    ['that takes away what is not there', { kind: 'section', id: 'roof', before: null, after: null }],
    ['beyond the end of its list', { kind: 'support', id: 'B1', at: 9, before: null, after: { ...first!, id: 'B1' } }],
    ['that gives an entity the name of another', { kind: 'support', id: 'A1', before: first!, after: second! }],
    [
      'in a line that is not there',
      { kind: 'node', line: 'Z', id: 'n', before: null, after: { id: 'n', x_m: 0, z_m: 0 } },
    ],
    ['that takes away a line with its members', { kind: 'line', id: 'A', before: { id: 'A' }, after: null }],
    ['of a head that is not as before', { kind: 'head', before: { name: 'Other' }, after: { name: 'New' } }],
  ])('%s is refused', (_, change) => {
    expect(() => applyChanges(building, [change])).toThrow(/is not as it was when the change was made/)
  })

  test('of no known kind is refused', () => {
    expect(() => applyChanges(building, [{ kind: 'roof' } as unknown as Change])).toThrow(/not of its form/)
  })
})
