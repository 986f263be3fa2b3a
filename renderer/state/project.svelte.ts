/** The project that is open, and everything that can be done to it. A failed action leaves all as it was, and throws. */
import type { ProjectView, ImportedView } from '../../app/contract/views.ts'
import type { Building, Round } from '../../app/model/building.ts'
import type { Edit } from '../../app/model/changes.ts'
import { call } from '../client.svelte.ts'
import { contextOf } from './context.ts'
import type { WorkState } from './work.svelte.ts'

/** A round as it is typed, whole or not. */
export interface Draft extends Round {
  observer?: string
  instrument?: string
  weather?: string
  note?: string
}

export class ProjectState {
  #view = $state.raw<ProjectView | null>(null)
  #text = ''
  readonly #work: WorkState

  constructor(work: WorkState) {
    this.#work = work
  }

  get view(): ProjectView | null {
    return this.#view
  }

  /** The description and the accepted rounds. Throws where no project is open: ask for `view` first. */
  get building(): Building {
    if (!this.#view) throw new Error('No project is open.')
    return this.#view.building
  }

  /** Takes what the core answered. An unchanged building stays the same object, so that nothing hangs on it anew. */
  #take(view: ProjectView | null): void {
    const text = view ? JSON.stringify(view.building) : ''
    this.#view = view && this.#view && text === this.#text ? { ...view, building: this.#view.building } : view
    this.#text = text
  }

  /** What the core has open already: a file named on the command line, or this window before it was reloaded. */
  async resume(): Promise<void> {
    this.#take(await call('project/view', {}))
  }

  async open(path: string): Promise<void> {
    this.#take(await this.#work.run('Opening the file', (following) => call('project/open', { path }, following)))
  }

  async start(path: string, name: string): Promise<void> {
    this.#take(await call('project/new', { path, name }))
  }

  async example(path: string): Promise<void> {
    this.#take(await call('project/example', { path }))
  }

  async import(from: string, to: string): Promise<void> {
    this.#take(
      await this.#work.run('Reading the building file', (following) =>
        call('exchange/import', { from, to }, following),
      ),
    )
  }

  async duplicate(path: string): Promise<void> {
    this.#take(await this.#work.run('Copying the file', (following) => call('project/duplicate', { path }, following)))
  }

  async close(): Promise<void> {
    await call('project/close', {})
    this.#take(null)
  }

  async export(to: string): Promise<string[]> {
    return (await call('exchange/export', { to })).drafts
  }

  /** Writes the accepted rounds as readings tables; gives where. */
  async exportReadings(to: string): Promise<string[]> {
    return (await call('exchange/readings', { to })).written
  }

  /** Adds the rounds of a readings table. */
  async log(from: string): Promise<ImportedView> {
    const added = await this.#work.run('Reading the table', (following) => call('exchange/log', { from }, following))
    await this.resume()
    return added
  }

  async edit(edit: Edit): Promise<void> {
    this.#take(await call('describe/edit', edit))
  }

  async undo(): Promise<void> {
    if (this.#view?.undo) this.#take(await call('project/undo', {}))
  }

  async redo(): Promise<void> {
    if (this.#view?.redo) this.#take(await call('project/redo', {}))
  }

  async draft(round: Draft): Promise<void> {
    this.#take(await call('rounds/draft', { ...round }))
  }

  async discard(round: string): Promise<void> {
    this.#take(await call('rounds/discard', { round }))
  }

  async accept(round: string, note?: string): Promise<void> {
    this.#take(await call('rounds/accept', note ? { round, note } : { round }))
  }

  async correct(round: Draft, reason: string): Promise<void> {
    this.#take(await call('rounds/correct', { round: { ...round }, reason }))
  }

  async baseline(round: string, reason: string): Promise<void> {
    this.#take(await call('rounds/baseline', { round, reason }))
  }
}

const context = contextOf<ProjectState>('project')
export const handProject = context.hand
export const useProject = context.use
