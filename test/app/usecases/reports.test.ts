/** The register of issued reports: numbers, revisions, and PDFs that stay what they were. */
import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import type { ReportOptions } from '../../../app/contract/views.ts'
import { setHead } from '../../../app/model/edits/description.ts'
import { printer } from '../../../app/report/print.ts'
import type { Printer } from '../../../app/usecases/ports.ts'
import { labelOf } from '../../../app/usecases/reports.ts'
import { desk, type Desk } from '../../support/desk.ts'

function options(round: string): ReportOptions {
  return { round, paper: 'A4', surveyed_by: 'N. Reader', assessed_by: 'A. Sessor', reviewer: 'R. Viewer' }
}

async function exampleDesk(parts: Parameters<typeof desk>[0] = {}): Promise<Desk> {
  const made = desk(parts)
  await made.ask('project/example', { path: made.at('example.levelstead') })
  return made
}

/** Prints only once it is let go. */
function waitingPrinter(): { printer: Printer; go: () => void } {
  let go!: () => void
  const waited = new Promise<void>((done) => (go = done))
  return { printer: { print: () => waited.then(() => ({ pdf: new Uint8Array([1]), pages: 1 })) }, go }
}

describe('an issued report', () => {
  it('is numbered by round, and a second one of the same round is its next revision', async () => {
    const { ask, edit } = await exampleDesk()
    await edit((b) => setHead(b, { reference: 'TR-014' }))
    for (const round of ['R5', 'R6', 'R5', 'R6', 'R6']) await ask('report/issue', options(round))
    expect((await ask('report/register', {})).map((r) => [r.number, r.label, r.round])).toEqual([
      [1, 'TR-014/1 rev A', 'R5'],
      [2, 'TR-014/2 rev A', 'R6'],
      [3, 'TR-014/1 rev B', 'R5'],
      [4, 'TR-014/2 rev B', 'R6'],
      [5, 'TR-014/2 rev C', 'R6'],
    ])
  })

  it('goes on after Z with AA', () => {
    const issued = Array.from({ length: 28 }, () => ({ round: 'R1' }))
    expect(labelOf({}, issued.slice(0, 25), 'R1')).toBe('1 rev Z')
    expect(labelOf({}, issued.slice(0, 26), 'R1')).toBe('1 rev AA')
    expect(labelOf({}, issued.slice(0, 27), 'R1')).toBe('1 rev AB')
    expect(labelOf({}, issued, 'R2')).toBe('2 rev A')
  })

  it('is kept byte by byte, whatever becomes of the building, and is saved over nothing', async () => {
    const { ask, at, context, edit, refused } = await exampleDesk()
    const { sha256 } = await ask('report/issue', options('R6'))
    await edit((b) => setHead(b, { name: 'Renamed since' }))
    await ask('report/save', { number: 1, to: at('one.pdf') })
    const bytes = readFileSync(at('one.pdf'))
    expect(context.hasher.sha256(bytes)).toBe(sha256)
    expect(JSON.parse(bytes.toString())).toMatchObject({ status: 'issued', round: 'R6', date: '2026-05-04' })
    writeFileSync(at('two.pdf'), 'mine')
    expect((await refused('report/save', { number: 1, to: at('two.pdf') }))[0]!.code).toBe('file.exists')
    expect(readFileSync(at('two.pdf'), 'utf8')).toBe('mine')
    for (const request of ['report/pdf', 'report/save'] as const)
      expect(
        (await refused(request, { number: 2, ...(request === 'report/save' && { to: at('x.pdf') }) }))[0]!.code,
      ).toBe('report.unknown')
    expect(existsSync(at('x.pdf'))).toBe(false)
  })

  it('needs an accepted round other than the baseline, and a refused one takes no number', async () => {
    const { ask, refused } = await exampleDesk({ printer: printer() })
    await ask('rounds/draft', { id: 'R7', date: '2026-12-01' })
    const codes = []
    for (const round of ['R0', 'R7', 'R8']) codes.push((await refused('report/issue', options(round)))[0]!.code)
    expect(codes).toEqual(['report.baseline', 'round.draft', 'round.unknown'])
    expect(await ask('report/register', {})).toEqual([])
  })

  it('is not issued where the building changed while it was printed', async () => {
    const { printer, go } = waitingPrinter()
    const { ask, edit, refused } = await exampleDesk({ printer })
    const issuing = refused('report/issue', options('R6'))
    await edit((b) => setHead(b, { name: 'Renamed meanwhile' }))
    go()
    expect((await issuing)[0]!.code).toBe('report.overtaken')
    expect(await ask('report/register', {})).toEqual([])
  })

  it('has a label of its own where two were begun at once', async () => {
    const { printer, go } = waitingPrinter()
    const { ask, envelope } = await exampleDesk({ printer })
    const both = [envelope('report/issue', options('R6')), envelope('report/issue', options('R6'))]
    go()
    const answers = await Promise.all(both)
    expect(answers.map((a) => (a.ok ? 'issued' : 'faults' in a ? a.faults[0]!.code : a.bug.message))).toEqual([
      'issued',
      'report.overtaken',
    ])
    expect(await ask('report/register', {})).toHaveLength(1)
  })

  it('is not issued once it is stopped, or into a project that was closed', async () => {
    for (const closes of [true, false]) {
      const { printer, go } = waitingPrinter()
      const signal = { aborted: false }
      const { ask, at, refused } = await exampleDesk({ printer, signal })
      const issuing = refused('report/issue', options('R6'))
      if (closes) await ask('project/close', {})
      else signal.aborted = true
      go()
      expect((await issuing)[0]!.code).toBe('work.stopped')
      await ask('project/open', { path: at('example.levelstead') })
      expect(await ask('report/register', {})).toEqual([])
    }
  })
})
