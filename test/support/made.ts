/** Buildings for tests: one small one that says everything a building file can say, and any number at random. */
import fc from 'fast-check'
import type {
  Base,
  BookRow,
  Building,
  Capacity,
  FrameLine,
  GivenCriteria,
  Member,
  MemberLoad,
  Round,
  Section,
  Support,
  SurveyPoint,
} from '../../app/model/building.ts'
import { filled } from '../../app/model/edits/difference.ts'

/** A portal of one bay with every key of the format, one round of levels and one level book. */
export function smallBuilding(): Building {
  return {
    format: 'levelstead-building',
    version: 1,
    name: 'Lime Kiln Lane, store',
    reference: 'LK-2',
    client: '',
    address: 'Lime Kiln Lane 2',
    notes: '',
    supports: [
      { id: 'A1', x_m: 0, y_m: 0, base_m: -1.2 },
      { id: 'A2', x_m: 6, y_m: 0 },
    ],
    sections: [
      {
        id: 'beam',
        material: 'concrete',
        E_GPa: 30,
        I_cm4: 540000,
        A_cm2: 1800,
        shear_area_cm2: 1500,
        G_over_E: 0.41667,
        stiffness_factor: 0.5,
        capacity: { sagging_kNm: 210, hogging_kNm: 260, shear_kN: 240 },
      },
      { id: 'column', material: 'concrete', E_GPa: 30, I_cm4: 213333, A_cm2: 1600, capacity: { sagging_kNm: 180 } },
    ],
    frame_lines: [
      {
        id: 'A',
        nodes: [
          { id: 'a1', x_m: 0, z_m: 0, support: 'A1', base: { rotation_kNm_per_rad: 25000 } },
          { id: 'a2', x_m: 6, z_m: 0, support: 'A2', base: 'pinned' },
          { id: 'a1-1', x_m: 0, z_m: 3.5, load_kN: { permanent: 120, variable: 40 } },
          { id: 'a2-1', x_m: 6, z_m: 3.5 },
        ],
        members: [
          { id: 'C1', kind: 'column', from: 'a1', to: 'a1-1', section: 'column' },
          { id: 'C2', kind: 'column', from: 'a2', to: 'a2-1', section: 'column', capacity: { sagging_kNm: 150 } },
          {
            id: 'B1',
            kind: 'beam',
            from: 'a1-1',
            to: 'a2-1',
            section: 'beam',
            pin_from: false,
            pin_to: true,
            loads: [
              { kind: 'uniform', kN_per_m: 18, action: 'permanent' },
              { kind: 'point', kN: 30, at_m: 2.5, action: 'variable' },
            ],
          },
        ],
      },
    ],
    survey: {
      points: [
        { id: 'BM1', kind: 'benchmark', level_m: 10 },
        { id: 'S-A1', kind: 'stud', support: 'A1' },
        { id: 'S-A2', kind: 'stud', support: 'A2' },
      ],
      baseline: 'R0',
      rounds: [
        {
          id: 'R0',
          date: '2026-03-02',
          levels: [
            { point: 'S-A1', level_m: 10.4321, sd_mm: 0.3 },
            { point: 'S-A2', level_m: 10.4307, sd_mm: 0.3 },
          ],
        },
        {
          id: 'R1',
          date: '2026-04-02',
          book: {
            sd_mm_per_sqrt_km: 0.7,
            rows: [
              { point: 'BM1', back_m: 1.4321, sight_m: 22 },
              { point: 'S-A1', mid_m: 1.0008, sight_m: 18.5 },
              { point: 'TP1', fore_m: 1.2, back_m: 1.3, sight_m: 21, back_sight_m: 20.5 },
              { point: 'S-A2', mid_m: 1.1062, sight_m: 17 },
              { point: 'BM1', fore_m: 1.532, sight_m: 20.5 },
            ],
          },
        },
      ],
    },
    criteria: {
      induced_fraction: { amber: 0.1, red: 0.25 },
      utilisation: { amber: 0.85, red: 1 },
      angular_distortion: { amber: 0.002, red: 0.00667 },
      combination: { permanent: 1, variable: 0.3, settlement: 1 },
      base_rotation: 'follows-tilt',
      confidence: 0.95,
    },
  }
}

/** In steps as they are written down, so that nothing shrinks to figures no building has. */
function steps(min: number, max: number, decimals: number): fc.Arbitrary<number> {
  const scale = 10 ** decimals
  return fc.integer({ min: Math.round(min * scale), max: Math.round(max * scale) }).map((n) => n / scale)
}

