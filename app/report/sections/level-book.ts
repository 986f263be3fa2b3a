/** The level book as a surveyor would lay out the page. */
import type { Content } from 'pdfmake/interfaces.js'
import { bookView } from '../../assess/level-book.ts'
import type { LevelBook } from '../../model/building.ts'
import { fixed, level, millimetres } from '../../model/numbers.ts'
import type { ReportInput } from '../input.ts'
import { table } from '../style.ts'

export function levelBook({ building, round }: ReportInput): Content[] {
  if (!round.book) return []
  const view = bookView(building, round)
  return [
    { text: 'Appendix: level book', style: 'heading', headlineLevel: 1, pageBreak: 'before' },
    {
      text: `Round ${round.id}, ${round.date}. Readings in m as booked; reduced level by height of collimation; adjusted level and its standard deviation from the least-squares adjustment.${collimation(round.book)}`,
      style: 'body',
    },
    table(
      [
        { heading: 'point', width: '*' },
        { heading: 'back', width: 48, align: 'right' },
        { heading: 'mid', width: 48, align: 'right' },
        { heading: 'fore', width: 48, align: 'right' },
        { heading: 'collimation', width: 58, align: 'right' },
        { heading: 'reduced', width: 54, align: 'right' },
        { heading: 'adjusted', width: 54, align: 'right' },
        { heading: 'sd, mm', width: 36, align: 'right' },
      ],
      view.rows.map((row, i) => {
        const booked = round.book!.rows[i]!
        return [
          booked.point,
          reading(booked.back_m),
          reading(booked.mid_m),
          reading(booked.fore_m),
          row.collimation_m === undefined ? '' : level(row.collimation_m),
          row.reduced_m === undefined ? '' : level(row.reduced_m),
          row.adjusted_m === undefined ? '' : level(row.adjusted_m),
          row.sd_mm === undefined ? '' : millimetres(row.sd_mm, 2),
        ]
      }),
    ),
  ]
}

function collimation({ collimation_mm_per_10_m: error }: LevelBook): string {
  if (!error) return ''
  return ` Reduced from readings corrected over their sights for a collimation error of ${fixed(error, 2)} mm in 10 m (line of sight rising).`
}

function reading(value: number | undefined): string {
  return value === undefined ? '' : value.toFixed(5)
}
