/**
 * The condition report as PDF bytes. pdfmake is loaded only here, when something is printed; one embedded
 * typeface, nothing fetched, the same input gives the same bytes.
 */
import { createRequire } from 'node:module'
import { dirname, join } from 'node:path'
import { assessRound, pointsOf } from '../assess/assess.ts'
import { prepare } from '../assess/prepare.ts'
import { Fault } from '../model/faults.ts'
import { criteriaOf } from '../model/building.ts'
import type { Printer } from '../usecases/ports.ts'
import { reportDocument } from './document.ts'
import type { ReportInput } from './input.ts'
import { normalQuantile } from '../../solver/index.ts'

type PrintRequest = Parameters<Printer['print']>

/** What the report of one round is made from; throws a Fault where the round cannot be reported. */
export function reportInput(building: PrintRequest[0], options: PrintRequest[1]): ReportInput {
  const { rounds, baseline: baselineId } = building.survey
  const round = rounds.find((r) => r.id === options.round)
  const baseline = rounds.find((r) => r.id === baselineId)
  if (!round) throw new Fault('round.unknown', { value: options.round, path: 'round' })
  if (!baseline) throw new Fault('report.baseline', { value: options.round })
  if (round === baseline) throw new Fault('report.baseline', { value: options.round })
  const prepared = prepare(building)
  const criteria = criteriaOf(building)
  return {
    building,
    criteria,
    prepared,
    round,
    baseline,
    baselinePoints: pointsOf(prepared, baseline.id),
    findings: assessRound(prepared, round.id),
    options,
    label: options.label,
    state: options.status,
    date: options.date,
    verification: options.verification,
    z: normalQuantile(0.5 + criteria.confidence / 2),
  }
}

/** The file paths of the one typeface, from pdfmake's own package. */
export function typeface(): Record<'normal' | 'bold' | 'italics' | 'bolditalics', string> {
  const folder = join(dirname(createRequire(import.meta.url).resolve('pdfmake/package.json')), 'fonts', 'Roboto')
  return {
    normal: join(folder, 'Roboto-Regular.ttf'),
    bold: join(folder, 'Roboto-Medium.ttf'),
    italics: join(folder, 'Roboto-Italic.ttf'),
    bolditalics: join(folder, 'Roboto-MediumItalic.ttf'),
  }
}

export function printer(): Printer {
  return {
    async print(building, options, signal) {
      const input = reportInput(building, options)
      if (signal.aborted) throw new Fault('work.stopped')
      const { default: pdfmake } = await import('pdfmake')
      const fonts = typeface()
      const known = new Set(Object.values(fonts))
      pdfmake.setFonts({ Roboto: fonts })
      pdfmake.setLocalAccessPolicy((path: string) => known.has(path))
      pdfmake.setUrlAccessPolicy(() => false)
      let pages = 0
      const document = pdfmake.createPdf(reportDocument(input, (count) => (pages = count)))
      const pdf = new Uint8Array(await document.getBuffer())
      if (signal.aborted) throw new Fault('work.stopped')
      return { pdf, pages }
    },
  }
}
