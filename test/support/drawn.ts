/** What the drawing tests look at in a scene, and buildings that are hard to draw. */
import fc from 'fast-check'
import { layOutGrid, rowsOf } from '../../app/model/edits/grid.ts'
import { addFrameLine } from '../../app/model/edits/frame-lines.ts'
import { emptyBuilding, type Building, type FrameLine, type Section } from '../../app/model/building.ts'
import { textWidth, CAP_HEIGHT } from '../../app/drawing/text-width.ts'
import type { Box } from '../../app/drawing/place-labels.ts'
import type { Point, Primitive, Scene } from '../../app/drawing/scene.ts'
import { applied } from './applied.ts'

export const EVIL = '<&"\'>\u0000 ]]>'

/** Every primitive, groups opened. */
export function flat(primitives: readonly Primitive[]): Primitive[] {
  return primitives.flatMap((p) => (p.shape === 'group' ? flat(p.children) : [p]))
}

export type Text = Primitive & { shape: 'text' }

export function textsOf(scene: Scene): Text[] {
  return flat(scene.primitives).filter((p): p is Text => p.shape === 'text')
}

/** The box of a text's capitals and figures on the sheet. */
export function boxOf(t: Text): Box {
  const width = textWidth(t.text, t.size, t.role === 'text-strong' ? 'medium' : 'regular')
  const height = t.size * CAP_HEIGHT
  const before = t.anchor === 'start' ? 0 : t.anchor === 'end' ? width : width / 2
  const [x, y] = t.at
  if (t.turn === -90) return { x: x - height, y: y - (width - before), width: height, height: width }
  return { x: x - before, y: y - height, width, height }
}

/** All points that a scene's primitives reach. */
export function reachOf(scene: Scene): Point[] {
  return flat(scene.primitives).flatMap((p): Point[] => {
    switch (p.shape) {
      case 'line':
        return [p.from, p.to]
      case 'polyline':
        return [...p.points]
      case 'path':
        return p.d.flatMap((s) => (s.to === 'close' ? [] : s.to === 'curve' ? [s.c1, s.c2, s.at] : [s.at]))
      case 'circle':
        return square(p.centre, p.radius)
      case 'mark':
        return square(p.centre, p.size / 2)
      case 'text': {
        const { x, y, width, height } = boxOf(p)
        return [
          [x, y],
          [x + width, y + height],
        ]
      }
      case 'group':
        return []
    }
  })
}

function square([x, y]: Point, r: number): Point[] {
  return [
    [x - r, y - r],
    [x + r, y + r],
  ]
}

/** What of a scene lies outside its sheet or is no number. */
export function strays(scene: Scene): Point[] {
  const { width, height } = scene
  return reachOf(scene).filter(([x, y]) => !(x >= -0.01 && y >= -0.01 && x <= width + 0.01 && y <= height + 0.01))
}

/** Pairs of texts that lie on each other. */
export function collisions(scene: Scene): string[] {
  const texts = textsOf(scene)
    .filter((t) => t.text !== '')
    .map((t) => ({ t, box: boxOf(t) }))
  return texts.flatMap(({ t, box }, i) =>
    texts
      .slice(i + 1)
      .filter(({ box: b }) => lieOn(box, b))
      .map((other) => `${t.text} | ${other.t.text}`),
  )
}

function lieOn(a: Box, b: Box): boolean {
  const slack = 0.05
  return (
    a.x + slack < b.x + b.width &&
    b.x + slack < a.x + a.width &&
    a.y + slack < b.y + b.height &&
    b.y + slack < a.y + a.height
  )
}

const BEAM: Section = {
  id: 'beam 300x550',
  material: 'concrete',
  E_GPa: 30,
  I_cm4: 415938,
  A_cm2: 1650,
  stiffness_factor: 0.5,
  capacity: { sagging_kNm: 90 },
}
const COLUMN: Section = {
  id: 'column 350x350',
  material: 'concrete',
  E_GPa: 30,
  I_cm4: 125052,
  A_cm2: 1225,
  capacity: { sagging_kNm: 80 },
}

/** A regular building that settled by the given mm, support by support in the order of the building. */
export function settledGrid(x: number[], y: number[], storeys: number[], settled: readonly number[]): Building {
  let building: Building = { ...emptyBuilding('Made'), sections: [BEAM, COLUMN] }
  building = applied(building, layOutGrid(building, { x, y }).changes)
  for (const row of rowsOf(building.supports)) {
    const supports = row.supports.map((s) => s.id)
    building = applied(
      building,
      addFrameLine(building, { id: row.id, supports, storeys, beam: BEAM.id, column: COLUMN.id }).changes,
    )
  }
  return settle(building, settled)
}

/** The building with studs, a baseline and a round R1. NaN stands for a support that was not read. */
export function settle(building: Building, settled_mm: readonly number[]): Building {
  const points = building.supports.map((s, i) => ({ id: `P${i}`, kind: 'stud' as const, support: s.id }))
  const levels = points.map((p) => ({ point: p.id, level_m: 10, sd_mm: 0.25 }))
  const after = levels.flatMap((l, i) => {
    const s = settled_mm[i % settled_mm.length]!
    return Number.isNaN(s) ? [] : [{ ...l, level_m: 10 - s / 1000 }]
  })
  return {
    ...building,
    survey: {
      points,
      baseline: 'R0',
      rounds: [
        { id: 'R0', date: '2026-01-12', levels },
        { id: 'R1', date: '2026-04-20', levels: after },
      ],
    },
  }
}

