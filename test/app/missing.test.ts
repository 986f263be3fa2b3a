import { expect, test } from 'vitest'
import { missing } from '../../app/assess/missing.ts'
import { emptyBuilding, type Building } from '../../app/model/building.ts'
import type { Edit } from '../../app/model/changes.ts'
import { addGridLines } from '../../app/model/edits/frame-lines.ts'
import { layOutGrid } from '../../app/model/edits/grid.ts'
import { setUniform } from '../../app/model/edits/loads.ts'
import { setCapacity } from '../../app/model/edits/members.ts'
import { addBenchmark, placeStuds, removePoint } from '../../app/model/edits/points.ts'
import { addSection } from '../../app/model/edits/sections.ts'
import { addSupport } from '../../app/model/edits/supports.ts'
import { applied } from '../support/applied.ts'

function after(building: Building, ...edits: readonly ((b: Building) => Edit)[]): Building {
  return edits.reduce((now, make) => applied(now, make(now).changes), building)
}

function texts(building: Building, drafts: { id: string }[] = []): string[] {
  return missing(building, drafts).map((m) => m.text)
}

const FRAMED = after(
  emptyBuilding('Dye works'),
  (b) => layOutGrid(b, { x: [6, 5.4], y: [] }),
  (b) => addSection(b, { id: 'beam', material: 'concrete', E_GPa: 30, I_cm4: 416000, A_cm2: 1650 }),
  (b) => addGridLines(b, { storeys: [3.6], beam: 'beam', column: 'beam' }),
)
const all = FRAMED.frame_lines.flatMap((line) => line.members.map((m) => ({ line: line.id, id: m.id })))
const WHOLE = after(
  FRAMED,
  placeStuds,
  (b) => addBenchmark(b, { id: 'BM1', level_m: 42.5 }),
  (b) => setCapacity(b, all, 'sagging_kNm', 150),
  (b) => setUniform(b, all, 'permanent', 18),
)

function withRounds(building: Building, ...ids: string[]): Building {
  const rounds = ids.map((id) => ({ id, date: '2026-03-02', levels: [] }))
  return { ...building, survey: { ...building.survey, baseline: ids[0], rounds } }
}

test('an empty building lacks supports, sections and a frame line, in this order', () => {
  expect(missing(emptyBuilding('Dye works'), []).map((m) => [m.target.part, m.place, m.needed])).toEqual([
    ['grid', 'describe', true],
    ['sections', 'describe', true],
    ['lines', 'describe', true],
  ])
})

test('a frame without studs, capacities and loads says what each would bring', () => {
  expect(texts(FRAMED)).toEqual([
    'There is no levelling stud yet: place one at every support.',
    'There is no benchmark: a level book needs one, given levels do not.',
    'No member has a moment capacity: moments are found, flags are not.',
    'No member carries a load: utilisation counts what settlement induces alone.',
  ])
})

test('once described, the survey is what is missing, and a draft waits to be accepted', () => {
  expect(texts(WHOLE)).toEqual(['There is no baseline yet: book the first round.'])
  expect(texts(WHOLE, [{ id: 'R0' }])).toEqual(['Round R0 is a draft: accept it to make it the baseline.'])
  expect(texts(withRounds(WHOLE, 'R0'))).toEqual(['There is one round only: settlement needs a second.'])
  expect(missing(withRounds(WHOLE, 'R0'), [{ id: 'R1' }])[0]).toEqual({
    text: 'Round R1 is a draft: accept it and its results are kept.',
    place: 'log',
    target: { part: 'rounds', element: { kind: 'round', id: 'R1' } },
    needed: true,
  })
  expect(missing(withRounds(WHOLE, 'R0', 'R1'), [])).toEqual([])
})

test('what is lacking at a single support or member is named and linked to it', () => {
  const building = after(
    withRounds(WHOLE, 'R0', 'R1'),
    (b) => removePoint(b, 'S-A2'),
    (b) => setCapacity(b, [{ line: 'A', id: 'A1-A2/1' }], 'sagging_kNm', undefined),
    (b) => addSupport(b, { id: 'Well', x_m: 3, y_m: 4 }),
  )
  expect(missing(building, []).map((m) => [m.text, m.target.element?.id])).toEqual([
    ['Well stands on no frame line: settlement is found, bending is not.', undefined],
    ['A2, Well have no stud: the settlement there is estimated.', 'A2'],
    ['A1-A2/1 has no moment capacity: moments are found, flags are not.', 'A1-A2/1'],
  ])
  expect(missing(building, []).some((m) => m.needed)).toBe(false)
})

test('rounds without a baseline ask for one', () => {
  const building = withRounds(WHOLE, 'R0', 'R1')
  expect(texts({ ...building, survey: { ...building.survey, baseline: undefined } })).toEqual([
    'No round is the baseline: say which one settlement is counted from.',
  ])
})

test('a frame line whose members are all struck out is named', () => {
  const bare = { ...WHOLE, frame_lines: WHOLE.frame_lines.map((line) => ({ ...line, members: [] })) }
  expect(texts(bare)[0]).toBe('Frame line A has no member left.')
})
