/** The whole job through the one way in, on a real file: from nothing to an issued report, and back from the file. */
import { readFileSync } from 'node:fs'
import { expect, it } from 'vitest'
import type { BookRow } from '../../../app/model/building.ts'
import { addGridLines } from '../../../app/model/edits/frame-lines.ts'
import { layOutGrid } from '../../../app/model/edits/grid.ts'
import { setUniform } from '../../../app/model/edits/loads.ts'
import { addBenchmark, placeStuds } from '../../../app/model/edits/points.ts'
import { addSection } from '../../../app/model/edits/sections.ts'
import { printer } from '../../../app/report/print.ts'
import { desk } from '../../support/desk.ts'
import { pdfPages } from '../../support/pdf-text.ts'

const BEAM = { id: 'beam', material: 'concrete', E_GPa: 30, I_cm4: 540000, A_cm2: 1800 } as const
const CAPACITY = { sagging_kNm: 160, hogging_kNm: 190, shear_kN: 240 }

/** A loop from the benchmark over the studs, each of which has gone down by so many mm. */
function book(down_mm: readonly number[]): BookRow[] {
  return [
    { point: 'BM1', back_m: 1.5, sight_m: 20 },
    ...down_mm.map((mm, i) => ({ point: `S-A${i + 1}`, mid_m: Number((1.1 + mm / 1000).toFixed(5)), sight_m: 18 })),
    { point: 'TP1', fore_m: 1.2, back_m: 1.3, sight_m: 20, back_sight_m: 20 },
    { point: 'BM1', fore_m: 1.6002, sight_m: 20 },
  ]
}

it('a building is described, visited twice, assessed, reported, exported and made again from its file', async () => {
  const { ask, at, edit, refused } = desk({ printer: printer() })
  const path = at('tower.levelstead')
  expect(await ask('project/new', { path, name: ' Chapel Row 4 ' })).toMatchObject({
    path,
    read_only: false,
    undo: null,
    building: { name: 'Chapel Row 4', supports: [], survey: { rounds: [] } },
  })

  await edit((b) => layOutGrid(b, { x: [6, 6], y: [] }))
  await edit((b) => addSection(b, { ...BEAM, capacity: CAPACITY }))
  await edit((b) => addSection(b, { ...BEAM, id: 'column', I_cm4: 213333, A_cm2: 1600 }))
  await edit((b) => addGridLines(b, { storeys: [3.5, 3.2], beam: 'beam', column: 'column' }))
  await edit((b) => {
    const beams = b.frame_lines[0]!.members.filter((m) => m.kind === 'beam')
    return setUniform(
      b,
      beams.map(({ id }) => ({ line: 'A', id })),
      'permanent',
      18,
    )
  })
  await edit((b) => addBenchmark(b, { id: 'BM1', level_m: 20 }))
  const described = await edit(placeStuds)
  expect(described.survey.points.map((p) => p.id)).toEqual(['BM1', 'S-A1', 'S-A2', 'S-A3'])

  const r0 = { id: 'R0', date: '2026-03-02', observer: 'N. Reader', instrument: 'digital level' }
  const half = [
    { point: 'BM1', back_m: 1.5, sight_m: 20 },
    { point: 'S-A1', mid_m: '1,1 or so' },
  ]
  const typing = await ask('rounds/draft', { ...r0, book: { sd_mm_per_sqrt_km: 0.7, rows: half } })
  expect(typing.rounds).toEqual([{ ...r0, state: 'draft', version: 1, book: { sd_mm_per_sqrt_km: 0.7, rows: half } }])
  expect((await refused('rounds/accept', { round: 'R0' })).map((f) => f.code)).toContain('number.quoted')

  await ask('rounds/draft', { ...r0, book: { sd_mm_per_sqrt_km: 0.7, rows: book([0, 0, 0]) } })
  const first = await ask('rounds/accept', { round: 'R0', note: 'dry, no wind' })
  expect(first.building.survey.baseline).toBe('R0')
  expect(first.rounds).toMatchObject([
    { ...r0, state: 'accepted', accepted_by: 'T. Tester', note: 'dry, no wind', version: 1 },
  ])

  await ask('rounds/draft', { id: 'R1', date: '2026-04-02', book: { sd_mm_per_sqrt_km: 0.7, rows: book([0, 9, 1]) } })
  expect((await refused('report/issue', options('R1')))[0]).toMatchObject({ code: 'round.draft' })
  await ask('rounds/accept', { round: 'R1' })

  const { rounds } = await ask('assess/findings', {})
  const [found] = rounds
  expect(found).toMatchObject({ id: 'R1', status: 'red' })
  expect(found!.supports.map((s) => Number(s.settlement_mm.toFixed(1)))).toEqual([0, 9, 1])
  expect(await ask('assess/findings', { round: 'R1' })).toMatchObject({ rounds: [found] })

  const preview = await ask('report/preview', options('R1'))
  expect(await ask('report/register', {})).toEqual([])
  const issued = await ask('report/issue', options('R1'))
  expect(issued).toMatchObject({
    number: 1,
    label: '1 rev A',
    round: 'R1',
    pages: preview.pages,
    reviewer: 'R. Viewer',
  })
  expect(await ask('report/register', {})).toEqual([issued])
  await ask('report/save', { number: 1, to: at('report.pdf') })
  const pdf = readFileSync(at('report.pdf'))
  expect((await ask('report/pdf', { number: 1 })).pdf).toBe(pdf.toString('base64'))
  const pages = await pdfPages(new Uint8Array(pdf))
  expect(pages).toHaveLength(issued.pages)
  expect(pages[0]).toContain('Chapel Row 4')

  await ask('rounds/draft', { id: 'R2', date: '2026-05-02' })
  expect(await ask('exchange/export', { to: at('tower.building.json') })).toEqual({
    written: at('tower.building.json'),
    drafts: ['R2'],
    unfinished: [],
  })
  const before = (await ask('project/view', {}))!
  const kept = await ask('assess/findings', {})
  const again = await ask('exchange/import', { from: at('tower.building.json'), to: at('again.levelstead') })
  expect(again.building).toEqual(before.building)
  expect(await ask('assess/findings', {})).toEqual(kept)

  const back = await ask('project/open', { path })
  expect(back).toEqual(before)
  expect(back.undo).toBe('Place 3 studs')
  await ask('project/close', {})
  expect(await ask('project/view', {})).toBeNull()
})

function options(round: string) {
  return { round, paper: 'A4', surveyed_by: 'N. Reader', assessed_by: 'A. Sessor', reviewer: 'R. Viewer' } as const
}
