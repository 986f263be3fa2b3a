/** Reads of a project file: rows in, entities of the model out. */
import type { Building, FrameLine, Round } from '../app/model/building.ts'
import type { IssuedReportView, RoundView } from '../app/contract/views.ts'
import type { Findings } from '../app/model/findings.ts'
import type { ReadStore } from '../app/usecases/ports.ts'
import type { Statement } from 'better-sqlite3'
import type { ReadDb } from './connection.ts'
import { onFile } from './sqlite-faults.ts'
import { COLUMNS, bookRowOf, givenLevelOf, memberOf, nodeOf, pointOf, sectionOf, supportOf, type Row } from './rows.ts'

const SQL = {
  project: 'SELECT name, reference, client, address, notes, criteria, baseline FROM project',
  revision: 'SELECT revision FROM project',
  supports: `SELECT ${COLUMNS.support} FROM support ORDER BY place`,
  sections: `SELECT ${COLUMNS.section} FROM section ORDER BY place`,
  lines: `SELECT ${COLUMNS.frame_line} FROM frame_line ORDER BY place`,
  nodes: `SELECT ${COLUMNS.node} FROM node WHERE line = ? ORDER BY place`,
  members: `SELECT ${COLUMNS.member} FROM member WHERE line = ? ORDER BY place`,
  points: `SELECT ${COLUMNS.point} FROM point ORDER BY place`,
  roundsInForce: "SELECT * FROM round WHERE state = 'accepted' ORDER BY place, key",
  rounds: 'SELECT * FROM round ORDER BY date, place, version',
  readings: 'SELECT point, back_m, mid_m, fore_m, sight_m, back_sight_m FROM reading WHERE round = ? ORDER BY row',
  levels: 'SELECT point, level_m, sd_mm FROM given_level WHERE round = ? ORDER BY row',
  lastDone: "SELECT what FROM edit WHERE state = 'done' ORDER BY seq DESC LIMIT 1",
  nextUndone: "SELECT what FROM edit WHERE state = 'undone' ORDER BY seq LIMIT 1",
  register:
    'SELECT number, label, round, issued_at, surveyed_by, assessed_by, reviewer, pages, sha256 FROM report ORDER BY number',
  pdf: 'SELECT pdf FROM report WHERE number = ?',
  kept: 'SELECT findings FROM kept_findings WHERE hash = ?',
}

interface RoundRow {
  key: number
  id: string
  version: number
  date: string
  state: RoundView['state']
  kind: 'levels' | 'book' | null
  sd_mm_per_sqrt_km: number | null
  sd_mm_per_setup: number | null
  collimation_mm_per_10_m: number | null
  observer: string | null
  instrument: string | null
  weather: string | null
  note: string | null
  reason: string | null
  accepted_at: string | null
  accepted_by: string | null
  draft: string | null
}

/** Reads, and what makes them forget the building they hold: a transaction rolled back gives a revision out twice. */
export interface OwnReadStore extends ReadStore {
  forget(): void
}

export function readStore(db: ReadDb, path: string, readOnly: boolean): OwnReadStore {
  const statement = Object.fromEntries(
    Object.entries(SQL).map(([name, sql]) => [name, db.prepare(sql)] as const),
  ) as Record<keyof typeof SQL, Statement>
  let known: { revision: number; building: Building } | undefined

  function revision(): number {
    return (statement.revision.get() as { revision: number }).revision
  }

  function roundOf(row: RoundRow): Round {
    if (row.kind === 'levels')
      return { id: row.id, date: row.date, levels: statement.levels.all(row.key).map((r) => givenLevelOf(r as Row)) }
    return {
      id: row.id,
      date: row.date,
      book: {
        ...(row.sd_mm_per_sqrt_km === null ? {} : { sd_mm_per_sqrt_km: row.sd_mm_per_sqrt_km }),
        ...(row.sd_mm_per_setup === null ? {} : { sd_mm_per_setup: row.sd_mm_per_setup }),
        ...(row.collimation_mm_per_10_m === null ? {} : { collimation_mm_per_10_m: row.collimation_mm_per_10_m }),
        rows: statement.readings.all(row.key).map((r) => bookRowOf(r as Row)),
      },
    }
  }

  function lineOf({ id }: { id: string }): FrameLine {
    return {
      id,
      nodes: statement.nodes.all(id).map((r) => nodeOf(r as Row)),
      members: statement.members.all(id).map((r) => memberOf(r as Row)),
    }
  }

  function readBuilding(): Building {
    const head = statement.project.get() as Record<string, string | null>
    const { criteria, baseline } = head
    const rounds = (statement.roundsInForce.all() as RoundRow[]).map(roundOf)
    return {
      format: 'levelstead-building',
      version: 1,
      name: head.name!,
      ...Object.fromEntries(
        ['reference', 'client', 'address', 'notes'].flatMap((key) => (head[key] === null ? [] : [[key, head[key]]])),
      ),
      supports: statement.supports.all().map((r) => supportOf(r as Row)),
      sections: statement.sections.all().map((r) => sectionOf(r as Row)),
      frame_lines: (statement.lines.all() as { id: string }[]).map(lineOf),
      survey: {
        points: statement.points.all().map((r) => pointOf(r as Row)),
        ...(baseline === null || baseline === undefined ? {} : { baseline }),
        rounds,
      },
      ...(criteria === null || criteria === undefined
        ? {}
        : { criteria: JSON.parse(criteria) as Building['criteria'] & object }),
    }
  }

  function roundView(row: RoundRow): RoundView {
    if (row.state === 'draft')
      return { ...(JSON.parse(row.draft!) as Round), id: row.id, date: row.date, state: 'draft', version: row.version }
    const told = Object.fromEntries(
      (['observer', 'instrument', 'weather', 'note', 'reason', 'accepted_at', 'accepted_by'] as const).flatMap((key) =>
        row[key] === null ? [] : [[key, row[key]]],
      ),
    )
    return { ...roundOf(row), state: row.state, version: row.version, ...told }
  }

  return heldToFile({
    path,
    readOnly,
    revision,
    forget: () => void (known = undefined),
    building() {
      const now = revision()
      if (known?.revision !== now) known = { revision: now, building: readBuilding() }
      return known.building
    },
    rounds: () => (statement.rounds.all() as RoundRow[]).map(roundView),
    undoName: () => (statement.lastDone.get() as { what: string } | undefined)?.what ?? null,
    redoName: () => (statement.nextUndone.get() as { what: string } | undefined)?.what ?? null,
    register: () => statement.register.all() as IssuedReportView[],
    pdf(number) {
      const row = statement.pdf.get(number) as { pdf: Buffer } | undefined
      return row && new Uint8Array(row.pdf)
    },
    keptFindings(hash) {
      const row = statement.kept.get(hash) as { findings: string } | undefined
      return row && (JSON.parse(row.findings) as Findings)
    },
  })
}

/** Reads whose refusals by SQLite (another program's lock, a disk that is gone) are faults of the file. */
function heldToFile(store: OwnReadStore): OwnReadStore {
  const held = Object.entries(store).map(([name, read]: [string, unknown]) => {
    if (typeof read !== 'function') return [name, read]
    return [name, (...given: unknown[]): unknown => onFile(store.path, 'reading', () => read(...given) as unknown)]
  })
  return Object.fromEntries(held) as OwnReadStore
}
