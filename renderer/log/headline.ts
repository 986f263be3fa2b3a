/** A round's findings in a few lines. */
import { percent, ratio } from '../../app/model/numbers.ts'
import type { MemberFinding, RoundFindings, SpanFinding, Status } from '../../app/model/findings.ts'
import { byWorst } from '../../app/model/findings.ts'

export interface Headline {
  status: string
  lines: string[]
}

const WORDS: Record<Status, string> = {
  red: 'Red',
  amber: 'Amber',
  green: 'Green',
  none: 'No flag: no capacity is given',
}

export function headlineOf(findings: RoundFindings): Headline {
  const members = findings.frame_lines.flatMap(({ id, members }) => members.map((member) => ({ line: id, member })))
  const spans = findings.frame_lines.flatMap(({ id, spans }) => spans.map((span) => ({ line: id, span })))
  const all = [...members.map((m) => m.member), ...spans.map((s) => s.span)]
  const counts = (['red', 'amber'] as const)
    .map((status) => [all.filter((x) => x.status === status).length, status] as const)
    .filter(([count]) => count > 0)
    .map(([count, status]) => `${count} ${status}`)
  const worst = members
    .filter(({ member }) => member.induced_fraction !== undefined)
    .toSorted(
      (a, b) =>
        byWorst(a.member.status, b.member.status) ||
        (b.member.induced_fraction ?? 0) - (a.member.induced_fraction ?? 0),
    )[0]
  const steepest = spans.toSorted(
    (a, b) => Math.abs(b.span.angular_distortion_rad) - Math.abs(a.span.angular_distortion_rad),
  )[0]
  return {
    status: [WORDS[findings.status], ...(counts.length ? [counts.join(', ')] : [])].join(': '),
    lines: [...(worst ? [memberLine(worst)] : []), ...(steepest ? [spanLine(steepest)] : [])],
  }
}

function memberLine({ line, member }: { line: string; member: MemberFinding }): string {
  const used = member.utilisation === undefined ? '' : `, utilisation ${percent(member.utilisation)}`
  return `Most of its capacity is induced in ${member.member} of line ${line}: ${percent(member.induced_fraction!)}${used}, ${member.certainty}.`
}

function spanLine({ line, span }: { line: string; span: SpanFinding }): string {
  return `Greatest angular distortion from ${span.from} to ${span.to} of line ${line}: ${ratio(Math.abs(span.angular_distortion_rad))}, ${span.certainty}.`
}
