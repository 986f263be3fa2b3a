/** What an engineer does with the example: through the visits, to the worst member, why, and out as a report. */
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Page } from 'playwright-core'
import { assessBuilding } from '../../app/assess/assess.ts'
import { CAUTION_LINE, CAUTIONS, RED_CAUTION } from '../../app/model/cautions.ts'
import { exampleBuilding } from '../../app/usecases/example-building.ts'
import { openHouse, press, tabTo, type House } from './support.ts'

const findings = assessBuilding(exampleBuilding())

let house: House
let page: Page

beforeAll(async () => {
  house = await openHouse({ example: true })
  page = await house.open()
  await page.getByRole('button', { name: 'Assess', exact: true }).click()
})
afterAll(() => house.close())

describe('the example in the window', () => {
  it('opens on the latest visit and the line with the worst flag, red with what to do at once', async () => {
    await expect.poll(() => page.getByRole('radio', { checked: true, name: /^round R6/ }).count()).toBe(1)
    await expect
      .poll(() => page.getByRole('radio', { name: 'frame line 4, red' }).getAttribute('aria-checked'))
      .toBe('true')
    expect(await page.getByRole('alert').allInnerTexts()).toEqual(
      expect.arrayContaining([expect.stringContaining(RED_CAUTION)]),
    )
    expect(await page.locator('footer').innerText()).toContain(CAUTION_LINE)
  })

  it('has a mark on the strip for each visit, with its status in words', async () => {
    const wanted = findings.rounds.map((r) => `round ${r.id}, ${r.date}, ${r.status}`)
    await expect
      .poll(() =>
        page
          .getByRole('radiogroup', { name: 'round' })
          .getByRole('radio')
          .evaluateAll((all) => all.map((e) => e.getAttribute('aria-label'))),
      )
      .toEqual([expect.stringMatching(/^round R0, .*, baseline$/), ...wanted])
  })

  it('lists the red member first, and its figures are those of the findings', async () => {
    const first = page.getByRole('row').nth(1)
    const text = await first.innerText()
    expect(text).toContain('A4-B4/2')
    const member = findings.rounds
      .at(-1)!
      .frame_lines.flatMap((l) => l.members)
      .find((m) => m.member === 'A4-B4/2')!
    expect(text).toContain(Math.abs(member.moment_to_kNm).toFixed(1))
    expect(text).toContain(`${(member.induced_fraction! * 100).toFixed(1)}\u00a0%`)
    expect(text).toContain('clear')
  })

  it('says by keyboard alone what makes the worst member red', async () => {
    await tabTo(page, 'button', /A4-B4\/2/)
    await press(page, 'Enter')
    const because = page.getByRole('region', { name: 'because' })
    await expect.poll(() => because.innerText()).toContain('beam A4-B4/2')
    expect(await because.innerText()).toMatch(/Driven most by support B4/)
    await press(page, 'ArrowDown')
    await expect.poll(() => because.innerText()).toContain('beam B4-C4/2')
  })

  it('shows in the ledger what is picked in the drawing', async () => {
    await page.locator('.sheet svg .pickable').first().waitFor()
    const member = page.locator('.sheet svg line.pickable').nth(3)
    await member.dispatchEvent('click')
    await expect.poll(() => page.locator('tr.picked').count()).toBe(1)
  })

  it('moves in time by the arrows, and every value follows', async () => {
    await page.getByRole('radio', { name: /^round R6/ }).focus()
    await press(page, 'ArrowLeft', 'ArrowLeft', 'ArrowLeft')
    await expect.poll(() => page.getByText('round R3 against baseline R0').count()).toBe(1)
    await page.getByRole('tab', { name: 'supports' }).click()
    expect(await page.getByRole('row', { name: /^B3/ }).innerText()).toContain('estimated')
    await press(page, 'End')
    await page.getByRole('radio', { name: /^round R0/ }).click()
    await expect.poll(() => page.getByText('Settlements are counted from round R0').count()).toBe(1)
    await page.getByRole('radio', { name: /^round R6/ }).click()
  })

  it('says how many millimetres each support has left', async () => {
    await page.getByRole('tab', { name: 'headroom' }).click()
    await expect.poll(() => page.getByRole('tabpanel').getByRole('row').count()).toBe(13)
  })

  it('draws the plan and every line without a complaint', async () => {
    for (const name of ['plan', ...['A', 'B', 'C', '1', '2', '3', '4'].map((id) => new RegExp(`^frame line ${id},`))]) {
      await page.getByRole('radio', { name }).click()
      await expect
        .poll(() => page.locator('.sheet svg').getAttribute('aria-label'))
        .toMatch(typeof name === 'string' ? /plan/i : /Elevation/)
      const size = await page.locator('.sheet svg').evaluate((svg) => svg.querySelectorAll('*').length)
      expect(size).toBeGreaterThan(30)
    }
  })

  it('exaggerates the deformed line as asked, and prints the factor', async () => {
    await page.getByRole('radio', { name: /^frame line 4/ }).click()
    const slider = page.getByRole('slider', { name: 'exaggeration' })
    await slider.focus()
    await press(page, 'Home')
    await expect.poll(() => page.locator('.sheet svg text', { hasText: /deformed, × 1$/ }).count()).toBe(1)
    await page.getByRole('button', { name: /fit$/ }).click()
    await expect.poll(() => page.locator('.sheet svg text', { hasText: /deformed, × 100$/ }).count()).toBe(1)
  })

  it('shows the report page by page, issues it under a number, and opens it again', async () => {
    await page.getByRole('button', { name: 'Issue', exact: true }).click()
    for (const caution of [...CAUTIONS, RED_CAUTION])
      expect(await page.getByRole('main').innerText()).toContain(caution)
    await page.getByLabel('Surveyed by').fill('A. Surveyor')
    await page.getByLabel('For review by').fill('R. Reviewer')
    await page.getByRole('button', { name: 'show the pages' }).click()
    await expect.poll(() => page.getByText(/draft of round R6, \d\d pages/).count(), { timeout: 20_000 }).toBe(1)
    await expect
      .poll(() => page.locator('canvas').first().getAttribute('aria-label'), { timeout: 20_000 })
      .toContain('Condition report')
    await page.getByRole('button', { name: 'issue', exact: true }).click()
    await expect.poll(() => page.getByText('Issued as TR-014/1 rev A').count(), { timeout: 20_000 }).toBe(1)
    await page.reload()
    await page.getByRole('button', { name: 'Issue', exact: true }).click()
    await page.getByRole('button', { name: 'TR-014/1 rev A', exact: true }).click()
    await expect
      .poll(() => page.locator('canvas').first().getAttribute('aria-label'), { timeout: 20_000 })
      .toContain('R. Reviewer')
  })
})

