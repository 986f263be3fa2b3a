import { describe, expect, test } from 'vitest'
import { emptyBuilding, type Building, type Round } from '../../app/model/building.ts'
import type { Edit } from '../../app/model/changes.ts'
import { setBase, setCriteria, setHead } from '../../app/model/edits/description.ts'
import { storeyHeights } from '../../app/model/edits/frame-grid.ts'
import {
  addFrameLine,
  addGridLines,
  alongLine,
  removeFrameLine,
  renameFrameLine,
} from '../../app/model/edits/frame-lines.ts'
import { layOutGrid, rowLetters, spacingsOf } from '../../app/model/edits/grid.ts'
import { addPointLoad, setLoad, setNodeLoad, setUniform, uniformOf } from '../../app/model/edits/loads.ts'
import {
  absentMembers,
  addMember,
  restore,
  setCapacity,
  setPin,
  setSection,
  strikeOut,
} from '../../app/model/edits/members.ts'
import {
  addBenchmark,
  placeStuds,
  removePoint,
  renamePoint,
  setBenchmarkLevel,
  setReleased,
} from '../../app/model/edits/points.ts'
import { addSection, changeSection, removeSection, renameSection } from '../../app/model/edits/sections.ts'
import { setStoreys } from '../../app/model/edits/storeys.ts'
import { addSupport, moveSupport, removeSupports, renameSupport } from '../../app/model/edits/supports.ts'
import { Fault } from '../../app/model/faults.ts'
import { applied, reversed } from '../support/applied.ts'

const SECTIONS = [
  { id: 'col', material: 'concrete' as const, E_GPa: 30, I_cm4: 125000, A_cm2: 1225 },
  { id: 'beam', material: 'concrete' as const, E_GPa: 30, I_cm4: 416000, A_cm2: 1650 },
]

/** A building after edits made one upon the other; each is taken back on the way as a check. */
function after(building: Building, ...edits: readonly ((b: Building) => Edit)[]): Building {
  return edits.reduce((now, make) => {
    const { changes } = make(now)
    const next = applied(now, changes)
    expect(applied(next, reversed(changes))).toEqual(now)
    return next
  }, building)
}

function grid(x: readonly number[], y: readonly number[]): Building {
  return after({ ...emptyBuilding('Dye works'), sections: SECTIONS }, (b) => layOutGrid(b, { x, y }))
}

function framed(): Building {
  return after(grid([6, 5.4], [5]), (b) => addGridLines(b, { storeys: [3.6, 3.2], beam: 'beam', column: 'col' }))
}

function line(building: Building, id: string) {
  return building.frame_lines.find((l) => l.id === id)!
}

function codeOf(run: () => unknown): string {
  try {
    run()
  } catch (error) {
    if (error instanceof Fault) return error.code
    throw error
  }
  return 'none'
}

const READ: Round = { id: 'R0', date: '2026-03-02', levels: [{ point: 'S-A1', level_m: 10.4321, sd_mm: 0.3 }] }

