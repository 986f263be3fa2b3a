import { readFileSync } from 'node:fs'
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { applyChanges, reverseEdit } from '../../app/model/apply-changes.ts'
import type { Building } from '../../app/model/building.ts'
import { editOf } from '../../app/model/edits/difference.ts'
import { errorLine } from '../../app/model/fault-line.ts'
import { InputFault } from '../../app/model/faults.ts'
import { readBuilding } from '../../app/model/read-building.ts'
import { writeBuilding } from '../../app/model/write-building.ts'
import { anyBuilding, smallBuilding } from '../support/made.ts'
import { referenceFiles } from '../support/reference-files.ts'

/** A building, or faults that can be told; whatever else is thrown fails the test. */
function readOrTold(input: string | Uint8Array): Building | readonly string[] {
  try {
    return readBuilding(input, 'any.building.json')
  } catch (error) {
    if (!(error instanceof InputFault)) throw error
    expect(error.faults.length).toBeGreaterThan(0)
    return error.faults.map((fault) => errorLine(fault))
  }
}

describe('a building file', () => {
  test.each(referenceFiles())(
    '%s of the reference folder reads without a fault and comes back as it was',
    (_, path) => {
      const { building } = JSON.parse(readFileSync(path, 'utf8')) as { building: Building }
      const read = readBuilding(JSON.stringify(building))
      expect(read).toEqual(building)
      expect(readBuilding(writeBuilding(read))).toEqual(building)
    },
  )

  test('that says everything the format can say comes back as it was', () => {
    expect(readBuilding(writeBuilding(smallBuilding()))).toEqual(smallBuilding())
  })

  test('of any building comes back as that building, and is written the same again', () => {
    fc.assert(
      fc.property(anyBuilding, (building) => {
        const file = writeBuilding(building)
        const read = readBuilding(new TextEncoder().encode(file))
        expect(read).toEqual(building)
        expect(writeBuilding(read)).toBe(file)
      }),
    )
  })

  test('is written without what a project knows of its rounds besides', () => {
    const building = smallBuilding()
    const visited = { ...building.survey.rounds[0]!, observer: 'someone', state: 'accepted' }
    const file = writeBuilding({
      ...building,
      survey: { ...building.survey, rounds: [visited, building.survey.rounds[1]!] },
    })
    expect(file).toBe(writeBuilding(building))
  })

  test('of any bytes is a building or a list of faults, never another error', () => {
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 400 }), (bytes) => void readOrTold(bytes)),
      { numRuns: 500 },
    )
  })

  test('of any JSON is a building or a list of faults, one line each', () => {
    fc.assert(
      fc.property(fc.json({ noUnicodeString: false }), (text) => {
        const told = readOrTold(text)
        if (Array.isArray(told)) for (const line of told) expect(line).toMatch(/^error: any\.building\.json: [^\n]+$/)
      }),
      { numRuns: 300 },
    )
  })

  test('with any one value replaced is a building or a list of faults', () => {
    const places = pathsOf(smallBuilding())
    const odd = fc.oneof(fc.jsonValue(), fc.double(), fc.constantFrom(undefined, '', '30', '1,5', -1, 0, 1e308, NaN))
    fc.assert(
      fc.property(fc.constantFrom(...places), odd, (path, value) => {
        const building = smallBuilding()
        put(building, path, value)
        readOrTold(JSON.stringify(building).replaceAll('null', 'NaN'))
      }),
      { numRuns: 1000 },
    )
  })

  test('with a stretch of its text cut out or doubled is a building or a list of faults', () => {
    const file = writeBuilding(smallBuilding())
    const at = fc.nat({ max: file.length })
    fc.assert(
      fc.property(at, at, fc.boolean(), (a, b, isDoubled) => {
        const [from, to] = [Math.min(a, b), Math.max(a, b)]
        const stretch = file.slice(from, to)
        readOrTold(isDoubled ? file.slice(0, to) + stretch + file.slice(to) : file.slice(0, from) + file.slice(to))
      }),
      { numRuns: 500 },
    )
  })

  test('cut off anywhere is told as not whole, and nothing of it is taken', () => {
    const file = writeBuilding(smallBuilding()).trimEnd()
    for (let length = 1; length < file.length; length++)
      expect(() => readBuilding(file.slice(0, length))).toThrow(InputFault)
  })
})

describe('changes', () => {
  test('from one building to any other and back give the same file', () => {
    fc.assert(
      fc.property(anyBuilding, anyBuilding, (before, other) => {
        const after = { ...other, survey: { ...before.survey, points: other.survey.points } }
        const edit = editOf('Change all', before, after)
        const changed = applyChanges(before, edit.changes)
        const back = applyChanges(changed, reverseEdit(edit).changes)
        expect(writeBuilding(back)).toBe(writeBuilding(before))
        expect(writeBuilding(applyChanges(back, edit.changes))).toBe(writeBuilding(changed))
      }),
    )
  })
})

type Path = readonly (string | number)[]

function pathsOf(value: unknown, path: Path = []): Path[] {
  if (typeof value !== 'object' || value === null) return [path]
  const below = Object.entries(value).flatMap(([key, item]) => pathsOf(item, [...path, key]))
  return path.length === 0 ? below : [path, ...below]
}

function put(root: object, path: Path, value: unknown): void {
  let at = root as Record<string | number, unknown>
  for (const step of path.slice(0, -1)) at = at[step] as Record<string | number, unknown>
  at[path.at(-1)!] = value
}
