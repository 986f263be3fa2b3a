/** What does not go well: work that is stopped, a visit that is half booked, a core that is gone. Nothing entered is lost. */
import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Page } from 'playwright-core'
import { writeBuilding } from '../../app/model/write-building.ts'
import { largeBuilding } from '../support/large-building.ts'
import { openHouse, press, type House } from './support.ts'

let house: House
let page: Page

beforeAll(async () => {
  house = await openHouse()
  page = await house.open()
  const building = largeBuilding({ lines: 8, bays: 10, storeys: 10 })
  writeFileSync(join(house.folder, 'large.building.json'), writeBuilding(building))
  await page.getByRole('button', { name: 'open', exact: true }).click()
  for (const file of ['large.building.json', 'large']) {
    await page.getByRole('dialog').getByRole('textbox').fill(join(house.folder, file))
    await press(page, 'Enter')
  }
  await page.getByRole('heading', { level: 1, name: 'Large' }).waitFor()
})
afterAll(() => house.close())

function place(name: string): Promise<void> {
  return page.getByRole('button', { name, exact: true }).click()
}

describe('trouble in the window', () => {
  it('stops setting the pages when asked to, says so, and sets them when asked again', async () => {
    await place('Issue')
    await page.getByRole('contentinfo').getByRole('button', { name: 'stop' }).click()
    const report = page.getByRole('region', { name: 'report', exact: true })
    await expect.poll(() => report.locator('.fault').last().innerText(), { timeout: 60_000 }).toContain('was stopped')
    expect(await page.locator('canvas').count()).toBe(0)
    await page.getByRole('button', { name: 'show the pages' }).click()
    await expect.poll(() => page.locator('canvas').count(), { timeout: 60_000 }).toBeGreaterThan(10)
    expect(await report.locator('.fault').allInnerTexts()).not.toContainEqual(expect.stringContaining('was stopped'))
  })

  it('leaves the place while pages are set without a word, and nothing is issued', async () => {
    await place('Assess')
    await place('Issue')
    await place('Describe')
    await page.waitForTimeout(500)
    expect(await page.getByRole('alert').allInnerTexts()).toEqual([''])
    await place('Issue')
    await expect.poll(() => page.getByText('Nothing is issued yet.').count()).toBe(1)
  })

  it('shows a half booked visit as a draft on the strip, and in Assess what it says so far', async () => {
    await place('Log')
    await page.getByLabel('date of the visit').fill('2026-09-01')
    await page.getByRole('button', { name: 'Begin round' }).click()
    await expect.poll(() => page.getByRole('radio', { name: 'round R2, 2026-09-01, draft' }).count()).toBe(1)
    await place('Assess')
    await expect
      .poll(() => page.getByRole('heading', { level: 2 }).allInnerTexts())
      .toContainEqual(expect.stringMatching(/results/))
  })

  it('says of a core that is gone what was kept and what to do, beside what was asked for', async () => {
    await page.getByRole('radio', { name: /^round R1/ }).click()
    await house.door.close()
    await place('Issue')
    const report = page.getByRole('region', { name: 'report', exact: true })
    await expect.poll(() => report.locator('.fault').last().innerText()).toContain('Start Levelstead again')
    // What the window has is still there to be read.
    await place('Assess')
    expect(await page.getByRole('row').count()).toBeGreaterThan(10)
  })
})
