/** Projects through dispatch: made, opened, copied, closed; edits taken back; findings kept. */
import { readFileSync, writeFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { addSupport, moveSupport } from '../../../app/model/edits/supports.ts'
import { emptyBuilding } from '../../../app/model/building.ts'
import { exampleBuilding } from '../../../app/usecases/example-building.ts'
import { connect } from '../../../db/connection.ts'
import { desk } from '../../support/desk.ts'

describe('a project', () => {
  it('begins empty, under a name that says something', async () => {
    const { ask, at, refused } = desk()
    expect((await refused('project/new', { path: at('a.levelstead'), name: '  ' }))[0]!.code).toBe('name.empty')
    const view = await ask('project/new', { path: at('a.levelstead'), name: 'Mill' })
    expect(view.building).toEqual(emptyBuilding('Mill'))
  })

  it('that cannot be opened leaves the one that is open as it is', async () => {
    const { ask, at, refused } = desk()
    const before = await ask('project/example', { path: at('example.levelstead') })
    writeFileSync(at('other.levelstead'), 'no project')
    expect((await refused('project/open', { path: at('other.levelstead') }))[0]!.code).toBe('project.foreign')
    expect(await ask('project/view', {})).toEqual(before)
  })

  it('goes on as its duplicate, and the first stays as it was', async () => {
    const { ask, at, edit } = desk()
    await ask('project/example', { path: at('one.levelstead') })
    const { path } = await ask('project/duplicate', { path: at('two.levelstead') })
    expect(path).toBe(at('two.levelstead'))
    await edit((b) => moveSupport(b, 'A1', { base_m: -3 }))
    expect((await ask('project/open', { path: at('one.levelstead') })).building).toEqual(exampleBuilding())
  })

  it('holds the example as the example is, all its rounds accepted', async () => {
    const { ask, at } = desk()
    const { building, rounds } = await ask('project/example', { path: at('example.levelstead') })
    expect(building).toEqual(exampleBuilding())
    expect(new Set(rounds.map((r) => r.state))).toEqual(new Set(['accepted']))
  })

  it('must be open for whatever is asked of one', async () => {
    const { refused } = desk()
    const asked = [
      ['project/undo', {}],
      ['describe/edit', { what: 'x', changes: [] }],
      ['assess/findings', {}],
      ['report/register', {}],
      ['exchange/export', { to: '/nowhere/x' }],
    ] as const
    for (const [name, input] of asked)
      expect(await refused(name, input), name).toEqual([{ code: 'project.none', place: {} }])
  })
})

describe('an edit', () => {
  it('counts the revision up, and is taken back and done again by name', async () => {
    const { ask, at, edit, refused } = desk()
    const first = await ask('project/example', { path: at('example.levelstead') })
    const moved = await edit((b) => moveSupport(b, 'A1', { base_m: -3 }))
    const after = (await ask('project/view', {}))!
    expect([after.undo, after.redo]).toEqual(['Set base level of A1', null])
    expect(after.revision).toBeGreaterThan(first.revision)
    const undone = await ask('project/undo', {})
    expect([undone.building, undone.undo, undone.redo]).toEqual([first.building, null, 'Set base level of A1'])
    expect((await ask('project/redo', {})).building).toEqual(moved)
    expect(await refused('project/redo', {})).toEqual([{ code: 'edit.none', place: { value: 'redo' } }])
  })

  it('that was made of the building as it no longer is, is refused', async () => {
    const { ask, at, edit, refused } = desk()
    const { building } = await ask('project/example', { path: at('example.levelstead') })
    const stale = moveSupport(building, 'A1', { base_m: -5 })
    await edit((b) => moveSupport(b, 'A1', { base_m: -3 }))
    expect(await refused('describe/edit', stale)).toMatchObject([
      { code: 'change.unfit', place: { element: { kind: 'support', id: 'A1' } } },
    ])
  })

  it('that says what no building file may say is refused with the faults of the file', async () => {
    const { ask, at, refused } = desk()
    await ask('project/new', { path: at('a.levelstead'), name: 'Mill' })
    const { changes } = addSupport(emptyBuilding('Mill'), { id: 'A1', x_m: 0, y_m: 0 })
    const after = { id: 'A1', x_m: 'far', y_m: 1e999, z_m: 3 }
    const faults = await refused('describe/edit', { what: 'x', changes: [{ ...changes[0]!, after }] })
    expect(faults.map((f) => f.code).toSorted()).toEqual(['key.unknown', 'number.infinite', 'number.quoted'])
    expect((await ask('project/view', {}))!.building.supports).toEqual([])
  })
})

describe('findings', () => {
  it('are kept by what they are made from, and found anew once that changes', async () => {
    let assessed = 0
    const { ask, at, edit } = desk({
      progress: (_done, _of, what) => void (assessed += what.startsWith('Round') ? 1 : 0),
    })
    const path = at('example.levelstead')
    await ask('project/example', { path })
    const found = await ask('assess/findings', {})
    expect(assessed).toBeGreaterThan(0)
    assessed = 0
    expect(await ask('assess/findings', {})).toEqual(found)
    await ask('project/open', { path })
    expect(await ask('assess/findings', {})).toEqual(found)
    expect(assessed, 'assessed again although nothing had changed').toBe(0)
    await edit((b) => moveSupport(b, 'B4', { x_m: 21 }))
    expect(await ask('assess/findings', {})).not.toEqual(found)
    expect(assessed).toBeGreaterThan(0)
  })

  it('are given all the same where they cannot be kept', async () => {
    const { ask, at, context } = desk()
    const path = at('example.levelstead')
    await ask('project/example', { path })
    context.session.project!.close()
    context.session.project = (await import('../../../db/projects.ts')).projects(context.clock.now, 50).open(path)
    const other = connect(path)
    other.exec('BEGIN IMMEDIATE')
    expect((await ask('assess/findings', {})).rounds).toHaveLength(6)
    other.close()
  })

  it('stop between rounds when nobody waits for them, and keep nothing half', async () => {
    const signal = { aborted: false }
    const { ask, at, refused } = desk({ signal, progress: (done) => void (signal.aborted = done >= 2) })
    await ask('project/example', { path: at('example.levelstead') })
    expect((await refused('assess/findings', {}))[0]!.code).toBe('work.stopped')
    const size = readFileSync(at('example.levelstead')).length
    expect(size).toBeGreaterThan(0)
    const db = connect(at('example.levelstead'), { readonly: true })
    expect(db.prepare('SELECT count(*) FROM kept_findings').pluck().get()).toBe(0)
    db.close()
  })

  it('of a round that is not accepted, or not there, are refused by its name', async () => {
    const { ask, at, refused } = desk()
    await ask('project/example', { path: at('example.levelstead') })
    await ask('rounds/draft', { id: 'R7', date: '' })
    expect(await refused('assess/findings', { round: 'R7' })).toMatchObject([{ code: 'round.draft' }])
    expect(await refused('assess/findings', { round: 'R8' })).toMatchObject([{ code: 'round.unknown' }])
  })
})

describe('what needs no project', () => {
  it('is answered without one', async () => {
    const { ask, at } = desk()
    expect(await ask('about/view', {})).toMatchObject({ version: '0', shell: 'command line', opened: null })
    writeFileSync(at('a.building.json'), '{}')
    expect(await ask('files/list', { folder: at('.') })).toMatchObject({ folders: [], files: ['a.building.json'] })
    const checks = await ask('verify/run', {})
    expect(checks.length).toBeGreaterThan(10)
    expect(checks.filter((row) => !row.agrees)).toEqual([])
  })
})
