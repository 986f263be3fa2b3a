/** What is picked, in drawing and ledger alike, and which sheet lies on the table. */
import type { Target } from '../../app/drawing/scene.ts'
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

function lineOf(target: Target): string | undefined {
  if (target.kind === 'line') return target.id
  return target.kind === 'support' ? undefined : target.line
}

/** Whether two targets are the same thing of the building; which end of a member is spoken of plays no part. */
export function sameThing(a: Target, b: Target): boolean {
  switch (a.kind) {
    case 'support':
    case 'line':
      return a.kind === b.kind && a.id === b.id
    case 'member':
    case 'node':
      return a.kind === b.kind && a.id === b.id && a.line === b.line
    case 'span':
      return b.kind === 'span' && a.line === b.line && a.from === b.from && a.to === b.to
  }
}

const context = contextOf<SelectionState>('selection')
export const handSelection = context.hand
export const useSelection = context.use
