/** Rounds through dispatch: drafts are kept as typed, what is accepted stays, what was wrong is corrected in the open. */
import { describe, expect, it } from 'vitest'
import type { GivenLevel, Round } from '../../../app/model/building.ts'
import { desk, type Desk } from '../../support/desk.ts'

const LATEST = 'R6'

async function exampleDesk(): Promise<Desk> {
  const made = desk()
  await made.ask('project/example', { path: made.at('example.levelstead') })
  return made
}

function levels(mm: number): GivenLevel[] {
  return ['S-A1', 'S-B1', 'S-C1', 'S-A4', 'S-B4'].map((point) => ({ point, level_m: 42.73 - mm / 1000, sd_mm: 0.3 }))
}

function latestOf(view: { building: { survey: { rounds: Round[] } } }): Round {
  return view.building.survey.rounds.at(-1)!
}

describe('a draft', () => {
  it('is kept as it is typed, whole or not, and is no part of the building', async () => {
    const { ask } = await exampleDesk()
    const before = (await ask('project/view', {}))!.building
    const typed = { id: 'R7', date: '2026-13-', book: { rows: [{ point: 'BM', back_m: '1.2.3' }, {}] }, weather: 'fog' }
    const view = await ask('rounds/draft', typed)
    expect(view.rounds.find((r) => r.id === 'R7')).toEqual({ ...typed, state: 'draft', version: 1 })
    expect(view.building).toEqual(before)
    expect((await ask('assess/findings', {})).rounds.map((r) => r.id)).not.toContain('R7')
  })

  it('is not accepted until it holds, and stays as it was typed', async () => {
    const { ask, refused } = await exampleDesk()
    const typed = { id: 'R7', date: '2026-13-41', levels: [...levels(1), { point: 'S-A9', level_m: 42, sd_mm: 0.3 }] }
    const before = await ask('rounds/draft', typed)
    const faults = await refused('rounds/accept', { round: 'R7' })
    expect(faults.map((f) => f.code).toSorted()).toEqual(['date.impossible', 'point.unknown'])
    expect(await ask('project/view', {})).toEqual(before)
  })

  it('of a book that ties to no benchmark is not accepted', async () => {
    const { ask, refused } = await exampleDesk()
    const rows = [
      { point: 'TP1', back_m: 1.2, sight_m: 20 },
      { point: 'S-A1', mid_m: 1.1, sight_m: 20 },
      { point: 'TP1', fore_m: 1.2, sight_m: 20 },
    ]
    await ask('rounds/draft', { id: 'R7', date: '2026-12-01', book: { sd_mm_per_sqrt_km: 0.7, rows } })
    expect((await refused('rounds/accept', { round: 'R7' })).map((f) => f.code)).toEqual(['round.untied'])
  })

  it('can be thrown away once, and its name used again', async () => {
    const { ask, refused } = await exampleDesk()
    await ask('rounds/draft', { id: 'R7', date: '' })
    await ask('rounds/discard', { round: 'R7' })
    expect((await refused('rounds/discard', { round: 'R7' }))[0]!.code).toBe('draft.unknown')
    expect((await refused('rounds/accept', { round: 'R7' }))[0]!.code).toBe('round.unknown')
    await ask('rounds/draft', { id: 'R7', date: '2026-12-01', levels: levels(0) })
    expect(latestOf(await ask('rounds/accept', { round: 'R7' })).id).toBe('R7')
  })
})

describe('an accepted round', () => {
  it('takes no draft of its name, is not accepted twice and cannot be thrown away', async () => {
    const { ask, refused } = await exampleDesk()
    const before = await ask('project/view', {})
    expect((await refused('rounds/draft', { id: LATEST, date: '2026-12-01' }))[0]!.code).toBe('round.frozen')
    expect((await refused('rounds/accept', { round: LATEST }))[0]!.code).toBe('round.frozen')
    expect((await refused('rounds/discard', { round: LATEST }))[0]!.code).toBe('draft.unknown')
    expect(await ask('project/view', {})).toEqual(before)
  })

  it('is corrected by a new version with its reason, and the old one stays to be seen', async () => {
    const { ask } = await exampleDesk()
    const old = latestOf((await ask('project/view', {}))!)
    const found = await ask('assess/findings', { round: LATEST })
    const rows = old.book!.rows.map((row) => (row.point === 'S-B4' ? { ...row, mid_m: row.mid_m! + 0.002 } : row))
    const corrected = { ...old, book: { ...old.book!, rows } }
    const view = await ask('rounds/correct', { round: corrected, reason: ' S-B4 was misread by 2 mm ' })
    expect(latestOf(view)).toEqual(corrected)
    expect(view.rounds.filter((r) => r.id === LATEST)).toMatchObject([
      { version: 1, state: 'superseded', book: old.book },
      { version: 2, state: 'accepted', book: corrected.book, reason: 'S-B4 was misread by 2 mm' },
    ])
    expect(await ask('assess/findings', { round: LATEST })).not.toEqual(found)
    const twice = await ask('rounds/correct', { round: old, reason: 'it was right after all' })
    expect(twice.rounds.filter((r) => r.id === LATEST).map((r) => r.state)).toEqual([
      'superseded',
      'superseded',
      'accepted',
    ])
    expect(await ask('assess/findings', { round: LATEST })).toEqual(found)
  })

  it('is corrected only for a reason, by readings that hold, and only where it is there', async () => {
    const { ask, refused } = await exampleDesk()
    const round = latestOf((await ask('project/view', {}))!)
    async function code(round: object, reason: string): Promise<string> {
      return (await refused('rounds/correct', { round, reason }))[0]!.code
    }
    expect(await code(round, '   ')).toBe('reason.empty')
    expect(await code({ ...round, date: '2026-02-30' }, 'x')).toBe('date.impossible')
    expect(await code({ ...round, id: 'R9' }, 'x')).toBe('round.unknown')
    await ask('rounds/draft', { id: 'R7', date: '2026-12-01', levels: levels(0) })
    expect(await code({ ...round, id: 'R7' }, 'x')).toBe('round.draft')
    expect(latestOf((await ask('project/view', {}))!)).toEqual(round)
  })
})

describe('the baseline', () => {
  it('is the first accepted round, and another one only for a reason', async () => {
    const { ask, refused } = await exampleDesk()
    expect((await ask('project/view', {}))!.building.survey.baseline).toBe('R0')
    expect((await refused('rounds/baseline', { round: 'R1', reason: '' }))[0]!.code).toBe('reason.empty')
    expect((await refused('rounds/baseline', { round: 'R9', reason: 'x' }))[0]!.code).toBe('round.unknown')
    const view = await ask('rounds/baseline', { round: 'R1', reason: 'studs were set anew' })
    expect(view.building.survey.baseline).toBe('R1')
    const { rounds, baseline } = await ask('assess/findings', {})
    expect(baseline).toBe('R1')
    expect(rounds.map((r) => r.id)).toEqual(['R0', 'R2', 'R3', 'R4', 'R5', 'R6'])
  })

  it('is not moved by undo, which takes back edits of the description alone', async () => {
    const { ask, refused } = await exampleDesk()
    await ask('rounds/baseline', { round: 'R1', reason: 'studs were set anew' })
    expect((await refused('project/undo', {}))[0]!.code).toBe('edit.none')
  })
})
