/** The ways into a file and out of it, as they are walked in the window without the system's own dialogs. */
import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Page } from 'playwright-core'
import { writeBuilding } from '../../app/model/write-building.ts'
import { exampleBuilding } from '../../app/usecases/example-building.ts'
import { focused, openHouse, press, type House } from './support.ts'

let house: House
let page: Page

beforeAll(async () => {
  house = await openHouse()
  page = await house.open()
  writeFileSync(join(house.folder, 'block.building.json'), writeBuilding({ ...exampleBuilding(), name: 'The block' }))
  writeFileSync(join(house.folder, 'half.building.json'), '{"format": "levelstead-building", "version": 1, "na')
})
afterAll(() => house.close())

function heading(): Promise<string> {
  return page.getByRole('heading', { level: 1 }).innerText()
}

async function choose(item: string): Promise<void> {
  await page.getByRole('button', { name: /^file/ }).click()
  await page.getByRole('menuitem', { name: item }).click()
}

async function answer(path: string): Promise<void> {
  await page.getByRole('dialog').getByRole('textbox').fill(path)
  await press(page, 'Enter')
}

describe('files in the window', () => {
  it('makes a project of a building file: which file, then where it is kept', async () => {
    await page.getByRole('button', { name: 'open', exact: true }).click()
    await answer(join(house.folder, 'block.building.json'))
    await expect.poll(() => page.getByRole('dialog').innerText()).toContain('Make a project of the building file')
    expect(await page.getByRole('dialog').getByRole('textbox').inputValue()).toBe('block')
    await answer(join(house.folder, 'block'))
    await expect.poll(heading).toBe('The block')
    expect(existsSync(join(house.folder, 'block.levelstead'))).toBe(true)
  })

  it('says of half a building file where it breaks off, and keeps what is open', async () => {
    await choose('open a file')
    await answer(join(house.folder, 'half.building.json'))
    await expect.poll(() => page.getByRole('dialog').innerText()).toContain('Make a project of the building file')
    await answer(join(house.folder, 'half'))
    await expect.poll(() => page.getByRole('alert').first().innerText()).toContain('half.building.json')
    expect(await page.getByRole('alert').first().innerText()).toContain('Nothing was written')
    expect(await heading()).toBe('The block')
    expect(existsSync(join(house.folder, 'half.levelstead'))).toBe(false)
    await page.getByRole('alert').first().getByRole('button', { name: 'close' }).click()
  })

  it('walks folders by keyboard, and writes over nothing', async () => {
    await choose('duplicate as')
    const dialog = page.getByRole('dialog')
    await expect.poll(() => dialog.innerText()).toContain(house.folder)
    await dialog.getByRole('button', { name: /folder up/ }).focus()
    await press(page, 'ArrowDown')
    expect(await focused(page)).toEqual({ role: 'button', name: 'block.levelstead' })
    await press(page, 'Enter')
    expect(await dialog.getByRole('textbox').inputValue()).toBe('block.levelstead')
    const before = readFileSync(join(house.folder, 'block.levelstead'))
    await dialog.getByRole('button', { name: 'save here' }).click()
    await expect.poll(() => dialog.innerText()).toContain('exists already')
    expect(readFileSync(join(house.folder, 'block.levelstead')).equals(before)).toBe(true)
    await answer(join(house.folder, 'copy'))
    await expect.poll(() => page.getByRole('dialog').count()).toBe(0)
    await expect.poll(() => existsSync(join(house.folder, 'copy.levelstead'))).toBe(true)
  })

  it('turns back from a dialog with Escape, and nothing has happened', async () => {
    await choose('export the building file')
    await press(page, 'Escape')
    await expect.poll(() => page.getByRole('dialog').count()).toBe(0)
    expect((await focused(page)).name).toMatch(/^file/)
    expect(await heading()).toBe('The block')
  })

  it('exports the building file with everything that is in it', async () => {
    await choose('export the building file')
    await answer(join(house.folder, 'out'))
    await expect.poll(() => existsSync(join(house.folder, 'out.building.json'))).toBe(true)
    const text = readFileSync(join(house.folder, 'out.building.json'), 'utf8')
    expect(JSON.parse(text)).toEqual(JSON.parse(writeBuilding({ ...exampleBuilding(), name: 'The block' })))
  })

  it('takes an edit back and does it again, each by its name', async () => {
    await page.getByRole('button', { name: 'Describe', exact: true }).click()
    await page.getByRole('tab', { name: 'Particulars' }).click()
    await page.getByRole('main').getByLabel('Name', { exact: true }).fill('The other block')
    await press(page, 'Enter')
    await expect.poll(heading).toBe('The other block')
    await page.getByRole('button', { name: /^file/ }).click()
    const undo = page.getByRole('menuitem', { name: /^undo: .+/ })
    await undo.click()
    await expect.poll(heading).toBe('The block')
    await page.getByRole('button', { name: /^file/ }).focus()
    await press(page, 'Control+Shift+z')
    await expect.poll(heading).toBe('The other block')
    await press(page, 'Control+z')
    await expect.poll(heading).toBe('The block')
  })

  it('shows which version it is, and its own checks made now', async () => {
    await choose('about, and checks of the program')
    const dialog = page.getByRole('dialog')
    await expect.poll(() => dialog.innerText()).toMatch(/(\d+) of \1 agree/)
    expect(await dialog.innerText()).toMatch(/Levelstead \d+\.\d+\.\d+/)
    await press(page, 'Escape')
  })

  it('closes the building, and offers a file, a new building and the example', async () => {
    await choose('close')
    await expect
      .poll(() => page.getByRole('heading', { level: 2 }).allInnerTexts())
      .toEqual(['Open a file', 'Start a building', 'Look at the example'])
    expect(house.complaints).toEqual([])
  })
})
