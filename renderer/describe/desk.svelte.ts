/**
 * The table on which a building is described: the part that lies open, the sheet that is shown, and what is picked
 * on it. It makes edits from the building as it is now; whether an edit holds is for the core to say.
 */
import { getContext, setContext, tick } from 'svelte'
import type { Missing, MissingPart } from '../../app/assess/missing.ts'
import type { Building, FrameLine, Member } from '../../app/model/building.ts'
import type { Edit } from '../../app/model/changes.ts'
import type { MemberRef } from '../../app/model/edits/refs.ts'
import type { SelectionState } from '../state/selection.svelte.ts'

export type DescribePart = 'building' | 'grid' | 'sections' | 'lines' | 'members' | 'points' | 'criteria'

/** Which part of the place holds what is missing. */
const PART_OF: Record<MissingPart, DescribePart> = {
  grid: 'grid',
  sections: 'sections',
  lines: 'lines',
  members: 'members',
  loads: 'members',
  capacities: 'members',
  points: 'points',
  rounds: 'points',
}

export class Desk {
  part = $state<DescribePart>('grid')
  #picked = $state.raw<readonly MemberRef[]>([])
  #supports = $state.raw<readonly string[]>([])
  readonly #building: () => Building
  readonly #send: (edit: Edit) => Promise<void>
  readonly #selection: SelectionState
  /** The edit under way: the next is made from the building as that one leaves it. */
  #making: Promise<void> = Promise.resolve()

  constructor(building: () => Building, selection: SelectionState, send: (edit: Edit) => Promise<void>) {
    this.#building = building
    this.#selection = selection
    this.#send = send
  }

  /** Name of the frame line whose elevation is shown; null is the plan. */
  get sheet(): string | null {
    return this.#selection.sheet
  }

  set sheet(line: string | null) {
    this.#selection.sheet = line
  }

  get building(): Building {
    return this.#building()
  }

  /** The frame line that is shown or, on the plan, the first one. */
  get line(): FrameLine | undefined {
    const { frame_lines } = this.building
    return frame_lines.find((line) => line.id === this.sheet) ?? frame_lines[0]
  }

  /** Members picked that are still there. */
  get picked(): readonly MemberRef[] {
    return this.#picked.filter((ref) => this.member(ref))
  }

  /** The last one picked is also what the other places show as picked. */
  set picked(refs: readonly MemberRef[]) {
    this.#picked = refs
    const last = refs.at(-1)
    this.#selection.pick(last ? { kind: 'member', ...last } : null)
  }

  /** Supports picked, in the order in which they were, that are still there. */
  get supports(): readonly string[] {
    return this.#supports.filter((id) => this.building.supports.some((support) => support.id === id))
  }

  set supports(ids: readonly string[]) {
    this.#supports = ids
  }

  member(ref: MemberRef): Member | undefined {
    return this.building.frame_lines.find((line) => line.id === ref.line)?.members.find((m) => m.id === ref.id)
  }

  isPicked(ref: MemberRef): boolean {
    return this.#picked.some((p) => p.line === ref.line && p.id === ref.id)
  }

  toggle(ref: MemberRef): void {
    this.picked = this.isPicked(ref)
      ? this.picked.filter((p) => p.line !== ref.line || p.id !== ref.id)
      : [...this.picked, ref]
  }

  toggleSupport(id: string): void {
    this.supports = this.supports.includes(id) ? this.supports.filter((s) => s !== id) : [...this.supports, id]
  }

  /** Makes an edit and sends it. Throws the faults that stand in its way; the building is then as it was. */
  make(edit: (building: Building) => Edit): Promise<void> {
    const made = this.#making
      .catch(() => undefined) // whoever made that edit has been told
      .then(async () => {
        const { what, changes } = edit(this.building)
        if (changes.length > 0) await this.#send({ what, changes })
      })
    this.#making = made
    return made
  }

  /** Opens the place where a missing thing is given, and puts the keyboard there. */
  async open({ target: { part, element } }: Missing): Promise<void> {
    this.part = PART_OF[part]
    if (element?.kind === 'line') this.sheet = element.id
    if (element?.kind === 'member' && element.within !== undefined) {
      this.sheet = element.within
      this.picked = [{ line: element.within, id: element.id }]
    }
    await tick()
    controlNear(part)?.focus()
  }
}

/** The control that gives what is missing: of several places that say they do, the last one that is open to the keyboard. */
function controlNear(part: MissingPart): HTMLElement | undefined {
  const controls = 'input, select, button'
  return [...document.querySelectorAll<HTMLElement>(`[data-missing~="${part}"]`)].toReversed().flatMap((place) => {
    const inside = place.matches(controls) ? [place] : [...place.querySelectorAll<HTMLElement>(controls)]
    return inside.find((control) => !control.matches(':disabled')) ?? []
  })[0]
}

const KEY = Symbol('desk')

export function layDesk(desk: Desk): Desk {
  return setContext(KEY, desk)
}

export function useDesk(): Desk {
  const desk = getContext<Desk | undefined>(KEY)
  if (!desk) throw new Error('This part of Describe stands outside of the place Describe.')
  return desk
}
