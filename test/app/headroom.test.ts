import { describe, expect, it } from 'vitest'
import { assessRound } from '../../app/assess/assess.ts'
import { headroomOf } from '../../app/assess/headroom.ts'
import { prepare } from '../../app/assess/prepare.ts'
import type { Building } from '../../app/model/building.ts'
import { criteriaOf } from '../../app/model/building.ts'
import type { RoundFindings, Triggered } from '../../app/model/findings.ts'
import { exampleBuilding } from '../../app/usecases/example-building.ts'
import { largeBuilding } from '../support/large-building.ts'

/** The example with given levels, so that a support can be made to settle by an exact amount. */
function given(settlements: (index: number) => number): Building {
  const building = exampleBuilding()
  const studs = building.survey.points.filter((p) => p.kind === 'stud')
  function levels(share: number) {
    return studs.map((s, i) => ({ point: s.id, level_m: 42.7 - (share * settlements(i)) / 1000, sd_mm: 0.2 }))
  }
  building.survey.rounds = [
    { id: 'R0', date: '2026-01-05', levels: levels(0) },
    { id: 'R1', date: '2026-06-05', levels: levels(1) },
  ]
  return building
}

function settledMore(building: Building, support: string, mm: number): Building {
  const next = structuredClone(building)
  for (const level of next.survey.rounds[1]!.levels!) if (level.point === `S-${support}`) level.level_m -= mm / 1000
  return next
}

/** How near every value that the target is held by is to a trigger, as a ratio. */
function ratio(findings: RoundFindings, target: Triggered, trigger: 'amber' | 'red', building: Building): number {
  const line = findings.frame_lines.find((l) => l.id === target.line)!
  const criteria = criteriaOf(building)
  if (target.kind === 'span') {
    const span = line.spans.find((s) => s.from === target.from && s.to === target.to)!
    return Math.abs(span.angular_distortion_rad) / criteria.angular_distortion[trigger]
  }
  const member = line.members.find((m) => m.member === target.id)!
  return Math.max(
    ...[
      [member.induced_fraction, criteria.induced_fraction[trigger]],
      [member.utilisation, criteria.utilisation[trigger]],
    ].flatMap(([value, limit]) => (value === undefined ? [] : [value / limit!])),
  )
}

const settlements = [0.6, 1.0, 1.4, 2.9, 0.7, 1.3, 2.2, 4.1, 0.5, 0.9, 1.7, 3.1]

describe('the millimetres left at each support', () => {
  const building = given((i) => settlements[i]! * 0.6)
  const headroom = headroomOf(prepare(building), 'R1')

  it('are given for every support, amber before red or at another member', () => {
    expect(headroom.map((h) => h.support)).toEqual(building.supports.map((s) => s.id))
    for (const { amber, red } of headroom) {
      expect(amber!.left_mm).toBeGreaterThan(0)
      expect(red!.left_mm).toBeGreaterThan(amber!.left_mm)
    }
  })

  it.each(['amber', 'red'] as const)('bring a value exactly to its %s trigger when they are used up', (trigger) => {
    for (const left of headroom) {
      const reach = left[trigger]!
      const after = assessRound(prepare(settledMore(building, left.support, reach.left_mm)), 'R1')
      // Given levels are around 42.7 m: their own last digit is 1e-14 of the value, 1e-9 leaves room for it.
      const values = [reach.target].map((t) => ratio(after, t, trigger, building))
      expect(Math.abs(values[0]! - 1)).toBeLessThan(1e-9)
    }
  })

  it('are the first crossing: just before, nothing new has reached the trigger', () => {
    const before = assessRound(prepare(building), 'R1')
    for (const left of headroom) {
      const after = assessRound(prepare(settledMore(building, left.support, left.red!.left_mm * 0.999)), 'R1')
      after.frame_lines.forEach((line, l) => {
        line.members.forEach((m, i) => {
          if (before.frame_lines[l]!.members[i]!.status !== 'red') expect(m.status).not.toBe('red')
        })
        line.spans.forEach((s, i) => {
          if (before.frame_lines[l]!.spans[i]!.status !== 'red') expect(s.status).not.toBe('red')
        })
      })
    }
  })

  it('are found on a large building from its level books', () => {
    const large = largeBuilding({ lines: 5, bays: 6, storeys: 5 })
    const found = headroomOf(prepare(large), 'R1')
    expect(found.filter((h) => h.amber && h.red)).toHaveLength(35)
  })
})
