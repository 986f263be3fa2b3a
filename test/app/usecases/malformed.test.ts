/** Whatever is sent: an answer or a fault, never a bug, and the project is as it was where it was refused. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { requests, type RequestName } from '../../../app/contract/requests.ts'
import { desk } from '../../support/desk.ts'

const NAMES = Object.keys(requests) as RequestName[]
/** Requests that make or leave a project, or write a file: not sent at random. */
const AT_LARGE = /^(project\/(new|open|example|close|duplicate)|exchange|report\/save|files)/

describe('a request', () => {
  it('that there is none of is refused, the names of every object among them', async () => {
    const { envelope } = desk()
    for (const name of ['', 'project', 'project/view ', 'toString', '__proto__', 'constructor', 'hasOwnProperty'])
      expect(await envelope(name, {}), name).toEqual({
        ok: false,
        faults: [{ code: 'request.unknown', place: { value: name } }],
      })
  })

  it.each(NAMES)('%s takes nothing but its own form', async (name) => {
    const { ask, at, envelope } = desk()
    await ask('project/example', { path: at('example.levelstead') })
    const before = await ask('project/view', {})
    for (const input of [undefined, null, 3, 'x', [], { stray: 1 }, { path: 3 }, { path: '' }, { path: 'a\0b' }])
      expect(await envelope(name, input), JSON.stringify(input)).toMatchObject({
        ok: false,
        faults: [{ code: 'request.malformed', place: { value: name } }],
      })
    expect(await ask('project/view', {})).toEqual(before)
  })

  it('names the place that is not of its form', async () => {
    const { ask, at, refused } = desk()
    await ask('project/example', { path: at('example.levelstead') })
    async function place(name: RequestName, input: unknown): Promise<string | undefined> {
      const [fault] = await refused(name, input)
      expect(fault!.code).toBe('request.malformed')
      return fault!.place.path
    }
    expect(await place('report/preview', { round: 'R1', paper: 'A3' })).toBe('surveyed_by')
    expect(await place('report/pdf', { number: 1.5 })).toBe('number')
    expect(await place('describe/edit', { what: 'x', changes: [{ kind: 'support' }, { kind: 3 }] })).toBe(
      'changes.1.kind',
    )
    expect(await place('rounds/draft', { id: '', date: '' })).toBe('id')
    expect(await place('rounds/draft', { id: 'R9', date: '', levels: [4] })).toBe('levels.0')
    expect(await place('rounds/draft', { id: 'R9', date: '', book: { rows: 'none' } })).toBe('book')
    expect(await place('rounds/correct', { round: { id: 'R1', date: '' } })).toBe('reason')
  })

  it('of any content is answered or refused, and is never a bug', async () => {
    const made = desk()
    await made.ask('project/example', { path: made.at('example.levelstead') })
    const { ask, envelope } = made
    const key = fc.constantFrom(
      'id',
      'round',
      'kind',
      'line',
      'before',
      'after',
      'at',
      'x_m',
      'support',
      'levels',
      'book',
    )
    const value = fc.oneof(
      fc.jsonValue({ maxDepth: 2 }),
      fc.constantFrom('A1', 'R1', 'R6', 'A', 'S-A1', 'beam', 'stud', null, -1, 1e308, '__proto__'),
    )
    const loose = fc.dictionary(key, value, { maxKeys: 6 })
    const change = fc
      .record({
        kind: fc.constantFrom('head', 'criteria', 'support', 'section', 'line', 'node', 'member', 'point', 'roof'),
        rest: loose,
        after: fc.oneof(loose, fc.constant(null)),
      })
      .map(({ kind, rest, after }) => ({ ...rest, kind, after }))
    const row = fc.dictionary(
      fc.constantFrom('point', 'back_m', 'mid_m', 'fore_m', 'sight_m', 'level_m', 'sd_mm'),
      value,
    )
    const round = fc.record(
      {
        id: fc.constantFrom('R1', 'R6', 'R7', ' ', 'R8'),
        date: fc.constantFrom('2026-12-01', '', 'soon'),
        levels: fc.array(row, { maxLength: 3 }),
        book: fc.record({ rows: fc.array(row, { maxLength: 3 }), sd_mm_per_setup: value }),
        note: value,
      },
      { requiredKeys: ['id', 'date'] },
    )
    const name = fc.constantFrom('R1', 'R6', 'R7', 'R8', ' ', '__proto__')
    const sent: fc.Arbitrary<readonly [string, unknown]> = fc.oneof(
      fc.tuple(fc.constant('describe/edit'), fc.record({ what: name, changes: fc.array(change, { maxLength: 3 }) })),
      fc.tuple(fc.constant('rounds/draft'), round),
      fc.tuple(fc.constant('rounds/correct'), fc.record({ round, reason: name })),
      fc.tuple(fc.constantFrom('rounds/accept', 'rounds/discard', 'assess/findings'), fc.record({ round: name })),
      fc.tuple(fc.constant('rounds/baseline'), fc.record({ round: name, reason: name })),
      fc.tuple(fc.constantFrom(...NAMES.filter((n) => !AT_LARGE.test(n))), fc.jsonValue()),
    )
    await fc.assert(
      fc.asyncProperty(fc.array(sent, { minLength: 1, maxLength: 4 }), async (calls) => {
        for (const [asked, input] of calls) {
          const before = JSON.stringify(await ask('project/view', {}))
          const answer = await envelope(asked, input)
          if (answer.ok) continue
          expect('faults' in answer ? '' : answer.bug.stack, `${asked} ${JSON.stringify(input)}`).toBe('')
          expect(JSON.stringify(await ask('project/view', {}))).toBe(before)
        }
      }),
      { numRuns: 150 },
    )
  })
})
