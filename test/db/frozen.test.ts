/** What is accepted, issued or journalled cannot be changed, by whatever program opens the file. */
import { describe, expect, it } from 'vitest'
import { connect, type Connection } from '../../db/connection.ts'
import { copied, opened } from '../support/opened.ts'

/** Holds round R0 superseded (key 1) and in force (key 3), R1 in force (key 2, a level book), R2 a draft (key 4). */
const KEPT = new URL('cases/schema-10.levelstead', import.meta.url).pathname

const ROUND = '(key, id, version, place, date, state, kind, accepted_at, accepted_by, saved_at)'
const ACCEPTED = "'2026-01-01', 'accepted', 'book', '2026-01-01', 'x', '2026-01-01'"
const DRAFT = "'2026-01-01', 'draft', NULL, NULL, NULL, '2026-01-01'"
const REPORT = `(number, label, round, issued_at, surveyed_by, assessed_by, reviewer, pages, sha256, pdf)`
const PDF = `'R1', '2026-01-01', '', '', '', 1, '${'0'.repeat(64)}', x'00'`

const ATTEMPTS: readonly (readonly [what: string, refusal: string, sql: string])[] = [
  ['altering a reading', 'reading.frozen', 'UPDATE reading SET back_m = 1 WHERE round = 2 AND row = 1'],
  ['taking a reading away', 'reading.frozen', 'DELETE FROM reading WHERE round = 2'],
  ['adding a reading', 'reading.frozen', "INSERT INTO reading (round, row, point, mid_m) VALUES (2, 99, 'S-A1', 1)"],
  [
    'replacing a reading',
    'reading.frozen',
    "INSERT OR REPLACE INTO reading (round, row, point, mid_m) VALUES (2, 2, 'S-A1', 1)",
  ],
  [
    'moving a reading of a draft over an accepted one',
    'reading.frozen',
    "INSERT INTO reading (round, row, point, mid_m) VALUES (4, 2, 'S-A1', 1); UPDATE OR REPLACE reading SET round = 2 WHERE round = 4",
  ],
  [
    'moving a reading of a draft into a superseded round',
    'reading.frozen',
    "INSERT INTO reading (round, row, point, mid_m) VALUES (4, 2, 'S-A1', 1); UPDATE reading SET round = 1 WHERE round = 4",
  ],
  ['altering a given level', 'reading.frozen', 'UPDATE given_level SET level_m = 0 WHERE round = 3'],
  ['altering a superseded level', 'reading.frozen', 'UPDATE given_level SET level_m = 0 WHERE round = 1'],
  ['taking a given level away', 'reading.frozen', 'DELETE FROM given_level'],
  ['adding a given level', 'reading.frozen', "INSERT INTO given_level VALUES (3, 99, 'S-A9', 10, 0.3)"],
  [
    'moving a level of a draft into a superseded round',
    'reading.frozen',
    "INSERT INTO given_level VALUES (4, 9, 'S-A9', 10, 0.3); UPDATE given_level SET round = 1 WHERE round = 4",
  ],
  ['dating a round anew', 'round.frozen', "UPDATE round SET date = '2026-01-01' WHERE key = 2"],
  ['making an accepted round a draft', 'round.frozen', "UPDATE round SET state = 'draft', draft = '{}' WHERE key = 2"],
  ['putting a superseded round in force', 'round.frozen', "UPDATE round SET state = 'accepted' WHERE key = 1"],
  ['altering the instrument', 'round.frozen', 'UPDATE round SET sd_mm_per_sqrt_km = 9 WHERE key = 2'],
  [
    'superseding and altering at once',
    'round.frozen',
    "UPDATE round SET state = 'superseded', note = 'x' WHERE key = 2",
  ],
  ['taking a round away', 'round.frozen', 'DELETE FROM round WHERE key = 2'],
  [
    'replacing a round by its key',
    'round.frozen',
    `INSERT OR REPLACE INTO round ${ROUND} VALUES (2, 'R1', 1, 1, ${DRAFT})`,
  ],
  [
    'replacing a round by its version',
    'round.frozen',
    `INSERT OR REPLACE INTO round ${ROUND} VALUES (NULL, 'R1', 1, 1, ${DRAFT})`,
  ],
  [
    'adding a round past its draft',
    'round.frozen',
    `INSERT INTO round ${ROUND} VALUES (NULL, 'R9', 1, 1, ${ACCEPTED})`,
  ],
  ['moving a draft over a round', 'round.frozen', 'UPDATE OR REPLACE round SET key = 2 WHERE key = 4'],
  [
    'giving a draft the name of a round',
    'round.frozen',
    "UPDATE OR REPLACE round SET id = 'R1', version = 1 WHERE key = 4",
  ],
  [
    'accepting a draft in the place of a round',
    'round.frozen',
    `UPDATE OR REPLACE round SET id = 'R1', version = 2, state = 'accepted', kind = 'book', draft = NULL, accepted_at = 'x' WHERE key = 4`,
  ],
  ['altering an issued report', 'report.frozen', "UPDATE report SET pdf = x'00'"],
  ['taking an issued report away', 'report.frozen', 'DELETE FROM report'],
  [
    'replacing a report by its number',
    'report.frozen',
    `INSERT OR REPLACE INTO report ${REPORT} VALUES (1, 'new', ${PDF})`,
  ],
  [
    'replacing a report by its label',
    'report.frozen',
    `INSERT OR REPLACE INTO report ${REPORT} VALUES (2, 'LK-2/1 rev A', ${PDF})`,
  ],
  ['altering the journal', 'journal.frozen', "UPDATE journal SET who = 'x'"],
  ['taking a line of the journal away', 'journal.frozen', 'DELETE FROM journal WHERE seq = 1'],
  [
    'replacing a line of the journal',
    'journal.frozen',
    "INSERT OR REPLACE INTO journal VALUES (1, 'a', 'b', 'c', NULL)",
  ],
  ['altering what an edit did', 'edit.frozen', "UPDATE edit SET changes = '[]'"],
  ['saying that another did it', 'edit.frozen', "UPDATE edit SET done_by = 'x'"],
  ['taking an edit away', 'edit.frozen', 'DELETE FROM edit WHERE seq = 1'],
  ['replacing an edit', 'edit.frozen', "INSERT OR REPLACE INTO edit VALUES (1, 'a', '[]', '[]', 'done', 'b', 'c')"],
  [
    'bringing back an edit that was dropped',
    'edit.frozen',
    "UPDATE edit SET state = 'dropped' WHERE seq = 2; UPDATE edit SET state = 'done' WHERE seq = 2",
  ],
]