describe('the window for everybody', () => {
  it.each(['light', 'dark'] as const)(
    'keeps its texts legible on its paper, %s (WCAG 2.2 AA, 4.5 to 1)',
    async (colorScheme) => {
      const view = await house.open({ colorScheme })
      await view.getByRole('button', { name: 'Assess', exact: true }).click()
      await view.locator('tbody tr').first().waitFor()
      for (const place of ['Describe', 'Log', 'Assess', 'Issue']) {
        await view.getByRole('button', { name: place, exact: true }).click()
        await view.waitForTimeout(300)
        expect(await view.evaluate(faintTexts)).toEqual([])
      }
      await view.context().close()
    },
  )

  it('loses nothing sideways at 200 % text', async () => {
    // 1280 x 720 magnified to 200 %, as a browser and the desktop window magnify.
    const view = await house.open({ viewport: { width: 640, height: 360 }, deviceScaleFactor: 2 })
    await view.getByRole('button', { name: 'Assess', exact: true }).waitFor()
    for (const place of ['Describe', 'Log', 'Assess', 'Issue']) {
      await view.getByRole('button', { name: place, exact: true }).click()
      await view.waitForTimeout(200)
      const beyond = await view.evaluate(
        () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
      )
      expect([place, beyond]).toEqual([place, 0])
      await view.screenshot({ path: `test/.out/${place}-200.png`, fullPage: true })
    }
    await view.context().close()
  })

  it('gives every control a name', async () => {
    for (const place of ['Describe', 'Log', 'Assess', 'Issue']) {
      await page.getByRole('button', { name: place, exact: true }).click()
      await page.waitForTimeout(200)
      const snapshot = await page.locator('body').ariaSnapshot()
      const nameless = snapshot
        .split('\n')
        .filter((line) => /^\s*- (button|textbox|combobox|checkbox|radio|slider|tab|link)(:| \[|$)/.test(line))
      expect([place, nameless]).toEqual([place, []])
    }
  })

  it('says nothing to its console and asks nothing of another machine', () => {
    expect(house.complaints).toEqual([])
  })
})

/** Texts of the page with less than 4.5 to 1 against what lies behind them; 3 to 1 where they are large. */
function faintTexts(): string[] {
  function channels(colour: string): number[] {
    return (colour.match(/[\d.]+/g) ?? []).map(Number)
  }
  function luminance([r = 0, g = 0, b = 0]: number[]): number {
    const [x, y, z] = [r, g, b].map((v) => (v / 255 <= 0.04045 ? v / 255 / 12.92 : ((v / 255 + 0.055) / 1.055) ** 2.4))
    return 0.2126 * x! + 0.7152 * y! + 0.0722 * z!
  }
  function behind(element: Element | null): number[] {
    for (let e = element; e; e = e.parentElement) {
      const c = channels(getComputedStyle(e).backgroundColor)
      if (c.length === 3 || (c[3] ?? 0) > 0.95) return c
    }
    return channels(getComputedStyle(document.documentElement).backgroundColor)
  }
  const faint: string[] = []
  for (const element of document.querySelectorAll('body *')) {
    const own = [...element.childNodes].some((n) => n.nodeType === Node.TEXT_NODE && n.textContent!.trim() !== '')
    const style = getComputedStyle(element)
    const box = element.getBoundingClientRect()
    if (
      !own ||
      box.width < 2 ||
      box.height < 2 ||
      style.visibility === 'hidden' ||
      (element as HTMLButtonElement).disabled
    )
      continue
    const colour = element instanceof SVGElement ? style.fill : style.color
    if (colour === 'none') continue
    const [a, b] = [luminance(channels(colour)), luminance(behind(element))]
    const ratio = (Math.max(a, b) + 0.05) / (Math.min(a, b) + 0.05)
    const isLarge = parseFloat(style.fontSize) >= 24
    if (ratio < (isLarge ? 3 : 4.5)) faint.push(`${element.textContent!.trim().slice(0, 30)}: ${ratio.toFixed(2)}`)
  }
  return [...new Set(faint)]
}
