/** The whole chain, from given levels to flags, on a bay that can be worked by hand. */
import type { Building } from '../../model/building.ts'
import { assessBuilding } from '../assess.ts'
import type { Check } from './check.ts'

const BY_HAND = 'Slope-deflection by hand, the formulas above'

/** One beam of 6 m, EI = 162 000 kNm2, fixed to two supports; the levels fall by the settlements given, mm. */
function bay(settlements: readonly [number, number], base_rotation: 'held' | 'follows-tilt'): Building {
  const level_m = 10
  return {
    format: 'levelstead-building',
    version: 1,
    name: 'One bay',
    supports: [
      { id: 'A', x_m: 0, y_m: 0 },
      { id: 'B', x_m: 6, y_m: 0 },
    ],
    sections: [{ id: 'beam', material: 'concrete', E_GPa: 30, I_cm4: 540000, A_cm2: 1800, capacity: { sagging_kNm: 540 } }], // prettier-ignore
    frame_lines: [
      {
        id: '1',
        nodes: [
          { id: 'A', x_m: 0, z_m: 0, support: 'A' },
          { id: 'B', x_m: 6, z_m: 0, support: 'B' },
        ],
        members: [{ id: 'A-B', kind: 'beam', from: 'A', to: 'B', section: 'beam' }],
      },
    ],
    survey: {
      points: ['A', 'B'].map((support) => ({ id: `S-${support}`, kind: 'stud', support })),
      baseline: 'R0',
      rounds: [
        { id: 'R0', date: '2026-01-01', levels: ['A', 'B'].map((s) => ({ point: `S-${s}`, level_m, sd_mm: 0.3 })) },
        {
          id: 'R1',
          date: '2026-02-01',
          levels: ['A', 'B'].map((s, i) => ({
            point: `S-${s}`,
            level_m: level_m - settlements[i]! / 1000,
            sd_mm: 0.3,
          })),
        },
      ],
    },
    criteria: { base_rotation },
  }
}

export function wholeChecks(): Check[] {
  const held = assessBuilding(bay([0, 10], 'held')).rounds[0]!
  const leaning = assessBuilding(bay([4, 10], 'follows-tilt')).rounds[0]!
  const member = held.frame_lines[0]!.members[0]!
  return [
    { source: BY_HAND, check: 'levels to moments, one end sinks 10 mm: 6EI \u00d7 settlement / L\u00b2', expected: -270, found: member.moment_from_kNm, unit: 'kNm', tolerance: 1e-6 }, // prettier-ignore
    { source: `${BY_HAND}; 0.3 mm for each level, four levels`, check: 'its standard deviation', expected: 27 * 0.3 * Math.SQRT2 * Math.SQRT2, found: member.sd_from_kNm, unit: 'kNm', tolerance: 1e-6 }, // prettier-ignore
    { source: BY_HAND, check: 'its share of a capacity of 540 kNm', expected: 0.5, found: member.induced_fraction!, unit: '', tolerance: 1e-9 }, // prettier-ignore
    { source: 'A building that only sinks and tilts is not bent, where its footings turn with it', check: 'the same bay, tilting: moment', expected: 0, found: leaning.frame_lines[0]!.members[0]!.moment_from_kNm, unit: 'kNm' }, // prettier-ignore
  ]
}
