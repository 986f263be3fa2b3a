/** The chain from readings to flags: what holds whatever the numbers are. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { assessBuilding, assessRound } from '../../app/assess/assess.ts'
import { because, type BecauseTarget } from '../../app/assess/because.ts'
import { prepare } from '../../app/assess/prepare.ts'
import { runVerification } from '../../app/assess/verify.ts'
import type { Building, GivenLevel } from '../../app/model/building.ts'
import { Fault } from '../../app/model/faults.ts'
import type { RoundFindings } from '../../app/model/findings.ts'
import { exampleBuilding } from '../../app/usecases/example-building.ts'

const LEVEL = 42.7

/** The example with given levels: settlement in mm for each support in the building's order. */
function given(
  rounds: readonly { id: string; mm: readonly number[]; without?: readonly string[] }[],
  sd_mm = 0.2,
): Building {
  const building = exampleBuilding()
  building.survey.rounds = rounds.map(({ id, mm, without = [] }, r) => ({
    id,
    date: `2026-0${r + 1}-05`,
    levels: building.supports.flatMap((s, i): GivenLevel[] =>
      without.includes(s.id) ? [] : [{ point: `S-${s.id}`, level_m: LEVEL - mm[i]! / 1000, sd_mm }],
    ),
  }))
  return building
}

const ZERO = Array<number>(12).fill(0)
const settlements = fc.array(fc.integer({ min: -80, max: 120 }).map((v) => v / 10), { minLength: 12, maxLength: 12 }) // prettier-ignore

function last(building: Building): RoundFindings {
  return assessBuilding(building).rounds.at(-1)!
}

describe('settlement that only moves the building as a whole', () => {
  it('bends nothing, exactly, where the footings turn with the tilt', () => {
    const slope = fc.integer({ min: -30, max: 30 }).map((v) => v / 10)
    fc.assert(
      fc.property(slope, slope, slope, (mean, a, b) => {
        const { supports } = exampleBuilding()
        const mm = supports.map((s) => mean + a * s.x_m + b * s.y_m)
        const round = last(given([{ id: 'R0', mm: ZERO }, { id: 'R1', mm }])) // prettier-ignore
        for (const line of round.frame_lines) {
          for (const m of line.members) {
            // Levels are near 43 m: their last digit is 7e-15 m, times some 1e4 kNm/m.
            expect(Math.abs(m.moment_from_kNm)).toBeLessThan(1e-8)
            expect(Math.abs(m.moment_to_kNm)).toBeLessThan(1e-8)
          }
          for (const s of line.spans) expect(Math.abs(s.angular_distortion_rad)).toBeLessThan(1e-12)
        }
      }),
      { numRuns: 30 },
    )
  })
})

describe('any settlement', () => {
  it('adds: the moments of two settlements together are the sums of their moments', () => {
    fc.assert(
      fc.property(settlements, settlements, (a, b) => {
        const both = a.map((v, i) => v + b[i]!)
        const [ra, rb, rs] = [a, b, both].map((mm) => last(given([{ id: 'R0', mm: ZERO }, { id: 'R1', mm }]))) // prettier-ignore
        rs!.frame_lines.forEach((line, l) =>
          line.members.forEach((m, i) => {
            const sum =
              ra!.frame_lines[l]!.members[i]!.moment_from_kNm + rb!.frame_lines[l]!.members[i]!.moment_from_kNm
            expect(m.moment_from_kNm).toBeCloseTo(sum, 6)
          }),
        )
      }),
      { numRuns: 15 },
    )
  })

  it('loads nothing: on every line the changes of reaction sum to nothing', () => {
    fc.assert(
      fc.property(settlements, (mm) => {
        for (const line of last(
          given([
            { id: 'R0', mm: ZERO },
            { id: 'R1', mm },
          ]),
        ).frame_lines) {
          expect(line.reactions.reduce((sum, r) => sum + r.vertical_kN, 0)).toBeCloseTo(0, 6)
        }
      }),
      { numRuns: 30 },
    )
  })

  it('is explained: the shares of the supports sum to the value, for members, spans and supports', () => {
    fc.assert(
      fc.property(settlements, fc.nat(121), (mm, pick) => {
        const prepared = prepare(given([{ id: 'R0', mm: ZERO }, { id: 'R1', mm }])) // prettier-ignore
        const round = assessRound(prepared, 'R1')
        const members = round.frame_lines.flatMap((l) => l.members.map((m) => ({ line: l.id, id: m.member })))
        const { line, id } = members[pick % members.length]!
        const span = round.frame_lines.find((l) => l.id === line)!.spans[0]!
        const targets: BecauseTarget[] = [
          { kind: 'member', line, id, end: 'from' },
          { kind: 'member', line, id, end: 'to' },
          { kind: 'span', line, from: span.from, to: span.to },
        ]
        for (const target of targets) {
          const { value, shares } = because(prepared, round, target)
          const sum = shares.reduce((total, s) => total + s.share, 0)
          expect(Math.abs(sum - value)).toBeLessThan(1e-9 * Math.max(1, Math.abs(value)))
        }
      }),
      { numRuns: 40 },
    )
  })
})

