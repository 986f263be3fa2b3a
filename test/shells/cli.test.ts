/** The command line as scripts and people use it: built, as a child process, on real files. */
import { existsSync, mkdirSync, readFileSync, readdirSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { spawnSync } from 'node:child_process'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildStale } from '../../app/shells/build.ts'
import { assessBuilding } from '../../app/assess/assess.ts'
import { CAUTIONS, RED_CAUTION } from '../../app/model/cautions.ts'
import type { Findings } from '../../app/model/findings.ts'
import { readBuilding } from '../../app/model/read-building.ts'
import { writeBuilding } from '../../app/model/write-building.ts'
import { exampleBuilding } from '../../app/usecases/example-building.ts'
import { openBench, type Bench } from '../support/command.ts'
import { pdfPages } from '../support/pdf-text.ts'

const FRAMES = join(import.meta.dirname, '..', 'reference', 'frames')

let bench: Bench

beforeAll(async () => {
  await buildStale(['core'])
  bench = openBench()
  expect(bench.run('example', 'x.levelstead').code).toBe(0)
  writeFileSync(bench.path('x.building.json'), writeBuilding(exampleBuilding()))
})
afterAll(() => bench.remove())

function errorLines(text: string): string[] {
  return text.split('\n').filter((line) => line !== '')
}

describe('levelstead assess', () => {
  it('says status, worst members with interval and certainty, and the cautions, in words as well as marks', () => {
    const { code, out, error } = bench.run('assess', 'x.levelstead')
    expect([code, error]).toEqual([0, ''])
    expect(out).toMatch(/■ R6 +2026-11-16 +red/)
    expect(out).toMatch(/■ red +member A4-B4\/2, frame line 4: induced 31\.7 ± 3\.1 kNm, 30\.2\s% of capacity.*; clear/)
    for (const caution of [...CAUTIONS, RED_CAUTION]) expect(out).toContain(caution)
  })

  it('gives the same findings of a project and of its building file, and only JSON where JSON is asked for', () => {
    const [a, b] = ['x.levelstead', 'x.building.json'].map((file) => bench.run('assess', file, '--json', '-'))
    expect([a!.code, b!.code]).toEqual([0, 0])
    expect(JSON.parse(a!.out)).toEqual(JSON.parse(b!.out))
    expect(JSON.parse(a!.out)).toEqual(JSON.parse(JSON.stringify(assessBuilding(exampleBuilding()))))
    expect(a!.error).toContain('R6')
  })

  it('writes one round where one is asked for', () => {
    expect(bench.run('assess', 'x.levelstead', '--round', 'R3', '--json', 'one.json').code).toBe(0)
    const findings = JSON.parse(readFileSync(bench.path('one.json'), 'utf8')) as Findings
    expect(findings.rounds.map((r) => r.id)).toEqual(['R3'])
    expect([findings.format, findings.version, findings.baseline]).toEqual(['levelstead-findings', 1, 'R0'])
  })

  it.each(readdirSync(FRAMES))('agrees with the independent findings of %s to their tolerance', (name) => {
    const { building, expected, relative_tolerance } = JSON.parse(readFileSync(join(FRAMES, name), 'utf8')) as {
      building: object
      expected: Findings
      relative_tolerance: number
    }
    writeFileSync(bench.path(`ref-${name}`), JSON.stringify(building))
    const { code, out } = bench.run('assess', `ref-${name}`, '--json', '-')
    expect(code).toBe(0)
    const found = JSON.parse(out) as Findings
    const moments = (f: Findings) => f.rounds.flatMap((r) => r.frame_lines.flatMap((l) => l.members.flatMap((m) => [m.moment_from_kNm, m.moment_to_kNm]))) // prettier-ignore
    const [ours, theirs] = [moments(found), moments(expected)]
    // Where there are no moments, rounding of the levels is what is left: their last digit times some 1e4 kNm/m.
    const size = Math.max(...theirs.map(Math.abs), 1e-3)
    expect(ours.length).toBe(theirs.length)
    ours.forEach((m, i) => expect(Math.abs(m - theirs[i]!)).toBeLessThanOrEqual((relative_tolerance ?? 1e-6) * size))
  })

  it('does not mind a reader that goes away', () => {
    const cli = join(import.meta.dirname, '..', '..', 'dist', 'cli.js')
    const { stderr, status } = spawnSync(
      'sh',
      [
        '-c',
        `"${process.execPath}" "${cli}" assess x.levelstead --json - 2>err.txt | head -c 10; cat err.txt | grep -c "at " || true`,
      ],
      { cwd: bench.folder, encoding: 'utf8' },
    )
    expect([status, stderr]).toEqual([0, ''])
  })
})

