/**
 * The round that lies open in Log: a draft, stored a moment after each keystroke, or the correction of an accepted
 * round, which is stored once it has its reason. Both outlive a look at another place.
 */
import type { RoundView } from '../../app/contract/views.ts'
import { faultsOf, type FaultRecord } from '../../app/model/faults.ts'
import type { Cells } from '../log/grid-cells.ts'
import {
  readRound,
  textOf,
  withoutBlankRows,
  type HeadText,
  type ReadRound,
  type RoundText,
} from '../log/round-cells.ts'
import { contextOf } from './context.ts'
import type { Draft, ProjectState } from './project.svelte.ts'
import type { VisitState } from './visit.svelte.ts'

/** Waited after a keystroke before a draft is stored, ms. */
const PAUSE = 300

export class OpenRound {
  #text: RoundText
  #read: ReadRound
  /** What the core refused at acceptance, until the next keystroke. */
  refused = $state.raw<readonly FaultRecord[]>([])
  readonly isCorrection: boolean
  #timer: ReturnType<typeof setTimeout> | undefined
  #saving: Promise<void> = Promise.resolve()
  readonly #project: ProjectState

  constructor(project: ProjectState, round: RoundView, isCorrection: boolean) {
    this.#project = project
    this.isCorrection = isCorrection
    this.#text = $state.raw(textOf(round))
    this.#read = $state.raw(readRound(this.#text))
  }

  get id(): string {
    return this.#text.id
  }

  get kind(): RoundText['kind'] {
    return this.#text.kind
  }

  get head(): HeadText {
    return this.#text.head
  }

  get rows(): readonly Cells[] {
    return this.#text.rows
  }

  /** What the text says. */
  get read(): ReadRound {
    return this.#read
  }

  set rows(rows: readonly Cells[]) {
    this.#type({ ...this.#text, rows })
  }

  set kind(kind: RoundText['kind']) {
    this.#type({ ...this.#text, kind })
  }

  setHead(values: Partial<HeadText>): void {
    this.#type({ ...this.#text, head: { ...this.#text.head, ...values } })
  }

  #type(text: RoundText): void {
    this.#text = text
    this.#read = readRound(text)
    this.refused = []
    if (this.isCorrection) return
    clearTimeout(this.#timer)
    this.#timer = setTimeout(() => void this.save(), PAUSE)
  }

  /** Stores the draft as it is now; one store after the other, so that the last one typed is the last one stored. */
  save(): Promise<void> {
    clearTimeout(this.#timer)
    this.#saving = this.#saving
      .catch(() => undefined) // its own caller has been told
      .then(() => this.#project.draft(this.#read.stored as Draft))
    return this.#saving
  }

  /** Freezes the readings. Throws what stands in the way; it is also kept in `refused`, for the rows. */
  async accept(note: string): Promise<void> {
    await this.#attempt(async () => {
      await this.save()
      await this.#project.accept(this.id, note.trim())
    })
  }

  async correct(reason: string): Promise<void> {
    await this.#attempt(() => this.#project.correct(this.#read.stored as Draft, reason))
  }

  async discard(): Promise<void> {
    clearTimeout(this.#timer)
    await this.#saving.catch(() => undefined) // a store that failed is no reason to keep what is thrown away
    await this.#project.discard(this.id)
  }

  async #attempt(act: () => Promise<void>): Promise<void> {
    this.#type(withoutBlankRows(this.#text))
    clearTimeout(this.#timer)
    try {
      await act()
    } catch (error) {
      this.refused = faultsOf(error) ?? []
      throw error
    }
  }
}

export class LogState {
  #correction = $state.raw<OpenRound | null>(null)
  /** Drafts once opened, so that what is being typed in them is not read back from the file. */
  readonly #drafts = new Map<string, OpenRound>()
  readonly #project: ProjectState
  readonly #visit: VisitState

  constructor(project: ProjectState, visit: VisitState) {
    this.#project = project
    this.#visit = visit
    visit.typing = () => this.open?.read.whole ?? null
  }

  /** The draft or the correction of the round that is looked at; null where that one is accepted. */
  readonly open = $derived.by((): OpenRound | null => {
    const id = this.#visit.round
    if (this.#correction && this.#correction.id === id) return this.#correction
    const draft = this.#project.view?.rounds.find((round) => round.id === id && round.state === 'draft')
    return draft ? this.#draft(draft) : null
  })

  #draft(round: RoundView): OpenRound {
    const key = `${this.#project.view?.path}\n${round.id}`
    const open = this.#drafts.get(key) ?? new OpenRound(this.#project, round, false)
    this.#drafts.set(key, open)
    return open
  }

  /** Begins the correction of an accepted round, from what was accepted. */
  correct(round: RoundView): void {
    this.#correction = new OpenRound(this.#project, round, true)
  }

  /** Puts the correction aside, once it is stored or given up. */
  endCorrection(): void {
    this.#correction = null
  }

  /** Forgets a draft that is accepted or thrown away: its name may be used again. */
  forget(id: string): void {
    this.#drafts.delete(`${this.#project.view?.path}\n${id}`)
  }
}

const context = contextOf<LogState>('log')
export const handLog = context.hand
export const useLog = context.use
