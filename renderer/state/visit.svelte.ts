/**
 * The visit that is looked at: an accepted round, or the one that is being typed. Findings are made here, in the
 * window, by the same code that the core uses, so that they follow every keystroke.
 */
import { assessRound } from '../../app/assess/assess.ts'
import { prepare, type Prepared } from '../../app/assess/prepare.ts'
import type { Building } from '../../app/model/building.ts'
import { faultsOf, type FaultRecord } from '../../app/model/faults.ts'
import type { RoundFindings } from '../../app/model/findings.ts'
import { call } from '../client.svelte.ts'
import type { Visit } from '../strip/places.ts'
import { contextOf } from './context.ts'
import type { Draft, ProjectState } from './project.svelte.ts'
import type { WorkState } from './work.svelte.ts'

type Made<T> = { value: T; faults?: undefined } | { value?: undefined; faults: readonly FaultRecord[] }

export class VisitState {
  readonly #project: ProjectState
  readonly #work: WorkState
  #chosen = $state<string | null>(null)
  /** Gives the round as it is being typed; Log sets it. */
  typing: () => Draft | null = () => null
  #rounds = $state.raw<readonly RoundFindings[]>([])
  readonly #statuses = $derived(new Map(this.#rounds.map((r) => [r.id, r.status])))
  #before: Prepared | undefined

  constructor(project: ProjectState, work: WorkState) {
    this.#project = project
    this.#work = work
  }

  readonly visits = $derived.by((): Visit[] => {
    const view = this.#project.view
    if (!view) return []
    const { baseline } = view.building.survey
    return view.rounds
      .filter((round) => round.state !== 'superseded')
      .map(({ id, date, state }) => ({
        id,
        date,
        isDraft: state === 'draft',
        isBaseline: id === baseline,
        status: this.#statuses.get(id) ?? 'none',
      }))
  })

  /** Name of the round that is looked at: the chosen one while it is there, else the latest. */
  readonly round = $derived.by((): string | null => {
    const visits = this.visits
    if (visits.some((v) => v.id === this.#chosen)) return this.#chosen
    return visits.filter((v) => !v.isDraft).at(-1)?.id ?? visits.at(-1)?.id ?? null
  })

  /** The round as it is being typed; it stands in for the draft of its name. */
  get live(): Draft | null {
    return this.typing()
  }

  choose(id: string): void {
    this.#chosen = id
  }

  /** The building with the round that is being typed, where that one is looked at. */
  readonly building = $derived.by((): Building | null => {
    const building = this.#project.view?.building ?? null
    const { live } = this
    if (!building || !live || live.id !== this.round || !(live.book ?? live.levels)) return building
    const rounds = [...building.survey.rounds.filter((r) => r.id !== live.id), live]
    return { ...building, survey: { ...building.survey, rounds } }
  })

  readonly #prepared = $derived.by((): Made<Prepared> | null => {
    const building = this.building
    if (!building) return null
    return made(() => (this.#before = prepare(building, this.#before)))
  })

  readonly #findings = $derived.by((): Made<RoundFindings> | null => {
    const prepared = this.#prepared?.value
    const round = this.round
    if (!prepared || round === null || round === prepared.building.survey.baseline) return null
    if (!prepared.building.survey.rounds.some((r) => r.id === round)) return null
    return made(() => assessRound(prepared, round))
  })

  get prepared(): Prepared | null {
    return this.#prepared?.value ?? null
  }

  get findings(): RoundFindings | null {
    return this.#findings?.value ?? null
  }

  /** What stands in the way of findings. */
  get faults(): readonly FaultRecord[] {
    return this.#prepared?.faults ?? this.#findings?.faults ?? []
  }

  get isBaseline(): boolean {
    return this.round !== null && this.round === this.#project.view?.building.survey.baseline
  }

  get isDraft(): boolean {
    return this.visits.some((v) => v.id === this.round && v.isDraft)
  }

  /** Findings of all accepted rounds by date, with what is being typed in place of its own. */
  readonly all = $derived.by((): readonly RoundFindings[] => {
    const now = this.findings
    if (!now) return this.#rounds
    const others = this.#rounds.filter((r) => r.id !== now.id)
    return [...others, now].sort((a, b) => (a.date < b.date ? -1 : a.date > b.date ? 1 : 0))
  })

  /** The findings of every accepted round, from the core, which keeps what it has found once. */
  async refreshStatuses(): Promise<void> {
    const building = this.#project.view?.building
    if (!building) return
    try {
      const { rounds } = await this.#work.run('Assessing the visits', (following) =>
        call('assess/findings', {}, following),
      )
      if (this.#project.view?.building === building) this.#rounds = rounds
    } catch (error) {
      // A building that cannot be assessed yet has no flags; the place Assess says why.
      const faults = faultsOf(error)
      if (!faults) throw error
      if (!faults.some(({ code }) => code === 'work.stopped')) this.#rounds = []
    }
  }
}

function made<T>(make: () => T): Made<T> {
  try {
    return { value: make() }
  } catch (error) {
    const faults = faultsOf(error)
    if (!faults) throw error
    return { faults }
  }
}

const context = contextOf<VisitState>('visit')
export const handVisit = context.hand
export const useVisit = context.use