describe('levelstead import, export and log', () => {
  it('give back the building that was imported', () => {
    expect(bench.run('import', 'x.building.json', 'y.levelstead').code).toBe(0)
    expect(bench.run('export', 'y.levelstead', 'y.building.json').code).toBe(0)
    expect(readBuilding(readFileSync(bench.path('y.building.json')))).toEqual(exampleBuilding())
  })

  it('add the rounds of a table with semicolons and decimal commas, and say how it was understood', () => {
    const rows = exampleBuilding().supports.map((s) => `R7;2026-12-14;S-${s.id};42,72;0,3`)
    writeFileSync(bench.path('visit.csv'), `\ufeffRound;Date;Point;Level_m;SD_mm\r\n${rows.join('\r\n')}\r\n`)
    const { code, out } = bench.run('log', 'y.levelstead', 'visit.csv')
    expect([code, out]).toEqual([0, expect.stringContaining('R7')])
    expect(bench.run('assess', 'y.levelstead', '--round', 'R7').code).toBe(0)
  })

  it('refuse the same round a second time and leave the project as it was', () => {
    const before = readFileSync(bench.path('y.levelstead'))
    const { code, error } = bench.run('log', 'y.levelstead', 'visit.csv')
    expect([code, error]).toEqual([2, expect.stringContaining('R7')])
    expect(readFileSync(bench.path('y.levelstead')).equals(before)).toBe(true)
  })
})

describe('levelstead report', () => {
  it('writes a PDF that names the building, on the paper asked for', async () => {
    const { code } = bench.run('report', 'x.levelstead', '--pdf', 'x.pdf', '--paper', 'Letter')
    expect(code).toBe(0)
    const pages = await pdfPages(new Uint8Array(readFileSync(bench.path('x.pdf'))))
    expect(pages[0]).toContain('Tannery Row, block 2')
    expect(pages.length).toBeGreaterThan(5)
  })

  it('is refused for the baseline, and writes nothing then', () => {
    const { code, error } = bench.run('report', 'x.levelstead', '--round', 'R0', '--pdf', 'r0.pdf')
    expect([code, error]).toEqual([2, expect.stringMatching(/^error: .*R0/)])
    expect(existsSync(bench.path('r0.pdf'))).toBe(false)
  })
})

describe('results', () => {
  it('may be written again, but never over a project or a building file', () => {
    for (let i = 0; i < 2; i++) expect(bench.run('assess', 'x.levelstead', '--json', 'again.json').code).toBe(0)
    const before = ['x.levelstead', 'x.building.json'].map((file) => readFileSync(bench.path(file)))
    for (const target of ['x.levelstead', 'x.building.json']) {
      expect(bench.run('assess', 'x.levelstead', '--json', target).code).toBe(2)
      expect(bench.run('report', 'x.levelstead', '--pdf', target).code).toBe(2)
    }
    expect(before.map((bytes, i) => bytes.equals(readFileSync(bench.path(['x.levelstead', 'x.building.json'][i]!))))).toEqual([true, true]) // prettier-ignore
  })

  it('of export may be written again, and into a file that a script has made empty', () => {
    writeFileSync(bench.path('made.building.json'), '')
    for (let i = 0; i < 2; i++) expect(bench.run('export', 'x.levelstead', 'made.building.json').code).toBe(0)
    expect(bench.run('export', 'x.levelstead', 'x.levelstead').code).toBe(2)
  })
})

describe('levelstead verify', () => {
  it('prints every check with its source and says that all agree', () => {
    const { code, out } = bench.run('verify')
    expect(code).toBe(0)
    expect(out).toMatch(/(\d+) of \1 checks agree/)
    expect(out).toContain('Maney')
    expect(out).not.toContain('DISAGREES')
  })
})

