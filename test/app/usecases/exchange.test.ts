/** Building files and readings tables through dispatch: what goes out comes in again, what is at fault leaves no trace. */
import { existsSync, readFileSync, readdirSync, writeFileSync } from 'node:fs'
import { dirname } from 'node:path'
import { describe, expect, it, test } from 'vitest'
import { moveSupport } from '../../../app/model/edits/supports.ts'
import type { Building, Round } from '../../../app/model/building.ts'
import { readReadings } from '../../../app/model/read-readings.ts'
import { writeBuilding } from '../../../app/model/write-building.ts'
import { desk } from '../../support/desk.ts'
import { disagreements } from '../../support/disagreements.ts'
import { smallBuilding } from '../../support/made.ts'
import { referenceFiles } from '../../support/reference-files.ts'

interface Reference {
  relative_tolerance: number
  building: Building
  expected: unknown
}

describe('every reference case', () => {
  test.each(referenceFiles())('%s comes out of a project as it went in, with its findings', async (_name, file) => {
    const { ask, at } = desk()
    const { building, expected, relative_tolerance } = JSON.parse(readFileSync(file, 'utf8')) as Reference
    writeFileSync(at('in.json'), JSON.stringify(building))
    await ask('exchange/import', { from: at('in.json'), to: at('p.levelstead') })
    expect(disagreements(await ask('assess/findings', {}), expected, relative_tolerance)).toEqual([])
    await ask('exchange/export', { to: at('out.json') })
    expect(readFileSync(at('out.json'), 'utf8')).toBe(writeBuilding(building))
    expect(JSON.parse(readFileSync(at('out.json'), 'utf8'))).toEqual(building)
  })
})

describe('a building file', () => {
  it('that holds a mechanism is refused by its frame line, and no project is made', async () => {
    const { at, context, refused } = desk()
    const building = smallBuilding()
    const [c1, c2, beam] = building.frame_lines[0]!.members
    Object.assign(beam!, { pin_from: true, pin_to: true })
    Object.assign(c1!, { pin_from: true })
    Object.assign(c2!, { pin_from: true })
    writeFileSync(at('in.json'), writeBuilding(building))
    expect(await refused('exchange/import', { from: at('in.json'), to: at('p.levelstead') })).toMatchObject([
      { code: 'frame.mechanism', place: { file: at('in.json'), path: 'frame_lines[0]', detail: { line: 'A' } } },
    ])
    expect(readdirSync(dirname(at('x')))).toEqual(['in.json'])
    expect(context.session.project).toBeNull()
  })

  it('with faults has every one of them listed, and no project is made', async () => {
    const { at, refused } = desk()
    const text = writeBuilding(smallBuilding())
      .replace('"E_GPa": 30', '"E_GPa": -30')
      .replace('"x_m": 6, "y_m": 0', '"x_m": "6", "y_m": 0')
    writeFileSync(at('in.json'), text)
    const faults = await refused('exchange/import', { from: at('in.json'), to: at('p.levelstead') })
    expect(faults.map(({ code, place }) => `${code} ${place.path}`)).toEqual([
      'number.quoted supports[1].x_m',
      'number.low sections[0].E_GPa',
    ])
    expect(existsSync(at('p.levelstead'))).toBe(false)
  })

  it('is not imported over a file that is there, and the project that was open stays open', async () => {
    const { ask, at, refused } = desk()
    writeFileSync(at('in.json'), writeBuilding(smallBuilding()))
    writeFileSync(at('p.levelstead'), 'mine')
    await ask('project/example', { path: at('example.levelstead') })
    expect(await refused('exchange/import', { from: at('in.json'), to: at('p.levelstead') })).toMatchObject([
      { code: 'file.exists', place: { file: at('p.levelstead') } },
    ])
    expect(readFileSync(at('p.levelstead'), 'utf8')).toBe('mine')
    expect((await ask('project/view', {}))!.path).toBe(at('example.levelstead'))
  })

  it('is not exported over anything, least of all over the project itself', async () => {
    const { ask, at, refused } = desk()
    const path = at('example.levelstead')
    await ask('project/example', { path })
    const before = readFileSync(path)
    expect((await refused('exchange/export', { to: path }))[0]!.code).toBe('file.exists')
    expect((await refused('exchange/export', { to: path, replace: true }))[0]!.code).toBe('file.exists')
    expect((await refused('exchange/export', { to: at('nowhere/b.json') }))[0]!.code).toBe('folder.missing')
    expect(readFileSync(path).equals(before)).toBe(true)
  })

  it('takes the place of an earlier building file where that is asked for, and of nothing else', async () => {
    const { ask, at, edit, refused } = desk()
    await ask('project/example', { path: at('example.levelstead') })
    await ask('exchange/export', { to: at('out.json') })
    const building = await edit((b) => moveSupport(b, 'A1', { base_m: -3 }))
    expect((await refused('exchange/export', { to: at('out.json') }))[0]!.code).toBe('file.exists')
    await ask('exchange/export', { to: at('out.json'), replace: true })
    expect(readFileSync(at('out.json'), 'utf8')).toBe(writeBuilding(building))
    for (const held of ['%PDF-1.7 issued', '{ "format": "levelstead-findings" }', 'round,date,point']) {
      writeFileSync(at('held'), held)
      expect((await refused('exchange/export', { to: at('held'), replace: true }))[0]!.code, held).toBe('file.exists')
      expect(readFileSync(at('held'), 'utf8')).toBe(held)
    }
    writeFileSync(at('empty'), '')
    await ask('exchange/export', { to: at('empty'), replace: true })
    expect(readFileSync(at('empty'), 'utf8')).toBe(writeBuilding(building))
  })

  it('says what is unfinished, since such a file cannot be imported yet', async () => {
    const { ask, at } = desk()
    await ask('project/new', { path: at('p.levelstead'), name: 'Store' })
    await ask('describe/edit', {
      what: 'Begin a line',
      changes: [
        { kind: 'line', id: 'A', before: null, after: { id: 'A' } },
        { kind: 'node', line: 'A', id: 'a', before: null, after: { id: 'a', x_m: 0, z_m: 0 } },
      ],
    })
    const { unfinished } = await ask('exchange/export', { to: at('p.json') })
    expect(unfinished.map((fault) => fault.code)).toEqual(['line.unsupported'])
  })
})

