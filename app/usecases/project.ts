/** Project files: started, opened, copied, closed; edits taken back. */
import type { FolderView, AboutView, ProjectView } from '../contract/views.ts'
import { emptyBuilding } from '../model/building.ts'
import { checkBuilding } from '../model/check-building.ts'
import { Fault } from '../model/faults.ts'
import { exampleBuilding } from './example-building.ts'
import type { Context, WriteStore } from './ports.ts'
import { openProject, projectView } from './project-view.ts'

export function aboutView(_: object, { about, files, session }: Context): AboutView {
  return { ...about, home: files.home(), opened: session.project?.path ?? null }
}

export function listFolder({ folder }: { folder?: string }, { files }: Context): FolderView {
  return files.list(folder ?? files.home())
}

export function newProject({ path, name }: { path: string; name: string }, context: Context): ProjectView {
  const building = checkBuilding(emptyBuilding(name.trim()), undefined, { unfinished: true })
  context.projects.create(path, building, [], context.clock.who(), context.clock.now())
  return open({ path }, context)
}

export function exampleProject({ path }: { path: string }, context: Context): ProjectView {
  const building = exampleBuilding()
  context.projects.create(path, building, building.survey.rounds, context.clock.who(), context.clock.now())
  return open({ path }, context)
}

/** Opens the project in place of the one that is open; where it cannot be opened, that one stays. */
export function open({ path }: { path: string }, context: Context): ProjectView {
  const opened = context.projects.open(path)
  try {
    const view = projectView(opened.read)
    context.session.project?.close()
    context.session.project = opened
    return view
  } catch (error) {
    opened.close()
    throw error
  }
}

export function close(_: object, context: Context): null {
  context.session.project?.close()
  context.session.project = null
  return null
}

export function view(_: object, { session }: Context): ProjectView | null {
  return session.project && projectView(session.project.read)
}

/** Copies the project and goes on with the copy. */
export function duplicate({ path }: { path: string }, context: Context): ProjectView {
  context.projects.duplicate(openProject(context), path)
  return open({ path }, context)
}

export function undo(_: object, context: Context, store: WriteStore): ProjectView {
  if (store.undo(context.clock.who(), context.clock.now()) === null) throw new Fault('edit.none', { value: 'undo' })
  return projectView(store)
}

export function redo(_: object, context: Context, store: WriteStore): ProjectView {
  if (store.redo(context.clock.who(), context.clock.now()) === null) throw new Fault('edit.none', { value: 'redo' })
  return projectView(store)
}
