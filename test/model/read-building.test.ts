import { describe, expect, test } from 'vitest'
import { checkBuilding, checkRound } from '../../app/model/check-building.ts'
import { emptyBuilding, type Building } from '../../app/model/building.ts'
import { errorLine } from '../../app/model/fault-line.ts'
import { InputFault } from '../../app/model/faults.ts'
import { readBuilding } from '../../app/model/read-building.ts'
import { writeBuilding } from '../../app/model/write-building.ts'
import { smallBuilding } from '../support/made.ts'

function linesOf(run: () => unknown): string[] {
  try {
    run()
  } catch (error) {
    if (error instanceof InputFault) return error.faults.map((fault) => errorLine(fault))
    throw error
  }
  return []
}

function placesOf(run: () => unknown): string[] {
  return linesOf(run).map((line) => line.split(': ').slice(1, 3).join(' '))
}

/** The small building after something is done to it. */
function with_(change: (building: Building) => void): Building {
  const building = smallBuilding()
  change(building)
  return building
}

const file = writeBuilding(smallBuilding())

describe('a building file is read', () => {
  test('from UTF-8 with and without a byte order mark, and from UTF-16 of both kinds', () => {
    const units = [...`\ufeff${file}`].map((sign) => sign.charCodeAt(0))
    const little = Uint8Array.from(units.flatMap((u) => [u & 255, u >> 8]))
    const big = Uint8Array.from(units.flatMap((u) => [u >> 8, u & 255]))
    const marked = new TextEncoder().encode(`\ufeff${file}`)
    for (const bytes of [marked, little, big, little.slice(2), big.slice(2), new TextEncoder().encode(file)])
      expect(readBuilding(bytes)).toEqual(smallBuilding())
  })

  test('with line breaks of any kind and keys in any order', () => {
    expect(readBuilding(file.replaceAll('\n', '\r\n'))).toEqual(smallBuilding())
    const turned = Object.fromEntries(Object.entries(smallBuilding()).reverse())
    expect(writeBuilding(readBuilding(JSON.stringify(turned)))).toBe(file)
  })

  test('with names in every script, escaped or not', () => {
    const building = with_((b) => (b.name = 'Gerberhof \u2116 7, \u5009\u5eab \ud83c\udfda "alt"\n'))
    expect(readBuilding(writeBuilding(building))).toEqual(building)
    expect(readBuilding(JSON.stringify(building).replace('\ud83c\udfda', '\\ud83c\\udfda'))).toEqual(building)
  })

  test('while nothing is described, no round is measured and no criteria are given', () => {
    expect(readBuilding(writeBuilding(emptyBuilding('New')))).toEqual(emptyBuilding('New'))
    const { criteria: _, ...rest } = smallBuilding()
    const unmeasured = { ...rest, survey: { points: rest.survey.points, rounds: [] } }
    expect(readBuilding(writeBuilding(unmeasured))).toEqual(unmeasured)
  })

  test('where a single setup closes on the benchmark that it began with', () => {
    const rows = [
      { point: 'BM1', back_m: 1.4 },
      { point: 'S-A1', mid_m: 1.0 },
      { point: 'S-A2', mid_m: 1.1 },
      { point: 'BM1', fore_m: 1.4001 },
    ]
    const building = with_((b) => (b.survey.rounds[1]!.book = { sd_mm_per_setup: 0.3, rows }))
    expect(checkBuilding(building)).toEqual(building)
  })

  test('where a stud is read from two setups', () => {
    const building = with_((b) =>
      b.survey.rounds[1]!.book!.rows.splice(3, 0, { point: 'S-A1', mid_m: 1.1, sight_m: 9 }),
    )
    expect(checkBuilding(building)).toEqual(building)
  })

  test('where an uplift acts, a load stands on the very end and a level is that of high ground', () => {
    const building = with_((b) => {
      b.frame_lines[0]!.members[2]!.loads = [{ kind: 'point', kN: -4, at_m: 6, action: 'variable' }]
      b.frame_lines[0]!.nodes[2]!.load_kN = { variable: -3 }
      b.survey.points[0] = { id: 'BM1', kind: 'benchmark', level_m: 3640.2 }
    })
    expect(checkBuilding(building)).toEqual(building)
  })
})

