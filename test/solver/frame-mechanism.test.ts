/** Frames that cannot stand are refused with the nodes that move; those that can are not, however soft. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { baseInfluence, factorFrame, loadResponse, SolverFault } from '../../solver/index.ts'
import { arraysOf, FIXED, gridFrame, PINNED, type MadeFrame, type MadeMember } from '../support/made-frames.ts'

const STEEL = { EI: 2e4, EA: 1e6 }

function bar(from: number, to: number, pins: 'both' | 'from' | 'to' | 'none' = 'none'): MadeMember {
  return { from, to, ...STEEL, pinFrom: pins === 'both' || pins === 'from', pinTo: pins === 'both' || pins === 'to' }
}

function verdict(made: MadeFrame): string {
  try {
    factorFrame(arraysOf(made))
    return 'stands'
  } catch (fault) {
    if (fault instanceof SolverFault) return `${fault.code} ${fault.what} ${fault.at.join(' ')}`
    throw fault
  }
}

const FOUR_CORNERS = [
  [0, 0],
  [0, 4],
  [6, 4],
  [6, 0],
] as const

describe('a mechanism is found and its nodes are named', () => {
  it('four bars joined by pins', () => {
    const members = [bar(0, 1, 'both'), bar(1, 2, 'both'), bar(3, 2, 'both')]
    expect(
      verdict({
        nodes: FOUR_CORNERS,
        members,
        bases: [
          [0, FIXED],
          [3, FIXED],
        ],
      }),
    ).toBe('mechanism node 1 2')
  })

  it('a portal on pinned bases with pinned beam ends', () => {
    const members = [bar(0, 1), bar(1, 2, 'both'), bar(3, 2)]
    expect(
      verdict({
        nodes: FOUR_CORNERS,
        members,
        bases: [
          [0, PINNED],
          [3, PINNED],
        ],
      }),
    ).toBe('mechanism node 1 2')
    expect(
      verdict({
        nodes: FOUR_CORNERS,
        members,
        bases: [
          [0, PINNED],
          [3, FIXED],
        ],
      }),
    ).toBe('stands')
  })

  it('a beam with one pin too many', () => {
    const nodes = [
      [0, 0],
      [3, 0],
      [6, 0],
      [9, 0],
    ] as const
    const bases = [
      [0, FIXED],
      [3, FIXED],
    ] as const
    function beam(...pins: ('both' | 'from' | 'to' | 'none')[]): MadeFrame {
      return { nodes, members: pins.map((pin, i) => bar(i, i + 1, pin)), bases }
    }
    expect(verdict(beam('to', 'none', 'to'))).toBe('stands')
    expect(verdict(beam('to', 'to', 'to'))).toBe('mechanism node 2')
    expect(verdict(beam('from', 'none', 'to'))).toBe('stands')
    expect(verdict(beam('both', 'to', 'none'))).toBe('mechanism node 1')
    expect(verdict(beam('both', 'both', 'both'))).toBe('mechanism node 1 2')
  })

  it('a column pinned at its base and standing alone', () => {
    const nodes = [
      [0, 0],
      [0, 3],
    ] as const
    expect(verdict({ nodes, members: [bar(0, 1, 'both')], bases: [[0, FIXED]] })).toBe('mechanism node 1')
    expect(verdict({ nodes, members: [bar(0, 1)], bases: [[0, PINNED]] })).toBe('mechanism node 1')
    expect(verdict({ nodes, members: [bar(0, 1, 'to')], bases: [[0, FIXED]] })).toBe('stands')
  })

  it('two bars in one line, also where rounding bends the line', () => {
    for (const sag of [0, 1e-15, 1e-9, 1e-6]) {
      const nodes = [
        [0, 3.5],
        [2, 3.5 - sag],
        [7, 3.5],
      ] as const
      const made: MadeFrame = {
        nodes,
        members: [bar(0, 1, 'both'), bar(1, 2, 'both')],
        bases: [
          [0, FIXED],
          [2, FIXED],
        ],
      }
      expect(verdict(made)).toBe('mechanism node 1')
    }
  })

  it('a base spring that is next to none', () => {
    const nodes = [
      [0, 0],
      [0, 3],
    ] as const
    function onSpring(spring: number): string {
      return verdict({ nodes, members: [bar(0, 1)], bases: [[0, spring]] })
    }
    expect([onSpring(1e-8), onSpring(1)]).toEqual(['mechanism node 1', 'stands'])
  })

  it('several at once are all named, and nodes at rest are not', () => {
    const made = gridFrame(4, 3)
    const top = [8, 9, 10, 11]
    const nodes = [...made.nodes, [-2, 3.5] as const, [20, 3.5] as const]
    // A bracket hung on a pin at either side.
    const members = [...made.members, bar(4, 12, 'from'), bar(7, 13, 'from')]
    expect(verdict({ ...made, nodes, members })).toBe('mechanism node 12 13')
    // And the top storey's columns pinned at both ends.
    const swaying = members.map((m) =>
      top.includes(m.to) && m.from === m.to - 4 ? { ...m, pinFrom: true, pinTo: true } : m,
    )
    expect(verdict({ ...made, nodes, members: swaying })).toBe(`mechanism node ${[...top, 12, 13].join(' ')}`)
  })

  it('a storey of pinned columns in any frame, whatever the stiffnesses', () => {
    const size = fc.record({ columns: fc.integer({ min: 1, max: 9 }), storeys: fc.integer({ min: 1, max: 12 }) })
    fc.assert(
      fc.property(
        size,
        fc.nat(),
        fc.infiniteStream(fc.integer({ min: 0, max: 400 })),
        ({ columns, storeys }, pick, draw) => {
          const made = gridFrame(columns, storeys + 1)
          const soft = 1 + (pick % storeys)
          const members = made.members.map((m) => {
            // Bending and axial stiffness over four orders each.
            const own = { ...m, EI: 1e2 * 10 ** (draw.next().value! / 100), EA: 1e5 * 10 ** (draw.next().value! / 100) }
            const isSoft = m.to === m.from + columns && Math.floor(m.to / columns) === soft
            return isSoft ? { ...own, pinFrom: true, pinTo: true } : own
          })
          const moving = made.nodes.flatMap((_, node) => (node >= soft * columns ? [node] : []))
          expect(verdict({ ...made, members })).toBe(`mechanism node ${moving.join(' ')}`)
        },
      ),
    )
  })
})

describe('parts joined to no base are named', () => {
  it('a part beside the frame, and a node without members', () => {
    const made = gridFrame(2, 2)
    const nodes = [...made.nodes, [20, 3] as const, [24, 3] as const, [30, 0] as const]
    expect(verdict({ ...made, nodes, members: [...made.members, bar(4, 5)] })).toBe('unsupported node 4 5 6')
  })

  it('a frame without bases', () => {
    expect(verdict({ ...gridFrame(2, 2), bases: [] })).toBe('unsupported node 0 1 2 3')
  })

  it('but a base without members is only a base', () => {
    const made = gridFrame(2, 2)
    const nodes = [...made.nodes, [12, 0] as const]
    const f = factorFrame(arraysOf({ ...made, nodes, bases: [...made.bases, [4, FIXED]] }))
    expect(Array.from(baseInfluence(f).reactionUp.subarray(6))).toEqual([0, 0, 0])
  })

  it('and no frame at all is no fault', () => {
    expect(baseInfluence(factorFrame(arraysOf({ nodes: [], members: [], bases: [] }))).cases).toBe(0)
  })
})

describe('what stands is not refused', () => {
  it('a node at which every member is pinned has its rotation left out', () => {
    // A truss of pinned bars: one triangle on two bases, 30 kN at its top; 3-4-5, so 25 kN * 5/4 / 2 in each leg.
    const made: MadeFrame = {
      nodes: [
        [0, 0],
        [6, 0],
        [3, 4],
      ],
      members: [bar(0, 2, 'both'), bar(1, 2, 'both')],
      bases: [
        [0, PINNED],
        [1, FIXED],
      ],
    }
    const r = loadResponse(factorFrame(arraysOf(made)), [{ nodeDown: Float64Array.of(0, 0, 32), onMembers: [] }])
    expect(Array.from(r.axial)).toEqual([expect.closeTo(-20, 10), expect.closeTo(-20, 10)])
    expect(Array.from(r.rotation)).toEqual([0, 0, 0])
    expect([...r.momentFrom, ...r.momentTo, ...r.reactionMoment]).toEqual([0, 0, 0, 0, 0, 0])
    expect(Array.from(r.reactionRight)).toEqual([expect.closeTo(12, 10), expect.closeTo(-12, 10)])
  })

  it('a column cut into 300 pieces, a tower of 60 storeys, a frame of very unlike members', () => {
    const pieces = 300
    const column: MadeFrame = {
      nodes: Array.from({ length: pieces + 1 }, (_, k) => [0, k / 20] as const),
      members: Array.from({ length: pieces }, (_, k) => bar(k, k + 1)),
      bases: [[0, FIXED]],
    }
    expect(verdict(column)).toBe('stands')
    expect(verdict(gridFrame(2, 61))).toBe('stands')
    const grid = gridFrame(5, 5)
    const unlike = grid.members.map((m, i) => ({
      ...m,
      EI: m.EI * 10 ** ((i % 5) - 2),
      EA: m.EA * 10 ** ((i % 3) - 1),
    }))
    expect(verdict({ ...grid, members: unlike })).toBe('stands')
  })
})

describe('arrays that describe no frame are refused', () => {
  const good = arraysOf(gridFrame(2, 2))
  it.each([
    ['a length is missing', { EI: good.EI.subarray(1) }, 'shape EI '],
    ['a height is missing', { z: good.z.subarray(1) }, 'shape z '],
    ['a spring is missing', { baseSpring: good.baseSpring.subarray(1) }, 'shape baseSpring '],
    ['a member starts nowhere', { from: Int32Array.of(0, 9, 2) }, 'shape from 1'],
    ['a member ends nowhere', { to: Int32Array.of(-1, 3, 3) }, 'shape to 0'],
    ['a base stands nowhere', { base: Int32Array.of(0, 4) }, 'shape base 1'],
    ['a base is named twice', { base: Int32Array.of(1, 1) }, 'shape base 1'],
    ['a place is no number', { x: Float64Array.of(0, NaN, 0, Infinity) }, 'not-finite x 1 3'],
    ['a stiffness is infinite', { EA: Float64Array.of(1, 1, Infinity) }, 'not-finite EA 2'],
    ['a shear stiffness is no number', { GAs: Float64Array.of(NaN, 1, Infinity) }, 'not-finite GAs 0'],
    ['a bending stiffness is negative', { EI: Float64Array.of(1, -1, 0) }, 'not-positive EI 1 2'],
    ['a shear stiffness is zero', { GAs: Float64Array.of(1, 0, 1) }, 'not-positive GAs 1'],
    ['a base spring is negative', { baseSpring: Float64Array.of(-1, 0) }, 'not-positive baseSpring 0'],
    ['a member joins a node to itself', { to: Int32Array.of(2, 1, 3) }, 'zero-length member 1'],
    [
      'two joined nodes are in one place',
      { x: Float64Array.of(0, 6, 0, 0), z: Float64Array.of(0, 0, 3, 3) },
      'zero-length member 2',
    ],
  ])('%s', (_, wrong, fault) => {
    let found = 'no fault'
    try {
      factorFrame({ ...good, ...wrong })
    } catch (thrown) {
      if (!(thrown instanceof SolverFault)) throw thrown
      found = `${thrown.code} ${thrown.what} ${thrown.at.join(' ')}`
    }
    expect(found).toBe(fault)
  })
})
