/** The ways into a project, each asking for its files first; a person who turns back has changed nothing. */
import type { FileWish } from './wish.ts'

interface Project {
  open(path: string): Promise<void>
  import(from: string, to: string): Promise<void>
  start(path: string, name: string): Promise<void>
  example(path: string): Promise<void>
}
interface Chooser {
  ask(wish: FileWish): Promise<string | null>
}

const PROJECT = ['levelstead']

/** Opens a project; of a building file a project is made, kept where the person says. */
export async function openFile(project: Project, chooser: Chooser): Promise<void> {
  const path = await chooser.ask({
    does: 'open',
    title: 'Open a project or a building file',
    kinds: ['levelstead', 'building.json'],
  })
  if (path === null) return
  if (!/\.json$/i.test(path)) return project.open(path)
  const to = await chooser.ask({
    does: 'save',
    title: 'Make a project of the building file',
    kinds: PROJECT,
    name: baseName(path),
  })
  if (to !== null) await project.import(path, to)
}

/** Starts a building; without a name it takes that of its file. */
export async function startBuilding(project: Project, chooser: Chooser, name = ''): Promise<void> {
  const to = await chooser.ask({
    does: 'save',
    title: name ? `Where ${name} is kept` : 'Start a building: its name, and where it is kept',
    kinds: PROJECT,
    name: fileName(name),
  })
  if (to !== null) await project.start(to, name || baseName(to))
}

export async function openExample(project: Project, chooser: Chooser): Promise<void> {
  const to = await chooser.ask({
    does: 'save',
    title: 'Where your copy of the example is kept',
    kinds: PROJECT,
    name: 'Tannery Row, block 2',
  })
  if (to !== null) await project.example(to)
}

/** A name as a file may have it on any system. */
export function fileName(name: string): string {
  return name.replace(/[\\/:*?"<>|\s]+/g, ' ').trim()
}

function baseName(path: string): string {
  return path.replace(/^.*[\\/]/, '').replace(/(\.building)?\.json$|\.levelstead$/i, '')
}
