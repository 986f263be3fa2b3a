/** Edits of the description: held to the rules of the building file, each kept with what takes it back. */
import type { ProjectView } from '../contract/views.ts'
import { applyChanges } from '../model/apply-changes.ts'
import type { Building } from '../model/building.ts'
import type { Edit } from '../model/changes.ts'
import { checkBuilding } from '../model/check-building.ts'
import type { Context, WriteStore } from './ports.ts'
import { projectView } from './project-view.ts'

export function edit(edit: Edit, { clock }: Context, store: WriteStore): ProjectView {
  const next = applyChanges(store.building(), edit.changes)
  checkBuilding(withoutRounds(next), undefined, { unfinished: true })
  store.edit(edit, clock.who(), clock.now())
  return projectView(store)
}

/** Readings were checked when they were accepted, and an edit cannot reach them. */
function withoutRounds(building: Building): Building {
  return { ...building, survey: { points: building.survey.points, rounds: [] } }
}
