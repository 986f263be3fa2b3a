/** A visit in Log beyond the plain way: pasted readings, a blunder, a refused round, a correction with its reason. */
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Page } from 'playwright-core'
import { projects } from '../../db/projects.ts'
import { focused, openHouse, press, tabTo, type House } from './support.ts'

let house: House
let page: Page

beforeAll(async () => {
  house = await openHouse({ example: true })
  page = await house.open()
  await page.getByRole('button', { name: 'Log', exact: true }).waitFor()
  await press(page, 'Alt+2')
})
afterAll(() => house.close())

function rounds() {
  const project = projects().open(`${house.folder}/example.levelstead`)
  try {
    return project.read.rounds()
  } finally {
    project.close()
  }
}

async function paste(text: string): Promise<void> {
  await page.evaluate((copied) => {
    const clipboardData = new DataTransfer()
    clipboardData.setData('text/plain', copied)
    const event = new ClipboardEvent('paste', { clipboardData, bubbles: true, cancelable: true })
    document.activeElement!.dispatchEvent(event)
  }, text)
}

function cell(row: number, column: number): Promise<string> {
  return page.locator(`input[data-spot="${row}-${column}"]`).inputValue()
}

describe('logging a visit', () => {
  it('takes a table pasted with headings once it has been shown as it is understood', async () => {
    await tabTo(page, 'button', 'Begin round')
    await press(page, 'Enter')
    await expect.poll(() => focused(page)).toEqual({ role: 'textbox', name: 'row 1, point' })
    await paste('point;FS;BS;IS;dist;remark\nBM1;;1,2764;;21,8;\nS-A1;;;1,0465;14,2;wet\n')
    const shown = page.getByRole('region', { name: 'pasted table' })
    expect(await shown.innerText()).toContain('remark left out')
    expect(await focused(page)).toMatchObject({ name: 'Take these rows in place of those typed' })
    await press(page, 'Enter')
    await expect.poll(() => cell(1, 2)).toBe('1,0465')
    expect(await page.getByRole('row', { name: /^2 / }).innerText()).toContain('42.72')
  })

  it('lets a block without headings be put down from a cell on, and takes it back', async () => {
    await expect.poll(() => focused(page)).toMatchObject({ name: 'row 1, point' })
    await press(page, 'ArrowDown', 'ArrowDown')
    await paste('S-B1\t\t1.0473\t\t12.7\nS-C1\t\t1.0428\t\t15.9\n')
    await expect.poll(() => cell(3, 0)).toBe('S-C1')
    await press(page, 'Control+z')
    await expect.poll(() => cell(2, 0)).toBe('')
    await press(page, 'Control+y')
    await expect.poll(() => cell(3, 0)).toBe('S-C1')
  })

  it('moves, inserts, takes out and clears as hands know it', async () => {
    await press(page, 'Home', 'ArrowUp', 'Tab', 'Tab')
    expect(await focused(page)).toEqual({ role: 'textbox', name: 'row 2, intermediate in m' })
    await press(page, 'Enter')
    expect(await focused(page)).toEqual({ role: 'textbox', name: 'row 3, point' })
    await press(page, 'ArrowRight', 'ArrowRight', 'Delete')
    expect(await cell(2, 2)).toBe('')
    await press(page, 'Escape')
    expect(await cell(2, 2)).toBe('1.0473')
    await press(page, 'F2', 'Backspace')
    await page.keyboard.type('4')
    expect(await cell(2, 2)).toBe('1.0474')
    await press(page, 'Enter', 'Escape')
    await tabTo(page, 'button', /^insert a row above/)
    await press(page, 'Enter')
    await expect.poll(() => cell(3, 0)).toBe('')
    await press(page, 'Escape')
    await tabTo(page, 'button', /^take row 4 out/)
    await press(page, 'Enter')
    await expect.poll(() => cell(3, 0)).toBe('S-C1')
  })

  it('refuses a round with a point that is not described, beside its row, and keeps all that was typed', async () => {
    await tabTo(page, 'textbox', /^row \d+, /)
    await press(page, 'Control+End', 'Home')
    await page.keyboard.type('S-X9')
    await press(page, 'Tab', 'Tab')
    await page.keyboard.type('1.2000')
    await press(page, 'Tab', 'Tab')
    await page.keyboard.type('10')
    await press(page, 'Escape')
    await press(page, 'Escape')
    await tabTo(page, 'button', /^Accept round R7/)
    await press(page, 'Enter')
    await tabTo(page, 'button', 'Accept and freeze')
    await press(page, 'Enter')
    await expect.poll(() => page.getByRole('dialog').innerText()).toContain('S-X9')
    await press(page, 'Escape')
    const last = page.getByLabel('row 5, point')
    expect(await last.inputValue()).toBe('S-X9')
    expect(await last.getAttribute('aria-invalid')).toBe('true')
    expect(rounds().find((round) => round.id === 'R7')?.state).toBe('draft')
  })

  it('throws a draft away only when asked twice', async () => {
    await tabTo(page, 'button', /^discard the draft/)
    await press(page, 'Enter')
    expect(await page.getByRole('dialog').innerText()).toContain('Nothing accepted is touched')
    await tabTo(page, 'button', 'Discard')
    await press(page, 'Enter')
    await expect.poll(() => rounds().some((round) => round.id === 'R7')).toBe(false)
  })

  it('marks what a blunder disturbs at once, while a correction is typed', async () => {
    await tabTo(page, 'button', /^Correct with a reason/)
    await press(page, 'Enter')
    await tabTo(page, 'textbox', /^row \d+, /)
    for (let i = 0; i < 13; i++) await press(page, 'ArrowDown')
    for (let i = 0; i < 3; i++) await press(page, 'ArrowRight')
    expect(await focused(page)).toEqual({ role: 'textbox', name: 'row 14, fore in m' })
    await page.keyboard.type('1.14437')
    await expect.poll(() => page.locator('td.doubtful').count()).toBeGreaterThan(0)
    expect(await page.getByRole('region', { name: 'does the book close' }).innerText()).toContain(
      '-9.8'.replace('-', '−'),
    )
    await page.keyboard.press('Control+a')
    await page.keyboard.type('1.13438')
    await expect.poll(() => page.locator('td.doubtful').count()).toBe(0)
  })

  it('stores the correction with its reason as a new version, and the old one stays to be seen', async () => {
    await tabTo(page, 'textbox', 'reason of the correction')
    await page.keyboard.type('one tenth misread at BM2')
    await tabTo(page, 'button', 'Store as version 2')
    await press(page, 'Enter')
    await expect
      .poll(() =>
        rounds()
          .filter((round) => round.id === 'R6')
          .map(({ state, version, reason }) => ({ state, version, reason })),
      )
      .toEqual(
        expect.arrayContaining([
          { state: 'superseded', version: 1, reason: undefined },
          { state: 'accepted', version: 2, reason: 'one tenth misread at BM2' },
        ]),
      )
    await tabTo(page, 'button', /version 1, replaced/)
    await press(page, 'Enter')
    await expect.poll(() => cell(13, 3)).toBe('1.13437')
    expect(await page.locator('input[data-spot="13-3"]').getAttribute('readonly')).not.toBeNull()
    expect(house.complaints).toEqual([])
  })
})
