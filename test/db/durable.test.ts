/** Nothing that was stored is lost, and nothing half stored is ever seen: kill, full disk, damage, locks. */
import { spawn, spawnSync } from 'node:child_process'
import { existsSync, mkdirSync, readFileSync, readdirSync, statSync, truncateSync, writeFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { connect } from '../../db/connection.ts'
import { copiesFolder } from '../../db/copies.ts'
import { projects } from '../../db/projects.ts'
import { onFile } from '../../db/sqlite-faults.ts'
import { smallBuilding } from '../support/made.ts'
import { codesBy, faultsBy, madeProject, opened, temporary, WHEN, WHO } from '../support/opened.ts'

const WRITER = new URL('writer.ts', import.meta.url).pathname

/** Runs the writer until it says the word, kills it, and gives everything that it had said by then. */
function killedAt(path: string, doing: string, word: string): Promise<string[]> {
  const child = spawn(process.execPath, [WRITER, path, doing], { stdio: ['ignore', 'pipe', 'pipe'] })
  let said = ''
  let wrong = ''
  child.stderr.on('data', (bytes: Buffer) => (wrong += bytes.toString()))
  child.stdout.on('data', (bytes: Buffer) => {
    said += bytes.toString()
    if (said.split('\n').includes(word)) child.kill('SIGKILL')
  })
  return new Promise((done, fail) => {
    child.on('close', (code, signal) => {
      if (signal === 'SIGKILL') done(said.trim().split('\n'))
      else fail(new Error(`The writer ended by itself (${code}): ${wrong}`))
    })
  })
}

describe('a program that is killed', () => {
  it('in the midst of an edit leaves the project as it was before', async () => {
    const path = madeProject()
    await killedAt(path, 'mid-edit', 'held')
    const { read } = opened(path)
    expect(read.building()).toEqual(smallBuilding())
    expect([read.undoName(), read.rounds().filter((round) => round.state === 'draft')]).toEqual([null, []])
  })

  it('with half of its pages in the file leaves the project as it was before', async () => {
    const path = madeProject()
    const before = readFileSync(path)
    await killedAt(path, 'mid-file', 'held')
    expect(readFileSync(path).equals(before), 'the file holds half a transaction').toBe(false)
    expect(existsSync(`${path}-journal`)).toBe(true)
    expect(opened(path).read.building()).toEqual(smallBuilding())
    expect(readFileSync(path).equals(before)).toBe(true)
  })

  it('while a project is made leaves no project, and does not stand in the way of the next', async () => {
    const path = temporary()
    await killedAt(path, 'mid-making', 'held')
    expect(existsSync(path)).toBe(false)
    const building = smallBuilding()
    projects(() => WHEN).create(path, building, building.survey.rounds, WHO, WHEN)
    expect(opened(path).read.building()).toEqual(building)
  })

  it('while a round is typed loses no row that it had stored', async () => {
    const path = madeProject()
    const said = await killedAt(path, 'typing', '12')
    const stored = opened(path)
      .read.rounds()
      .find((round) => round.id === 'R9')!.book!.rows.length
    expect(stored).toBeGreaterThanOrEqual(Number(said.at(-1)))
  })
})

const canMount = process.platform === 'linux' && spawnSync('unshare', ['-m', 'true']).status === 0

/** What a script says that runs where a disk has been made of the folder, in a mount space of its own. */
function mountedRun(script: string, folder: string, make: string, alone = true): unknown {
  const shell = ['sh', '-c', `${make} && exec "$2" "$3" "$1"`, 'sh']
  const words = [...shell, folder, process.execPath, new URL(script, import.meta.url).pathname]
  const [program, ...rest] = alone ? ['unshare', '-m', ...words] : words
  const { stdout, stderr } = spawnSync(program!, rest, { encoding: 'utf8' })
  spawnSync('chmod', ['0755', folder])
  expect(stderr).toBe('')
  return JSON.parse(stdout)
}

describe('a full disk', () => {
  it('is a fault, and the project stays as it was', () => {
    const path = madeProject()
    const db = connect(path)
    db.pragma(`max_page_count = ${db.pragma('page_count', { simple: true }) as number}`)
    const fill = db.transaction(() => {
      for (let i = 0; i < 100; i++)
        db.prepare("INSERT INTO journal (at, who, what) VALUES ('', '', ?)").run('x'.repeat(5000))
    })
    expect(codesBy(() => onFile(path, 'writing', () => fill.immediate()))).toEqual(['disk.full'])
    db.close()
    expect(opened(path).read.building()).toEqual(smallBuilding())
  })

  // A disk of 300 kB can be had by the superuser of Linux alone.
  it.runIf(canMount)('takes no new project and no long draft, and keeps what it holds', () => {
    const folder = dirname(temporary())
    expect(mountedRun('full-disk.ts', folder, 'mount -t tmpfs -o size=300k none "$1"')).toEqual({
      draft: 'disk.full',
      making: 'disk.full',
      duplicating: 'disk.full',
      left: ['store.levelstead'],
      name: smallBuilding().name,
      drafts: 0,
    })
  })
})

describe('a file that may not be written to', () => {
  // The superuser writes whatever the file's permissions are, but not on a disk that takes nothing.
  const isSuperuser = process.getuid?.() === 0
  it.runIf(canMount || !isSuperuser)('opens for reading, says so, and refuses every write', () => {
    const folder = dirname(madeProject())
    const seen = isSuperuser
      ? mountedRun('read-only.ts', folder, 'mount --bind "$1" "$1" && mount -o remount,ro,bind "$1"')
      : mountedRun('read-only.ts', folder, 'chmod 0555 "$1"', false)
    expect(seen).toEqual({
      readOnly: true,
      name: smallBuilding().name,
      edit: 'file.unwritable',
      making: 'file.unwritable',
      left: ['store.levelstead'],
    })
  })
})

describe('a damaged file', () => {
  it('that is cut short anywhere is named as damaged or as none of ours, and left alone', () => {
    const whole = statSync(madeProject()).size
    for (const size of [1, 15, 50, 99, 100, 512, 4096, 5000, Math.floor(whole / 2), whole - 4096, whole - 1]) {
      const path = madeProject()
      truncateSync(path, size)
      const before = readFileSync(path)
      const [code] = codesBy(() => projects(() => WHEN).open(path))
      expect(code, `cut to ${size} bytes`).toBe(size < 15 ? 'project.foreign' : 'project.damaged')
      expect(readFileSync(path).equals(before)).toBe(true)
    }
  })

  it('with a page of noise is refused, and the copies there are named', () => {
    const path = madeProject()
    opened(path, '2026-05-05T08:30:00Z').close()
    const bytes = readFileSync(path)
    bytes.fill(0xa5, 4096, 3 * 4096)
    writeFileSync(path, bytes)
    expect(faultsBy(() => projects().open(path))).toMatchObject([
      { code: 'project.damaged', place: { file: path, detail: { copies: copiesFolder(path) } } },
    ])
    expect(readFileSync(path).equals(bytes)).toBe(true)
  })

  it('that has lost a table, or its building, is damaged and no fault of the program', () => {
    for (const sql of ['DROP TABLE kept_findings', 'DELETE FROM project', 'ALTER TABLE support DROP COLUMN base_m']) {
      const path = madeProject()
      connect(path).exec(sql).close()
      expect(
        codesBy(() => projects(() => WHEN).open(path)),
        sql,
      ).toEqual(['project.damaged'])
    }
  })
})

describe('a file that another program holds', () => {
  it('for itself alone is busy, not damaged', () => {
    const path = madeProject()
    const other = connect(path)
    other.exec('BEGIN EXCLUSIVE')
    expect(codesBy(() => projects(() => WHEN, 50).open(path))).toEqual(['file.busy'])
    other.close()
    expect(opened(path).read.building()).toEqual(smallBuilding())
  })

  it('can be read while the other writes, and says that it is busy where both would', () => {
    const path = madeProject()
    const project = opened(path, WHEN, 50)
    const other = connect(path)
    other.exec("BEGIN IMMEDIATE; UPDATE project SET name = 'Another'")
    expect(project.read.building().name).toBe(smallBuilding().name)
    expect(codesBy(() => project.write((store) => store.putDraft({ id: 'R9', date: '' }, WHEN)))).toEqual(['file.busy'])
    other.exec('COMMIT')
    other.close()
  })

  it('is busy to a project that was open before, too', () => {
    const path = madeProject()
    const project = opened(path, WHEN, 50)
    const other = connect(path)
    other.exec('BEGIN EXCLUSIVE')
    expect(codesBy(() => project.read.rounds())).toEqual(['file.busy'])
    other.close()
    expect(project.read.rounds()).toHaveLength(2)
  })

  it('and has changed shows what it holds now', () => {
    const path = madeProject()
    const [one, other] = [opened(path), opened(path)]
    one.read.building()
    other.write((store) =>
      store.edit(
        { what: 'Rename', changes: [{ kind: 'head', before: { name: '' }, after: { name: 'Another' } }] },
        WHO,
        WHEN,
      ),
    )
    expect(one.read.building().name).toBe('Another')
  })
})

describe('making a project', () => {
  it('writes over nothing, and leaves nothing where it cannot be made', () => {
    const taken = madeProject()
    const before = readFileSync(taken)
    const building = smallBuilding()
    function make(path: string): () => void {
      return () => projects().create(path, building, building.survey.rounds, WHO, WHEN)
    }
    expect(codesBy(make(taken))).toEqual(['file.exists'])
    expect(readFileSync(taken).equals(before)).toBe(true)
    expect(codesBy(make(join(dirname(taken), 'nowhere', 'a.levelstead')))).toEqual(['folder.missing'])
    expect(codesBy(make(join(taken, 'a.levelstead')))).toEqual(['folder.missing'])
    expect(codesBy(make(join(dirname(taken), `${'long'.repeat(80)}.levelstead`)))).toEqual(['file.unwritable'])
    mkdirSync(join(dirname(taken), 'folder.levelstead'))
    expect(codesBy(make(join(dirname(taken), 'folder.levelstead')))).toEqual(['file.exists'])
    const twice = { ...building.survey.rounds[0]!, id: 'R1' }
    const clash = temporary()
    expect(() => projects().create(clash, building, [...building.survey.rounds, twice], WHO, WHEN)).toThrow()
    expect([readdirSync(dirname(clash)), readdirSync(dirname(taken))]).toEqual([
      [],
      ['folder.levelstead', 'store.levelstead'],
    ])
  })

  // No user, not even the superuser, can make a file in Linux' own folder of processes.
  it.runIf(process.platform === 'linux')('in a folder that takes no files is a fault of that file', () => {
    const building = smallBuilding()
    expect(faultsBy(() => projects().create('/proc/a.levelstead', building, [], WHO, WHEN))).toMatchObject([
      { code: 'file.unwritable', place: { file: '/proc/a.levelstead' } },
    ])
  })
})
