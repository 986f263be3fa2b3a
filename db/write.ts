/** Writes of a project file. Only handed out inside a transaction; every one counts the revision up and is journalled. */
import type { IssuedReportView } from '../app/contract/views.ts'
import type { Building, Round } from '../app/model/building.ts'
import type { Change, Edit } from '../app/model/changes.ts'
import { Fault } from '../app/model/faults.ts'
import type { Findings } from '../app/model/findings.ts'
import type { DraftRound, ReadStore, WriteStore } from '../app/usecases/ports.ts'
import type { WriteDb } from './connection.ts'
import { applyChange, insert, reversed } from './entities.ts'

/** Findings kept at most; the oldest go first. */
const KEPT_FINDINGS = 64

export function writeStore(db: WriteDb, read: ReadStore): WriteStore {
  function journal(when: string, who: string, what: string, detail?: unknown): void {
    db.prepare('UPDATE project SET revision = revision + 1').run()
    db.prepare('INSERT INTO journal (at, who, what, detail) VALUES (?, ?, ?, ?)').run(
      when,
      who,
      what,
      detail === undefined ? null : JSON.stringify(detail),
    )
  }

  function apply(changes: readonly Change[]): Change[] {
    const removed = changes.flatMap((c) => (c.kind === 'point' && c.after === null ? [c.id] : []))
    const found = changes.map((change) => applyChange(db, change))
    for (const point of removed) refuseIfRead(db, point)
    refuseOpenReferences(db, found)
    return found
  }

  function step(take: 'undo' | 'redo', who: string, when: string): string | null {
    const [state, order] = take === 'undo' ? ['done', 'DESC'] : ['undone', 'ASC']
    const edit = db
      .prepare(`SELECT seq, what, changes, reverse FROM edit WHERE state = ? ORDER BY seq ${order} LIMIT 1`)
      .get(state) as { seq: number; what: string; changes: string; reverse: string } | undefined
    if (!edit) return null
    apply(JSON.parse(take === 'undo' ? edit.reverse : edit.changes) as Change[])
    db.prepare('UPDATE edit SET state = ? WHERE seq = ?').run(take === 'undo' ? 'undone' : 'done', edit.seq)
    journal(when, who, `${take}: ${edit.what}`, { edit: edit.seq })
    return edit.what
  }

  return {
    ...read,
    edit({ what, changes }: Edit, who, when) {
      const found = apply(changes)
      db.prepare("UPDATE edit SET state = 'dropped' WHERE state = 'undone'").run()
      db.prepare(
        "INSERT INTO edit (what, changes, reverse, state, done_by, done_at) VALUES (?, ?, ?, 'done', ?, ?)",
      ).run(what, JSON.stringify(found), JSON.stringify(reversed(found)), who, when)
      journal(when, who, what)
    },
    undo: (who, when) => step('undo', who, when),
    redo: (who, when) => step('redo', who, when),
    putDraft(draft, when) {
      putDraft(db, draft, when)
      // A draft is saved while it is typed: counted, but not worth a line of the journal.
      db.prepare('UPDATE project SET revision = revision + 1').run()
    },
    dropDraft(id) {
      const { changes } = db.prepare("DELETE FROM round WHERE id = ? AND state = 'draft'").run(id)
      if (changes === 0) throw new Fault('draft.unknown', { value: id })
      db.prepare('UPDATE project SET revision = revision + 1').run()
    },
    accept(id, who, when, note) {
      const row = db.prepare("SELECT key, draft FROM round WHERE id = ? AND state = 'draft'").get(id) as
        { key: number; draft: string } | undefined
      if (!row) throw new Fault('draft.unknown', { value: id })
      const draft = JSON.parse(row.draft) as DraftRound
      freeze(db, row.key, { ...draft, ...(note ? { note } : {}) }, who, when)
      journal(when, who, `Accept round ${id}`)
    },
    correct(round, reason, who, when) {
      const old = db
        .prepare("SELECT key, version, place FROM round WHERE id = ? AND state = 'accepted'")
        .get(round.id) as { key: number; version: number; place: number } | undefined
      if (!old) throw new Fault('round.unknown', { value: round.id })
      db.prepare("UPDATE round SET state = 'superseded' WHERE key = ?").run(old.key)
      const { lastInsertRowid } = db
        .prepare(
          `INSERT INTO round (id, version, place, date, state, reason, draft, saved_at)
           VALUES (?, ?, ?, ?, 'draft', ?, '{}', ?)`,
        )
        .run(round.id, old.version + 1, old.place, round.date, reason, when)
      freeze(db, Number(lastInsertRowid), round, who, when)
      journal(when, who, `Correct round ${round.id}`, { reason, version: old.version + 1 })
    },
    setBaseline(id, reason, who, when) {
      const { baseline } = db.prepare('SELECT baseline FROM project').get() as { baseline: string | null }
      db.prepare('UPDATE project SET baseline = ?').run(id)
      journal(when, who, `Make ${id} the baseline`, { reason, before: baseline })
    },
    keepFindings(hash, findings: Findings) {
      db.prepare('INSERT OR REPLACE INTO kept_findings (hash, findings) VALUES (?, ?)').run(
        hash,
        JSON.stringify(findings),
      )
      db.prepare(
        'DELETE FROM kept_findings WHERE rowid NOT IN (SELECT rowid FROM kept_findings ORDER BY rowid DESC LIMIT ?)',
      ).run(KEPT_FINDINGS)
    },
    issue(report: IssuedReportView, pdf, who) {
      db.prepare(
        `INSERT INTO report (number, label, round, issued_at, surveyed_by, assessed_by, reviewer, pages, sha256, pdf)
         VALUES (@number, @label, @round, @issued_at, @surveyed_by, @assessed_by, @reviewer, @pages, @sha256, @pdf)`,
      ).run({ ...report, pdf: Buffer.from(pdf) })
      journal(report.issued_at, who, `Issue report ${report.label}`, { sha256: report.sha256 })
    },
  }
}

