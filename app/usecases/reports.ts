/** The condition report: shown as it will be, issued under a number, kept unchanged, opened again. */
import { runVerification } from '../assess/verify.ts'
import type { IssuedReportView, PdfView, ReportOptions } from '../contract/views.ts'
import type { Building } from '../model/building.ts'
import { Fault } from '../model/faults.ts'
import { toBase64 } from './base64.ts'
import type { Context } from './ports.ts'
import { openProject } from './project-view.ts'
import { refusalOf } from './rounds.ts'
import { writeNew } from './write-new.ts'

export async function preview(options: ReportOptions, context: Context): Promise<PdfView> {
  const { pdf, pages } = await print(options, context, 'draft')
  return { pdf: toBase64(pdf), pages }
}

export async function issue(options: ReportOptions, context: Context): Promise<IssuedReportView> {
  const project = openProject(context)
  const building = project.read.building()
  const { pdf, pages, label, when } = await print(options, context, 'issued')
  const { round, surveyed_by, assessed_by, reviewer } = options
  if (context.signal.aborted || context.session.project !== project) throw new Fault('work.stopped')
  return project.write((store) => {
    const isSame = JSON.stringify(store.building()) === JSON.stringify(building)
    if (!isSame || labelOf(building, store.register(), round) !== label)
      throw new Fault('report.overtaken', { value: round })
    const issued: IssuedReportView = {
      number: store.register().length + 1,
      label,
      round,
      issued_at: when,
      surveyed_by,
      assessed_by,
      reviewer,
      pages,
      sha256: context.hasher.sha256(pdf),
    }
    store.issue(issued, pdf, context.clock.who())
    return issued
  })
}

export function register(_: object, context: Context): IssuedReportView[] {
  return openProject(context).read.register()
}

export function issuedPdf({ number }: { number: number }, context: Context): PdfView {
  const { read } = openProject(context)
  return { pdf: toBase64(pdfOf(number, context)), pages: read.register().find((r) => r.number === number)!.pages }
}

export function savePdf({ number, to }: { number: number; to: string }, context: Context): { written: string } {
  writeNew(context, to, pdfOf(number, context))
  return { written: to }
}

function pdfOf(number: number, context: Context): Uint8Array {
  const pdf = openProject(context).read.pdf(number)
  if (!pdf) throw new Fault('report.unknown', { value: number })
  return pdf
}

async function print(options: ReportOptions, context: Context, status: 'draft' | 'issued') {
  const { read } = openProject(context)
  const building = read.building()
  if (!building.survey.rounds.some((r) => r.id === options.round)) throw refusalOf(read, options.round)
  const label = labelOf(building, read.register(), options.round)
  const when = context.clock.now()
  context.progress(0, 1, 'Setting the pages')
  const printed = await context.printer.print(
    building,
    { ...options, label, status, date: when.slice(0, 10), verification: runVerification() },
    context.signal,
  )
  return { ...printed, label, when }
}

/** The next number for a round's first report; the next revision of that number for those after it. */
export function labelOf(
  building: Pick<Building, 'reference'>,
  register: readonly Pick<IssuedReportView, 'round'>[],
  round: string,
): string {
  const rounds = [...new Set(register.map((r) => r.round))]
  const known = rounds.indexOf(round)
  const number = known < 0 ? rounds.length + 1 : known + 1
  const revision = revisionLetters(register.filter((r) => r.round === round).length)
  return `${building.reference ? `${building.reference}/` : ''}${number} rev ${revision}`
}

/** A to Z, then AA, AB. */
function revisionLetters(index: number): string {
  const last = String.fromCharCode(65 + (index % 26))
  return index < 26 ? last : revisionLetters(Math.floor(index / 26) - 1) + last
}
