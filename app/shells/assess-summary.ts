/** Findings as lines for a terminal: status in words, every value with its uncertainty, cautions at the end. */
import type {
  Findings,
  FrameLineFinding,
  MemberFinding,
  RoundFindings,
  SpanFinding,
  Status,
} from '../model/findings.ts'
import { byWorst } from '../model/findings.ts'
import { millimetres, momentWithInterval, percent, ratio } from '../model/numbers.ts'

/** Members and spans named for each round; the findings file has them all. */
const NAMED = 8
const MARK: Record<Status, string> = { green: '●', amber: '▲', red: '■', none: '○' }

export function summary(findings: Findings, z: number): string {
  const { building, baseline, rounds } = findings
  const head = `${building}: ${rounds.length} ${rounds.length === 1 ? 'round' : 'rounds'} against baseline ${baseline ?? 'none'}`
  if (rounds.length === 0)
    return [head, '', 'There is no round after the baseline yet: nothing to assess.', '', ...findings.cautions].join(
      '\n',
    )
  const latest = rounds.at(-1)!
  return [
    head,
    '',
    ...rounds.map((round) => roundLine(round)),
    '',
    ...latestLines(latest, z),
    '',
    ...findings.cautions,
  ].join('\n')
}

function roundLine(round: RoundFindings): string {
  const members = round.frame_lines.flatMap((line) => line.members)
  const spans = round.frame_lines.flatMap((line) => line.spans)
  const flagged = (status: Status) => [...members, ...spans].filter((x) => x.status === status).length
  const most = Math.max(...round.supports.map((s) => s.settlement_mm))
  const borderline = [...members, ...spans].filter((x) => x.certainty === 'borderline').length
  return `${MARK[round.status]} ${round.id.padEnd(6)} ${round.date}  ${round.status.padEnd(6)} ${flagged('red')} red, ${flagged('amber')} amber, ${borderline} borderline; greatest settlement ${millimetres(most)} mm`
}

function latestLines(round: RoundFindings, z: number): string[] {
  const lines = [`Round ${round.id}, ${round.date}:`]
  const estimated = round.supports.filter((s) => s.estimated)
  if (estimated.length) lines.push(`  not measured, estimated: ${estimated.map((s) => s.support).join(', ')}`)
  if (round.levelling?.scaled)
    lines.push('  the level book scatters more than its instrument should; its uncertainty was raised')
  const members = round.frame_lines
    .flatMap((line) => line.members.map((member) => ({ line, member })))
    .sort((a, b) => byWorst(a.member.status, b.member.status) || share(b.member) - share(a.member))
  const spans = round.frame_lines
    .flatMap((line) => line.spans.map((span) => ({ line, span })))
    .sort((a, b) => Math.abs(b.span.angular_distortion_rad) - Math.abs(a.span.angular_distortion_rad))
  lines.push(...members.slice(0, NAMED).map(({ line, member }) => memberLine(line, member, z)))
  if (members.length > NAMED) lines.push(`  and ${members.length - NAMED} more members`)
  lines.push(...spans.slice(0, 3).map(({ line, span }) => spanLine(line, span, z)))
  if (spans.length > 3) lines.push(`  and ${spans.length - 3} more spans`)
  return lines
}

function share(member: MemberFinding): number {
  return member.induced_fraction ?? -1
}

function memberLine(line: FrameLineFinding, m: MemberFinding, z: number): string {
  const isFrom = m.fraction_end ? m.fraction_end === 'from' : Math.abs(m.moment_from_kNm) >= Math.abs(m.moment_to_kNm)
  const value = isFrom ? m.moment_from_kNm : m.moment_to_kNm
  const sd = isFrom ? m.sd_from_kNm : m.sd_to_kNm
  const held =
    m.induced_fraction === undefined
      ? 'no capacity given'
      : `${percent(m.induced_fraction)} of capacity, utilisation ${m.utilisation === undefined ? '–' : percent(m.utilisation)}`
  return `  ${MARK[m.status]} ${m.status.padEnd(6)} member ${m.member}, frame line ${line.id}: induced ${momentWithInterval(Math.abs(value), z * sd).join(' ± ')} kNm, ${held}; ${m.certainty}`
}

function spanLine(line: FrameLineFinding, s: SpanFinding, z: number): string {
  return `  ${MARK[s.status]} ${s.status.padEnd(6)} span ${s.from} to ${s.to}, frame line ${line.id}: angular distortion ${ratio(Math.abs(s.angular_distortion_rad))} ± ${ratio(z * s.sd_rad)}; ${s.certainty}`
}
