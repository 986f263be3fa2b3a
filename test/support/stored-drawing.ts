/**
 * Compares a drawing with the one stored. Numbers may differ by what another processor rounds otherwise; all else is
 * exact. A drawing that changed is written beside the stored one, to be looked at and, where right, put in its place.
 */
import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { expect } from 'vitest'

const FOLDER = new URL('../app/drawings/', import.meta.url)
const NUMBER = /-?\d+(?:\.\d+)?/g
/** mm: a few units of the third digit. */
const SAME = 0.004

export function expectDrawing(name: string, drawn: string): void {
  const stored = new URL(`${name}.svg`, FOLDER)
  const changed = new URL(`${name}.changed.svg`, FOLDER)
  const before = existsSync(stored) ? readFileSync(stored, 'utf8') : ''
  const difference = firstDifference(before, drawn)
  if (difference === undefined) {
    rmSync(changed, { force: true })
    return
  }
  writeFileSync(changed, drawn)
  expect.fail(`${name}.svg is drawn otherwise (${difference}); look at test/app/drawings/${name}.changed.svg`)
}

/** The first line that differs, and how; undefined where the drawings are alike. */
export function firstDifference(before: string, after: string): string | undefined {
  const a = before.split('\n')
  const b = after.split('\n')
  for (let i = 0; i < Math.max(a.length, b.length); i++) {
    const [x = '', y = ''] = [a[i], b[i]]
    const isAlike = x.replace(NUMBER, '#') === y.replace(NUMBER, '#') && nearNumbers(x, y)
    if (!isAlike) return `line ${i + 1}: ${x.slice(0, 120)} is now ${y.slice(0, 120)}`
  }
  return undefined
}

function nearNumbers(a: string, b: string): boolean {
  const numbers = b.match(NUMBER) ?? []
  return (a.match(NUMBER) ?? []).every((n, i) => Math.abs(Number(n) - Number(numbers[i])) <= SAME)
}