describe('the readings of a project', () => {
  it('come out as tables that another project takes back: books in one, given levels in another beside it', async () => {
    const { ask, at } = desk()
    await ask('project/example', { path: at('example.levelstead') })
    const levels = [{ point: 'S-A1', level_m: 42.7, sd_mm: 0.3 }]
    await ask('rounds/draft', { id: 'R7', date: '2026-12-14', levels })
    await ask('rounds/accept', { round: 'R7' })
    const { building } = (await ask('project/view', {}))!
    const { written } = await ask('exchange/readings', { to: at('visits.csv') })
    expect(written).toEqual([at('visits.csv'), at('visits, levels.csv')])
    const bare = { ...building, survey: { points: building.survey.points, rounds: [] } }
    const [books, given] = written.map((path) => readReadings(readFileSync(path), bare, path).rounds)
    const rows = (rounds: readonly Round[]) =>
      rounds.map(({ id, date, book, levels }) => [id, date, book?.rows ?? levels])
    expect(rows(books!)).toEqual(rows(building.survey.rounds.slice(0, 7)))
    expect(rows(given!)).toEqual([['R7', '2026-12-14', levels]])
  })

  it('are not written where there are none, nor over anything', async () => {
    const { ask, at, refused } = desk()
    await ask('project/new', { path: at('p.levelstead'), name: 'Store' })
    expect((await refused('exchange/readings', { to: at('r.csv') }))[0]!.code).toBe('rounds.none')
    await ask('project/example', { path: at('x.levelstead') })
    await ask('exchange/readings', { to: at('r.csv') })
    expect((await refused('exchange/readings', { to: at('r.csv') }))[0]!.code).toBe('file.exists')
  })
})

describe('a readings table', () => {
  async function withTable(table: string) {
    const made = desk()
    await made.ask('project/new', { path: made.at('p.levelstead'), name: 'Store' })
    const { survey } = smallBuilding()
    const building = { ...smallBuilding(), survey: { points: survey.points, rounds: [] } }
    writeFileSync(made.at('in.json'), writeBuilding(building))
    await made.ask('exchange/import', { from: made.at('in.json'), to: made.at('store.levelstead') })
    writeFileSync(made.at('t.csv'), table)
    return { ...made, from: made.at('t.csv') }
  }

  const TWO = 'round,date,point,level_m,sd_mm\nR0,2026-03-02,S-A1,10.1,0.3\nR1,2026-04-02,S-A1,10.099,0.3\n'

  it('adds its rounds, accepted, and the first of them is the baseline', async () => {
    const { ask, from } = await withTable(TWO)
    expect(await ask('exchange/log', { from })).toMatchObject({ added: ['R0', 'R1'] })
    const { building, rounds } = (await ask('project/view', {}))!
    expect(building.survey.baseline).toBe('R0')
    expect(rounds.map((r) => r.state)).toEqual(['accepted', 'accepted'])
  })

  it('adds none of its rounds where one of them is there already', async () => {
    const { ask, from, refused } = await withTable(TWO)
    await ask('exchange/log', { from })
    const before = await ask('project/view', {})
    expect((await refused('exchange/log', { from })).map((f) => f.code)).toEqual(['round.present', 'round.present'])
    expect(await ask('project/view', {})).toEqual(before)
  })

  it('does not take the place of a draft of the same name', async () => {
    const { ask, from, refused } = await withTable(TWO)
    const draft = { id: 'R1', date: '2026-04-02', levels: [{ point: 'S-A1', level_m: 10.05 }] }
    await ask('rounds/draft', draft)
    expect(await refused('exchange/log', { from })).toMatchObject([
      { code: 'draft.present', place: { file: from, value: 'R1' } },
    ])
    expect((await ask('project/view', {}))!.rounds).toEqual([{ ...draft, state: 'draft', version: 1 }])
  })

  it('with a book that ties to no benchmark is refused by round and points, and nothing is added', async () => {
    const { ask, from, refused } = await withTable(
      'round,date,point,back_m,mid_m,fore_m,sight_m\nR0,2026-03-02,TP1,1.2,,,20\nR0,2026-03-02,S-A1,,1.1,,20\nR0,2026-03-02,TP1,,,1.2,20\n',
    )
    expect(await refused('exchange/log', { from })).toMatchObject([
      { code: 'round.untied', place: { file: from, path: 'round R0' } },
    ])
    expect((await ask('project/view', {}))!.rounds).toEqual([])
  })
})
