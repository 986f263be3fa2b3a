/** Copies of a project: when one is made, which stay, and that each is a project to go back to. */
import { readdirSync, writeFileSync } from 'node:fs'
import { basename, join } from 'node:path'
import { describe, expect, it, vi } from 'vitest'
import { connect } from '../../db/connection.ts'
import { copiesFolder, copiesOf, copyTo, keptCopies } from '../../db/copies.ts'
import { projects } from '../../db/projects.ts'
import { codesBy, madeProject, opened, temporary, WHO } from '../support/opened.ts'

function copyPath(path: string, name: string): string {
  return join(copiesFolder(path), name)
}

describe('a copy of a project', () => {
  it('is made on its first opening of a day, and on no other of that day', () => {
    const path = madeProject()
    opened(path, '2026-05-04T16:00:00Z').close()
    expect(copiesOf(path), 'a project of that day has nothing yet to copy').toEqual([])
    for (const at of ['2026-05-05T08:30:15Z', '2026-05-05T11:00:00Z', '2026-05-07T09:00:00Z']) opened(path, at).close()
    expect(copiesOf(path)).toEqual(['2026-05-07 090000.levelstead', '2026-05-05 083015.levelstead'])
    expect(basename(copiesFolder(path))).toBe('store.copies')
  })

  it('is a project as it was then, to be opened as it is', () => {
    const path = madeProject()
    const then = opened(path, '2026-05-05T08:00:00Z')
    const building = then.read.building()
    const head = { name: building.name }
    then.write((store) =>
      store.edit({ what: 'x', changes: [{ kind: 'head', before: head, after: { name: 'B' } }] }, WHO, 'w'),
    )
    then.close()
    const [name] = copiesOf(path)
    expect(opened(copyPath(path, name!), '2026-05-05T09:00:00Z').read.building()).toEqual(building)
    expect(opened(path, '2026-05-05T09:00:00Z').read.building().name).toBe('B')
  })

  it('that cannot be made keeps nobody from the project, and is said', async () => {
    const path = madeProject()
    writeFileSync(copiesFolder(path), 'in the way')
    const warned = vi.spyOn(process, 'emitWarning').mockImplementation(() => undefined)
    try {
      expect(opened(path, '2026-05-05T08:00:00Z').read.building().name).toBe('Lime Kiln Lane, store')
      expect(warned).toHaveBeenCalledWith(expect.stringContaining(`No copy of ${path} was made today`), {
        code: 'LEVELSTEAD_COPY',
      })
    } finally {
      warned.mockRestore()
    }
  })

  it('that was cut short has no copy’s name, and is made anew', () => {
    const path = madeProject()
    opened(path, '2026-05-05T08:00:00Z').close()
    writeFileSync(copyPath(path, '2026-05-06 071500.levelstead.part'), 'half a copy')
    expect(copiesOf(path)).toEqual(['2026-05-05 080000.levelstead'])
    opened(path, '2026-05-06T08:00:00Z').close()
    expect(readdirSync(copiesFolder(path)).sort()).toEqual([
      '2026-05-05 080000.levelstead',
      '2026-05-06 080000.levelstead',
    ])
    opened(copyPath(path, '2026-05-06 080000.levelstead'), '2026-05-06T09:00:00Z')
  })

  it('that fails leaves nothing behind', () => {
    const path = madeProject()
    const target = join(temporary('no-such-folder'), 'copy.levelstead')
    const db = connect(path)
    expect(() => copyTo(db, target)).toThrow('unable to open database')
    db.close()
  })
})

describe('the copies that stay', () => {
  it('are ten: three of the latest day, one of each day before', () => {
    const names = [
      ...['2026-05-20 17', '2026-05-20 12', '2026-05-20 09', '2026-05-20 08'],
      ...['2026-05-19 15', '2026-05-19 08'],
      ...Array.from({ length: 9 }, (_, i) => `2026-05-0${9 - i} 10`),
    ]
    expect([...keptCopies(names)]).toEqual([
      ...['2026-05-20 17', '2026-05-20 12', '2026-05-20 09', '2026-05-19 15'],
      ...['2026-05-09 10', '2026-05-08 10', '2026-05-07 10', '2026-05-06 10', '2026-05-05 10', '2026-05-04 10'],
    ])
  })

  it('are ten after a month of openings, and those from before a new schema besides', () => {
    const path = madeProject()
    opened(path, '2026-05-05T08:00:00Z').close()
    const before = '2026-05-05 080000 before 0020.levelstead'
    writeFileSync(copyPath(path, before), 'of an older schema')
    for (let day = 6; day <= 30; day++) opened(path, `2026-05-${String(day).padStart(2, '0')}T08:00:00Z`).close()
    const copies = copiesOf(path)
    expect(copies).toHaveLength(11)
    expect([copies[0], copies.at(-2), copies.at(-1)]).toEqual([
      '2026-05-30 080000.levelstead',
      '2026-05-21 080000.levelstead',
      before,
    ])
  })
})

describe('a duplicate', () => {
  it('holds everything, goes its own way, and writes over nothing', () => {
    const project = opened(madeProject())
    const path = temporary('second.levelstead')
    projects().duplicate(project, path)
    const second = opened(path)
    expect(second.read.building()).toEqual(project.read.building())
    second.write((store) => store.putDraft({ id: 'R9', date: '' }, 'w'))
    expect([second.read.rounds().length, project.read.rounds().length]).toEqual([3, 2])
    expect(codesBy(() => projects().duplicate(project, path))).toEqual(['file.exists'])
  })
})