describe('every fault of a file is listed at once', () => {
  test('in the order of the file, with the file, the path and the value of each', () => {
    const building = smallBuilding() as unknown as Record<string, unknown>
    const text = JSON.stringify({ ...building, colour: 'red' })
      .replace('"E_GPa":30', '"E_GPa":"30,5"')
      .replace('"I_cm4":213333', '"I_cm4":-1')
      .replace('"to":"a2-1"', '"to":"a2-7"')
      .replace('"sd_mm":0.3', '"sd_mm":NaN')
      .replace('"confidence":0.95', '"confidence":95')
    expect(
      linesOf(() => readBuilding(text, 'store.building.json')).map((line) => line.split(': ').slice(1, 4)),
    ).toEqual([
      ['store.building.json', 'colour', 'value "red"'],
      ['store.building.json', 'sections[0].E_GPa', 'value "30,5"'],
      ['store.building.json', 'sections[1].I_cm4', 'value -1'],
      ['store.building.json', 'frame_lines[0].members[1].to', 'value "a2-7"'],
      ['store.building.json', 'survey.rounds[0].levels[0].sd_mm', 'value NaN'],
      ['store.building.json', 'criteria.confidence', 'value 95'],
    ])
  })

  test('and a fault is no second fault at what refers to it', () => {
    const building = with_((b) => (b.sections[0]!.E_GPa = 0))
    expect(placesOf(() => checkBuilding(building))).toEqual(['sections[0].E_GPa value 0'])
  })

  test('in a file of many thousand faults as well', () => {
    const supports = Array.from({ length: 20_000 }, (_, i) => ({ id: `S${i}`, x_m: String(i), y_m: 0, bass_m: 1 }))
    expect(linesOf(() => checkBuilding({ ...smallBuilding(), supports })).length).toBeGreaterThan(40_000)
  })

  test('and a file beyond the size that is read says what that size is', () => {
    const [line] = linesOf(() => readBuilding(new Uint8Array(128 * 1024 * 1024 + 1), 'big.json'))
    expect(line).toMatch(/134217729 bytes; 134217728 is the most/)
  })
})

describe('a description that is still being typed', () => {
  const loose = with_((b) => {
    b.frame_lines[0]!.nodes.push({ id: 'up', x_m: 3, z_m: 7 })
    delete b.survey.baseline
  })

  test('may have parts that hang on nothing and rounds without a baseline; a file may not', () => {
    expect(checkBuilding(loose, undefined, { unfinished: true })).toEqual(loose)
    expect(placesOf(() => checkBuilding(loose))).toEqual([
      'frame_lines[0].nodes[4] value "up"',
      'survey.baseline value missing',
    ])
  })
})

describe('a round by itself', () => {
  const building = smallBuilding()
  const [levels, book] = building.survey.rounds

  test('is held to the points of the building, and keeps what is known of the visit', () => {
    const visit = { observer: 'K. L.', instrument: 'digital level', weather: 'dry, 12 degrees', note: '' }
    expect(checkRound({ ...book, ...visit }, building)).toEqual({ ...book, ...visit })
    expect(checkRound({ ...levels, observer: undefined, book: undefined }, building)).toEqual(levels)
  })

  test('names each fault by its path in the round and stands it beside its row', () => {
    const rows = book!.book!.rows.map((row) => (row.point === 'S-A1' ? { ...row, point: 'S-B1' } : row))
    try {
      checkRound({ ...book, date: '2026-02-30', book: { ...book!.book, rows } }, building)
      expect.unreachable()
    } catch (error) {
      expect((error as InputFault).faults).toMatchObject([
        { code: 'date.impossible', place: { path: 'date', element: { kind: 'round', id: 'R1' } } },
        {
          code: 'point.unknown',
          place: { path: 'book.rows[1].point', element: { kind: 'row', id: '2', within: 'R1' } },
        },
      ])
    }
  })
})

describe('a level book', () => {
  test('may turn on points that the survey does not describe, and begin and close on one', () => {
    const rows = [
      { point: 'peg', back_m: 1.4 },
      { point: 'BM1', mid_m: 1.3 },
      { point: 'S-A1', mid_m: 1.0 },
      { point: 'TP1', fore_m: 1.1 },
      { point: 'TP1', back_m: 1.2 },
      { point: 'S-A2', mid_m: 1.1 },
      { point: 'peg', fore_m: 1.5 },
    ]
    const building = with_((b) => (b.survey.rounds[1]!.book = { sd_mm_per_setup: 0.3, rows }))
    expect(checkBuilding(building)).toEqual(building)
    const misspelt = with_((b) => {
      const own = rows.map((row) => (row.point === 'S-A2' ? { ...row, point: 'S-A3' } : row))
      b.survey.rounds[1]!.book = { sd_mm_per_setup: 0.3, rows: own }
    })
    expect(placesOf(() => checkBuilding(misspelt))).toEqual(['survey.rounds[1].book.rows[5].point value "S-A3"'])
  })
})