function putDraft(db: WriteDb, draft: DraftRound, when: string): void {
  const same = db.prepare("SELECT key, state FROM round WHERE id = ? ORDER BY state = 'draft' DESC").get(draft.id) as
    { key: number; state: string } | undefined
  if (same && same.state !== 'draft') throw new Fault('round.frozen', { value: draft.id })
  if (same) {
    db.prepare('UPDATE round SET date = ?, draft = ?, saved_at = ? WHERE key = ?').run(
      draft.date,
      JSON.stringify(draft),
      when,
      same.key,
    )
    return
  }
  db.prepare(
    `INSERT INTO round (id, version, place, date, state, draft, saved_at)
     SELECT ?, 1, coalesce(max(place) + 1, 0), ?, 'draft', ?, ? FROM round`,
  ).run(draft.id, draft.date, JSON.stringify(draft), when)
}

/** Writes the readings of a round that is still a draft, then freezes it. */
function freeze(db: WriteDb, key: number, round: DraftRound, who: string, when: string): void {
  writeReadings(db, key, round)
  const { observer, instrument, weather, note } = round
  db.prepare(
    `UPDATE round SET state = 'accepted', date = ?, kind = ?, sd_mm_per_sqrt_km = ?, sd_mm_per_setup = ?,
       collimation_mm_per_10_m = ?, observer = ?,
       instrument = ?, weather = ?, note = ?, accepted_at = ?, accepted_by = ?, draft = NULL, saved_at = ?
     WHERE key = ?`,
  ).run(
    round.date,
    round.book ? 'book' : 'levels',
    round.book?.sd_mm_per_sqrt_km ?? null,
    round.book?.sd_mm_per_setup ?? null,
    round.book?.collimation_mm_per_10_m ?? null,
    observer ?? null,
    instrument ?? null,
    weather ?? null,
    note ?? null,
    when,
    who,
    when,
    key,
  )
}

function writeReadings(db: WriteDb, key: number, { levels, book }: Round): void {
  const level = db.prepare('INSERT INTO given_level (round, row, point, level_m, sd_mm) VALUES (?, ?, ?, ?, ?)')
  levels?.forEach((g, i) => level.run(key, i + 1, g.point, g.level_m, g.sd_mm))
  const reading = db.prepare(
    `INSERT INTO reading (round, row, point, back_m, mid_m, fore_m, sight_m, back_sight_m) VALUES (?, ?, ?, ?, ?, ?, ?, ?)`,
  )
  book?.rows.forEach((r, i) =>
    reading.run(
      key,
      i + 1,
      r.point,
      r.back_m ?? null,
      r.mid_m ?? null,
      r.fore_m ?? null,
      r.sight_m ?? null,
      r.back_sight_m ?? null,
    ),
  )
}

/** A point that an accepted round has read stays described. */
function refuseIfRead(db: WriteDb, point: string): void {
  if (db.prepare('SELECT 1 FROM point WHERE id = ?').get(point)) return
  const rounds = db
    .prepare(
      `SELECT DISTINCT id FROM round WHERE state = 'accepted' AND (
         key IN (SELECT round FROM reading WHERE point = @point) OR key IN (SELECT round FROM given_level WHERE point = @point))`,
    )
    .all({ point }) as { id: string }[]
  if (rounds.length)
    throw new Fault('point.read', {
      value: point,
      element: { kind: 'point', id: point },
      detail: { rounds: rounds.map((r) => r.id) },
    })
}

/** Deferred references are looked at now, so that an open one is a fault of the edit and not of the commit. */
function refuseOpenReferences(db: WriteDb, changes: readonly Change[]): void {
  const open = db.pragma('foreign_key_check') as { table: string; parent: string }[]
  if (open.length)
    throw new Fault('change.unfit', {
      value: `${open[0]!.table} without its ${open[0]!.parent}`,
      path: changes[0]?.kind,
    })
}

/** Fills a new project with a building and its rounds, all accepted. */
export function fill(db: WriteDb, building: Building, rounds: readonly DraftRound[], who: string, when: string): void {
  const { criteria, survey, supports, sections, frame_lines } = building
  db.prepare('INSERT INTO project (one, name, created_at) VALUES (1, ?, ?)').run(building.name, when)
  const { name, reference, client, address, notes } = building
  const head = { name, reference, client, address, notes }
  applyChange(db, { kind: 'head', before: { name }, after: head })
  if (criteria) applyChange(db, { kind: 'criteria', before: null, after: criteria })
  supports.forEach((support, i) => insert(db, 'support', support, i))
  sections.forEach((section, i) => insert(db, 'section', section, i))
  frame_lines.forEach((line, i) => {
    insert(db, 'line', line, i)
    line.nodes.forEach((node, k) => insert(db, 'node', node, k, line.id))
    line.members.forEach((member, k) => insert(db, 'member', member, k, line.id))
  })
  survey.points.forEach((point, i) => insert(db, 'point', point, i))
  for (const round of rounds) {
    putDraft(db, round, when)
    const { key } = db.prepare("SELECT key FROM round WHERE id = ? AND state = 'draft'").get(round.id) as {
      key: number
    }
    freeze(db, key, round, who, when)
  }
  if (survey.baseline !== undefined) db.prepare('UPDATE project SET baseline = ?').run(survey.baseline)
  db.prepare('INSERT INTO journal (at, who, what) VALUES (?, ?, ?)').run(when, who, 'Make the project')
}
