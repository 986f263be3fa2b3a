/** What is picked, in drawing and ledger alike, and which sheet lies on the table. */
import type { Target } from '../../app/drawing/scene.ts'
import { lineOf, sameThing } from '../assess/targets.ts'
import { contextOf } from './context.ts'

export class SelectionState {
  target = $state.raw<Target | null>(null)
  /** Name of the frame line whose elevation is shown; null is the plan. */
  sheet = $state<string | null>(null)

  pick(target: Target | null): void {
    this.target = target
  }

  /** Picks, and turns to the sheet that shows it. */
  show(target: Target): void {
    this.target = target
    const line = lineOf(target)
    if (line !== undefined) this.sheet = line
  }

  isPicked(target: Target): boolean {
    return this.target !== null && sameThing(this.target, target)
  }
}

const context = contextOf<SelectionState>('selection')
export const handSelection = context.hand
export const useSelection = context.use
