/** The drawing by mouse, by keyboard, enlarged, on paper, and with the system's texts at twice their size. */
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Page } from 'playwright-core'
import { openHouse, press, tabTo, type House } from './support.ts'
import { pdfPages } from '../support/pdf-text.ts'

let house: House
let page: Page

beforeAll(async () => {
  house = await openHouse({ example: true })
  page = await house.open()
  await page.getByRole('button', { name: 'Assess', exact: true }).click()
  await page.getByRole('radio', { name: 'frame line 4, red', checked: true }).waitFor()
})
afterAll(() => house.close())

function tip(): Promise<string> {
  return page.locator('.tip').innerText()
}

function because(): Promise<string> {
  return page.getByRole('region', { name: 'because' }).innerText()
}

describe('the drawing', () => {
  it('says under the pointer what a member has, with its interval and its triggers', async () => {
    const box = (await page.locator('.sheet').boundingBox())!
    // The red beam: found by its colour, which stands for its status alone.
    const beam = (await page.locator('.sheet svg line[stroke="#b4241c"]').first().boundingBox())!
    await page.mouse.move(beam.x + beam.width / 4, beam.y + beam.height / 2)
    await expect.poll(tip).toMatch(/^Beam A4-B4\/2: induced .* ± .* kNm; 30 % ± 3 % of capacity/)
    expect(await tip()).toMatch(/amber from 10\s%, red from 25\s% of capacity/)
    await page.mouse.move(box.x + 3, box.y + box.height - 3)
    await expect.poll(() => page.locator('.tip').count()).toBe(0)
  })

  it('is walked by the arrows, told of at each step, and picked from by Enter', async () => {
    await tabTo(page, 'application', /^drawing/)
    await press(page, 'ArrowDown')
    const told = page.locator('.sheet [role="status"]')
    const first = await told.innerText()
    expect(first).not.toBe('')
    for (let step = 0; step < 12 && !/^Beam/.test(await told.innerText()); step++) await press(page, 'ArrowDown')
    expect(await told.innerText()).toMatch(/^Beam \S+: induced/)
    const beam = /^Beam (\S+):/.exec(await told.innerText())![1]!
    await press(page, 'Enter')
    await expect.poll(because).toContain(`beam ${beam}`)
    expect(await page.locator('tr.picked').innerText()).toContain(beam)
    await press(page, 'Escape')
    expect(await told.innerText()).toBe('')
  })

  it('is enlarged around its middle, and goes back to its place', async () => {
    const sheet = page.locator('.sheet')
    const place = await sheet.evaluate((e) => [e.clientWidth, e.scrollWidth])
    expect(place[1]).toBe(place[0])
    await press(page, '+')
    await page.getByRole('button', { name: 'larger sheet' }).click()
    await expect.poll(() => page.getByRole('group', { name: 'size of the sheet' }).innerText()).toContain('200 %')
    const [wide, whole, left] = await sheet.evaluate((e) => [e.clientWidth, e.scrollWidth, e.scrollLeft])
    expect(whole! / wide!).toBeCloseTo(2, 1)
    expect((left! + wide! / 2) / whole!).toBeCloseTo(0.5, 1)
    await page.getByRole('button', { name: 'larger sheet' }).click()
    await page.getByRole('row', { name: /^red A4-B4\/2/ }).click()
    const beam = page.locator('.sheet svg line[stroke="#b4241c"]').first()
    await expect.poll(() => beam.evaluate(isInSight)).toBe(true)
    await page.getByRole('row', { name: /^amber CC4\/3/ }).click()
    await sheet.focus()
    await press(page, '0')
    await expect.poll(() => sheet.evaluate((e) => e.scrollWidth - e.clientWidth)).toBe(0)
  })

  it('prints dark on white from a dark screen: the drawing, why, and the whole ledger', async () => {
    const dark = await house.open({ colorScheme: 'dark' })
    await dark.getByRole('button', { name: 'Assess', exact: true }).click()
    await dark.getByRole('row').nth(1).click()
    const rows = await dark.locator('tbody tr[class]').count()
    const text = (await pdfPages(new Uint8Array(await dark.pdf({ format: 'A4' })))).join(' ')
    expect(rows).toBeGreaterThan(60)
    for (const words of [
      'Frame line 4',
      'deformed, × 100',
      'Because',
      'do not wait for the report',
      'Local codes govern',
    ])
      expect(text).toContain(words)
    expect(text.match(/\b(clear|borderline)\b/g)!.length).toBeGreaterThan(60)
    await dark.emulateMedia({ media: 'print' })
    const paper = await dark.evaluate(() => getComputedStyle(document.body.parentElement!).backgroundColor)
    expect(paper).toBe('rgb(255, 255, 255)')
    await dark.context().close()
  })

  it('keeps within the window where the system shows texts at twice their size', async () => {
    const view = await house.open()
    // As somebody has set it in the browser: places are laid out by it, too.
    const devtools = await view.context().newCDPSession(view)
    await devtools.send('Page.setFontSizes', { fontSizes: { standard: 32 } })
    await view.reload()
    await expect.poll(() => view.evaluate(() => getComputedStyle(document.body).fontSize)).toBe('28px')
    for (const place of ['Describe', 'Log', 'Assess', 'Issue']) {
      await view.getByRole('button', { name: place, exact: true }).click()
      await view.waitForTimeout(300)
      const beyond = await view.evaluate(
        () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
      )
      expect([place, beyond]).toEqual([place, 0])
      await view.screenshot({ path: `test/.out/${place}-texts-200.png` })
    }
    await view.context().close()
  })

  it('says nothing to its console and asks nothing of another machine', () => {
    expect(house.complaints).toEqual([])
  })
})

/** Whether the middle of an element lies within the part of its sheet that is seen. */
function isInSight(element: Element): boolean {
  const [own, seen] = [element.getBoundingClientRect(), element.closest('.sheet')!.getBoundingClientRect()]
  const [x, y] = [own.x + own.width / 2, own.y + own.height / 2]
  return x >= seen.left && x <= seen.right && y >= seen.top && y <= seen.bottom
}
