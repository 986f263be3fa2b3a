import { beforeAll, describe, expect, it } from 'vitest'
import { assessBuilding } from '../../app/assess/assess.ts'
import { runVerification } from '../../app/assess/verify.ts'
import { CAUTION_LINE, CAUTIONS, RED_CAUTION } from '../../app/model/cautions.ts'
import { momentWithInterval, percent } from '../../app/model/numbers.ts'
import { printer } from '../../app/report/print.ts'
import { exampleBuilding } from '../../app/usecases/example-building.ts'
import type { Printer } from '../../app/usecases/ports.ts'
import { normalQuantile } from '../../solver/index.ts'
import { pdfPages } from '../support/pdf-text.ts'

const building = exampleBuilding()
const options: Parameters<Printer['print']>[1] = {
  round: 'R6',
  paper: 'A4',
  surveyed_by: 'A. Surveyor',
  assessed_by: 'An Assessor',
  reviewer: 'R. Reviewer',
  label: 'TR-014/1 rev A',
  status: 'issued',
  date: '2026-11-20',
  verification: runVerification(),
}
const z = normalQuantile(0.975)
const going = { aborted: false }

function folded(text: string): string {
  return text.replace(/\s+/g, ' ')
}

describe('the condition report of the example', () => {
  let pdf: Uint8Array
  let pages: string[]
  let whole: string

  beforeAll(async () => {
    const printed = await printer().print(building, options, going)
    pdf = printed.pdf
    pages = (await pdfPages(pdf)).map(folded)
    whole = pages.join(' ')
    expect(pages).toHaveLength(printed.pages)
  })

  it('carries the caution, its number and its page on every page', () => {
    pages.forEach((page, i) => {
      expect(page).toContain(CAUTION_LINE)
      expect(page).toContain('TR-014/1 rev A')
      expect(page).toContain(`page ${i + 1} of ${pages.length}`)
    })
  })

  it('says all cautions and, being red, what to do at once on the first page', () => {
    for (const caution of [...CAUTIONS, RED_CAUTION]) expect(pages[0]).toContain(caution)
    expect(pages[0]).toContain('Status: red')
  })

  it('has every section', () => {
    const headings = [
      'What was measured',
      'How sure it is',
      'Plan',
      'Frame line B',
      'Supports',
      'Spans',
      'Members',
      'Flagged members and what makes them so',
      'Method and assumptions',
      'Limits and their sources',
      'What is not covered',
      'Sign-off',
      'Appendix: level book',
      'Appendix: verification',
    ]
    for (const heading of headings) expect(whole).toContain(heading)
    for (const name of ['A. Surveyor', 'An Assessor', 'R. Reviewer']) expect(whole).toContain(name)
  })

  it('prints the figures of the findings, minus signs included', () => {
    const round = assessBuilding(building, 'R6').rounds[0]!
    const members = round.frame_lines.flatMap((line) => line.members)
    const negative = members.filter((m) => m.moment_from_kNm < -1)
    expect(negative.length).toBeGreaterThan(5)
    for (const member of members) {
      expect(whole).toContain(momentWithInterval(member.moment_from_kNm, z * member.sd_from_kNm).join(' ± '))
      if (member.induced_fraction !== undefined)
        expect(whole).toContain(percent(member.induced_fraction).replace('\u00a0', ' '))
    }
    expect(whole).toContain(`\u2212${Math.abs(negative[0]!.moment_from_kNm).toFixed(1)}`)
  })

  it('never prints a status without its certainty', () => {
    expect(whole).toMatch(/red, (clear|borderline)/)
    expect(whole).toMatch(/amber, (clear|borderline)/)
    expect(whole).toMatch(/green, (clear|borderline)/)
  })

  it('repeats the verification with its sources', () => {
    for (const row of options.verification) expect(whole).toContain(folded(row.check).slice(0, 20))
    expect(whole).not.toMatch(/\bNO\b/)
  })

  it('is the same, byte for byte, when made again', async () => {
    const again = await printer().print(building, options, going)
    expect(Buffer.from(again.pdf).equals(Buffer.from(pdf))).toBe(true)
  })

  it('comes on Letter as well, and says so of a draft', async () => {
    const printed = await printer().print(building, { ...options, paper: 'Letter', status: 'draft' }, going)
    const text = folded((await pdfPages(printed.pdf))[0]!)
    expect(text).toContain('Draft')
    expect(Buffer.from(printed.pdf).toString('latin1')).toContain('/MediaBox [0 0 612 792]')
  })
})

describe('a report that cannot be made', () => {
  it('is refused with a sentence for the baseline itself and for a round that is not there', async () => {
    await expect(printer().print(building, { ...options, round: 'R0' }, going)).rejects.toMatchObject({
      code: 'report.baseline',
    })
    await expect(printer().print(building, { ...options, round: 'R9' }, going)).rejects.toMatchObject({
      code: 'round.unknown',
    })
  })

  it('stops when nobody waits for it any more', async () => {
    await expect(printer().print(building, options, { aborted: true })).rejects.toMatchObject({ code: 'work.stopped' })
  })
})
