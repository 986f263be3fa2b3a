/** Rounds: drafted while they are typed, accepted once they hold, corrected only by a new version with a reason. */
import type { TypedRound } from '../contract/requests.ts'
import type { ProjectView } from '../contract/views.ts'
import { levelRound } from '../assess/levels.ts'
import { criteriaOf, type Building, type Round } from '../model/building.ts'
import { checkRound } from '../model/check-building.ts'
import { Fault } from '../model/faults.ts'
import type { Context, DraftRound, ReadStore, WriteStore } from './ports.ts'
import { projectView } from './project-view.ts'

/** Of the two-sided interval at 95 %; only whether the levels can be had is asked here. */
const Z = 1.96

/** What is typed is kept as it is, whole or not. */
export function saveDraft(draft: TypedRound, { clock }: Context, store: WriteStore): ProjectView {
  store.putDraft(draft as DraftRound, clock.now())
  return projectView(store)
}

export function discard({ round }: { round: string }, _: Context, store: WriteStore): ProjectView {
  store.dropDraft(round)
  return projectView(store)
}

export function accept(
  { round: id, note }: { round: string; note?: string },
  { clock }: Context,
  store: WriteStore,
): ProjectView {
  const view = store.rounds().find((r) => r.id === id && r.state === 'draft')
  if (!view) throw refusalOf(store, id)
  const { state: _state, version: _version, ...draft } = view
  addRound(store, soundRound(draft, store.building()), clock.who(), clock.now(), note)
  return projectView(store)
}

/** Accepts a round; the first one becomes the baseline. */
export function addRound(store: WriteStore, round: DraftRound, who: string, when: string, note?: string): void {
  store.putDraft(round, when)
  store.accept(round.id, who, when, note)
  if (store.building().survey.baseline === undefined) store.setBaseline(round.id, 'the first round', who, when)
}

export function correct(
  { round, reason }: { round: TypedRound; reason: string },
  { clock }: Context,
  store: WriteStore,
): ProjectView {
  refuseEmpty(reason)
  const { id } = round
  if (!store.building().survey.rounds.some((r) => r.id === id)) throw refusalOf(store, id)
  store.correct(soundRound(round, store.building()), reason, clock.who(), clock.now())
  return projectView(store)
}

export function setBaseline(
  { round, reason }: { round: string; reason: string },
  { clock }: Context,
  store: WriteStore,
): ProjectView {
  refuseEmpty(reason)
  if (!store.building().survey.rounds.some((r) => r.id === round)) throw refusalOf(store, round)
  store.setBaseline(round, reason, clock.who(), clock.now())
  return projectView(store)
}

/** The fault of asking for a round that is not there in that state. */
export function refusalOf(store: ReadStore, id: string): Fault {
  const states = store.rounds().filter((r) => r.id === id)
  const place = { value: id, element: { kind: 'round', id } } as const
  if (states.some((r) => r.state === 'draft')) return new Fault('round.draft', place)
  return new Fault(states.length ? 'round.frozen' : 'round.unknown', place)
}

/** The round, held to its form and adjusted once, so that none is accepted whose levels cannot be had. */
function soundRound(value: object, building: Building): DraftRound {
  const round = checkRound(value, building)
  refuseUnlevelled(round, building)
  return round
}

/** Refuses a round whose levels cannot be had. */
export function refuseUnlevelled(round: Round, building: Building): void {
  levelRound(building, round, criteriaOf(building).confidence, Z)
}

function refuseEmpty(reason: string): void {
  if (reason.trim() === '') throw new Fault('reason.empty')
}
