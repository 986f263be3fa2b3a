/**
 * Closes the ways round the first step's triggers. REPLACE takes the row in its way without asking its DELETE trigger,
 * and a draft's reading could be moved into a superseded round. Edits are kept like the journal: only whether
 * one is done, undone or dropped may change. Published: never edited, only followed.
 */
import type { Connection } from '../connection.ts'

export function up(db: Connection): void {
  db.exec(SCHEMA)
}

const SCHEMA = `
CREATE TRIGGER round_begun BEFORE INSERT ON round
WHEN NEW.state <> 'draft' OR EXISTS (
  SELECT 1 FROM round WHERE state <> 'draft' AND (key = NEW.key OR (id = NEW.id AND version = NEW.version))
)
BEGIN SELECT RAISE(ABORT, 'round.frozen'); END;
CREATE TRIGGER round_displaced BEFORE UPDATE ON round
WHEN EXISTS (
  SELECT 1 FROM round AS other WHERE other.key <> OLD.key AND other.state <> 'draft' AND (
    other.key = NEW.key
    OR (other.id = NEW.id AND other.version = NEW.version)
    OR (other.id = NEW.id AND other.state = 'accepted' AND NEW.state = 'accepted')
  )
)
BEGIN SELECT RAISE(ABORT, 'round.frozen'); END;

DROP TRIGGER reading_changed;
CREATE TRIGGER reading_changed BEFORE UPDATE ON reading
WHEN EXISTS (SELECT 1 FROM round WHERE key IN (OLD.round, NEW.round) AND state <> 'draft')
BEGIN SELECT RAISE(ABORT, 'reading.frozen'); END;
DROP TRIGGER given_level_changed;
CREATE TRIGGER given_level_changed BEFORE UPDATE ON given_level
WHEN EXISTS (SELECT 1 FROM round WHERE key IN (OLD.round, NEW.round) AND state <> 'draft')
BEGIN SELECT RAISE(ABORT, 'reading.frozen'); END;

CREATE TRIGGER report_added BEFORE INSERT ON report
WHEN EXISTS (SELECT 1 FROM report WHERE number = NEW.number OR label = NEW.label)
BEGIN SELECT RAISE(ABORT, 'report.frozen'); END;
CREATE TRIGGER journal_added BEFORE INSERT ON journal
WHEN EXISTS (SELECT 1 FROM journal WHERE seq = NEW.seq)
BEGIN SELECT RAISE(ABORT, 'journal.frozen'); END;

CREATE TRIGGER edit_added BEFORE INSERT ON edit
WHEN EXISTS (SELECT 1 FROM edit WHERE seq = NEW.seq)
BEGIN SELECT RAISE(ABORT, 'edit.frozen'); END;
CREATE TRIGGER edit_frozen BEFORE UPDATE ON edit
WHEN NEW.seq IS NOT OLD.seq OR NEW.what IS NOT OLD.what OR NEW.changes IS NOT OLD.changes
  OR NEW.reverse IS NOT OLD.reverse OR NEW.done_by IS NOT OLD.done_by OR NEW.done_at IS NOT OLD.done_at
  OR (OLD.state = 'dropped' AND NEW.state <> 'dropped')
BEGIN SELECT RAISE(ABORT, 'edit.frozen'); END;
CREATE TRIGGER edit_kept BEFORE DELETE ON edit BEGIN SELECT RAISE(ABORT, 'edit.frozen'); END;
`
