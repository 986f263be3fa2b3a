/** The flagged members and spans, worst first, with what makes them so. */
import type { Content } from 'pdfmake/interfaces.js'
import { because, type BecauseTarget } from '../../assess/because.ts'
import { byWorst } from '../../model/findings.ts'
import { millimetres, moment } from '../../model/numbers.ts'
import type { ReportInput } from '../input.ts'
import { statusCell, table } from '../style.ts'
import { severity } from './drawings.ts'

const SHOWN = 12

export function flagged(input: ReportInput): Content[] {
  const { findings, prepared } = input
  const rows = findings.frame_lines
    .flatMap((line) => line.members.map((member) => ({ line: line.id, member })))
    .filter(({ member }) => member.status === 'red' || member.status === 'amber')
    .sort((a, b) => byWorst(a.member.status, b.member.status) || severity(b.member) - severity(a.member))
  const heading: Content = { text: 'Flagged members and what makes them so', style: 'heading', headlineLevel: 1 }
  if (rows.length === 0)
    return [heading, { text: 'No member has reached an amber or red trigger in this round.', style: 'body' }]
  const shown = rows.slice(0, SHOWN).map(({ line, member }, i): Content => {
    const target: BecauseTarget = { kind: 'member', line, id: member.member, end: member.fraction_end }
    const reason = because(prepared, findings, target)
    const ranked = [...reason.shares].sort((a, b) => Math.abs(b.share) - Math.abs(a.share))
    const drivers = ranked.filter((d, i) => i < 6 && Math.abs(d.share) >= 0.01 * Math.abs(ranked[0]!.share))
    return {
      unbreakable: true,
      margin: [0, 0, 0, 8],
      stack: [
        // With the first of them, so that it never stands alone.
        ...(i === 0 ? [heading] : []),
        {
          columns: [
            { width: '*', text: `${member.member} on frame line ${line}`, style: 'subheading' },
            { width: 110, stack: [statusCell(member.status, member.certainty)], margin: [0, 9, 0, 0] },
          ],
        },
        { text: reason.sentences.join(' '), style: 'body' },
        ...reason.formula.map((text): Content => ({ text, style: 'formula' })),
        table(
          [
            { heading: 'support', width: 80 },
            { heading: 'settlement, mm', width: 80, align: 'right' },
            { heading: `share of the value, ${reason.unit}`, width: 120, align: 'right' },
          ],
          drivers.map((d) => [d.support, millimetres(d.settlement_mm, 1), moment(d.share)]),
        ),
      ],
    }
  })
  const left = rows.length - shown.length
  if (left > 0) shown.push({ text: `${left} further flagged members are in the table of members.`, style: 'quiet' })
  return shown
}
