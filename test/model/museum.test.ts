import { readdirSync, readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { errorLine } from '../../app/model/fault-line.ts'
import { InputFault } from '../../app/model/faults.ts'
import { readBuilding } from '../../app/model/read-building.ts'
import { readReadings } from '../../app/model/read-readings.ts'
import { smallBuilding } from '../support/made.ts'
import { MUSEUM } from './museum.ts'

const FOLDER = new URL('cases/', import.meta.url)

function faultsIn(name: string): InputFault {
  const bytes = readFileSync(new URL(name, FOLDER))
  try {
    if (name.endsWith('.csv')) readReadings(bytes, smallBuilding(), name)
    else readBuilding(bytes, name)
  } catch (error) {
    if (error instanceof InputFault) return error
    throw error
  }
  throw new Error(`${name} was read without a fault`)
}

describe('the museum of broken files', () => {
  test('shows every file that lies in it', () => {
    expect(Object.keys(MUSEUM).sort()).toEqual(readdirSync(FOLDER).sort())
  })

  test.each(Object.entries(MUSEUM))('%s is refused with every fault and its path', (name, told) => {
    const { faults } = faultsIn(name)
    expect(faults.map(({ code, place }) => (place.path === undefined ? code : `${code} at ${place.path}`))).toEqual(
      told,
    )
  })

  test.each(Object.keys(MUSEUM))(
    '%s is told in lines that name the file, the place, what is wrong and what to do',
    (name) => {
      for (const fault of faultsIn(name).faults) {
        const line = errorLine(fault)
        expect(line.startsWith(`error: ${name}: `)).toBe(true)
        if (fault.place.path) expect(line).toContain(`: ${fault.place.path}: value `)
        expect(line).toMatch(/\S; [A-Z][^\n]+\.$/)
        expect(line).not.toMatch(/undefined|\[object/)
      }
    },
  )
})