const FROZEN = ['reading', 'given_level', 'round', 'report', 'journal', 'edit']

function everything(db: Connection): unknown {
  return FROZEN.map((table) => db.prepare(`SELECT * FROM ${table} ORDER BY rowid`).all())
}

describe('a project file refuses', () => {
  it.each(ATTEMPTS)('%s: %s', (_what, refusal, sql) => {
    const path = copied(KEPT)
    opened(path).close()
    const db = connect(path)
    try {
      const before = everything(db)
      db.exec('BEGIN')
      expect(() => db.exec(sql)).toThrow(refusal)
      db.exec('ROLLBACK')
      expect(everything(db)).toEqual(before)
    } finally {
      db.close()
    }
  })

  it('rows that say nothing, or what cannot be', () => {
    const db = connect(copied(KEPT))
    const refused = [
      "INSERT INTO support (id, place, x_m, y_m) VALUES ('A9', 9, 'far', 0)",
      "INSERT INTO section (id, place, material, E_GPa, I_cm4, A_cm2) VALUES ('s', 9, 'concrete', -30, 1, 1)",
      "INSERT INTO section (id, place, material, E_GPa, I_cm4, A_cm2) VALUES ('s', 9, 'jelly', 30, 1, 1)",
      "INSERT INTO point (id, place, kind, level_m) VALUES ('P', 9, 'stud', 1)",
      "INSERT INTO member (line, id, place, kind, from_node, to_node, section) VALUES ('A', 'x', 9, 'beam', 'a1', 'a1', 'beam')",
      "INSERT INTO reading (round, row, point) VALUES (4, 1, 'S-A1')",
      "UPDATE project SET criteria = '{'",
      "INSERT INTO project (one, name, created_at) VALUES (2, 'another', '')",
    ]
    for (const sql of refused) expect(() => db.exec(sql), sql).toThrow(/constraint failed|cannot store TEXT/)
    db.close()
  })
})
