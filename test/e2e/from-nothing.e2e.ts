/**
 * By keyboard alone from nothing to an issued report: a building is described, two visits are booked, the members that
 * the settlement flags are seen and explained, and the PDF says of them what an assessment made apart from the window
 * says of the exported building.
 */
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Page } from 'playwright-core'
import { assessBuilding } from '../../app/assess/assess.ts'
import type { RoundView } from '../../app/contract/views.ts'
import type { Building } from '../../app/model/building.ts'
import { byWorst, type MemberFinding } from '../../app/model/findings.ts'
import { moment, percent } from '../../app/model/numbers.ts'
import { projects } from '../../db/projects.ts'
import { pdfPages } from '../support/pdf-text.ts'
import { focused, openHouse, press, tabTo, type House } from './support.ts'

/** Staff readings in m at the baseline, and settlement until the second visit in mm. */
const STUDS: readonly [stud: string, reading_m: number, settlement_mm: number][] = [
  ['S-A1', 0.8, 0.3],
  ['S-A2', 0.81, 0.9],
  ['S-A3', 0.82, 3.2],
  ['S-A4', 0.83, 2.1],
  ['S-B1', 0.84, 0.2],
  ['S-B2', 0.85, 2.0],
  ['S-B3', 0.86, 9.1],
  ['S-B4', 0.87, 3.0],
]

let house: House
let page: Page
let file: string

beforeAll(async () => {
  house = await openHouse()
  page = await house.open()
  file = `${house.folder}/lime-kiln.levelstead`
})
afterAll(() => house.close())

async function type(text: string): Promise<void> {
  await press(page, 'Control+a')
  await page.keyboard.type(text)
}

async function fill(name: string | RegExp, text: string): Promise<void> {
  await tabTo(page, 'textbox', name)
  await type(text)
}

async function act(name: string | RegExp): Promise<void> {
  await tabTo(page, 'button', name)
  await press(page, 'Enter')
}

/** The building and what is kept beside it, read from the file as another program would. */
function stored(): { building: Building; draft: RoundView | undefined; pdf: Uint8Array | undefined } {
  const project = projects().open(file)
  try {
    const draft = project.read.rounds().find((round) => round.state === 'draft')
    return { building: project.read.building(), draft, pdf: project.read.pdf(1) }
  } finally {
    project.close()
  }
}

