/** Findings, kept by the hash of what they are made from, so that an unchanged building is not assessed again. */
import { assessPrepared } from '../assess/assess.ts'
import { prepare } from '../assess/prepare.ts'
import { runVerification } from '../assess/verify.ts'
import type { VerifyRow } from '../contract/views.ts'
import { Fault } from '../model/faults.ts'
import type { Findings } from '../model/findings.ts'
import type { Context, OpenProject } from './ports.ts'
import { openProject } from './project-view.ts'
import { refusalOf } from './rounds.ts'

export function findings({ round }: { round?: string }, context: Context): Findings {
  const project = openProject(context)
  const building = project.read.building()
  if (round !== undefined && !building.survey.rounds.some((r) => r.id === round)) throw refusalOf(project.read, round)
  const hash = context.hasher.sha256(
    JSON.stringify([context.about.version, context.about.build, building, round ?? null]),
  )
  const kept = project.read.keptFindings(hash)
  if (kept) return kept
  const found = assessPrepared(prepare(building), round, (done, of, id) => {
    if (context.signal.aborted) throw new Fault('work.stopped')
    context.progress(done, of, `Round ${id}`)
  })
  keep(project, hash, found)
  return found
}

/** Keeping spares work the next time; a file that cannot be written just now does not take the answer away. */
function keep(project: OpenProject, hash: string, found: Findings): void {
  if (project.read.readOnly) return
  try {
    project.write((store) => store.keepFindings(hash, found))
  } catch (error) {
    if (!(error instanceof Fault)) throw error
  }
}

export function verify(): VerifyRow[] {
  return runVerification()
}
