/** How many millimetres each support has left before a trigger, and what reaches it first. */
import type { Content, TableCell } from 'pdfmake/interfaces.js'
import { headroomOf, MOST } from '../../assess/headroom.ts'
import type { Reach, SupportHeadroom, Triggered } from '../../model/findings.ts'
import { fixed } from '../../model/numbers.ts'
import type { ReportInput } from '../input.ts'
import { table } from '../style.ts'

export function headroom({ prepared, findings, z }: ReportInput): Content[] {
  const rows = headroomOf(prepared, findings)
  const isHeld = rows.some((row) => row.amber || row.red)
  const heading: Content = {
    text: 'What each support has left',
    style: 'heading',
    headlineLevel: 1,
    pageBreak: 'before',
  }
  if (!isHeld)
    return [heading, { text: `No support reaches a trigger within ${MOST} m of further settlement.`, style: 'body' }]
  return [
    heading,
    {
      text: 'Further settlement of one support alone, the others staying as they are, until the first member or span that is still below a trigger reaches it. Rounded down. Members and spans already at or beyond a trigger are in the tables below and are not counted again here.',
      style: 'body',
    },
    table(
      [
        { heading: 'support', width: 50 },
        { heading: 'to amber, mm', width: 62, align: 'right' },
        { heading: '±', width: 32, align: 'right' },
        { heading: 'first to reach it', width: '*' },
        { heading: 'to red, mm', width: 55, align: 'right' },
        { heading: '±', width: 32, align: 'right' },
        { heading: 'first to reach it', width: '*' },
      ],
      rows
        .sort((a, b) => nearest(a) - nearest(b))
        .map((row): TableCell[] => [row.support, ...reachCells(row.amber, z), ...reachCells(row.red, z)]),
    ),
  ]
}

function nearest({ red, amber }: SupportHeadroom): number {
  return red?.left_mm ?? amber?.left_mm ?? Infinity
}

function reachCells(reach: Reach | undefined, z: number): TableCell[] {
  if (!reach) return ['none', '', '']
  return [leftText(reach.left_mm), fixed(z * reach.sd_mm, 1), targetText(reach.target)]
}

/** A tenth of a millimetre, rounded down: nobody is promised more than there is. */
export function leftText(mm: number): string {
  return fixed(Math.floor(mm * 10) / 10, 1)
}

export function targetText(target: Triggered): string {
  return target.kind === 'member'
    ? `member ${target.id} (line ${target.line})`
    : `span ${target.from} to ${target.to} (line ${target.line})`
}