describe('by keyboard alone, from nothing', () => {
  it('starts a building and says what is missing first', async () => {
    await fill('its name', 'Lime Kiln Lane, store')
    await press(page, 'Enter')
    await expect.poll(() => focused(page)).toEqual({ role: 'textbox', name: 'name' })
    await type(file)
    await press(page, 'Enter')
    await expect.poll(() => page.getByRole('heading', { level: 1 }).innerText()).toBe('Lime Kiln Lane, store')
    await act(/^There are no supports yet/)
    await expect.poll(() => focused(page)).toEqual({ role: 'textbox', name: 'Spacings from left to right in m' })
  })

  it('lays out supports by typing spacings, and keeps a mistyped one with its remedy', async () => {
    await type('2 x 6.0, 5.4m')
    await press(page, 'Enter')
    await expect.poll(() => page.locator('#part .fault').innerText()).toContain('5.4m')
    expect(await page.locator(':focus').inputValue()).toBe('2 x 6.0, 5.4m')
    await type('2 x 6.0, 5.4')
    await press(page, 'Enter')
    await fill(/^Spacings from near to far/, '5.6')
    await press(page, 'Enter')
    await expect
      .poll(() => stored().building.supports.map((s) => `${s.id} ${s.x_m} ${s.y_m}`))
      .toEqual(['A1 0 0', 'A2 6 0', 'A3 12 0', 'A4 17.4 0', 'B1 0 5.6', 'B2 6 5.6', 'B3 12 5.6', 'B4 17.4 5.6'])
  })

  it('adds sections with what they can take', async () => {
    await act(/^There is no section yet/)
    await addSection('beam', { sides: '300 x 550', sagging: '165', hogging: '190', shear: '190' })
    await addSection('column', { sides: '350 x 350', sagging: '120' })
    const { sections } = stored().building
    expect(sections).toEqual([
      {
        id: 'beam',
        material: 'concrete',
        E_GPa: 30,
        I_cm4: 415938,
        A_cm2: 1650,
        shear_area_cm2: 1375,
        stiffness_factor: 0.5,
        capacity: { sagging_kNm: 165, hogging_kNm: 190, shear_kN: 190 },
      },
      {
        id: 'column',
        material: 'concrete',
        E_GPa: 30,
        I_cm4: 125052,
        A_cm2: 1225,
        shear_area_cm2: 1020.83,
        stiffness_factor: 0.5,
        capacity: { sagging_kNm: 120 },
      },
    ])
  })

  it('makes the frame lines of the grid from storey heights: bays and columns appear', async () => {
    await act(/^There is no frame line yet/)
    await expect.poll(() => focused(page)).toEqual({ role: 'textbox', name: 'storey heights, from the lowest in m' })
    await type('3.6, 3.2')
    await press(page, 'Enter')
    await act('Make the 6 frame lines of the grid')
    await expect
      .poll(() => stored().building.frame_lines.map((l) => `${l.id} ${l.members.length}`))
      .toEqual(['A 14', 'B 14', '1 6', '2 6', '3 6', '4 6'])
    await expect.poll(() => page.getByRole('img', { name: /frame line A/i }).count()).toBe(1)
  })

  it('sets loads on all beams at once, strikes a member out and takes that back', async () => {
    await act(/^No member carries a load/)
    await act('beams of all lines')
    await fill('permanent load in kN/m', '9')
    await press(page, 'Enter')
    await fill('variable load in kN/m', '4')
    await press(page, 'Enter')
    await expect
      .poll(() => beams().map((m) => m.loads?.map((l) => 'kN_per_m' in l && l.kN_per_m)))
      .toEqual(Array.from({ length: 20 }, () => [9, 4]))
    await act('none')
    await tabTo(page, 'checkbox', 'CA1/1')
    await press(page, 'ArrowDown', 'Space')
    await act('strike out')
    await expect.poll(() => stored().building.frame_lines[0]?.members.length).toBe(13)
    await act('undo: Strike out CA2/1')
    await expect.poll(() => stored().building.frame_lines[0]?.members.length).toBe(14)
  })

  it('places studs and a benchmark', async () => {
    await act(/^There is no levelling stud yet/)
    await expect.poll(() => focused(page)).toMatchObject({ name: 'Place a stud at each of 8 supports' })
    await press(page, 'Enter')
    await fill('benchmark', 'BM1')
    await fill('its level m', '10.0000')
    await act('Add benchmark')
    await expect.poll(() => stored().building.survey.points.length).toBe(9)
  })

  it('books the baseline, and accepts it only after saying what that freezes', async () => {
    await act(/^There is no baseline yet/)
    await fill('date of the visit', '2026-03-02')
    await act('Begin round')
    await expect.poll(() => focused(page)).toMatchObject({ name: 'sd for 1 km, mm' })
    await type('0.7')
    await tabTo(page, 'textbox', 'row 1, point')
    await row('BM1', { back: '1.2000', length: '15' })
    for (const [stud, reading] of STUDS) await row(stud, { mid: reading.toFixed(4), length: '15' })
    await row('BM1', { fore: '1.2001', length: '15' })
    await expect.poll(() => found()).toContain('The loop from BM1 closes to')
    await press(page, 'Escape')
    await act(/^Accept round R0/)
    expect(await page.getByRole('dialog').innerText()).toContain('Its 10 rows are frozen')
    await act('Accept and freeze')
    await expect.poll(() => stored().building.survey.baseline).toBe('R0')
  })

  it('shows results while the second visit is typed, and keeps a reading that is no number', async () => {
    await fill('date of the visit', '2026-06-01')
    await act('Begin round')
    await act(/^Take the points of R0/)
    await expect.poll(() => focused(page)).toEqual({ role: 'textbox', name: 'row 1, point' })
    await row('', { back: '1.2000', length: '15' })
    for (const [, reading, settlement] of STUDS)
      await row('', { mid: (reading + settlement / 1000).toFixed(4), length: '15' })
    expect(await page.getByRole('region', { name: 'results while typing' }).innerText()).toMatch(/^(Red|Amber)/)
    expect(await page.getByRole('row', { name: /^S-B3 10/ }).innerText()).toMatch(/\s9\.1\s/)
    await row('', { fore: '1.20o0', length: '15' })
    await press(page, 'ArrowUp', 'ArrowRight', 'ArrowRight', 'ArrowRight')
    expect(await page.locator('.reading-grid .said').innerText()).toContain('"1.20o0" is no number')
    await expect.poll(() => JSON.stringify(draftRows().at(-1))).toContain('1.20o0')
    await page.keyboard.type('1.2000')
    await press(page, 'Enter')
    expect(await page.locator('.reading-grid .said').innerText()).toBe('')
    expect(await found()).toContain('The loop from BM1 closes to 0.0 mm')
  })

  it('keeps what was typed when the window is gone in the midst of it', async () => {
    await expect.poll(() => draftRows().at(-1)).toEqual({ point: 'BM1', fore_m: 1.2, sight_m: 15 })
    await page.reload()
    await act(/^Round R1 is a draft/)
    await expect.poll(() => page.getByLabel('row 8, intermediate in m').inputValue()).toBe('0.8691')
    await tabTo(page, 'textbox', 'row 1, point')
    await press(page, 'Escape')
    await act(/^Accept round R1/)
    await act('Accept and freeze')
    await expect.poll(() => stored().building.survey.rounds.length).toBe(2)
    await expect.poll(() => page.getByRole('radio', { name: /^round R1, 2026-06-01, red$/ }).count()).toBe(1)
  })

  it('shows plan and elevation with the flagged members, and says why the worst is flagged', async () => {
    await press(page, 'Alt+3')
    await tabTo(page, 'radio', /^(plan|frame line )/)
    for (let i = 0; i < 6; i++) await press(page, 'ArrowLeft')
    await expect.poll(() => focused(page)).toEqual({ role: 'radio', name: 'plan' })
    await expect.poll(() => page.getByRole('img', { name: /^Plan of 8 supports.*worst flag red/ }).count()).toBe(1)
    const { line, member } = worst()
    await tabTo(page, 'button', new RegExp(`${member.member}`))
    await press(page, 'Enter')
    await expect.poll(() => page.getByRole('img', { name: new RegExp(`frame line ${line}.*red`, 'i') }).count()).toBe(1)
    const why = await page.getByRole('region', { name: 'because' }).innerText()
    expect(why).toContain('B3')
    const { fraction_end: end, moment_from_kNm, moment_to_kNm } = member
    expect(why).toContain(`${moment(Math.abs(end === 'from' ? moment_from_kNm : moment_to_kNm))} ± `)
    expect(why).toContain('has reached red')
  })

  it('issues a report whose figures of the flagged member are those found apart from the window', async () => {
    await press(page, 'Alt+4')
    await fill('Surveyed by', 'the surveyor')
    await fill('Assessed by', 'the assessor')
    await fill('For review by (licensed engineer)', 'the engineer')
    await act('issue')
    await expect.poll(() => stored().pdf?.length ?? 0, { timeout: 30_000 }).toBeGreaterThan(10_000)
    const pages = await pdfPages(stored().pdf!)
    const text = pages
      .join(' ')
      .replace(/\s+/g, ' ')
      .replace(/ ± [\d.]+( %)?/g, '')
    const row = printedRow(worst())
    expect(text.includes(row), `the report has the row: ${row}`).toBe(true)
    expect(house.complaints).toEqual([])
  })
})