/** A pitched hall with a brace, pins, a spring, stepped bases, loads of every kind and names that hurt. */
export function hall(): Building {
  const steel: Section = {
    id: `rafter ${EVIL}`,
    material: 'steel',
    E_GPa: 210,
    I_cm4: 14920,
    A_cm2: 118,
    capacity: { sagging_kNm: 300 },
  }
  const section = steel.id
  const west = 'axis 1 / west gable wall, old part'
  const middle = `mid ${EVIL}`
  const line: FrameLine = {
    id: `hall ${EVIL}`,
    nodes: [
      { id: 'a', x_m: 0, z_m: 0, support: west, base: 'pinned' },
      { id: 'b', x_m: 9.5, z_m: -1.2, support: middle, base: { rotation_kNm_per_rad: 20000 } },
      { id: 'c', x_m: 16.5, z_m: 0.6, support: 'E3' },
      { id: 'a1', x_m: 0, z_m: 5 },
      { id: 'b1', x_m: 9.5, z_m: 7.5, load_kN: { permanent: 40, variable: 12 } },
      { id: 'c1', x_m: 16.5, z_m: 5.5 },
    ],
    members: [
      { id: 'S1', kind: 'column', from: 'a', to: 'a1', section },
      { id: 'S2', kind: 'column', from: 'b', to: 'b1', section },
      { id: 'S3', kind: 'column', from: 'c', to: 'c1', section },
      {
        id: 'R1',
        kind: 'beam',
        from: 'a1',
        to: 'b1',
        section,
        pin_from: true,
        loads: [
          { kind: 'uniform', kN_per_m: 12, action: 'permanent' },
          { kind: 'point', kN: 30, at_m: 3, action: 'variable' },
        ],
      },
      { id: 'R2', kind: 'beam', from: 'c1', to: 'b1', section },
      { id: 'D1', kind: 'brace', from: 'a', to: 'b1', section, pin_from: true, pin_to: true },
    ],
  }
  const building: Building = {
    ...emptyBuilding('Hall'),
    supports: [
      { id: west, x_m: 0, y_m: 0 },
      { id: middle, x_m: 9, y_m: 3, base_m: -2 },
      { id: 'E3', x_m: 16, y_m: 1 },
      { id: 'E4', x_m: 8, y_m: 12 },
    ],
    sections: [steel],
    frame_lines: [line],
  }
  return settle(building, [0.5, 12, -4, 4])
}

function between(min: number, max: number): fc.Arbitrary<number> {
  return fc.integer({ min: 0, max: 1000 }).map((step) => min + ((max - min) * step) / 1000)
}

const SHEETS = [
  [170, 102],
  [170, 122],
  [232, 165],
  [300, 120],
  [130, 180],
  [100, 90],
] as const

/** Frames from one bay to twelve and up to twenty storeys, members struck out, pins, supports not read. */
export const madeDrawing = fc
  .record({
    bays: fc.array(between(2.5, 9), { minLength: 1, maxLength: 12 }),
    rows: fc.array(between(3, 8), { minLength: 0, maxLength: 3 }),
    storeys: fc.array(between(2.4, 5), { minLength: 1, maxLength: 20 }),
    settled: fc.array(fc.oneof({ weight: 9, arbitrary: between(-6, 25) }, { weight: 1, arbitrary: fc.constant(NaN) }), {
      minLength: 5,
      maxLength: 40,
    }),
    base: fc.constantFrom(0, -0.8, -3),
    struck: fc.array(between(0, 1), { minLength: 37, maxLength: 37 }),
    sheet: fc.constantFrom(...SHEETS),
    rename: fc.constantFrom('', 'support of the north wing, ', EVIL),
  })
  .map(({ bays, rows, storeys, settled, base, struck, sheet, rename }) => {
    const read = settled.filter((s) => !Number.isNaN(s))
    // Three at least are read, so that there is a plane.
    const made = settledGrid(bays, rows, storeys, read.length < 4 ? [1, 2, 4, 3] : settled)
    made.supports = made.supports.map((s) => ({ ...s, base_m: base }))
    let draw = 0
    function chance(): number {
      return struck[draw++ % struck.length]!
    }
    for (const line of made.frame_lines) {
      line.members = line.members.filter((m) => m.kind === 'column' || chance() > 0.15)
      for (const m of line.members) if (m.kind === 'beam' && chance() < 0.1) m.pin_to = true
      for (const m of line.members)
        if (m.kind === 'beam' && chance() < 0.7)
          m.loads = [
            { kind: 'uniform', kN_per_m: 18.5, action: 'permanent' },
            { kind: 'uniform', kN_per_m: 6, action: 'variable' },
            { kind: 'point', kN: 30, at_m: 1, action: 'variable' },
          ]
    }
    const building = rename === '' ? made : renamed(made, rename)
    return { building, line: building.frame_lines[0]!.id, width: sheet[0], height: sheet[1] }
  })

function renamed(building: Building, prefix: string): Building {
  function long(id: string) {
    return `${prefix}${id}`
  }
  return {
    ...building,
    supports: building.supports.map((s) => ({ ...s, id: long(s.id) })),
    frame_lines: building.frame_lines.map((l) => ({
      ...l,
      id: long(l.id),
      nodes: l.nodes.map((n) => (n.support === undefined ? n : { ...n, support: long(n.support) })),
    })),
    survey: {
      ...building.survey,
      points: building.survey.points.map((p) => (p.kind === 'stud' ? { ...p, support: long(p.support) } : p)),
    },
  }
}
