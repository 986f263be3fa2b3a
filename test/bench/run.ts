/** `npm run bench`: every bench of this folder, ratios within the run where it can. */
import { readdirSync } from 'node:fs'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { buildStale } from '../../app/shells/build.ts'

interface Bench {
  run(): { name: string; lines: string[] } | Promise<{ name: string; lines: string[] }>
}

await buildStale(['core'])
const wanted = process.argv.slice(2)
const files = readdirSync(import.meta.dirname)
  .filter((name) => name.endsWith('.bench.ts'))
  .filter((name) => wanted.length === 0 || wanted.some((word) => name.includes(word)))
for (const file of files.sort()) {
  const { run } = (await import(pathToFileURL(join(import.meta.dirname, file)).href)) as Bench
  const { name, lines } = await run()
  console.log(`\n${name}`)
  for (const line of lines) console.log(`  ${line}`)
}
