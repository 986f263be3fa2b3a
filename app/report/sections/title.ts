/** The first page: what it is about, its status in a word and a shape, the caution, and who stands for it. */
import type { Content } from 'pdfmake/interfaces.js'
import { CAUTIONS, RED_CAUTION } from '../../model/cautions.ts'
import type { RoundFindings, Status } from '../../model/findings.ts'
import type { ReportInput } from '../input.ts'
import { facts, framed, mark } from '../style.ts'

export function titlePage(input: ReportInput): Content[] {
  const { building, round, baseline, findings, options } = input
  const rows: [string, string][] = [['Building', building.name]]
  if (building.reference) rows.push(['Reference', building.reference])
  if (building.client) rows.push(['Client', building.client])
  if (building.address) rows.push(['Address', building.address])
  rows.push(
    ['Round', `${round.id}, ${round.date}`],
    ['Counted from', `${baseline.id}, ${baseline.date} (baseline)`],
    ['Report', input.label],
    [input.state === 'issued' ? 'Issued' : 'Drawn up', input.date],
    ['Surveyed by', options.surveyed_by || 'not named'],
    ['Assessed by', options.assessed_by || 'not named'],
    ['For review by', options.reviewer ? `${options.reviewer} (licensed engineer)` : 'a licensed engineer, not named'],
  )
  return [
    { text: 'Condition report', style: 'title' },
    {
      text: 'Settlement of an existing building and what it does to the frame',
      style: 'subtitle',
      margin: [0, 2, 0, 18],
    },
    facts(rows),
    statusLine(findings),
    cautionBox(findings.status),
    {
      text:
        input.state === 'draft'
          ? 'Draft: shown before issue, not entered in the register.'
          : 'Not reviewed until signed on the sign-off page.',
      style: 'quiet',
      margin: [0, 8, 0, 0],
    },
  ]
}

function statusLine(findings: RoundFindings): Content {
  return {
    columns: [
      { width: 24, stack: [mark(findings.status, 6)], margin: [0, 1, 0, 0] },
      {
        width: '*',
        stack: [
          {
            text: `Status: ${findings.status === 'none' ? 'not assessed' : findings.status}`,
            fontSize: 16,
            bold: true,
          },
          { text: statusSentence(findings), margin: [0, 3, 0, 0] },
        ],
      },
    ],
    margin: [0, 14, 0, 14],
  }
}

/** How many members and spans are red, amber and borderline, in one sentence. */
export function statusSentence(findings: RoundFindings): string {
  const members = findings.frame_lines.flatMap((line) => line.members)
  const spans = findings.frame_lines.flatMap((line) => line.spans)
  function counted(status: Status): string {
    const m = members.filter((x) => x.status === status).length
    const s = spans.filter((x) => x.status === status).length
    return `${m} ${m === 1 ? 'member' : 'members'} and ${s} ${s === 1 ? 'span' : 'spans'} ${status}`
  }
  const borderline = [...members, ...spans].filter((x) => x.certainty === 'borderline').length
  const unassessed = members.filter((x) => x.status === 'none').length
  const parts = [counted('red'), counted('amber')]
  let sentence = `${parts.join('; ')}. ${
    borderline === 0
      ? 'None is borderline.'
      : `${borderline} of all members and spans ${borderline === 1 ? 'is' : 'are'} borderline: within the survey's uncertainty of a trigger.`
  }`
  if (unassessed > 0)
    sentence += ` ${unassessed} ${unassessed === 1 ? 'member has' : 'members have'} no capacity given and ${unassessed === 1 ? 'is' : 'are'} not assessed.`
  return sentence
}

function cautionBox(status: Status): Content {
  const lines: Content[] = CAUTIONS.map((text) => ({ text, margin: [0, 0, 0, 2] }))
  if (status === 'red') lines.unshift({ text: RED_CAUTION, bold: true, margin: [0, 0, 0, 5] })
  return {
    table: {
      widths: ['*'],
      body: [[{ stack: [{ text: 'Caution', bold: true, margin: [0, 0, 0, 4] }, ...lines], style: 'caution' }]],
    },
    layout: framed,
  }
}
