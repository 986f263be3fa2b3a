import { describe, expect, test } from 'vitest'
import { catalogue } from '../../app/model/fault-messages.ts'
import { errorLine } from '../../app/model/fault-line.ts'
import { words, type FaultCode, type Place } from '../../app/model/faults.ts'

const codes = Object.keys(catalogue) as FaultCode[]

/** A place that has everything that a sentence may ask for. */
const FULL: Place = {
  file: 'house.building.json',
  path: 'sections[2].E_GPa',
  value: -3,
  element: { kind: 'section', id: 'beam-300x600' },
  detail: new Proxy({} as Record<string, string>, {
    get: (_, key) => (/s$/.test(String(key)) ? ['A1', 'A2'] : 'given'),
  }),
}

describe('the catalogue of faults', () => {
  test.each(codes)('%s has a code of noun and adjective and whole sentences', (code) => {
    expect(code).toMatch(/^[a-z]+\.[a-z]+$/)
    const { what, kept, todo } = words({ code, place: FULL })
    for (const sentence of [what, kept, todo]) {
      expect(sentence).toMatch(/^\S.*[.?\]}\w]$/)
      expect(sentence).not.toMatch(/undefined|\[object| {2}/)
    }
    expect(kept).toMatch(/\.$/)
  })

  test.each(codes)('%s can be told of whatever little is known of its place', (code) => {
    for (const place of [{}, { path: '' }, { value: [1] }, { path: 'row 3, column date', value: null }])
      expect(errorLine({ code, place })).toMatch(/^error: .+; .+/)
  })

  test.each(codes)('%s is one line of text whatever the file holds', (code) => {
    const place = {
      ...FULL,
      value: 'two\nlines\u001b[2J',
      path: 'a\r\nb',
      element: { kind: 'node', id: '\n' } as const,
    }
    expect(errorLine({ code, place })).not.toMatch(/[\u0000-\u001f\u2028]/)
  })
})
