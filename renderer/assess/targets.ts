/** Targets of the drawing held against each other. */
import type { Target } from '../../app/drawing/scene.ts'

/** The frame line that shows it; undefined of a support, which the plan shows. */
export function lineOf(target: Target): string | undefined {
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
