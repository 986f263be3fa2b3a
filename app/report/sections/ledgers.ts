/** The tables of supports, spans and members, worst first. */
import type { Content, TableCell } from 'pdfmake/interfaces.js'
import { byWorst, type MemberFinding, type SpanFinding } from '../../model/findings.ts'
import { millimetres, moment, momentWithInterval, percent, ratio } from '../../model/numbers.ts'
import type { ReportInput } from '../input.ts'
import { statusCell, table } from '../style.ts'
import { severity } from './drawings.ts'

/** Rows of a table at most; a longer one is read by nobody, and the findings file has them all. */
const MOST_ROWS = 300

export function ledgers(input: ReportInput): Content[] {
  return [
    { text: 'Supports', style: 'heading', headlineLevel: 1 },
    ...supports(input),
    { text: 'Spans', style: 'heading', headlineLevel: 1 },
    ...spans(input),
    ...stretches(input),
    { text: 'Members', style: 'heading', headlineLevel: 1 },
    ...members(input),
    {
      text: 'Moments at the from and to end induced by settlement alone, clockwise positive; existing moments from the loads as combined. Fraction: induced bending over capacity of its sense. Used: utilisation, induced and existing together over capacity, at its worst along the member.',
      style: 'quiet',
    },
  ]
}

function supports({ findings, z }: ReportInput): Content[] {
  const rows = [...findings.supports].sort((a, b) => b.settlement_mm - a.settlement_mm)
  return cut(rows, 'supports', (shown) =>
    table(
      [
        { heading: 'support', width: '*' },
        { heading: 'settlement, mm', width: 90, align: 'right' },
        { heading: '±, mm', width: 50, align: 'right' },
        { heading: 'significant', width: 70 },
        { heading: 'measured', width: 110 },
      ],
      shown.map((s) => [
        s.support,
        millimetres(s.settlement_mm, 1),
        millimetres(z * s.sd_mm, 1),
        s.significant ? 'yes' : 'no',
        s.estimated ? 'no: estimated' : 'yes',
      ]),
    ),
  )
}

function spans({ findings, z }: ReportInput): Content[] {
  const rows: { line: string; span: SpanFinding }[] = findings.frame_lines.flatMap((line) =>
    line.spans.map((span) => ({ line: line.id, span })),
  )
  rows.sort(
    (a, b) =>
      byWorst(a.span.status, b.span.status) ||
      Math.abs(b.span.angular_distortion_rad) - Math.abs(a.span.angular_distortion_rad),
  )
  return cut(rows, 'spans', (shown) =>
    table(
      [
        { heading: 'line', width: 45 },
        { heading: 'span', width: '*' },
        { heading: 'length, m', width: 50, align: 'right' },
        { heading: 'differential, mm', width: 70, align: 'right' },
        { heading: 'angular distortion', width: 75, align: 'right' },
        { heading: '±, 1/1000', width: 50, align: 'right' },
        { heading: 'status', width: 95 },
      ],
      shown.map(({ line, span }): TableCell[] => [
        line,
        `${span.from} to ${span.to}`,
        span.length_m.toFixed(2),
        millimetres(span.differential_mm, 1),
        ratio(span.angular_distortion_rad),
        (z * span.sd_rad * 1000).toFixed(2),
        statusCell(span.status, span.certainty),
      ]),
    ),
  )
}

/** Sagging and hogging stretches that the survey can tell from none. */
function stretches({ findings, z }: ReportInput): Content[] {
  const rows = findings.frame_lines
    .flatMap((line) => line.stretches.map((stretch) => ({ line: line.id, stretch })))
    .filter(({ stretch }) => stretch.deflection_ratio > z * stretch.sd_ratio)
    .sort((a, b) => b.stretch.deflection_ratio - a.stretch.deflection_ratio)
  if (rows.length === 0) return []
  return [
    { text: 'Deflection ratio', style: 'heading', headlineLevel: 1 },
    ...cut(rows, 'stretches', (shown) =>
      table(
        [
          { heading: 'line', width: 45 },
          { heading: 'stretch', width: '*' },
          { heading: 'length, m', width: 55, align: 'right' },
          { heading: 'largest offset, mm', width: 85, align: 'right' },
          { heading: 'at', width: 45 },
          { heading: 'deflection ratio', width: 75, align: 'right' },
          { heading: '±, 1/1000', width: 50, align: 'right' },
        ],
        shown.map(({ line, stretch }): TableCell[] => [
          line,
          `${stretch.kind}, ${stretch.from} to ${stretch.to}`,
          stretch.length_m.toFixed(2),
          millimetres(stretch.deflection_mm, 1),
          stretch.at,
          ratio(stretch.deflection_ratio),
          (z * stretch.sd_ratio * 1000).toFixed(2),
        ]),
      ),
    ),
    {
      text: 'The largest offset from the straight line between two supports over their distance, for every sagging and hogging stretch beyond the survey’s uncertainty (relative deflection: Burland and Wroth 1974). No trigger is held against it here.',
      style: 'quiet',
    },
  ]
}

function members({ findings, z }: ReportInput): Content[] {
  const rows: { line: string; member: MemberFinding }[] = findings.frame_lines.flatMap((line) =>
    line.members.map((member) => ({ line: line.id, member })),
  )
  rows.sort((a, b) => byWorst(a.member.status, b.member.status) || severity(b.member) - severity(a.member))
  const loaded = rows.some(({ member }) => member.existing_from_kNm !== undefined)
  return cut(rows, 'members', (shown) =>
    table(
      [
        { heading: 'line', width: 24 },
        { heading: 'member', width: '*' },
        { heading: 'from, kNm', width: 60, align: 'right' },
        { heading: 'to, kNm', width: 60, align: 'right' },
        ...(loaded ? [{ heading: 'existing, kNm', width: 62, align: 'right' as const }] : []),
        { heading: 'fraction', width: 56, align: 'right' },
        { heading: 'used', width: 32, align: 'right' },
        { heading: 'status', width: 84 },
      ],
      shown.map(({ line, member }): TableCell[] => [
        line,
        member.member,
        momentWithInterval(member.moment_from_kNm, z * member.sd_from_kNm).join(' ± '),
        momentWithInterval(member.moment_to_kNm, z * member.sd_to_kNm).join(' ± '),
        ...(loaded
          ? [
              member.existing_from_kNm === undefined
                ? ''
                : `${moment(member.existing_from_kNm)}, ${moment(member.existing_to_kNm ?? 0)}`,
            ]
          : []),
        member.induced_fraction === undefined
          ? 'no capacity'
          : `${percent(member.induced_fraction)} ± ${percent(z * (member.sd_induced_fraction ?? 0))}`,
        member.utilisation === undefined ? '' : percent(member.utilisation),
        statusCell(member.status, member.status === 'none' ? undefined : member.certainty),
      ]),
    ),
  )
}

/** The table of the first rows, and how many are left out. */
function cut<T>(rows: readonly T[], what: string, make: (shown: readonly T[]) => Content): Content[] {
  if (rows.length <= MOST_ROWS) return [make(rows)]
  const text = `The ${MOST_ROWS} worst of ${rows.length} ${what}; the others are in the findings file.`
  return [make(rows.slice(0, MOST_ROWS)), { text, style: 'quiet' }]
}
