/** The members as lines by their worst flag, their pins, and what is said of each. */
import type { MemberFinding, Status } from '../../model/findings.ts'
import { moment } from '../../model/numbers.ts'
import { between, circle, line, sameTarget } from '../shapes.ts'
import type { Primitive, Role, Target } from '../scene.ts'
import { weightOf, type DrawnFrame, type DrawnMember } from './frame.ts'

const ROLES: Record<Status, Role> = {
  none: 'member',
  green: 'member-green',
  amber: 'member-amber',
  red: 'member-red',
}
const ORDER: readonly Role[] = ['member', 'member-green', 'member-amber', 'member-red']

export function memberTarget(line: string, id: string): Target {
  return { kind: 'member', line, id }
}

/** Lines of all members, the worst on top. */
export function drawMembers(frame: DrawnFrame, z: number): Primitive[] {
  const findings = new Map(frame.finding?.members.map((m) => [m.member, m]))
  const weight = weightOf(frame)
  return frame.members
    .map((drawn): Primitive => {
      const finding = findings.get(drawn.member.id)
      return line(ROLES[finding?.status ?? 'none'], drawn.from, drawn.to, {
        id: `member/${frame.line.id}/${drawn.member.id}`,
        target: memberTarget(frame.line.id, drawn.member.id),
        label: memberLabel(drawn, finding, z),
        ...(weight < 1 ? { weight } : {}),
      })
    })
    .sort((a, b) => ORDER.indexOf(a.role) - ORDER.indexOf(b.role))
}

export function drawSelection(frame: DrawnFrame, selected?: Target): Primitive[] {
  return frame.members
    .filter((m) => sameTarget(selected, memberTarget(frame.line.id, m.member.id)))
    .map((m) => line('selection', m.from, m.to))
}

/** A small circle near each pinned end. */
export function drawPins({ line: { id }, members }: DrawnFrame): Primitive[] {
  return members.flatMap(({ member, from, to, length }) => {
    const away = Math.min(1.8, length / 4) / (length || 1)
    const target = memberTarget(id, member.id)
    return [
      ...(member.pin_from ? [circle('pin', between(from, to, away), 0.75, { target })] : []),
      ...(member.pin_to ? [circle('pin', between(to, from, away), 0.75, { target })] : []),
    ]
  })
}

export function wholePercent(fraction: number): string {
  return `${Math.round(fraction * 100)} %`
}

export function memberLabel({ member }: DrawnMember, finding: MemberFinding | undefined, z: number): string {
  if (!finding) return `${kindWord(member.kind)} ${member.id}, ${member.section}`
  function at(value: number, sd: number) {
    return `${moment(value)} \u00b1 ${moment(z * sd)}`
  }
  const said = [
    `${kindWord(member.kind)} ${member.id}: induced ${at(finding.moment_from_kNm, finding.sd_from_kNm)} and ${at(finding.moment_to_kNm, finding.sd_to_kNm)} kNm`,
  ]
  if (finding.induced_fraction !== undefined)
    said.push(
      `${wholePercent(finding.induced_fraction)} \u00b1 ${wholePercent(z * (finding.sd_induced_fraction ?? 0))} of capacity`,
    )
  if (finding.utilisation !== undefined) said.push(`utilisation ${wholePercent(finding.utilisation)}`)
  said.push(finding.status === 'none' ? 'no capacity given' : `${finding.status}, ${finding.certainty}`)
  return said.join('; ')
}

function kindWord(kind: 'beam' | 'column' | 'brace'): string {
  return `${kind[0]!.toUpperCase()}${kind.slice(1)}`
}
