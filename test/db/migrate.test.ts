import { createHash } from 'node:crypto'
import { existsSync, readFileSync, readdirSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { APPLICATION_ID, connect, type Connection } from '../../db/connection.ts'
import { copiesFolder, copiesOf } from '../../db/copies.ts'
import { LATEST, migrate, schemaOf, STEPS } from '../../db/migrate.ts'
import { projects } from '../../db/projects.ts'
import { writeBuilding } from '../../app/model/write-building.ts'
import { codesBy, copied, faultsBy, madeProject, opened, temporary, WHEN } from '../support/opened.ts'

const CASES = new URL('cases/', import.meta.url)
const MIGRATIONS = new URL('../../db/migrations/', import.meta.url)

/** A published step is never edited, only followed: its hash stays. */
const PUBLISHED: Record<string, string> = {
  '0010-first.ts': '9ee9ba7705a232084045172428d0a1b516d207c2ab2ccf7af02c97f0d9a2a98b',
  '0020-replace.ts': '2d4e969844498a588a69a65b7b01e5035f013d05f0b56b40e09b999e9b1b6fe4',
  '0030-released.ts': '0352f10b2ff71ae27f52c5e37752be25e9495640a656c4e88ec433939f2274d0',
  '0040-collimation.ts': '496eebe87af41849c035d51b7733546a5006c142f8b2e8d17e74e2c821d7ac8a',
}

function schemaText(db: Connection): unknown[] {
  return db.prepare('SELECT type, name, tbl_name, sql FROM sqlite_schema ORDER BY type, name').all()
}

function inspected<T>(path: string, look: (db: Connection) => T): T {
  const db = connect(path, { readonly: true })
  try {
    return look(db)
  } finally {
    db.close()
  }
}

function keptFile(name: string): string {
  return new URL(name, CASES).pathname
}

describe('the steps of the schema', () => {
  it('are numbered by tens, each above the one before', () => {
    const numbers = STEPS.map((step) => step.number)
    expect(numbers).toEqual([...new Set(numbers)].toSorted((a, b) => a - b))
    expect(numbers.every((number) => number > 0 && number % 10 === 0)).toBe(true)
    expect(LATEST).toBe(numbers.at(-1))
  })

  it('stay as they were published', () => {
    const files = readdirSync(MIGRATIONS).map((name) => [
      name,
      createHash('sha256')
        .update(readFileSync(new URL(name, MIGRATIONS)))
        .digest('hex'),
    ])
    expect(Object.fromEntries(files)).toEqual(PUBLISHED)
    expect(files.map(([name]) => Number(name!.slice(0, 4)))).toEqual(STEPS.map((step) => step.number))
  })

  it('mark a new file as ours, with the schema it has', () => {
    inspected(madeProject(), (db) => {
      expect(db.pragma('application_id', { simple: true })).toBe(APPLICATION_ID)
      expect(schemaOf(db)).toBe(LATEST)
      expect(db.pragma('journal_mode', { simple: true })).toBe('delete')
    })
  })

  it('leave a file as it was where one of them fails', () => {
    const path = copied(keptFile('schema-10.levelstead'))
    const before = readFileSync(path)
    const db = connect(path)
    const failing = [
      ...STEPS,
      { number: LATEST + 10, up: (to: Connection) => void to.exec('DROP TABLE journal; SELECT * FROM nowhere') },
    ]
    expect(() => migrate(db, failing)).toThrow('no such table: nowhere')
    db.close()
    expect(readFileSync(path).equals(before)).toBe(true)
    expect(opened(path).read.undoName()).toBe('Move support A1')
  })

  it('are refused where they leave a reference open', () => {
    const db = connect(madeProject())
    const step = { number: LATEST + 10, up: (to: Connection) => void to.exec("DELETE FROM section WHERE id = 'beam'") }
    expect(() => migrate(db, [...STEPS, step])).toThrow('references are open')
    expect(schemaOf(db)).toBe(LATEST)
    db.close()
  })

  it('are not run twice where another program was faster', () => {
    const path = copied(keptFile('schema-10.levelstead'))
    const [one, other] = [connect(path), connect(path)]
    migrate(one)
    migrate(other)
    expect([schemaOf(one), schemaOf(other)]).toEqual([LATEST, LATEST])
    one.close()
    other.close()
  })
})

describe.each(['schema-10'])('a file of the older %s', (name) => {
  const kept = keptFile(`${name}.levelstead`)
  const number = Number(/\d+/.exec(name)![0])

  it('is kept as that version wrote it', () => {
    inspected(kept, (db) => expect(schemaOf(db)).toBe(number))
  })

  it('opens with everything in it', () => {
    const { read } = opened(copied(kept))
    expect(writeBuilding(read.building())).toBe(readFileSync(keptFile(`${name}.building.json`), 'utf8'))
    expect(read.rounds().map((r) => `${r.id} version ${r.version} ${r.state}`)).toEqual([
      'R0 version 1 superseded',
      'R0 version 2 accepted',
      'R1 version 1 accepted',
      'R2 version 1 draft',
    ])
    expect(read.rounds()[1]).toMatchObject({ reason: 'S-A1 was booked from the wrong line', observer: 'N. Reader' })
    expect([read.undoName(), read.redoName()]).toEqual(['Move support A1', 'Rename the building'])
    expect(read.register().map((r) => r.label)).toEqual(['LK-2/1 rev A'])
    expect(Buffer.from(read.pdf(1)!).toString()).toBe('%PDF-1.7 kept')
  })

  it('has the schema of a new file once it is opened', () => {
    const path = copied(kept)
    opened(path).close()
    const fresh = inspected(madeProject(), schemaText)
    expect(inspected(path, schemaText)).toEqual(fresh)
    expect(fresh.length).toBeGreaterThan(20)
  })

  it('leaves a copy of itself as it was, which opens too', () => {
    const path = copied(kept)
    opened(path).close()
    const copies = copiesOf(path)
    expect(copies).toEqual([`2026-05-04 083000 before ${String(LATEST).padStart(4, '0')}.levelstead`])
    const copy = `${copiesFolder(path)}/${copies[0]}`
    inspected(copy, (db) => expect(schemaOf(db)).toBe(number))
    expect(opened(copy).read.building()).toEqual(opened(path).read.building())
  })

  it('goes on being edited and taken back', () => {
    const project = opened(copied(kept))
    project.write((store) => store.undo('T. Tester', WHEN))
    expect(project.read.building().supports[0]).toMatchObject({ id: 'A1', y_m: 0 })
  })
})

describe('a file of a newer version', () => {
  function newer(): string {
    const path = madeProject()
    const db = connect(path)
    db.pragma(`user_version = ${LATEST + 10}`)
    db.close()
    return path
  }

  it('is refused by name and number, and left alone', () => {
    const path = newer()
    const before = readFileSync(path)
    expect(faultsBy(() => projects().open(path))).toEqual([
      { code: 'project.newer', place: { file: path, value: LATEST + 10, detail: { known: LATEST } } },
    ])
    expect(readFileSync(path).equals(before)).toBe(true)
    expect(existsSync(copiesFolder(path))).toBe(false)
  })
})

describe('what is no project', () => {
  it('is told from one by what it holds, not by its name', () => {
    const building = temporary('house.levelstead')
    const other = temporary('other.levelstead')
    connect(other, { mustExist: false }).exec('CREATE TABLE t (a)').close()
    expect(codesBy(() => projects().open(building))).toEqual(['file.missing'])
    expect(codesBy(() => projects().open(other))).toEqual(['project.foreign'])
    expect(codesBy(() => projects().open(keptFile('.')))).toEqual(['file.folder'])
    expect(faultsBy(() => projects().open(keptFile('schema-10.building.json')))).toMatchObject([
      { code: 'project.foreign', place: { detail: { isBuilding: 'yes' } } },
    ])
  })
})
