import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import type { Building, Round } from '../../app/model/building.ts'
import { InputFault } from '../../app/model/faults.ts'
import { readReadings, type Readings } from '../../app/model/read-readings.ts'
import { writeReadings } from '../../app/model/write-readings.ts'
import { anyBuilding, smallBuilding } from '../support/made.ts'

const building = unmeasured(smallBuilding())

function unmeasured(b: Building): Building {
  return { ...b, survey: { points: b.survey.points, rounds: [] } }
}

function latin(text: string): Uint8Array {
  return Uint8Array.from([...text].map((sign) => sign.charCodeAt(0)))
}

const LEVELS: Round[] = [
  {
    id: 'R2',
    date: '2026-05-02',
    levels: [
      { point: 'S-A1', level_m: 10.4318, sd_mm: 0.3 },
      { point: 'S-A2', level_m: 10.4301, sd_mm: 0.25 },
    ],
  },
]
const WITH_POINTS = 'round,date,point,level_m,sd_mm\nR2,2026-05-02,S-A1,10.4318,0.3\nR2,2026-05-02,S-A2,10.4301,0.25\n'
const WITH_COMMAS = WITH_POINTS.replaceAll(',', ';').replaceAll('.', ',')

describe('a readings table of levels', () => {
  test.each([
    ['commas and decimal points', WITH_POINTS],
    ['semicolons and decimal commas', WITH_COMMAS],
    ['semicolons and decimal points', WITH_POINTS.replaceAll(',', ';')],
    ['tabs and decimal commas', WITH_COMMAS.replaceAll(';', '\t')],
    ['line breaks of Windows', WITH_POINTS.replaceAll('\n', '\r\n')],
    ['line breaks of old spreadsheets', WITH_POINTS.replaceAll('\n', '\r')],
    ['a byte order mark', `\ufeff${WITH_POINTS}`],
    ['no line break at its end', WITH_POINTS.trimEnd()],
    ['blank rows', WITH_POINTS.replaceAll('\n', '\n\n,,,,\n')],
    ['quoted cells', WITH_POINTS.replaceAll(/[^,\n]+/g, '"$&"')],
    [
      'quoted decimal commas',
      'round,date,point,level_m,sd_mm\nR2,2026-05-02,S-A1,"10,4318","0,3"\nR2,2026-05-02,S-A2,"10,4301","0,25"\n',
    ],
    ['headings in capitals', WITH_POINTS.replace(/^.*/, (heading) => heading.toUpperCase())],
    ['headings in words', WITH_POINTS.replace(/^.*/, 'Visit,Date,Stud,Reduced level (m),SD (mm)')],
    ['the separator told in its first line', `sep=;\n${WITH_COMMAS}`],
    ['blanks around its cells', WITH_POINTS.replaceAll(',', ' , ')],
  ])('with %s gives its rounds', (_, text) => {
    expect(readReadings(text, building).rounds).toEqual(LEVELS)
    expect(readReadings(new TextEncoder().encode(text), building).rounds).toEqual(LEVELS)
  })

  test('says what each column was taken for and what was left out', () => {
    const text = WITH_POINTS.replace(/^.*/, 'Round,Date,Stud,RL,sd_mm,Remarks').replaceAll(/(\d)\n/g, '$1,damp\n')
    expect(readReadings(text, building)).toEqual({
      rounds: LEVELS,
      columns: { Round: 'round', Date: 'date', Stud: 'point', RL: 'level_m', sd_mm: 'sd_mm', Remarks: 'left out' },
      notes: [],
    } satisfies Readings)
  })

  test('saved as Windows-1252 keeps the letters of its names', () => {
    const own = unmeasured(smallBuilding())
    own.survey.points.push({ id: 'S-\u20ac\u00c4', kind: 'stud', support: 'A1' })
    const bytes = latin('round;date;point;level_m;sd_mm\nR2;2026-05-02;S-\u0080\u00c4;10,4318;0,3\n')
    expect(readReadings(bytes, own).rounds[0]!.levels![0]!.point).toBe('S-\u20ac\u00c4')
  })

  test('with three decimals after a comma is read where only decimals are possible, and refused where not', () => {
    const heading = 'round;date;point;level_m;sd_mm\n'
    function levelOf(cell: string): unknown {
      try {
        return readReadings(`${heading}R2;2026-05-02;S-A1;${cell};1\n`, building).rounds[0]!.levels![0]!.level_m
      } catch (error) {
        return (error as InputFault).faults.map((fault) => fault.code)
      }
    }
    expect([levelOf('10,432'), levelOf('1,432'), levelOf('1.432')]).toEqual([10.432, ['number.ambiguous'], 1.432])
    const told = `${heading}R2;2026-05-02;S-A1;1,432;0,5\n`
    expect(readReadings(told, building).rounds[0]!.levels![0]!.level_m).toBe(1.432)
  })

  test('names a repeated point by the rows of the table', () => {
    const text = WITH_POINTS.replace('S-A2', 'S-A1')
    expect(() => readReadings(text, building)).toThrow(/second time in the round, first in row 2/)
  })
})