describe('the grid', () => {
  test('supports are lettered by row and numbered by column', () => {
    const building = grid([6, 5.4], [5])
    expect(building.supports).toEqual([
      { id: 'A1', x_m: 0, y_m: 0 },
      { id: 'A2', x_m: 6, y_m: 0 },
      { id: 'A3', x_m: 11.4, y_m: 0 },
      { id: 'B1', x_m: 0, y_m: 5 },
      { id: 'B2', x_m: 6, y_m: 5 },
      { id: 'B3', x_m: 11.4, y_m: 5 },
    ])
    expect(spacingsOf(building.supports)).toEqual({ x: [6, 5.4], y: [5] })
  })

  test('spacings add up without a trace of binary fractions', () => {
    expect(grid([0.1, 0.2, 0.3], []).supports.map((s) => s.x_m)).toEqual([0, 0.1, 0.3, 0.6])
  })

  test('the twenty-seventh row is AA', () => {
    expect([0, 25, 26, 27, 52].map(rowLetters)).toEqual(['A', 'Z', 'AA', 'AB', 'BA'])
  })

  test('laid out again, supports move with their frame lines and a named support stays', () => {
    const building = after(
      framed(),
      (b) => addSupport(b, { id: 'Well', x_m: 2, y_m: 2 }),
      (b) => layOutGrid(b, { x: [7, 5.4], y: [5] }),
    )
    expect(building.supports.map((s) => s.id)).toEqual(['A1', 'A2', 'A3', 'B1', 'B2', 'B3', 'Well'])
    expect(line(building, 'A').nodes.map((n) => [n.id, n.x_m])).toContainEqual(['A2-2', 7])
    expect(line(building, 'A').nodes.map((n) => [n.id, n.x_m])).toContainEqual(['A3-1', 12.4])
    expect(line(building, '2')).toEqual(line(framed(), '2'))
  })

  test('a bay fewer takes the columns and beams of that bay along, and lines that are left without two supports', () => {
    const building = after(framed(), (b) => layOutGrid(b, { x: [6], y: [5] }))
    expect(building.frame_lines.map((l) => l.id)).toEqual(['A', 'B', '1', '2'])
    expect(line(building, 'A').members.map((m) => m.id)).toEqual([
      'CA1/1',
      'CA2/1',
      'A1-A2/1',
      'CA1/2',
      'CA2/2',
      'A1-A2/2',
    ])
  })

  test('a grid of more supports than any building has is refused', () => {
    expect(codeOf(() => grid(Array(80).fill(5), Array(80).fill(5)))).toBe('grid.large')
  })
})

describe('supports', () => {
  test('a support within a line takes its lowest column; the floors above span on', () => {
    const building = after(framed(), (b) => removeSupports(b, ['A2']))
    const a = line(building, 'A')
    expect(a.nodes.some((n) => n.id === 'A2')).toBe(false)
    expect(a.members.map((m) => m.id)).not.toContain('CA2/1')
    expect(a.members.map((m) => m.id)).toEqual(expect.arrayContaining(['A1-A2/1', 'A2-A3/1', 'CA2/2']))
    expect(building.frame_lines.some((l) => l.id === '2')).toBe(false)
  })

  test('a support goes with its stud, but not once the stud was read', () => {
    const studded = after(framed(), placeStuds)
    expect(after(studded, (b) => removeSupports(b, ['A1'])).survey.points.map((p) => p.id)).not.toContain('S-A1')
    const read = { ...studded, survey: { ...studded.survey, baseline: 'R0', rounds: [READ] } }
    expect(codeOf(() => removeSupports(read, ['A1']))).toBe('support.read')
    expect(codeOf(() => removePoint(read, 'S-A1'))).toBe('point.read')
    expect(codeOf(() => renamePoint(read, 'S-A1', 'S1'))).toBe('point.read')
  })

  test('a new name of a support reaches its nodes, members and studs', () => {
    const building = after(framed(), placeStuds, (b) => renameSupport(b, 'A2', 'P7'))
    const a = line(building, 'A')
    expect(a.nodes.find((n) => n.support === 'P7')).toEqual({ id: 'P7', x_m: 6, z_m: 0, support: 'P7', base: 'fixed' })
    expect(a.members.map((m) => m.id)).toEqual(expect.arrayContaining(['CP7/1', 'CP7/2', 'A1-P7/1', 'P7-A3/2']))
    expect(a.members.map((m) => m.id).join()).not.toContain('A2')
    expect(building.survey.points).toContainEqual({ id: 'S-A2', kind: 'stud', support: 'P7' })
    expect(line(building, '2').members.map((m) => m.id)).toContain('P7-B2/1')
  })

  test('a name in use or empty is refused', () => {
    expect(codeOf(() => renameSupport(framed(), 'A2', 'A1'))).toBe('name.taken')
    expect(codeOf(() => renameSupport(framed(), 'A2', '  '))).toBe('name.empty')
    expect(codeOf(() => addSupport(framed(), { id: 'A1', x_m: 1, y_m: 1 }))).toBe('name.taken')
  })

  test('a lower base lengthens the column on it', () => {
    const building = after(framed(), (b) => moveSupport(b, 'A1', { base_m: -1.2 }))
    expect(line(building, 'A').nodes.find((n) => n.id === 'A1')!.z_m).toBe(-1.2)
    expect(line(building, 'A').nodes.find((n) => n.id === 'A2')!.z_m).toBe(0)
    expect(line(building, 'A').nodes.find((n) => n.id === 'A1-1')!.z_m).toBe(3.6)
  })

  test('a frame line described otherwise than the plan is left alone when a support moves', () => {
    const own = framed()
    const skewed: Building = {
      ...own,
      frame_lines: own.frame_lines.map((l) =>
        l.id === 'A' ? { ...l, nodes: l.nodes.map((n) => ({ ...n, x_m: n.x_m * 1.01 })) } : l,
      ),
    }
    const moved = after(skewed, (b) => moveSupport(b, 'A2', { x_m: 6.5 }))
    expect(line(moved, 'A')).toEqual(line(skewed, 'A'))
    expect(line(moved, '2').nodes.find((n) => n.id === 'B2')!.x_m).toBeCloseTo(Math.hypot(0.5, 5), 4)
  })
})

