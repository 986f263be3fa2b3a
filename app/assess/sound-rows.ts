/** Rows of a book as far as they can be reduced: what is half typed is left out and said, never thrown. */
import type { BookRow, Round } from '../model/building.ts'
import type { FaultRecord } from '../model/faults.ts'

const READINGS = ['back_m', 'mid_m', 'fore_m'] as const
const SIGHTS = ['sight_m', 'back_sight_m'] as const

/** One row for each row given, so that row numbers stay. Lists in `problems` what was left out. */
export function soundRows(rows: readonly BookRow[], round: Round, problems: FaultRecord[]): BookRow[] {
  return rows.map((row, i) => {
    function note(code: FaultRecord['code'], value?: unknown): void {
      const point = row.point
      problems.push({
        code,
        place: {
          element: { kind: 'row', id: String(i + 1), within: round.id },
          detail: { row: i + 1, point, round: round.id },
          ...(value === undefined ? {} : { value }),
        },
      })
    }
    const isBlank = !row.point && READINGS.every((key) => row[key] === undefined)
    if (isBlank) return { point: '' }
    if (!row.point) {
      note('row.pointless')
      return { point: '' }
    }
    const sound: BookRow = { point: row.point }
    for (const key of [...READINGS, ...SIGHTS]) {
      const value: unknown = row[key]
      if (value === undefined) continue
      if (typeof value === 'number' && Number.isFinite(value)) sound[key] = value
      else note('row.unusable', value)
    }
    if (READINGS.every((key) => row[key] === undefined)) note('row.readingless')
    return sound
  })
}
