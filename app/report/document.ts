/** The condition report as a pdfmake definition, section by section. */
import type { TDocumentDefinitions } from 'pdfmake/interfaces.js'
import { CAUTION_LINE } from '../model/cautions.ts'
import { MARGIN, POINTS, type ReportInput } from './input.ts'
import { drawings } from './sections/drawings.ts'
import { flagged } from './sections/flagged.ts'
import { headroom } from './sections/headroom.ts'
import { ledgers } from './sections/ledgers.ts'
import { levelBook } from './sections/level-book.ts'
import { howSure, measured } from './sections/measured.ts'
import { limits, method, notCovered, signOff, verification } from './sections/method.ts'
import { titlePage } from './sections/title.ts'
import { INK, QUIET, styles } from './style.ts'

/** `laidOut` is told the number of pages, which is known only once they are laid out. */
export function reportDocument(input: ReportInput, laidOut: (pages: number) => void): TDocumentDefinitions {
  const { building, label, options, round, date } = input
  const side = MARGIN * POINTS
  return {
    pageSize: options.paper === 'A4' ? 'A4' : 'LETTER',
    pageMargins: [side, 52, side, 60],
    info: {
      title: `Condition report ${label}: ${building.name}, round ${round.id}`,
      creator: 'Levelstead',
      producer: 'Levelstead',
      creationDate: new Date(`${date}T00:00:00Z`),
      modDate: new Date(`${date}T00:00:00Z`),
    },
    defaultStyle: { font: 'Roboto', fontSize: 10, color: INK },
    styles,
    header: {
      margin: [side, 24, side, 0],
      columns: [
        { text: `${building.name}, round ${round.id}`, color: QUIET, fontSize: 8.5 },
        {
          text: `${label}${input.state === 'draft' ? ' (draft)' : ''}`,
          alignment: 'right',
          color: QUIET,
          fontSize: 8.5,
        },
      ],
    },
    // A heading never stands alone at the foot of a page.
    pageBreakBefore: (node, nodes) => node.headlineLevel === 1 && nodes.getFollowingNodesOnPage().length === 0,
    footer: (page, pages) => {
      laidOut(pages)
      return {
        margin: [side, 14, side, 0],
        stack: [
          {
            canvas: [
              {
                type: 'line',
                x1: 0,
                y1: 0,
                x2: (options.paper === 'A4' ? 595.28 : 612) - 2 * side,
                y2: 0,
                lineWidth: 0.4,
                lineColor: QUIET,
              },
            ],
          },
          {
            margin: [0, 5, 0, 0],
            columns: [
              { text: `${CAUTION_LINE} Local codes govern.`, fontSize: 8, color: INK, width: '*' },
              { text: `page ${page} of ${pages}`, fontSize: 8, color: QUIET, width: 70, alignment: 'right' },
            ],
          },
        ],
      }
    },
    content: [
      ...titlePage(input),
      ...measured(input),
      ...howSure(input),
      ...drawings(input),
      ...headroom(input),
      ...ledgers(input),
      ...flagged(input),
      ...method(input),
      ...limits(input),
      ...notCovered(),
      ...signOff(input),
      ...levelBook(input),
      ...verification(input),
    ],
  }
}