describe('frame lines', () => {
  test('two supports and a storey are a portal', () => {
    const building = after(grid([6], []), (b) =>
      addFrameLine(b, { id: 'A', supports: ['A2', 'A1'], storeys: [3.5], beam: 'beam', column: 'col', base: 'pinned' }),
    )
    expect(building.frame_lines).toEqual([
      {
        id: 'A',
        nodes: [
          { id: 'A1', x_m: 0, z_m: 0, support: 'A1', base: 'pinned' },
          { id: 'A2', x_m: 6, z_m: 0, support: 'A2', base: 'pinned' },
          { id: 'A1-1', x_m: 0, z_m: 3.5 },
          { id: 'A2-1', x_m: 6, z_m: 3.5 },
        ],
        members: [
          { id: 'CA1/1', kind: 'column', from: 'A1', to: 'A1-1', section: 'col' },
          { id: 'CA2/1', kind: 'column', from: 'A2', to: 'A2-1', section: 'col' },
          { id: 'A1-A2/1', kind: 'beam', from: 'A1-1', to: 'A2-1', section: 'beam' },
        ],
      },
    ])
  })

  test('a line runs from its left end, or its near end where it runs up the plan', () => {
    const supports = grid([6, 5.4], [5]).supports
    function pick(...ids: string[]): string[] {
      return alongLine(ids.map((id) => supports.find((s) => s.id === id)!)).map((s) => s.id)
    }
    expect(pick('A3', 'A1', 'A2')).toEqual(['A1', 'A2', 'A3'])
    expect(pick('B2', 'A2')).toEqual(['A2', 'B2'])
    expect(pick('B3', 'A1')).toEqual(['A1', 'B3'])
  })

  test('every row and column of the grid gets its line once', () => {
    const building = framed()
    expect(building.frame_lines.map((l) => [l.id, l.members.length])).toEqual([
      ['A', 10],
      ['B', 10],
      ['1', 6],
      ['2', 6],
      ['3', 6],
    ])
    expect(addGridLines(building, { storeys: [3], beam: 'beam', column: 'col' }).changes).toEqual([])
  })

  test('a line of one support or no storey is refused', () => {
    const make = { id: 'A', storeys: [3], beam: 'beam', column: 'col' }
    expect(codeOf(() => addFrameLine(grid([6], []), { ...make, supports: ['A1', 'A1'] }))).toBe('line.short')
    expect(codeOf(() => addFrameLine(grid([6], []), { ...make, supports: ['A1', 'A2'], storeys: [] }))).toBe(
      'line.storeyless',
    )
  })

  test('lines are renamed and removed whole', () => {
    const building = after(
      framed(),
      (b) => renameFrameLine(b, 'A', 'North wall'),
      (b) => removeFrameLine(b, '2'),
    )
    expect(building.frame_lines.map((l) => l.id)).toEqual(['North wall', 'B', '1', '3'])
  })

  test('storey heights can be altered, a storey added and one taken off', () => {
    const taller = after(framed(), (b) => setStoreys(b, 'A', [4, 3.2, 3]))
    expect(storeyHeights(line(taller, 'A'))).toEqual([4, 3.2, 3])
    expect(line(taller, 'A').members).toContainEqual({
      id: 'A2-A3/3',
      kind: 'beam',
      from: 'A2-3',
      to: 'A3-3',
      section: 'beam',
    })
    const lower = after(taller, (b) => setStoreys(b, 'A', [4]))
    expect(line(lower, 'A').members.map((m) => m.id)).toEqual(['CA1/1', 'CA2/1', 'CA3/1', 'A1-A2/1', 'A2-A3/1'])
  })
})

