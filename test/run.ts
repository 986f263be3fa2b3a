/**
 * `npm test`: all suites, one after the other; `npm run test:e2e`: those in the browser alone. Gets what they need, adds up
 * their counts and ends with the one line `N passed, N failed`.
 */
import { spawn } from 'node:child_process'
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import { buildStale } from '../app/shells/build.ts'
import { ensuredBrowser } from './support/browser.ts'

const root = join(import.meta.dirname, '..')
const out = join(root, 'test', '.out')
const SUITES = { unit: 'test/vitest.config.ts', e2e: 'test/e2e/vitest.config.ts' }
type Suite = keyof typeof SUITES

interface Counts {
  passed: number
  failed: number
  skipped: number
}

interface Result {
  status: string
  message?: string
  name: string
  assertionResults: { status: string; fullName: string }[]
}

async function runSuite(suite: Suite, environment: Record<string, string>): Promise<Counts> {
  const report = join(out, `${suite}.json`)
  rmSync(report, { force: true })
  const vitest = join(root, 'node_modules', 'vitest', 'vitest.mjs')
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${report}`]
  const child = spawn(process.execPath, [vitest, 'run', '--config', SUITES[suite], ...reporters], {
    cwd: root,
    stdio: 'inherit',
    env: { ...process.env, ...environment },
  })
  await new Promise((done) => child.on('exit', done))
  if (!existsSync(report)) {
    console.error(`The suite ${suite} ended without a report.`)
    return { passed: 0, failed: 1, skipped: 0 }
  }
  return counted((JSON.parse(readFileSync(report, 'utf8')) as { testResults: Result[] }).testResults)
}

/** A file that could not be loaded has no tests and is a failure all the same. */
function counted(results: readonly Result[]): Counts {
  const counts: Counts = { passed: 0, failed: 0, skipped: 0 }
  for (const { status, assertionResults } of results) {
    const failed = assertionResults.filter((test) => test.status === 'failed').length
    counts.failed += failed === 0 && status === 'failed' ? 1 : failed
    counts.passed += assertionResults.filter((test) => test.status === 'passed').length
    counts.skipped += assertionResults.filter((test) => /skipped|pending|todo/.test(test.status)).length
  }
  return counts
}

function added(a: Counts, b: Counts): Counts {
  return { passed: a.passed + b.passed, failed: a.failed + b.failed, skipped: a.skipped + b.skipped }
}

async function run(suites: readonly Suite[]): Promise<Counts> {
  let total: Counts = { passed: 0, failed: 0, skipped: 0 }
  mkdirSync(out, { recursive: true })
  try {
    const built = await buildStale()
    if (built.length) console.log(`Built: ${built.join(', ')}.`)
  } catch (error) {
    console.error(`The build failed: ${error instanceof Error ? error.message : String(error)}`)
    total = added(total, { passed: 0, failed: 1, skipped: 0 })
  }
  for (const suite of suites) {
    const environment: Record<string, string> = {}
    if (suite === 'e2e') {
      try {
        environment.LEVELSTEAD_BROWSER = ensuredBrowser()
      } catch (error) {
        console.error(error instanceof Error ? error.message : String(error))
        total = added(total, { passed: 0, failed: 1, skipped: 0 })
        continue
      }
    }
    total = added(total, await runSuite(suite, environment))
  }
  return total
}

const wanted = process.argv.slice(2)
const known = Object.keys(SUITES) as Suite[]
const unknown = wanted.filter((word) => !known.includes(word as Suite))
if (unknown.length) {
  console.error(`There is no suite ${unknown.join(', ')}; there are ${known.join(' and ')}.`)
  process.exitCode = 2
} else {
  const { passed, failed, skipped } = await run(wanted.length ? (wanted as Suite[]) : known)
  if (skipped) console.log(`${skipped} skipped`)
  console.log(`${passed} passed, ${failed} failed`)
  process.exitCode = failed ? 1 : 0
}
