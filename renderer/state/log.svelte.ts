/**
 * The round that lies open in Log: a draft, stored a moment after each keystroke, or the correction of an accepted
 * round, which is stored once it has its reason. It outlives a look at another place.
 */
import type { RoundView } from '../../app/contract/views.ts'
import type { FaultRecord } from '../../app/model/faults.ts'
import { faultsOf } from '../../app/model/faults.ts'
import type { Cells } from '../log/grid-cells.ts'
import { readRound, textOf, withoutBlankRows, type HeadText, type RoundText } from '../log/round-cells.ts'
import { contextOf } from './context.ts'
import type { Draft, ProjectState } from './project.svelte.ts'
import type { VisitState } from './visit.svelte.ts'

/** Waited after a keystroke before a draft is stored, ms. */
const PAUSE = 300

export class OpenRound {
  #text = $state.raw<RoundText>() as RoundText
  /** What the core refused at acceptance, until the next keystroke. */
  refused = $state.raw<readonly FaultRecord[]>([])
  readonly isCorrection: boolean
  readonly read = $derived.by(() => readRound(this.#text))
  #timer: ReturnType<typeof setTimeout> | undefined
  #saving: Promise<void> = Promise.resolve()
  readonly #project: ProjectState
  readonly #visit: VisitState

  constructor(project: ProjectState, visit: VisitState, round: RoundView, isCorrection: boolean) {
    this.#project = project
    this.#visit = visit
    this.#text = textOf(round)
    this.isCorrection = isCorrection
    this.#visit.live = this.read.whole
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
    this.refused = []
    this.#visit.live = this.read.whole
    if (this.isCorrection) return
    clearTimeout(this.#timer)
    this.#timer = setTimeout(() => void this.save(), PAUSE)
  }

  /** Stores the draft as it is now; one store after the other, so that the last one typed is the last one stored. */
  save(): Promise<void> {
    clearTimeout(this.#timer)
    this.#saving = this.#saving
      .catch(() => undefined) // its own caller has been told
      .then(() => this.#project.draft(this.read.stored as Draft))
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
    await this.#attempt(() => this.#project.correct(this.read.stored as Draft, reason))
  }

  async #attempt(act: () => Promise<void>): Promise<void> {
    this.#text = withoutBlankRows(this.#text)
    try {
      await act()
      this.#visit.live = null
    } catch (error) {
      this.refused = faultsOf(error) ?? []
      throw error
    }
  }

  /** Puts the round away without storing it again. */
  drop(): void {
    clearTimeout(this.#timer)
    this.#visit.live = null
  }
}

export class LogState {
  open = $state.raw<OpenRound | null>(null)
  readonly #project: ProjectState
  readonly #visit: VisitState

  constructor(project: ProjectState, visit: VisitState) {
    this.#project = project
    this.#visit = visit
  }

  /** Opens the draft of a name, unless it lies open. */
  take(round: RoundView): OpenRound {
    if (this.open && this.open.id === round.id && !this.open.isCorrection) return this.open
    return (this.open = new OpenRound(this.#project, this.#visit, round, false))
  }

  /** Begins the correction of an accepted round, from what was accepted. */
  correct(round: RoundView): void {
    this.open = new OpenRound(this.#project, this.#visit, round, true)
  }

  close(): void {
    this.open?.drop()
    this.open = null
  }
}

const context = contextOf<LogState>('log')
export const handLog = context.hand
export const useLog = context.use