describe('members', () => {
  const refs = [
    { line: 'A', id: 'A1-A2/1' },
    { line: 'B', id: 'B1-B2/1' },
  ]

  test('a member struck out can be put back', () => {
    const struck = after(framed(), (b) => strikeOut(b, [{ line: 'A', id: 'A1-A2/1' }]))
    const absent = absentMembers(line(struck, 'A'))
    expect(absent.map((m) => m.id)).toEqual(['A1-A2/1'])
    const back = after(struck, (b) => restore(b, 'A', absent))
    expect(new Set(line(back, 'A').members)).toEqual(new Set(line(framed(), 'A').members))
    expect(absentMembers(line(back, 'A'))).toEqual([])
  })

  test('a whole bay struck out takes its loose nodes, and comes back with them', () => {
    const corner = ['CA3/2', 'A2-A3/2'].map((id) => ({ line: 'A', id }))
    const struck = after(framed(), (b) => strikeOut(b, corner))
    expect(line(struck, 'A').nodes.some((n) => n.id === 'A3-2')).toBe(false)
    const back = after(struck, (b) => restore(b, 'A', absentMembers(line(b, 'A'))))
    expect(new Set(line(back, 'A').nodes)).toEqual(new Set(line(framed(), 'A').nodes))
  })

  test('a column through two storeys leaves no place to fill', () => {
    const tall = after(
      framed(),
      (b) =>
        strikeOut(
          b,
          ['CA3/1', 'CA3/2', 'A2-A3/1'].map((id) => ({ line: 'A', id })),
        ),
      (b) => addMember(b, 'A', { id: 'tall', kind: 'column', from: 'A3', to: 'A3-2', section: 'col' }),
    )
    expect(absentMembers(line(tall, 'A')).map((m) => m.id)).toEqual(['A2-A3/1'])
  })

  test('section, pins, capacity and loads are set on many at once', () => {
    const building = after(
      framed(),
      (b) => setSection(b, refs, 'col'),
      (b) => setPin(b, refs, 'to', true),
      (b) => setCapacity(b, refs, 'sagging_kNm', 150),
      (b) => setUniform(b, refs, 'permanent', 18),
      (b) => addPointLoad(b, refs, { kind: 'point', kN: 30, at_m: 2.5, action: 'variable' }),
    )
    for (const ref of refs) {
      expect(line(building, ref.line).members.find((m) => m.id === ref.id)).toMatchObject({
        section: 'col',
        pin_to: true,
        capacity: { sagging_kNm: 150 },
        loads: [
          { kind: 'uniform', kN_per_m: 18, action: 'permanent' },
          { kind: 'point', kN: 30, at_m: 2.5, action: 'variable' },
        ],
      })
    }
    const bare = after(
      building,
      (b) => setPin(b, refs, 'to', false),
      (b) => setCapacity(b, refs, 'sagging_kNm', undefined),
      (b) => setUniform(b, refs, 'permanent', undefined),
      (b) => setLoad(b, refs[0]!, 0, undefined),
      (b) => setLoad(b, refs[1]!, 0, undefined),
      (b) => setSection(b, refs, 'beam'),
    )
    expect(bare).toEqual(framed())
  })

  test('a uniform load is replaced where it stands, and several are told as their sum', () => {
    const member = {
      loads: [3, 4].map((kN_per_m) => ({ kind: 'uniform' as const, kN_per_m, action: 'permanent' as const })),
    }
    expect([uniformOf(member, 'permanent'), uniformOf(member, 'variable')]).toEqual([7, undefined])
  })

  test('an edit names the one member, or how many', () => {
    expect(setSection(framed(), refs, 'col').what).toBe('Set section of 2 members')
    expect(setSection(framed(), refs.slice(0, 1), 'col').what).toBe('Set section of A1-A2/1')
  })

  test('a value set to what it was is no change', () => {
    expect(setSection(framed(), refs, 'beam').changes).toEqual([])
  })

  test('a node takes a load and gives it up', () => {
    const ref = { line: 'A', id: 'A1-1' }
    const loaded = after(framed(), (b) => setNodeLoad(b, ref, 'permanent', 120))
    expect(line(loaded, 'A').nodes.find((n) => n.id === 'A1-1')!.load_kN).toEqual({ permanent: 120 })
    expect(after(loaded, (b) => setNodeLoad(b, ref, 'permanent', undefined))).toEqual(framed())
  })
})

