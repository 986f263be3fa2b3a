import { expect, test } from 'vitest'
import { elevation } from '../../app/drawing/elevation.ts'
import { plan } from '../../app/drawing/plan.ts'
import type { Primitive } from '../../app/drawing/scene.ts'
import type { Member } from '../../app/model/building.ts'
import { likelySection } from '../../renderer/describe/likely-section.ts'
import { capacityWords, loadWords, pinWords, shared } from '../../renderer/describe/member-words.ts'
import { withPicked } from '../../renderer/describe/with-picked.ts'
import { smallBuilding } from '../support/made.ts'

const MEMBER: Member = { id: 'B1', kind: 'beam', from: 'a', to: 'b', section: 'beam' }

test('a member says its loads, pins and capacities in a few signs', () => {
  const loaded: Member = {
    ...MEMBER,
    pin_to: true,
    loads: [
      { kind: 'uniform', kN_per_m: 18, action: 'permanent' },
      { kind: 'point', kN: 30, at_m: 2.5, action: 'variable' },
    ],
  }
  expect(loadWords(loaded)).toBe('18 + 0, 1 point')
  expect(loadWords(MEMBER)).toBe('–')
  expect(pinWords(loaded)).toBe('to')
  expect(capacityWords(MEMBER, { id: 's', capacity: { sagging_kNm: 210, shear_kN: 240 } } as never)).toBe(
    '210 / 210 / 240',
  )
  expect(capacityWords(MEMBER, undefined)).toBe('–')
})

test('of many members the value is shown that all have', () => {
  expect(shared([2, 2])).toEqual({ same: true, value: 2 })
  expect(shared([2, undefined])).toEqual({ same: false })
  expect(shared([undefined, undefined])).toEqual({ same: true, value: undefined })
  expect(shared([])).toEqual({ same: false })
})

test('new frame lines are offered the sections in use, else those whose names fit', () => {
  const building = smallBuilding()
  expect([likelySection(building, 'beam'), likelySection(building, 'column')]).toEqual(['beam', 'column'])
  const bare = { ...building, frame_lines: [], sections: [...building.sections].reverse() }
  expect([likelySection(bare, 'beam'), likelySection(bare, 'column')]).toEqual(['beam', 'column'])
  expect(likelySection({ ...bare, sections: [] }, 'beam')).toBeUndefined()
})

test('everything picked is marked on the drawing, on the plan as on the elevation', () => {
  const building = smallBuilding()
  const input = { building, width: 150, height: 100 }
  function marks(primitives: readonly Primitive[]): number {
    return primitives.filter((p) => p.role === 'selection').length
  }
  const line = elevation({ ...input, line: 'A' })
  const picked = ['C1', 'B1'].map((id) => ({ kind: 'member', line: 'A', id }) as const)
  expect(marks(withPicked(line, picked).primitives)).toBe(2)
  expect(withPicked(line, [])).toBe(line)
  expect(marks(withPicked(plan(input), [{ kind: 'support', id: 'A2' }]).primitives)).toBe(1)
})