function maybe<T>(arbitrary: fc.Arbitrary<T>): fc.Arbitrary<T | undefined> {
  return fc.option(arbitrary, { nil: undefined })
}

const text = maybe(fc.string({ maxLength: 20, unit: 'grapheme' }))
/** Names as people give them: also such as need quotes in a table, or are letters of no alphabet of ours. */
const ending = fc.constantFrom('', '/2', ' b', 'ä', '"', ',', ';', '’', '№', '__proto__')

const capacity: fc.Arbitrary<Capacity> = fc
  .record({
    sagging_kNm: maybe(steps(1, 900, 1)),
    hogging_kNm: maybe(steps(1, 900, 1)),
    shear_kN: maybe(steps(1, 900, 1)),
  })
  .map(filled)

const section = fc
  .record({
    material: fc.constantFrom('concrete', 'steel', 'timber', 'masonry', 'other' as const),
    E_GPa: steps(1, 210, 1),
    I_cm4: steps(100, 900000, 0),
    A_cm2: steps(10, 5000, 1),
    shear_area_cm2: maybe(steps(10, 3000, 1)),
    G_over_E: maybe(steps(0.1, 0.5, 5)),
    stiffness_factor: maybe(steps(0.1, 1, 2)),
    capacity: maybe(capacity),
  })
  .map((made): Omit<Section, 'id'> => filled(made as Omit<Section, 'id'>))

const base: fc.Arbitrary<Base | undefined> = maybe(
  fc.oneof(
    fc.constantFrom<Base>('fixed', 'pinned'),
    steps(100, 90000, 0).map((rotation_kNm_per_rad) => ({ rotation_kNm_per_rad })),
  ),
)

const action = fc.constantFrom<'permanent' | 'variable'>('permanent', 'variable')
const load: fc.Arbitrary<MemberLoad> = fc.oneof(
  fc.record({ kind: fc.constant<'uniform'>('uniform'), kN_per_m: steps(-9, 40, 1), action }),
  fc.record({ kind: fc.constant<'point'>('point'), kN: steps(-9, 90, 1), at_m: steps(0, 2.4, 2), action }),
)

const member = fc
  .record({
    pin_to: maybe(fc.boolean()),
    loads: maybe(fc.array(load, { maxLength: 2 })),
    capacity: maybe(capacity),
  })
  .map((made) => filled(made))

const triggers = maybe(fc.constantFrom({}, { amber: 0.001 }, { red: 2 }, { amber: 0.001, red: 0.1 }))
const criteria: fc.Arbitrary<GivenCriteria | undefined> = maybe(
  fc
    .record({
      induced_fraction: triggers,
      utilisation: triggers,
      angular_distortion: maybe(fc.constantFrom({}, { amber: 0.001 }, { amber: 0.001, red: 0.01 })),
      combination: maybe(fc.constantFrom({}, { variable: 0.5 }, { permanent: 1.1, variable: 0, settlement: 1 })),
      base_rotation: maybe(fc.constantFrom<'follows-tilt' | 'held'>('follows-tilt', 'held')),
      confidence: maybe(steps(0.5, 0.99, 2)),
    })
    .map((made) => filled(made)),
)

const shape = fc.record({
  ending,
  bays: fc.integer({ min: 1, max: 4 }),
  storeys: fc.integer({ min: 1, max: 3 }),
  lines: fc.integer({ min: 0, max: 3 }),
  rounds: fc.integer({ min: 0, max: 3 }),
})