describe('sections, points and the rest', () => {
  test('a section in use cannot go, and its new name reaches its members', () => {
    expect(codeOf(() => removeSection(framed(), 'col'))).toBe('section.used')
    const building = after(
      framed(),
      (b) => renameSection(b, 'col', 'column 350x350'),
      (b) => addSection(b, { id: 'tie', material: 'steel', E_GPa: 210, I_cm4: 100, A_cm2: 20 }),
      (b) => changeSection(b, 'tie', { stiffness_factor: 0.5 }),
      (b) => changeSection(b, 'tie', { stiffness_factor: undefined }),
      (b) => removeSection(b, 'tie'),
    )
    expect(building.sections.map((s) => s.id)).toEqual(['column 350x350', 'beam'])
    expect(line(building, 'A').members[0]!.section).toBe('column 350x350')
  })

  test('studs are placed where none is, benchmarks by hand', () => {
    const building = after(
      grid([6], []),
      placeStuds,
      (b) => addBenchmark(b, { id: 'BM1', level_m: 42.5 }),
      (b) => setBenchmarkLevel(b, 'BM1', 42.501),
      (b) => setReleased(b, 'BM1', ' it moved '),
      (b) => addBenchmark(b, { id: 'BM2', level_m: 42.6 }),
      (b) => setReleased(b, 'BM2', 'in doubt'),
      (b) => setReleased(b, 'BM2', ''),
      (b) => renamePoint(b, 'S-A2', 'S2'),
    )
    expect(building.survey.points).toEqual([
      { id: 'S-A1', kind: 'stud', support: 'A1' },
      { id: 'S2', kind: 'stud', support: 'A2' },
      { id: 'BM1', kind: 'benchmark', level_m: 42.501, released: 'it moved' },
      { id: 'BM2', kind: 'benchmark', level_m: 42.6 },
    ])
    expect(placeStuds(building).changes).toEqual([])
  })

  test('the head keeps what is given and drops what is emptied', () => {
    const building = after(
      emptyBuilding('Dye works'),
      (b) => setHead(b, { reference: 'DW-1', client: ' The trust ' }),
      (b) => setHead(b, { reference: '' }),
    )
    expect(building).toEqual({ ...emptyBuilding('Dye works'), client: 'The trust' })
    expect(codeOf(() => setHead(building, { name: ' ' }))).toBe('name.empty')
  })

  test('a criterion emptied takes its default again', () => {
    const building = after(
      emptyBuilding('Dye works'),
      (b) => setCriteria(b, { induced_fraction: { amber: 0.15 } }),
      (b) => setCriteria(b, { induced_fraction: { red: 0.3 }, base_rotation: 'held' }),
    )
    expect(building.criteria).toEqual({ induced_fraction: { amber: 0.15, red: 0.3 }, base_rotation: 'held' })
    const emptied = after(building, (b) =>
      setCriteria(b, { induced_fraction: { amber: undefined, red: undefined }, base_rotation: undefined }),
    )
    expect(emptied).toEqual(emptyBuilding('Dye works'))
  })

  test('a base is set in every line on the support', () => {
    const building = after(framed(), (b) => setBase(b, ['A1'], { rotation_kNm_per_rad: 25000 }))
    expect(
      building.frame_lines.flatMap((l) => l.nodes.filter((n) => n.support === 'A1').map((n) => [l.id, n.base])),
    ).toEqual([
      ['A', { rotation_kNm_per_rad: 25000 }],
      ['1', { rotation_kNm_per_rad: 25000 }],
    ])
  })
})
