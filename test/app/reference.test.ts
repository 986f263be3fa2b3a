/**
 * Every reference case, made apart from this project, against the whole chain. A value agrees within the case's
 * relative tolerance; a value that is zero by theory is rounding noise on both sides and is held to a floor
 * far below anything that can be measured or matters: 1e-9 kNm and kN (a building's moments are some 1e2), 1e-9 mm,
 * 1e-12 rad, 1e-12 m.
 */
import { readdirSync, readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { assessBuilding } from '../../app/assess/assess.ts'
import type { Building } from '../../app/model/building.ts'
import { disagreements } from '../support/disagreements.ts'

interface Case {
  title: string
  source: string
  relative_tolerance: number
  building: Building
  expected: unknown
}

const folder = new URL('../reference/frames/', import.meta.url)

describe('reference cases, each solved apart from this project', () => {
  for (const file of readdirSync(folder).filter((f) => f.endsWith('.json'))) {
    const reference = JSON.parse(readFileSync(new URL(file, folder), 'utf8')) as Case
    test(`${file}: ${reference.title} (${reference.source})`, () => {
      const found = assessBuilding(reference.building)
      expect(disagreements(found, reference.expected, reference.relative_tolerance)).toEqual([])
    })
  }

  test('the comparison notices a moment that is off by two parts in a million, and one that is missing', () => {
    const expected = { members: [{ member: 'AB', moment_from_kNm: 100, moment_to_kNm: 0 }] }
    const found = { members: [{ member: 'AB', moment_from_kNm: 100.0002 }] }
    expect(disagreements(found, expected, 1e-6)).toHaveLength(2)
  })
})
