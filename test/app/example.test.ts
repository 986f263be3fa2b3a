import { describe, expect, it } from 'vitest'
import { assessBuilding } from '../../app/assess/assess.ts'
import { bookView } from '../../app/assess/level-book.ts'
import { checkBuilding } from '../../app/model/check-building.ts'
import { exampleBuilding } from '../../app/usecases/example-building.ts'

const building = exampleBuilding()
const findings = assessBuilding(building)
const latest = findings.rounds.at(-1)!

function members(round: (typeof findings.rounds)[number]) {
  return round.frame_lines.flatMap((line) => line.members)
}

describe('the example building', () => {
  it('is a right building file, the same each time it is made', () => {
    expect(checkBuilding(building)).toEqual(exampleBuilding())
  })

  it('stands on ten supports or more, in lines of two directions, three storeys high, read seven times in a year', () => {
    expect(building.supports.length).toBeGreaterThanOrEqual(10)
    const { supports, frame_lines, survey } = building
    const at = new Map(supports.map((s) => [s.id, s]))
    const directions = new Set(
      frame_lines.map((line) => {
        const [a, b] = [line.nodes[0]!, line.nodes[1]!].map((n) => at.get(n.support!)!)
        return a!.y_m === b!.y_m ? 'x' : 'y'
      }),
    )
    expect([...directions].sort()).toEqual(['x', 'y'])
    for (const line of frame_lines) expect(new Set(line.nodes.map((n) => n.z_m)).size).toBe(4)
    expect(survey.rounds).toHaveLength(7)
    const days = (Date.parse(survey.rounds.at(-1)!.date) - Date.parse(survey.rounds[0]!.date)) / 86_400_000
    expect(days).toBeGreaterThan(330)
    expect(days).toBeLessThan(400)
  })

  it('begins all green and ends with green, amber, one red and some borderline members', () => {
    expect(findings.rounds.map((r) => r.status)).toEqual(['green', 'green', 'amber', 'amber', 'red', 'red'])
    const statuses = members(latest).map((m) => m.status)
    expect(statuses.filter((s) => s === 'red')).toHaveLength(1)
    expect(statuses.filter((s) => s === 'amber').length).toBeGreaterThan(3)
    expect(statuses.filter((s) => s === 'green').length).toBeGreaterThan(50)
    expect(members(latest).filter((m) => m.certainty === 'borderline').length).toBeGreaterThan(0)
  })

  it('has one support that was once not measured, and nothing that hangs on it is clear', () => {
    const estimated = findings.rounds.map((r) => r.supports.filter((s) => s.estimated).map((s) => s.support))
    expect(estimated).toEqual([[], [], ['B3'], [], [], []])
    const round = findings.rounds[2]!
    const spans = round.frame_lines.flatMap((l) => l.spans).filter((s) => [s.from, s.to].includes('B3'))
    expect(spans.map((s) => s.certainty)).toEqual(spans.map(() => 'borderline'))
  })

  it('is read with scatter as a digital level has it: every book closes within the class, none exactly', () => {
    for (const round of building.survey.rounds) {
      const { misclosures, checks } = bookView(building, round)
      expect(checks?.agrees).toBe(true)
      expect(misclosures).toHaveLength(2)
      for (const { misclosure_mm, within } of misclosures) {
        expect(within).toBe(true)
        expect(Math.abs(misclosure_mm)).toBeGreaterThan(0.01)
      }
    }
  })
})
