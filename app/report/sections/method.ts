/** Method and assumptions, limits with their sources, what is not covered, sign-off and verification. */
import type { Content, TableCell } from 'pdfmake/interfaces.js'
import type { Triggers } from '../../model/building.ts'
import { limitSetOf } from '../../model/limit-sets.ts'
import { percent, ratio } from '../../model/numbers.ts'
import type { ReportInput } from '../input.ts'
import { QUIET, table } from '../style.ts'

export function method({ criteria, building }: ReportInput): Content[] {
  const { combination } = criteria
  const lines = [
    'Levels: every staff reading is an observation with the height of collimation of its setup unknown; benchmarks held; weighted least squares with full covariance. Where the variance factor exceeds its chi-square limit the covariance is scaled up; it is never scaled down.',
    'Settlement: baseline level minus level, with the covariance of both rounds. A support that was not measured is estimated from its neighbours with an allowance, marked so, and never gives a clear result.',
    'Movement of the whole: the least-squares plane through the measured supports gives mean settlement and tilt. Angular distortion is the chord rotation of a span less the tilt along its frame line (relative rotation; Skempton and MacDonald 1956, Burland and Wroth 1974).',
    `Frame: each frame line is a plane frame, linear elastic, small displacements, displacement method, axial deformation counted, shear deformation where a shear area is given. The measured settlement is a prescribed movement of the bases; ${
      criteria.base_rotation === 'follows-tilt'
        ? 'the footings turn with the tilt of the frame line, so that a building that only sinks and tilts has no induced moment'
        : 'the footings are held against rotation and horizontal movement'
    }.`,
    `Existing moments: from the loads described, ${combination.permanent} × permanent + ${combination.variable} × variable, on the same frame. Total: existing + ${combination.settlement} × induced.`,
    'A column that stands in two frame lines reports both moments; its utilisation is the sum of both at the same section.',
    'Stiffness: as described, sudden and unrelaxed. Creep and cracking after the settlement would reduce the induced moments of concrete; they are not counted unless in the stiffness given.',
  ]
  const cracked = building.sections.filter((s) => s.stiffness_factor !== undefined && s.stiffness_factor !== 1)
  if (cracked.length)
    lines.push(`Reduced stiffness: ${cracked.map((s) => `${s.id} × ${s.stiffness_factor}`).join(', ')}.`)
  return [
    { text: 'Method and assumptions', style: 'heading', headlineLevel: 1 },
    { ul: lines, style: 'body' },
  ]
}

export function limits({ criteria }: ReportInput): Content[] {
  return [
    {
      unbreakable: true,
      stack: [
        { text: 'Limits and their sources', style: 'heading', headlineLevel: 1 },
        table(
          [
            { heading: 'held against', width: 130 },
            { heading: 'amber', width: 60, align: 'right' },
            { heading: 'red', width: 60, align: 'right' },
            { heading: 'source', width: '*' },
          ],
          [
            [
              'induced moment over capacity',
              percent(criteria.induced_fraction.amber),
              percent(criteria.induced_fraction.red),
              'the assessor’s choice; common practice in monitoring plans',
            ],
            [
              'utilisation, induced and existing',
              percent(criteria.utilisation.amber),
              percent(criteria.utilisation.red),
              'red: the capacity given; amber: common practice',
            ],
            [
              'angular distortion',
              ratio(criteria.angular_distortion.amber),
              ratio(criteria.angular_distortion.red),
              distortionSource(criteria.angular_distortion),
            ],
          ],
        ),
        {
          text: 'EN 1997-1 Annex H gives its values for sagging and asks for half of them where the edge settles more (hogging). Finishes, plant and services may need stricter limits than the frame.',
          style: 'body',
        },
      ],
    },
  ]
}

/** Where the triggers come from: a published set, or the assessor, who then answers for them. */
function distortionSource(triggers: Triggers): string {
  const set = limitSetOf(triggers)
  if (set) return `${set.structure}. ${set.source}`
  return 'the assessor’s choice, of no published set known here'
}

export function notCovered(): Content[] {
  return [
    { text: 'What is not covered', style: 'heading', headlineLevel: 1 },
    {
      ul: [
        'Anything not described: members, walls, cladding, stairs, services, finishes, joints and their condition.',
        'Strength of the foundations and of the ground; the cause of the movement and how it will go on.',
        'Horizontal ground movement, twisting of the frame out of its plane, dynamic effects, fire and accidental actions.',
        'Redistribution after yielding, second-order effects, lateral stability.',
        'The capacities, loads and stiffnesses themselves: they are as typed in by the assessor.',
        'Movement that happened before the baseline round.',
      ],
      style: 'body',
    },
  ]
}

export function signOff({ options }: ReportInput): Content[] {
  const line = { text: '.'.repeat(58), color: '#b9b4a7' }
  function block(role: string, name: string): Content {
    return {
      unbreakable: true,
      margin: [0, 10, 0, 0],
      stack: [
        { text: role, style: 'subheading' },
        {
          columns: [
            {
              width: 90,
              stack: ['Name', 'Qualification', 'Signature', 'Date'].map((text): Content => ({
                text,
                margin: [0, 6, 0, 0],
              })),
            },
            {
              width: '*',
              stack: [name || line, line, line, line].map((c): Content => ({
                ...(typeof c === 'string' ? { text: c } : c),
                margin: [0, 6, 0, 0],
              })),
            },
          ],
        },
      ],
    }
  }
  return [
    {
      unbreakable: true,
      stack: [
        { text: 'Sign-off', style: 'heading', headlineLevel: 1 },
        {
          text: 'This report has no standing until a licensed engineer has reviewed the readings, the description of the frame, the capacities and the findings, has seen the building, and has signed below.',
          style: 'body',
        },
        block('Reviewing licensed engineer', options.reviewer),
        block('Assessed by', options.assessed_by),
        block('Surveyed by', options.surveyed_by),
      ],
    },
  ]
}

export function verification({ verification: rows }: ReportInput): Content[] {
  return [
    { text: 'Appendix: verification', style: 'heading', headlineLevel: 1, pageBreak: 'before' },
    {
      text: `Before this report was made the program repeated ${rows.length} checks against published results and practice with the code that made the findings; ${rows.filter((r) => r.agrees).length} agree.`,
      style: 'body',
    },
    table(
      [
        { heading: 'check, and where the expected value stands', width: '*' },
        { heading: 'expected', width: 58, align: 'right' },
        { heading: 'found', width: 58, align: 'right' },
        { heading: 'unit', width: 42 },
        { heading: 'agrees', width: 34 },
      ],
      rows.map((r): TableCell[] => [
        { stack: [{ text: r.check }, { text: r.source, color: QUIET, fontSize: 7.5 }] },
        significant(r.expected),
        found(r),
        r.unit,
        r.agrees ? 'yes' : 'NO',
      ]),
    ),
  ]
}

/** What is nothing but the rounding of the arithmetic is printed as nothing. */
function found({ expected, found: value, tolerance }: ReportInput['verification'][number]): string {
  return expected === 0 && Math.abs(value) <= tolerance ? '0' : significant(value)
}

function significant(value: number): string {
  return String(Number(value.toPrecision(7))).replace('-', '\u2212')
}
