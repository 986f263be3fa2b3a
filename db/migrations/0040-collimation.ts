/** A book may carry the collimation error of its instrument, by which its readings are corrected; frozen like the rest. */
import type { Connection } from '../connection.ts'

export function up(db: Connection): void {
  db.exec(SCHEMA)
}

const SCHEMA = `
ALTER TABLE round ADD COLUMN collimation_mm_per_10_m REAL;

DROP TRIGGER round_frozen;
CREATE TRIGGER round_frozen BEFORE UPDATE ON round
WHEN OLD.state <> 'draft' AND NOT (
  OLD.state = 'accepted' AND NEW.state = 'superseded'
  AND NEW.key IS OLD.key AND NEW.id IS OLD.id AND NEW.version IS OLD.version AND NEW.place IS OLD.place
  AND NEW.date IS OLD.date AND NEW.kind IS OLD.kind AND NEW.sd_mm_per_sqrt_km IS OLD.sd_mm_per_sqrt_km
  AND NEW.sd_mm_per_setup IS OLD.sd_mm_per_setup AND NEW.collimation_mm_per_10_m IS OLD.collimation_mm_per_10_m
  AND NEW.observer IS OLD.observer AND NEW.instrument IS OLD.instrument AND NEW.weather IS OLD.weather
  AND NEW.note IS OLD.note AND NEW.reason IS OLD.reason AND NEW.accepted_at IS OLD.accepted_at
  AND NEW.accepted_by IS OLD.accepted_by
)
BEGIN SELECT RAISE(ABORT, 'round.frozen'); END;
`