describe('the deflection ratio', () => {
  it('of a line that sags in the middle is its offset over its length, with the sd of the three levels (by hand)', () => {
    const mm = exampleBuilding().supports.map((s) => (s.id === 'B2' ? 6 : 0))
    const line = last(given([{ id: 'R0', mm: ZERO }, { id: 'R1', mm }])).frame_lines.find((l) => l.id === '2')! // prettier-ignore
    const [stretch] = line.stretches
    expect(stretch).toMatchObject({ kind: 'sagging', from: 'A2', to: 'C2', at: 'B2', length_m: 11.2 })
    expect(stretch!.deflection_ratio).toBeCloseTo(0.006 / 11.2, 12)
    // Each settlement has 0.2 sqrt 2 mm; the offset takes the middle once and the ends by half.
    expect(stretch!.sd_ratio).toBeCloseTo((0.2e-3 * Math.SQRT2 * Math.sqrt(1 + 0.25 + 0.25)) / 11.2, 12)
  })

  it('is none for a building that only tilts', () => {
    const mm = exampleBuilding().supports.map((s) => 2 + 0.5 * s.x_m)
    for (const line of last(given([{ id: 'R0', mm: ZERO }, { id: 'R1', mm }])).frame_lines) expect(line.stretches).toEqual([]) // prettier-ignore
  })
})

describe('a support that was not measured', () => {
  const mm = exampleBuilding().supports.map((s) => 0.03 * s.x_m ** 2)
  const whole = last(given([{ id: 'R0', mm: ZERO }, { id: 'R1', mm }])) // prettier-ignore
  const round = last(given([{ id: 'R0', mm: ZERO }, { id: 'R1', mm, without: ['B3'] }])) // prettier-ignore
  const b3 = round.supports.find((s) => s.support === 'B3')!

  it('is estimated between its neighbours, marked, with an allowance of 2 mm at least', () => {
    expect([b3.estimated, b3.estimated_from]).toEqual([true, expect.stringContaining('between')])
    expect(b3.sd_mm).toBeGreaterThanOrEqual(2)
    const measured = whole.supports.find((s) => s.support === 'B3')!
    expect(Math.abs(b3.settlement_mm - measured.settlement_mm)).toBeLessThan(2 * b3.sd_mm)
  })

  it('never gives a clear result', () => {
    for (const line of round.frame_lines.filter((l) => l.id === 'B' || l.id === '3')) {
      for (const m of line.members) expect([m.member, m.certainty]).toEqual([m.member, 'borderline'])
      for (const s of line.spans.filter((x) => [x.from, x.to].includes('B3'))) expect(s.certainty).toBe('borderline')
    }
  })
})

describe('a stud that was lost and replaced', () => {
  it('carries its series on from the first round that has the new one', () => {
    const step = (share: number) => ZERO.map((_, i) => share * i)
    const building = given([{ id: 'R0', mm: ZERO }, { id: 'R1', mm: step(0.5) }, { id: 'R2', mm: step(1) }]) // prettier-ignore
    building.survey.points.push({ id: 'S-B4b', kind: 'stud', support: 'B4' })
    const [, r1, r2] = building.survey.rounds
    r1!.levels!.push({ point: 'S-B4b', level_m: 40, sd_mm: 0.2 })
    r2!.levels = r2!.levels!.filter((l) => l.point !== 'S-B4')
    r2!.levels.push({ point: 'S-B4b', level_m: 40 - 0.0035, sd_mm: 0.2 })
    const b4 = last(building).supports.find((s) => s.support === 'B4')!
    expect(b4.estimated).toBe(false)
    expect(b4.settlement_mm).toBeCloseTo(3.5 + 3.5, 6)
    // Old stud over two rounds and new stud over two rounds: four levels.
    expect(b4.sd_mm).toBeCloseTo(0.2 * Math.sqrt(4), 6)
  })
})