describe('what the command line cannot use', () => {
  const cases: [why: string, words: string[], said: RegExp][] = [
    ['no such command', ['asses', 'x.levelstead'], /asses.*assess/],
    ['no such option', ['assess', 'x.levelstead', '--jsn', '-'], /--jsn.*--json/],
    ['an option without its value', ['assess', 'x.levelstead', '--round'], /--round/],
    ['a file too few', ['import', 'x.building.json'], /OUT\.levelstead/],
    ['a file too many', ['verify', 'x'], /"x"/],
    ['a report without a place', ['report', 'x.levelstead'], /--pdf/],
    ['no such file', ['assess', 'none.levelstead'], /none\.levelstead/],
    ['a folder', ['assess', '.'], /folder/],
    ['no such round', ['assess', 'x.levelstead', '--round', 'R99'], /R99/],
    ['a target that is there', ['example', 'x.levelstead'], /x\.levelstead.*exists/],
    ['a folder that is not there', ['example', 'no/where.levelstead'], /no\/where\.levelstead/],
    ['a paper that there is not', ['report', 'x.levelstead', '--pdf', 'p.pdf', '--paper', 'A5'], /A5/],
  ]
  it.each(cases)('%s: exit 2, one error line with the remedy, nothing on standard output', (_, words, said) => {
    const before = readdirSync(bench.folder).sort()
    const { code, out, error } = bench.run(...words)
    expect([code, out]).toEqual([2, ''])
    const lines = errorLines(error)
    expect(lines).toHaveLength(1)
    expect(lines[0]).toMatch(/^error: /)
    expect(lines[0]).toMatch(said)
    expect(readdirSync(bench.folder).sort()).toEqual(before)
  })

  it.each([
    ['empty', ''],
    ['binary', '\u0000\u0001\u0002'],
    ['not JSON', 'levels: 3'],
    ['half a file', writeBuilding(exampleBuilding()).slice(0, 2000)],
    ['a newer version', JSON.stringify({ ...exampleBuilding(), version: 9 })],
  ])('a building file that is %s: exit 2 naming the file, for import and assess, nothing written', (name, text) => {
    const file = `bad ${name}.building.json`
    writeFileSync(bench.path(file), text)
    for (const words of [
      ['assess', file, '--json', 'never.json'],
      ['import', file, 'never.levelstead'],
    ]) {
      const { code, out, error } = bench.run(...words)
      expect([code, out]).toEqual([2, ''])
      expect(errorLines(error)).toHaveLength(1)
      expect(error).toContain(file)
    }
    expect([existsSync(bench.path('never.json')), existsSync(bench.path('never.levelstead'))]).toEqual([false, false])
  })

  it('a mechanism: named with its line and nodes', () => {
    const building = exampleBuilding()
    for (const member of building.frame_lines[0]!.members) Object.assign(member, { pin_from: true, pin_to: true })
    writeFileSync(bench.path('loose.building.json'), writeBuilding(building))
    const { code, error } = bench.run('import', 'loose.building.json', 'loose.levelstead')
    expect([code, error]).toEqual([2, expect.stringMatching(/frame_lines\[0\].*line A can move freely at/)])
    expect(existsSync(bench.path('loose.levelstead'))).toBe(false)
  })

  it('lists every fault of a file, one line each', () => {
    const building = exampleBuilding()
    building.sections[0]!.E_GPa = -3
    building.frame_lines[0]!.members[0]!.section = 'beem'
    building.survey.rounds[1]!.date = '2026-02-30'
    writeFileSync(bench.path('three.building.json'), JSON.stringify(building))
    const { code, error } = bench.run('assess', 'three.building.json')
    expect(code).toBe(2)
    expect(errorLines(error).map((line) => line.split(': ')[2])).toEqual([
      'sections[0].E_GPa',
      'frame_lines[0].members[0].section',
      'survey.rounds[1].date',
    ])
  })

  it('a fault of the program itself: exit 1, a sentence and no stack', () => {
    mkdirSync(bench.path('broken'))
    const code =
      "import('CLI').then((m) => m.runCommandLine(['assess', 'x.building.json'])).then((c) => (process.exitCode = c))"
    const entry = join(import.meta.dirname, '..', '..', 'dist', 'command-line.js').replaceAll('\\', '/')
    const poison = 'Array.prototype.flatMap = function () { throw new RangeError("poisoned") };'
    const { status, stderr } = spawnSync(process.execPath, ['-e', `${poison}${code.replace('CLI', entry)}`], {
      cwd: bench.folder,
      encoding: 'utf8',
    })
    expect(status).toBe(1)
    expect(stderr).toContain('Levelstead itself failed')
    expect(stderr).not.toMatch(/^\s+at /m)
  })
})

describe('help', () => {
  it('lists every command, and each command its options', () => {
    const { code, out } = bench.run('--help')
    expect(code).toBe(0)
    for (const word of ['open', 'example', 'import', 'export', 'log', 'assess', 'report', 'verify'])
      expect(out).toContain(word)
    expect(bench.run('report', '--help').out).toContain('--pdf')
    expect(bench.run('--version').out).toMatch(/^\d+\.\d+\.\d+\n$/)
  })
})
