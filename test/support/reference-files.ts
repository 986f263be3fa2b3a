/** The independent reference cases, by name and path. */
import { readdirSync } from 'node:fs'
import { fileURLToPath } from 'node:url'

const FOLDER = new URL('../reference/frames/', import.meta.url)

export function referenceFiles(): [string, string][] {
  return readdirSync(FOLDER)
    .filter((name) => name.endsWith('.json'))
    .map((name) => [name, fileURLToPath(new URL(name, FOLDER))])
}
