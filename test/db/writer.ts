/**
 * A program of its own that writes to a project and is killed while it does; test/db/durable.test.ts starts it. It
 * says on its output how far it has come, and then does not end by itself.
 */
import { writeSync } from 'node:fs'
import { connect } from '../../db/connection.ts'
import { projects } from '../../db/projects.ts'
import { smallBuilding } from '../support/made.ts'

const WHEN = '2026-05-04T08:30:00Z'
const [path, doing] = process.argv.slice(2) as [string, string]

function say(word: string): void {
  writeSync(1, `${word}\n`)
}

/** Holds still where it is, in the midst of whatever it was doing, until it is killed. */
function holdStill(): never {
  say('held')
  Atomics.wait(new Int32Array(new SharedArrayBuffer(4)), 0, 0)
  throw new Error('It was to be killed.')
}

const WRITERS: Record<string, () => void> = {
  /** Within the transaction of a use case, several statements done. */
  'mid-edit'() {
    const project = projects(() => WHEN).open(path)
    project.write((store) => {
      const [support] = store.building().supports
      const after = { ...support!, x_m: -9 }
      store.edit({ what: 'Move', changes: [{ kind: 'support', id: support!.id, before: support!, after }] }, 'w', WHEN)
      store.putDraft({ id: 'R9', date: '2026-05-04' }, WHEN)
      holdStill()
    })
  },
  /** As above, with so small a cache that half of the new pages stand in the file already. */
  'mid-file'() {
    const db = connect(path)
    db.pragma('cache_size = 2')
    db.exec('BEGIN IMMEDIATE')
    const insert = db.prepare("INSERT INTO journal (at, who, what) VALUES ('', 'w', ?)")
    for (let i = 0; i < 500; i++) insert.run('x'.repeat(1000))
    db.exec("UPDATE project SET name = 'Half written'")
    holdStill()
  },
  /** While a new project is made. */
  'mid-making'() {
    const building = smallBuilding()
    const rounds = building.survey.rounds.map((round) => ({
      ...round,
      get levels(): never {
        return holdStill()
      },
    }))
    projects(() => WHEN).create(path, building, rounds, 'w', WHEN)
  },
  /** Draft after draft, each said once it is stored. */
  typing() {
    const project = projects(() => WHEN).open(path)
    for (let row = 1; ; row++) {
      const rows = Array.from({ length: row }, (_, i) => ({ point: `TP${i}`, mid_m: 1 }))
      project.write((store) => store.putDraft({ id: 'R9', date: '2026-05-04', book: { rows } }, WHEN))
      say(String(row))
    }
  },
}

WRITERS[doing]!()