describe('a readings table of a level book', () => {
  const small = smallBuilding()
  const { books } = writeReadings([{ ...small.survey.rounds[1]!, id: 'R2' }])

  test("takes the instrument from the building's last level book, and says so", () => {
    const own = structuredClone(small)
    own.survey.rounds[1]!.book = { ...own.survey.rounds[1]!.book!, sd_mm_per_sqrt_km: 0.4, sd_mm_per_setup: 0.2 }
    const { rounds, notes } = readReadings(books!, own)
    expect(rounds).toEqual([{ ...own.survey.rounds[1], id: 'R2' }])
    expect(notes).toEqual([
      'Round R2: standard deviation of the instrument taken as in round R1, 0.4 mm for a kilometre and 0.2 mm for a setup.',
    ])
  })

  test('without one before it takes a usual instrument: of a kilometre with sights, of a setup without', () => {
    const withSights = readReadings(books!, building)
    expect(withSights.rounds[0]!.book!.sd_mm_per_sqrt_km).toBe(0.7)
    const noSights =
      'round,date,point,back_m,mid_m,fore_m,sight_m\nR2,2026-05-02,BM1,1.4,,,\nR2,2026-05-02,S-A1,,1.0,,\n'
    const without = readReadings(noSights, building)
    expect(without.rounds[0]!.book).toEqual({
      sd_mm_per_setup: 0.3,
      rows: [
        { point: 'BM1', back_m: 1.4 },
        { point: 'S-A1', mid_m: 1 },
      ],
    })
    expect(without.notes).toEqual([expect.stringMatching(/0\.3 mm for a setup, a usual value/)])
  })
})

describe('readings tables', () => {
  test('written from any rounds give the same rounds', () => {
    fc.assert(
      fc.property(anyBuilding, (any) => {
        const plain = any.survey.points.every(({ id }) => id.trim() === id)
        fc.pre(plain && any.survey.rounds.length > 0)
        const { levels, books } = writeReadings(any.survey.rounds)
        const sdOf = any.survey.rounds.find((round) => round.book)?.book
        const before = unmeasured(any)
        if (sdOf) before.survey.rounds = [{ id: 'before', date: '2025-01-01', book: { ...sdOf, rows: [] } }]
        const read = [levels, books].flatMap((text) => (text ? readReadings(text, before).rounds : []))
        // A table has no place for the collimation error of an instrument.
        const booked = structuredClone(any.survey.rounds)
        for (const { book } of booked) delete book?.collimation_mm_per_10_m
        expect(read).toEqual(booked)
      }),
    )
  })

  test('of any bytes and of any mutilated table are rounds or faults, never another error', () => {
    const { books } = writeReadings(smallBuilding().survey.rounds)
    const text = `${books}`
    const cut = fc.record({
      at: fc.nat({ max: text.length }),
      length: fc.nat({ max: 9 }),
      put: fc.string({ maxLength: 6 }),
    })
    const mutilated = cut.map(({ at, length, put }) => text.slice(0, at) + put + text.slice(at + length))
    fc.assert(
      fc.property(fc.oneof(fc.uint8Array(), mutilated, fc.string()), (input) => {
        try {
          expect(readReadings(input, building).rounds.length).toBeGreaterThan(0)
        } catch (error) {
          if (!(error instanceof InputFault)) throw error
          expect(error.faults.length).toBeGreaterThan(0)
        }
      }),
      { numRuns: 1000 },
    )
  })
})
