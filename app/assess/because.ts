/**
 * Where a value comes from: in words, as a formula with its numbers, and as the share that every support's settlement
 * has in it. The shares add up to the value.
 */
import { Fault } from '../model/faults.ts'
import type { RoundFindings } from '../model/findings.ts'
import { movedLines } from './assess.ts'
import { becauseMember } from './because-member.ts'
import { becauseSpan } from './because-span.ts'
import { becauseSupport } from './because-support.ts'
import type { Prepared } from './prepare.ts'
import type { Share } from './shares.ts'

export type { Share } from './shares.ts'

export type BecauseTarget =
  /** One end of a member; left out, the end that governs. */
  | { kind: 'member'; line: string; id: string; end?: 'from' | 'to' }
  | { kind: 'span'; line: string; from: string; to: string }
  | { kind: 'support'; id: string }

export interface Because {
  title: string
  sentences: string[]
  /** Lines of plain text. */
  formula: string[]
  value: number
  sd: number
  unit: 'kNm' | 'rad' | 'mm'
  /** Of a member: the end spoken of. */
  end?: 'from' | 'to'
  shares: Share[]
}

/** Why a value of a round is what it is. The findings must be those of the same preparation. */
export function because(prepared: Prepared, round: RoundFindings, target: BecauseTarget): Because {
  const { settlements, moments } = movedLines(prepared, round.id)
  if (target.kind === 'support') {
    const support = round.supports.find((s) => s.support === target.id)
    if (!support) throw noSuch(target.kind, target.id)
    return becauseSupport(prepared, settlements, support)
  }
  const at = moments.findIndex((m) => m.movement.prepared.line.id === target.line)
  const line = round.frame_lines.find((l) => l.id === target.line)
  if (at < 0 || !line) throw noSuch('line', target.line)
  if (target.kind === 'span') {
    const span = line.spans.find((s) => s.from === target.from && s.to === target.to)
    if (!span) throw noSuch('line', `${target.from} to ${target.to}`)
    return becauseSpan(prepared, settlements, moments[at]!.movement, span)
  }
  const member = line.members.find((m) => m.member === target.id)
  if (!member) throw noSuch('member', target.id)
  return becauseMember(prepared, settlements, moments[at]!, member, target.end)
}

function noSuch(kind: 'member' | 'line' | 'support', id: string): Fault {
  return new Fault('element.unknown', { value: id, element: { kind, id } })
}