/** Whole buildings: regular frames with every optional key there or not, rounds of levels and level books. */
export const anyBuilding: fc.Arbitrary<Building> = shape.chain(({ ending, bays, storeys, lines, rounds }) => {
  const columns = bays + 1
  const count = lines * columns
  const members = lines * storeys * (columns + bays)
  return fc
    .record({
      name: fc.string({ minLength: 1, maxLength: 20 }).filter((name) => name.trim() !== ''),
      texts: fc.record({ reference: text, client: text, address: text, notes: text }),
      bay: steps(2.5, 9, 2),
      storey: steps(2.5, 5, 2),
      sections: fc.array(section, { minLength: 2, maxLength: 2 }),
      bases: fc.array(base, { minLength: count, maxLength: count }),
      base_m: fc.array(maybe(steps(-3, 0, 2)), { minLength: count, maxLength: count }),
      loads: fc.array(maybe(fc.record({ permanent: steps(-5, 200, 1) })), { minLength: count, maxLength: count }),
      members: fc.array(member, { minLength: members, maxLength: members }),
      readings: fc.array(fc.array(steps(0.2, 2.8, 5), { minLength: count + 2, maxLength: count + 2 }), {
        minLength: rounds,
        maxLength: rounds,
      }),
      isBook: fc.boolean(),
      perSetup: fc.boolean(),
      criteria,
    })
    .map((made): Building => {
      const supports: Support[] = made.base_m.map((base_m, i) =>
        filled({
          id: `${'ABC'[Math.floor(i / columns)]}${(i % columns) + 1}${ending}`,
          x_m: (i % columns) * made.bay,
          y_m: Math.floor(i / columns) * 5,
          base_m,
        }),
      )
      const points: SurveyPoint[] = [
        { id: 'BM1', kind: 'benchmark', level_m: 12.5 },
        { id: 'BM2', kind: 'benchmark', level_m: 13, released: 'in doubt: "moved"?' },
        ...supports.map(({ id }): SurveyPoint => ({ id: `S-${id}`, kind: 'stud', support: id })),
      ]
      const surveyed = made.readings.map((readings, i) => round(i, readings, points, made))
      return filled({
        format: 'levelstead-building',
        version: 1,
        name: made.name,
        ...filled(made.texts),
        supports,
        sections: made.sections.map((s, i) => ({ id: `${['beam', 'column'][i]}${ending}`, ...s })),
        frame_lines: Array.from({ length: lines }, (_, k) => frameLine(k, columns, storeys, supports, made, ending)),
        survey: filled({ points, baseline: surveyed[0]?.id, rounds: surveyed }),
        criteria: made.criteria,
      })
    })
})

interface MadeFrameLines {
  bay: number
  storey: number
  bases: readonly (Base | undefined)[]
  loads: readonly ({ permanent: number } | undefined)[]
  members: readonly Partial<Member>[]
}

function frameLine(
  k: number,
  columns: number,
  storeys: number,
  supports: readonly Support[],
  made: MadeFrameLines,
  ending: string,
): FrameLine {
  const own = supports.slice(k * columns, (k + 1) * columns)
  const line: FrameLine = { id: `${'ABC'[k]}${ending}`, nodes: [], members: [] }
  let next = k * storeys * (2 * columns - 1)
  for (let level = 0; level <= storeys; level++)
    own.forEach((support, i) => {
      const at = { x_m: i * made.bay, z_m: level * made.storey }
      const id = `${support.id}.${level}`
      if (level === 0) {
        line.nodes.push(filled({ id, ...at, support: support.id, base: made.bases[k * columns + i] }))
        return
      }
      line.nodes.push(filled({ id, ...at, load_kN: made.loads[k * columns + i] }))
      const column = { kind: 'column' as const, from: `${support.id}.${level - 1}`, to: id, section: `column${ending}` }
      line.members.push({ id: `C${i}.${level}`, ...column, ...made.members[next++] })
      if (i === 0) return
      const beam = { kind: 'beam' as const, from: `${own[i - 1]!.id}.${level}`, to: id, section: `beam${ending}` }
      line.members.push({ id: `B${i}.${level}`, ...beam, ...made.members[next++] })
    })
  return line
}

function round(
  i: number,
  readings: readonly number[],
  points: readonly SurveyPoint[],
  { isBook, perSetup }: { isBook: boolean; perSetup: boolean },
): Round {
  const head = { id: `R${i}`, date: `2026-0${i + 1}-15` }
  const studs = points.slice(2)
  if (!isBook) {
    const levels = studs.map(({ id }, k) => ({ point: id, level_m: 12 + readings[k]!, sd_mm: 0.3 }))
    return { ...head, levels: [...levels, { point: 'BM1', level_m: 12.5, sd_mm: 0.1 }] }
  }
  const sight = perSetup ? {} : { sight_m: 20 }
  const rows: BookRow[] = [
    { point: 'BM1', back_m: readings[0]!, ...sight },
    ...studs.map(({ id }, k) => ({ point: id, mid_m: readings[k + 1]!, ...sight })),
    { point: 'TP1', fore_m: 1.2, back_m: 1.1, ...sight, ...(!perSetup && { back_sight_m: 19 }) },
    { point: 'BM1', fore_m: readings.at(-1)!, ...sight },
  ]
  return {
    ...head,
    book: {
      ...(perSetup ? { sd_mm_per_setup: 0.3 } : { sd_mm_per_sqrt_km: 0.7, collimation_mm_per_10_m: -0.4 }),
      rows,
    },
  }
}
