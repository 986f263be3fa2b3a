import { expect, test } from 'vitest'
import { assessBuilding } from '../../app/assess/assess.ts'
import { bookView } from '../../app/assess/level-book.ts'
import type { BookRow, Building, Round } from '../../app/model/building.ts'
import { Fault, type FaultRecord } from '../../app/model/faults.ts'
import { exampleBuilding } from '../../app/usecases/example-building.ts'
import { placed } from '../../renderer/log/cell-faults.ts'
import { closingWords } from '../../renderer/log/closing-words.ts'
import { headlineOf } from '../../renderer/log/headline.ts'
import { draftAfter, nextRoundName, pointsOf, today } from '../../renderer/log/new-round.ts'
import { smallBuilding } from '../support/made.ts'

function booked(...rows: BookRow[]): Round {
  return { id: 'R9', date: '2026-09-01', book: { sd_mm_per_sqrt_km: 0.7, rows } }
}

function said(round: Round, building: Building = smallBuilding()): string[] {
  return closingWords(bookView(building, round)).map((words) => words.text)
}

test('a loop says what it closes to, against the class and against the instrument', () => {
  const round = booked(
    { point: 'BM1', back_m: 1.2, sight_m: 20 },
    { point: 'S-A1', mid_m: 0.8, sight_m: 20 },
    { point: 'BM1', fore_m: 1.2004, sight_m: 20 },
  )
  // 4 mm x sqrt(0.04 km) = 0.8 mm; 1.96 x 0.7 mm x sqrt(0.04 km) = 0.27 mm, by hand.
  expect(said(round)[0]).toBe(
    'The loop from BM1 closes to −0.4 mm over 1 setup, 0.040 km; allowed 0.8, the instrument lets expect 0.3 mm.',
  )
})

test('a book that does not close yet, and one benchmark alone, say what that leaves open', () => {
  const words = said(booked({ point: 'BM1', back_m: 1.2, sight_m: 20 }, { point: 'S-A1', mid_m: 0.8, sight_m: 20 }))
  expect(words).toContain('The book does not close on a benchmark yet: nothing checks it.')
  expect(words).toContain('One benchmark is read; that it stands still is assumed.')
  expect(closingWords(bookView(smallBuilding(), booked()))).toEqual([])
})

test('the headline names the flag, how many, and the member with most of its capacity induced', () => {
  const findings = assessBuilding(exampleBuilding()).rounds.at(-1)!
  const { status, lines } = headlineOf(findings)
  expect(status.toLowerCase()).toContain(findings.status)
  const worst = findings.frame_lines
    .flatMap((line) => line.members)
    .filter((member) => member.status === findings.status)
    .sort((a, b) => b.induced_fraction! - a.induced_fraction!)[0]!
  expect(lines[0]).toContain(worst.member)
  expect(lines[1]).toMatch(/^Greatest angular distortion from .* 1\/\d+/)
})

test('a fault of a row stands at its cell, one of the instrument at the head, the rest beneath', () => {
  const row = { kind: 'row', id: '3', within: 'R1' } as const
  const round = { kind: 'round', id: 'R1' } as const
  const faults: FaultRecord[] = [
    { code: 'number.malformed', place: { path: 'book.rows[2].mid_m', value: '1.x', element: row } },
    {
      code: 'sight.missing',
      place: { path: 'book.rows[2]', element: row, detail: { round: 'R1', row: '3', point: 'S-A1' } },
    },
    { code: 'date.malformed', place: { path: 'date', value: '1.4.26', element: round } },
    { code: 'book.sdless', place: { path: 'book', element: round, detail: { round: 'R1' } } },
    { code: 'round.untied', place: { element: round, detail: { points: ['S-A1'] } } },
  ]
  const { cells, head, rest } = placed(faults)
  expect([...cells.keys()]).toEqual(['2:mid_m', '2:sight_m'])
  expect(cells.get('2:mid_m')).toContain('"1.x" is no number')
  expect([...head.keys()]).toEqual(['date', 'sd_mm_per_sqrt_km'])
  expect(rest.map((fault) => fault.code)).toEqual(['round.untied'])
})

test('a new round takes over who reads with what, and no reading', () => {
  const last = {
    id: 'R1',
    date: '2026-04-02',
    observer: 'N.',
    instrument: 'level 3',
    book: { sd_mm_per_setup: 0.2, rows: [] },
  }
  expect(draftAfter(last, { id: 'R2', date: '2026-05-02', kind: 'book' }, ['R0', 'R1'])).toEqual({
    id: 'R2',
    date: '2026-05-02',
    observer: 'N.',
    instrument: 'level 3',
    book: { sd_mm_per_setup: 0.2, rows: [] },
  })
  expect(draftAfter(undefined, { id: 'R0', date: '2026-05-02', kind: 'levels' }, [])).toEqual({
    id: 'R0',
    date: '2026-05-02',
    levels: [],
  })
})

test('a new round has a name of its own and a day that is one', () => {
  expect(nextRoundName(['R0', 'R2'])).toBe('R1')
  expect(() => draftAfter(undefined, { id: 'R0', date: '2026-05-02', kind: 'book' }, ['R0'])).toThrow(Fault)
  expect(() => draftAfter(undefined, { id: 'R1', date: '2.5.2026', kind: 'book' }, ['R0'])).toThrow(
    'no date of the form',
  )
  expect(() => draftAfter(undefined, { id: 'R1', date: '2026-02-30', kind: 'book' }, [])).toThrow(Fault)
  expect(today(new Date(2026, 2, 2, 23, 59))).toBe('2026-03-02')
})

test('the points of a round are taken over in the order in which they were read', () => {
  expect(pointsOf(booked({ point: 'BM1', back_m: 1 }, { point: 'S-A1', mid_m: 2 }))).toEqual([
    { point: 'BM1' },
    { point: 'S-A1' },
  ])
})
