/** What the window and the command line are shown of an open project. */
import type { ProjectView } from '../contract/views.ts'
import { Fault } from '../model/faults.ts'
import type { Context, OpenProject, ReadStore } from './ports.ts'

export function projectView(store: ReadStore): ProjectView {
  return {
    path: store.path,
    read_only: store.readOnly,
    building: store.building(),
    rounds: store.rounds(),
    undo: store.undoName(),
    redo: store.redoName(),
    revision: store.revision(),
  }
}

/** The project that is open. Throws `project.none` where there is none. */
export function openProject(context: Context): OpenProject {
  const { project } = context.session
  if (!project) throw new Fault('project.none')
  return project
}
