/** What was measured in this round, and how sure it is. */
import type { Content } from 'pdfmake/interfaces.js'
import { bookView } from '../../assess/level-book.ts'
import { level, millimetres } from '../../model/numbers.ts'
import { heldBenchmarks } from '../../model/building.ts'
import type { Levelling } from '../../model/findings.ts'
import type { ReportInput } from '../input.ts'
import { facts, table } from '../style.ts'

export function measured(input: ReportInput): Content[] {
  const { building, round, baseline, findings } = input
  const benchmarks = heldBenchmarks(building)
  const released = building.survey.points.flatMap((p) => (p.kind === 'benchmark' && p.released ? [p] : []))
  const estimated = findings.supports.filter((s) => s.estimated)
  const total = findings.supports.length
  const rows: [string, string][] = [
    [
      'Visit',
      `round ${round.id} on ${round.date}, ${daysBetween(baseline.date, round.date)} days after the baseline ${baseline.id}`,
    ],
    [
      'Readings',
      round.book ? `level book of ${round.book.rows.length} rows` : `${round.levels?.length ?? 0} given levels`,
    ],
    ['Held as fixed', benchmarks.length ? benchmarks.map((b) => b.id).join(', ') : 'no benchmark (levels were given)'],
    ...released.map((p): [string, string] => ['Held no more', `${p.id}: ${p.released}`]),
    ['Supports measured', `${total - estimated.length} of ${total}`],
  ]
  if (estimated.length)
    rows.push([
      'Estimated',
      estimated.map((s) => `${s.support}: ${s.estimated_from ?? 'from its neighbours'}`).join('; '),
    ])
  return [
    { text: 'What was measured', style: 'heading', headlineLevel: 1, pageBreak: 'before' },
    facts(rows),
    table(
      [
        { heading: 'stud', width: '*' },
        { heading: `level, ${baseline.id}, m`, width: 90, align: 'right' },
        { heading: `level, ${round.id}, m`, width: 90, align: 'right' },
        { heading: 'sd, mm', width: 50, align: 'right' },
      ],
      studRows(input),
    ),
  ]
}

function studRows(input: ReportInput): string[][] {
  const studs = new Set(input.building.survey.points.filter((p) => p.kind === 'stud').map((p) => p.id))
  const first = new Map(input.baselinePoints.map((p) => [p.point, p.level_m]))
  return input.findings.points
    .filter((p) => studs.has(p.point))
    .map((p) => {
      const before = first.get(p.point)
      return [p.point, before === undefined ? 'not measured' : level(before), level(p.level_m), millimetres(p.sd_mm, 2)]
    })
}

export function howSure(input: ReportInput): Content[] {
  const { findings, building, criteria, z } = input
  const percent = Math.round(criteria.confidence * 100)
  const measuredSds = findings.supports.filter((s) => !s.estimated).map((s) => s.sd_mm)
  const benchmarks = heldBenchmarks(building).length
  const paragraphs: string[] = []
  if (measuredSds.length) {
    const worst = Math.max(...measuredSds)
    const significant = findings.supports.filter((s) => s.significant && !s.estimated).length
    paragraphs.push(
      `The standard deviation of a support's settlement is ${millimetres(Math.min(...measuredSds), 2)} to ${millimetres(worst, 2)} mm. At ${percent} % confidence this visit can show a settlement of ${millimetres(z * worst, 1)} mm; ${significant} of ${measuredSds.length} measured supports have moved by more than their own limit.`,
    )
  }
  for (const { support, studs_disagree: apart } of findings.supports)
    if (apart)
      paragraphs.push(
        `The studs of support ${support} disagree: ${apart.studs[0]} has settled ${millimetres(apart.difference_mm)} ± ${millimetres(z * apart.sd_mm)} mm more than ${apart.studs[1]}. One of them may have been disturbed; their mean was taken.`,
      )
  if (measuredSds.length) paragraphs.push(repeatSentence(z * Math.max(...measuredSds)))
  paragraphs.push(...levellingSentences(findings.levelling, percent))
  if (input.round.book) paragraphs.push(...bookView(building, input.round).hints)
  paragraphs.push(
    benchmarks === 1
      ? 'One benchmark was held. Its stability is assumed: a movement of the benchmark would look like an equal and opposite movement of the whole building.'
      : benchmarks > 1
        ? `${benchmarks} benchmarks were held at their given levels.`
        : 'No benchmark is described; the given levels are taken as they are.',
  )
  paragraphs.push(
    `Every rotation, moment and fraction below carries the standard deviation that follows from the levels and their covariance. "±" is ${z.toFixed(2)} standard deviations (${percent} %). A value is clear when that interval lies on one side of every trigger, else borderline. The uncertainty of stiffness, loads and capacity is not in it.`,
  )
  return [
    { text: 'How sure it is', style: 'heading', headlineLevel: 1 },
    ...paragraphs.map((text): Content => ({ text, style: 'body' })),
    ...misclosures(findings.levelling),
  ]
}

/** How often the book would have to be run for half of what it can show now: repeats average the scatter out. */
function repeatSentence(shows_mm: number): string {
  return `Run four times over and averaged, in both visits, the same book would show half of that, ${millimetres(shows_mm / 2, 1)} mm.`
}

function levellingSentences(levelling: Levelling | undefined, percent: number): string[] {
  if (!levelling) return ['Levels were given with their standard deviations; no level book was adjusted here.']
  if (levelling.degrees_of_freedom === 0)
    return ['The level book has no redundancy: no reading is checked by another, and a gross error would go unseen.']
  const said = [
    `The level book was adjusted by weighted least squares with ${levelling.degrees_of_freedom} degrees of freedom; variance factor ${(levelling.variance_factor ?? 0).toFixed(2)}.`,
  ]
  if (levelling.scaled)
    said.push(
      `It exceeds its limit at ${percent} %: the readings scatter more than the instrument's standard deviation says, and all standard deviations of this round were scaled up by it.`,
    )
  for (const s of levelling.suspects ?? [])
    said.push(
      `Reading of ${s.point} in row ${s.row} (${s.sight}sight) is suspect: off by about ${millimetres(s.error_mm, 1)} mm, standardised residual ${s.standardised_residual.toFixed(1)}.`,
    )
  const loose = levelling.uncontrolled_rows ?? []
  if (loose.length) said.push(`Nothing in the book checks the readings of rows ${loose.join(', ')}.`)
  return said
}

function misclosures(levelling: Levelling | undefined): Content[] {
  if (!levelling?.misclosures?.length) return []
  return [
    table(
      [
        { heading: 'loop or line', width: '*' },
        { heading: 'setups', width: 45, align: 'right' },
        { heading: 'length, km', width: 60, align: 'right' },
        { heading: 'misclosure, mm', width: 80, align: 'right' },
        { heading: 'predicted at most, mm', width: 100, align: 'right' },
      ],
      levelling.misclosures.map((m) => [
        m.from === m.to ? `${m.from} and back` : `${m.from} to ${m.to}`,
        String(m.setups),
        m.length_km === undefined ? 'not booked' : m.length_km.toFixed(3),
        millimetres(m.misclosure_mm, 2),
        millimetres(m.predicted_mm, 2),
      ]),
    ),
  ]
}

/** Whole days between two calendar days, yyyy-mm-dd. */
export function daysBetween(from: string, to: string): number {
  return Math.round((Date.parse(`${to}T00:00:00Z`) - Date.parse(`${from}T00:00:00Z`)) / 86_400_000)
}
