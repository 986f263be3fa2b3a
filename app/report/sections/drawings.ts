/** The plan and the worst elevations, by the same drawing code as the window. */
import type { Content } from 'pdfmake/interfaces.js'
import { elevation } from '../../drawing/elevation.ts'
import { plan } from '../../drawing/plan.ts'
import { byWorst, worse, type FrameLineFinding, type Status } from '../../model/findings.ts'
import { textWidthOf, type ReportInput } from '../input.ts'
import { drawing } from '../style.ts'

const ELEVATIONS = 4

export function drawings(input: ReportInput): Content[] {
  const { building, findings, options } = input
  const width = textWidthOf(options.paper)
  const lines = worstLines(findings.frame_lines).slice(0, ELEVATIONS)
  const shown: Content[] = [
    { text: 'Plan', style: 'heading', headlineLevel: 1, pageBreak: 'before' },
    drawing(plan({ building, findings, width, height: width * 0.72 })),
    {
      text: 'Settlement of the supports in mm, down positive; contours of settlement; frame lines by their worst flag.',
      style: 'quiet',
    },
  ]
  lines.forEach((line, i) => {
    const scene = elevation({
      building,
      line: line.id,
      findings,
      width,
      height: width * heightFor(building, line.id),
      show: { deformed: true, moments: true },
    })
    shown.push({
      unbreakable: true,
      stack: [
        {
          text: `Frame line ${line.id}${i === 0 && lines.length > 1 ? ', the worst' : ''}`,
          style: 'heading',
          headlineLevel: 1,
        },
        drawing(scene),
      ],
    })
  })
  const left = findings.frame_lines.length - lines.length
  shown.push({
    text: `Moments are those induced by settlement alone, drawn on the tension side; the deformed line is exaggerated by the factor printed.${left > 0 ? ` ${left} further frame ${left === 1 ? 'line is' : 'lines are'} in the tables, not drawn.` : ''}`,
    style: 'quiet',
  })
  return shown
}

/** Height of the sheet over its width: two to a page for the usual frame, more for a tower, at most a page. */
function heightFor(building: ReportInput['building'], id: string): number {
  const nodes = building.frame_lines.find((line) => line.id === id)?.nodes ?? []
  const [x, z] = [nodes.map((n) => n.x_m), nodes.map((n) => n.z_m)]
  const slenderness = (Math.max(...z) - Math.min(...z)) / Math.max(1, Math.max(...x) - Math.min(...x))
  return Math.min(1.3, Math.max(0.6, 0.35 + 0.6 * slenderness))
}

/** Frame lines, the one with the worst flag and the greatest fraction first. */
export function worstLines(lines: readonly FrameLineFinding[]): FrameLineFinding[] {
  return lines
    .map((line) => ({ line, status: lineStatus(line), fraction: Math.max(0, ...line.members.map(severity)) }))
    .sort((a, b) => byWorst(a.status, b.status) || b.fraction - a.fraction)
    .map((entry) => entry.line)
}

export function lineStatus(line: FrameLineFinding): Status {
  return [...line.members, ...line.spans].reduce<Status>((status, x) => worse(status, x.status), 'none')
}

/** How near its limits a member is, for sorting within a status. */
export function severity(member: FrameLineFinding['members'][number]): number {
  return Math.max(member.induced_fraction ?? 0, member.utilisation ?? 0)
}
