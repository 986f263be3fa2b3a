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

interface Case {
  title: string
  source: string
  relative_tolerance: number
  building: Building
  expected: unknown
}

const FLOOR: Record<string, number> = { kNm: 1e-9, kN: 1e-9, mm: 1e-9, rad: 1e-12, m: 1e-12 }

const folder = new URL('../reference/frames/', import.meta.url)

/** Where found does not agree with expected; lists are matched by the id of their entries. */
function disagreements(found: unknown, expected: unknown, tolerance: number, path = ''): string[] {
  if (Array.isArray(expected))
    return expected.flatMap((item, i) => {
      const id = idOf(item)
      const own = id === undefined ? (found as unknown[])?.[i] : (found as unknown[])?.find((x) => idOf(x) === id)
      return disagreements(own, item, tolerance, `${path}[${id ?? i}]`)
    })
  if (typeof expected === 'object' && expected !== null)
    return Object.entries(expected).flatMap(([key, value]) =>
      disagreements((found as Record<string, unknown> | undefined)?.[key], value, tolerance, `${path}.${key}`),
    )
  if (typeof expected === 'number') {
    const floor = FLOOR[/_(kNm|kN|mm|rad|m)$/.exec(path)?.[1] ?? ''] ?? 1e-12
    const agrees =
      typeof found === 'number' && Math.abs(found - expected) <= Math.max(tolerance * Math.abs(expected), floor)
    return agrees ? [] : [`${path}: expected ${expected}, found ${String(found)}`]
  }
  return found === expected ? [] : [`${path}: expected ${String(expected)}, found ${String(found)}`]
}

function idOf(item: unknown): string | undefined {
  if (typeof item !== 'object' || item === null) return undefined
  const it = item as Record<string, string>
  if (it.from !== undefined) return `${it.from}-${it.to}`
  return it.id ?? it.point ?? it.support ?? it.member ?? it.node
}

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
