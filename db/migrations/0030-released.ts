/** A benchmark may be let go, with the reason: it is then levelled like any other point. */
import type { Connection } from '../connection.ts'

export function up(db: Connection): void {
  db.exec(
    "ALTER TABLE point ADD COLUMN released TEXT CHECK (released IS NULL OR (kind = 'benchmark' AND length(released) > 0))",
  )
}