/** The worst member as an assessment apart from the window finds it, from the building as exported. */
function worst(): { line: string; member: MemberFinding } {
  const exported = JSON.parse(JSON.stringify(stored().building)) as Building
  const [round] = assessBuilding(exported, 'R1').rounds
  return round!.frame_lines
    .flatMap(({ id, members }) => members.map((member) => ({ line: id, member })))
    .sort(
      (a, b) =>
        byWorst(a.member.status, b.member.status) ||
        (b.member.induced_fraction ?? 0) - (a.member.induced_fraction ?? 0),
    )[0]!
}

/** The member's row in the report's table of members, its intervals left out. */
function printedRow({ line, member: m }: { line: string; member: MemberFinding }): string {
  return [
    line,
    m.member,
    moment(m.moment_from_kNm),
    moment(m.moment_to_kNm),
    `${moment(m.existing_from_kNm!)}, ${moment(m.existing_to_kNm!)}`,
    percent(m.induced_fraction!),
    percent(m.utilisation!),
    `${m.status}, ${m.certainty}`,
  ]
    .join(' ')
    .replace(/\s/g, ' ')
}

function draftRows(): unknown[] {
  return stored().draft?.book?.rows ?? []
}

async function addSection(
  name: string,
  { sides, ...capacities }: { sides: string; sagging: string; hogging?: string; shear?: string },
): Promise<void> {
  await fill('name', name)
  await fill(/^rectangle, width x depth/, sides)
  await press(page, 'Enter')
  await fill('E GPa', '30')
  await fill('factor on EI', '0.5')
  for (const [heading, text] of Object.entries(capacities)) await fill(new RegExp(`^${heading} kNm?$`), text)
  await act('Add section')
  await expect.poll(() => stored().building.sections.some((s) => s.id === name)).toBe(true)
}

function beams() {
  return stored().building.frame_lines.flatMap((line) => line.members.filter((m) => m.kind === 'beam'))
}

/** One row of the book from its first cell on; leaves the keyboard in the first cell of the next. */
async function row(
  point: string,
  { back = '', mid = '', fore = '', length }: { back?: string; mid?: string; fore?: string; length: string },
): Promise<void> {
  if (point) await page.keyboard.type(point)
  for (const reading of [back, mid, fore, length]) {
    await press(page, 'Tab')
    if (reading) await page.keyboard.type(reading)
  }
  await press(page, 'Tab')
}

/** What stands at the side while typing. */
function found(): Promise<string> {
  return page.locator('aside.found').innerText()
}
