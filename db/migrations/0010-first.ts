/**
 * The first schema. One row an entity, with the keys and units of the building file; what is left out in the
 * file is NULL here, so that an export gives back what was imported. Readings of accepted rounds, issued reports
 * and the journal are frozen by triggers, whoever opens the file. Published: never edited, only followed.
 */
import type { Connection } from '../connection.ts'

export function up(db: Connection): void {
  db.exec(SCHEMA)
}

const SCHEMA = `
CREATE TABLE project (
  one INTEGER PRIMARY KEY CHECK (one = 1),
  name TEXT NOT NULL CHECK (length(name) > 0),
  reference TEXT,
  client TEXT,
  address TEXT,
  notes TEXT,
  criteria TEXT CHECK (criteria IS NULL OR json_valid(criteria)),
  baseline TEXT,
  revision INTEGER NOT NULL DEFAULT 0 CHECK (revision >= 0),
  created_at TEXT NOT NULL
) STRICT;

CREATE TABLE support (
  id TEXT PRIMARY KEY CHECK (length(id) > 0),
  place INTEGER NOT NULL,
  x_m REAL NOT NULL,
  y_m REAL NOT NULL,
  base_m REAL
) STRICT;

CREATE TABLE section (
  id TEXT PRIMARY KEY CHECK (length(id) > 0),
  place INTEGER NOT NULL,
  material TEXT NOT NULL CHECK (material IN ('concrete', 'steel', 'timber', 'masonry', 'other')),
  E_GPa REAL NOT NULL CHECK (E_GPa > 0),
  I_cm4 REAL NOT NULL CHECK (I_cm4 > 0),
  A_cm2 REAL NOT NULL CHECK (A_cm2 > 0),
  shear_area_cm2 REAL CHECK (shear_area_cm2 > 0),
  G_over_E REAL CHECK (G_over_E > 0),
  stiffness_factor REAL CHECK (stiffness_factor > 0),
  capacity TEXT CHECK (capacity IS NULL OR json_valid(capacity))
) STRICT;

CREATE TABLE frame_line (
  id TEXT PRIMARY KEY CHECK (length(id) > 0),
  place INTEGER NOT NULL
) STRICT;

CREATE TABLE node (
  line TEXT NOT NULL REFERENCES frame_line (id) DEFERRABLE INITIALLY DEFERRED,
  id TEXT NOT NULL CHECK (length(id) > 0),
  place INTEGER NOT NULL,
  x_m REAL NOT NULL,
  z_m REAL NOT NULL,
  support TEXT REFERENCES support (id) DEFERRABLE INITIALLY DEFERRED,
  base TEXT CHECK (base IS NULL OR json_valid(base)),
  load_kN TEXT CHECK (load_kN IS NULL OR json_valid(load_kN)),
  PRIMARY KEY (line, id)
) STRICT;

CREATE TABLE member (
  line TEXT NOT NULL REFERENCES frame_line (id) DEFERRABLE INITIALLY DEFERRED,
  id TEXT NOT NULL CHECK (length(id) > 0),
  place INTEGER NOT NULL,
  kind TEXT NOT NULL CHECK (kind IN ('beam', 'column', 'brace')),
  from_node TEXT NOT NULL,
  to_node TEXT NOT NULL CHECK (to_node <> from_node),
  section TEXT NOT NULL REFERENCES section (id) DEFERRABLE INITIALLY DEFERRED,
  pin_from INTEGER CHECK (pin_from IN (0, 1)),
  pin_to INTEGER CHECK (pin_to IN (0, 1)),
  loads TEXT CHECK (loads IS NULL OR json_valid(loads)),
  capacity TEXT CHECK (capacity IS NULL OR json_valid(capacity)),
  PRIMARY KEY (line, id),
  FOREIGN KEY (line, from_node) REFERENCES node (line, id) DEFERRABLE INITIALLY DEFERRED,
  FOREIGN KEY (line, to_node) REFERENCES node (line, id) DEFERRABLE INITIALLY DEFERRED
) STRICT;

CREATE TABLE point (
  id TEXT PRIMARY KEY CHECK (length(id) > 0),
  place INTEGER NOT NULL,
  kind TEXT NOT NULL CHECK (kind IN ('benchmark', 'stud')),
  level_m REAL,
  support TEXT REFERENCES support (id) DEFERRABLE INITIALLY DEFERRED,
  CHECK ((kind = 'benchmark') = (level_m IS NOT NULL)),
  CHECK ((kind = 'stud') = (support IS NOT NULL))
) STRICT;

CREATE TABLE round (
  key INTEGER PRIMARY KEY,
  id TEXT NOT NULL CHECK (length(id) > 0),
  version INTEGER NOT NULL CHECK (version >= 1),
  place INTEGER NOT NULL,
  date TEXT NOT NULL,
  state TEXT NOT NULL CHECK (state IN ('draft', 'accepted', 'superseded')),
  kind TEXT CHECK (kind IN ('levels', 'book')),
  sd_mm_per_sqrt_km REAL CHECK (sd_mm_per_sqrt_km > 0),
  sd_mm_per_setup REAL CHECK (sd_mm_per_setup > 0),
  observer TEXT,
  instrument TEXT,
  weather TEXT,
  note TEXT,
  reason TEXT,
  accepted_at TEXT,
  accepted_by TEXT,
  draft TEXT CHECK (draft IS NULL OR json_valid(draft)),
  saved_at TEXT NOT NULL,
  UNIQUE (id, version),
  CHECK ((state = 'draft') = (accepted_at IS NULL)),
  CHECK (state = 'draft' OR (kind IS NOT NULL AND draft IS NULL))
) STRICT;
CREATE UNIQUE INDEX one_round_in_force ON round (id) WHERE state = 'accepted';
CREATE UNIQUE INDEX one_draft ON round (id) WHERE state = 'draft';

CREATE TABLE reading (
  round INTEGER NOT NULL REFERENCES round (key),
  row INTEGER NOT NULL CHECK (row >= 1),
  point TEXT NOT NULL CHECK (length(point) > 0),
  back_m REAL,
  mid_m REAL,
  fore_m REAL,
  sight_m REAL,
  back_sight_m REAL,
  PRIMARY KEY (round, row),
  CHECK (back_m IS NOT NULL OR mid_m IS NOT NULL OR fore_m IS NOT NULL)
) STRICT;

CREATE TABLE given_level (
  round INTEGER NOT NULL REFERENCES round (key),
  row INTEGER NOT NULL CHECK (row >= 1),
  point TEXT NOT NULL,
  level_m REAL NOT NULL,
  sd_mm REAL NOT NULL CHECK (sd_mm >= 0),
  PRIMARY KEY (round, row),
  UNIQUE (round, point)
) STRICT;

CREATE TABLE edit (
  seq INTEGER PRIMARY KEY,
  what TEXT NOT NULL,
  changes TEXT NOT NULL CHECK (json_valid(changes)),
  reverse TEXT NOT NULL CHECK (json_valid(reverse)),
  state TEXT NOT NULL CHECK (state IN ('done', 'undone', 'dropped')),
  done_by TEXT NOT NULL,
  done_at TEXT NOT NULL
) STRICT;
CREATE INDEX edit_by_state ON edit (state, seq);

CREATE TABLE kept_findings (
  hash TEXT PRIMARY KEY,
  findings TEXT NOT NULL CHECK (json_valid(findings))
) STRICT;

CREATE TABLE report (
  number INTEGER PRIMARY KEY CHECK (number >= 1),
  label TEXT NOT NULL UNIQUE,
  round TEXT NOT NULL,
  issued_at TEXT NOT NULL,
  surveyed_by TEXT NOT NULL,
  assessed_by TEXT NOT NULL,
  reviewer TEXT NOT NULL,
  pages INTEGER NOT NULL CHECK (pages >= 1),
  sha256 TEXT NOT NULL CHECK (length(sha256) = 64),
  pdf BLOB NOT NULL
) STRICT;

CREATE TABLE journal (
  seq INTEGER PRIMARY KEY AUTOINCREMENT,
  at TEXT NOT NULL,
  who TEXT NOT NULL,
  what TEXT NOT NULL,
  detail TEXT CHECK (detail IS NULL OR json_valid(detail))
) STRICT;

CREATE TRIGGER round_frozen BEFORE UPDATE ON round
WHEN OLD.state <> 'draft' AND NOT (
  OLD.state = 'accepted' AND NEW.state = 'superseded'
  AND NEW.key IS OLD.key AND NEW.id IS OLD.id AND NEW.version IS OLD.version AND NEW.place IS OLD.place
  AND NEW.date IS OLD.date AND NEW.kind IS OLD.kind AND NEW.sd_mm_per_sqrt_km IS OLD.sd_mm_per_sqrt_km
  AND NEW.sd_mm_per_setup IS OLD.sd_mm_per_setup AND NEW.observer IS OLD.observer
  AND NEW.instrument IS OLD.instrument AND NEW.weather IS OLD.weather AND NEW.note IS OLD.note
  AND NEW.reason IS OLD.reason AND NEW.accepted_at IS OLD.accepted_at AND NEW.accepted_by IS OLD.accepted_by
)
BEGIN SELECT RAISE(ABORT, 'round.frozen'); END;
CREATE TRIGGER round_kept BEFORE DELETE ON round WHEN OLD.state <> 'draft'
BEGIN SELECT RAISE(ABORT, 'round.frozen'); END;

CREATE TRIGGER reading_added BEFORE INSERT ON reading
WHEN (SELECT state FROM round WHERE key = NEW.round) <> 'draft'
BEGIN SELECT RAISE(ABORT, 'reading.frozen'); END;
CREATE TRIGGER reading_changed BEFORE UPDATE ON reading
WHEN (SELECT state FROM round WHERE key IN (OLD.round, NEW.round) ORDER BY state LIMIT 1) <> 'draft'
BEGIN SELECT RAISE(ABORT, 'reading.frozen'); END;
CREATE TRIGGER reading_kept BEFORE DELETE ON reading
WHEN (SELECT state FROM round WHERE key = OLD.round) <> 'draft'
BEGIN SELECT RAISE(ABORT, 'reading.frozen'); END;

CREATE TRIGGER given_level_added BEFORE INSERT ON given_level
WHEN (SELECT state FROM round WHERE key = NEW.round) <> 'draft'
BEGIN SELECT RAISE(ABORT, 'reading.frozen'); END;
CREATE TRIGGER given_level_changed BEFORE UPDATE ON given_level
WHEN (SELECT state FROM round WHERE key IN (OLD.round, NEW.round) ORDER BY state LIMIT 1) <> 'draft'
BEGIN SELECT RAISE(ABORT, 'reading.frozen'); END;
CREATE TRIGGER given_level_kept BEFORE DELETE ON given_level
WHEN (SELECT state FROM round WHERE key = OLD.round) <> 'draft'
BEGIN SELECT RAISE(ABORT, 'reading.frozen'); END;

CREATE TRIGGER report_frozen BEFORE UPDATE ON report BEGIN SELECT RAISE(ABORT, 'report.frozen'); END;
CREATE TRIGGER report_kept BEFORE DELETE ON report BEGIN SELECT RAISE(ABORT, 'report.frozen'); END;
CREATE TRIGGER journal_frozen BEFORE UPDATE ON journal BEGIN SELECT RAISE(ABORT, 'journal.frozen'); END;
CREATE TRIGGER journal_kept BEFORE DELETE ON journal BEGIN SELECT RAISE(ABORT, 'journal.frozen'); END;
`