describe('two studs on one support', () => {
  function pair(difference_mm: number) {
    const building = given([{ id: 'R0', mm: ZERO }, { id: 'R1', mm: ZERO }]) // prettier-ignore
    building.survey.points.push({ id: 'S-B2b', kind: 'stud', support: 'B2' })
    building.survey.rounds.forEach((round, r) =>
      round.levels!.push({ point: 'S-B2b', level_m: 41 - (r * difference_mm) / 1000, sd_mm: 0.2 }),
    )
    return last(building).supports.find((s) => s.support === 'B2')!
  }

  it('are averaged by their weights, and said to disagree only beyond what the survey can tell', () => {
    expect(pair(0.4)).toMatchObject({ settlement_mm: expect.closeTo(0.2, 9), sd_mm: expect.closeTo(0.2, 9) })
    // Each settlement has 0.2 sqrt 2 mm, their difference 0.4 mm: 95 % is 0.78 mm.
    expect(pair(0.7).studs_disagree).toBeUndefined()
    expect(pair(0.9).studs_disagree).toEqual({
      studs: ['S-B2', 'S-B2b'],
      difference_mm: expect.closeTo(-0.9, 9),
      sd_mm: expect.closeTo(0.4, 9),
    })
  })
})

describe('a level book that scatters', () => {
  /** The example's last book with one change point's foresight off by so much. */
  function off(mm: number) {
    const building = exampleBuilding()
    const rows = building.survey.rounds.at(-1)!.book!.rows
    rows.find((r) => r.point === 'TP2')!.fore_m! += mm / 1000
    return last(building)
  }

  it('has its uncertainty raised by its variance factor, never lowered', () => {
    const [calm, wild] = [off(0), off(4)]
    expect(calm.levelling!.variance_factor!).toBeLessThan(1)
    expect(calm.levelling!.scaled).toBe(false)
    expect(wild.levelling!.scaled).toBe(true)
    const factor = Math.sqrt(wild.levelling!.variance_factor!)
    for (const [i, point] of wild.points.entries()) expect(point.sd_mm / calm.points[i]!.sd_mm).toBeCloseTo(factor, 6)
  })
})

describe('a benchmark that is let go', () => {
  it('holds no level any more: what hangs on it is levelled from the other, in baseline and round alike', () => {
    const building = exampleBuilding()
    // The second benchmark has come down by 3 mm before the last visit: every reading taken to it shows it.
    const rows = building.survey.rounds.at(-1)!.book!.rows
    const bm2 = rows.find((r) => r.point === 'BM2')!
    bm2.fore_m! += 0.003
    bm2.back_m! += 0.003
    const held = assessBuilding(building, 'R6').rounds[0]!
    expect(held.levelling!.scaled).toBe(true)
    const points = building.survey.points.map((p) => (p.id === 'BM2' ? { ...p, released: 'it moved' } : p))
    const free = assessBuilding({ ...building, survey: { ...building.survey, points } }, 'R6').rounds[0]!
    expect(free.levelling).toMatchObject({ scaled: false, degrees_of_freedom: 1 })
    const truth = assessBuilding(exampleBuilding(), 'R6').rounds[0]!
    free.supports.forEach((s, i) => {
      expect(Math.abs(s.settlement_mm - truth.supports[i]!.settlement_mm)).toBeLessThan(0.5)
    })
  })

  it('says in its own name when none is left to hold', () => {
    const building = exampleBuilding()
    for (const p of building.survey.points) if (p.kind === 'benchmark') p.released = 'doubted'
    expect(() => assessBuilding(building, 'R6')).toThrow(/benchmark/)
  })
})

describe('a column on two lines', () => {
  it('is used by the bending of both at the same section', () => {
    const round = last(exampleBuilding())
    const [inA, in4] = ['A', '4'].map((id) =>
      round.frame_lines.find((l) => l.id === id)!.members.find((m) => m.member === 'CA4/1')!,
    )
    expect(inA!.utilisation!).toBeCloseTo(in4!.utilisation!, 12)
    expect([inA!.governing!.with_line, in4!.governing!.with_line]).toEqual(['4', 'A'])
    expect(inA!.moment_from_kNm).not.toBeCloseTo(in4!.moment_from_kNm, 3)
  })
})

describe('what cannot be assessed', () => {
  it('is refused with its name: an unknown round, a round that reads no known stud, a mechanism', () => {
    expect(() => assessBuilding(exampleBuilding(), 'R99')).toThrow(Fault)
    const blind = given([{ id: 'R0', mm: ZERO }, { id: 'R1', mm: ZERO, without: exampleBuilding().supports.map((s) => s.id) }]) // prettier-ignore
    expect(() => assessBuilding(blind)).toThrow(/R1/)
    const loose = exampleBuilding()
    for (const member of loose.frame_lines[0]!.members) Object.assign(member, { pin_from: true, pin_to: true })
    expect(() => prepare(loose)).toThrow(/line A .* mechanism/)
  })
})

describe('the built-in verification', () => {
  const rows = runVerification()

  it('agrees in every row, names a source in each, and has fifteen rows or more', () => {
    expect(rows.length).toBeGreaterThanOrEqual(15)
    expect(rows.filter((r) => !r.agrees)).toEqual([])
    for (const row of rows) expect(row.source.length).toBeGreaterThan(10)
  })
})
