/** What holds for every elastic frame, on frames of every kind. Laws of mechanics; no numbers of ours. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  baseInfluence,
  factorFrame,
  loadResponse,
  shearAt,
  tiltResponse,
  type FrameArrays,
  type FrameLoads,
  type FrameResponse,
} from '../../solver/index.ts'
import { apart, arraysOf, largest, lengthOf, loadedFrame, soundFrame, type MadeFrame } from '../support/made-frames.ts'

/** Digits lost: the condition of such frames, 1e4 to 1e6, of 1e-16. */
const CLOSE = 1e-8
/** kN for 1 m of settlement or 1 rad: a force below CLOSE of this is none. */
const SMALL = 100

const FORCES = ['momentFrom', 'momentTo', 'axial', 'reactionUp', 'reactionRight', 'reactionMoment'] as const

/** All forces of a response in one row. */
function forcesOf(r: FrameResponse): number[] {
  return FORCES.flatMap((kind) => Array.from(r[kind]))
}

function movementsOf(r: FrameResponse): number[] {
  return [...r.right, ...r.down, ...r.rotation]
}

function isSame(a: FrameResponse, b: FrameResponse): void {
  expect(apart(forcesOf(a), forcesOf(b), SMALL)).toBeLessThan(CLOSE)
  expect(apart(movementsOf(a), movementsOf(b), 1e-2)).toBeLessThan(CLOSE)
}

/** Sum over b of weights[b] times case b, and `extra`, as one case. */
function combined(r: FrameResponse, weights: readonly number[], extra?: FrameResponse): FrameResponse {
  function row(kind: Exclude<keyof FrameResponse, 'cases'>): Float64Array {
    const size = r[kind].length / r.cases
    return Float64Array.from({ length: size }, (_, i) =>
      weights.reduce((sum, w, c) => sum + w * r[kind][c * size + i]!, extra?.[kind][i] ?? 0),
    )
  }
  return {
    cases: 1,
    momentFrom: row('momentFrom'),
    momentTo: row('momentTo'),
    axial: row('axial'),
    right: row('right'),
    down: row('down'),
    rotation: row('rotation'),
    reactionUp: row('reactionUp'),
    reactionRight: row('reactionRight'),
    reactionMoment: row('reactionMoment'),
  }
}

/** Right, down and clockwise on every node that is no base must come to nothing; on a base, to the reaction. */
function unbalanced(frame: FrameArrays, r: FrameResponse, loads?: FrameLoads): number {
  const left = Array.from(frame.x, (_, node) => [0, loads?.nodeDown[node] ?? 0, 0] as [number, number, number])
  for (let i = 0; i < frame.from.length; i++) {
    const [a, b] = [frame.from[i]!, frame.to[i]!]
    const [dx, dz] = [frame.x[b]! - frame.x[a]!, frame.z[b]! - frame.z[a]!]
    const length = Math.hypot(dx, dz)
    const [c, s] = [dx / length, -dz / length]
    const own = loads?.onMembers.filter((load) => load.member === i) ?? []
    const total = own.reduce((sum, load) => sum + (load.kind === 'uniform' ? load.w * length : load.P), 0)
    const along = { length, dx, momentFrom: r.momentFrom[i]!, momentTo: r.momentTo[i]!, loads: own }
    // At a cut the part after it pulls the part before it along by the axial force and to the right by the shear.
    const ends = [
      { node: a, axial: r.axial[i]!, shear: shearAt(along, 0, 'before'), sign: 1, moment: r.momentFrom[i]! },
      {
        node: b,
        axial: r.axial[i]! - total * s,
        shear: shearAt(along, length, 'after'),
        sign: -1,
        moment: r.momentTo[i]!,
      },
    ]
    for (const { node, axial, shear, sign, moment } of ends) {
      left[node]![0] += sign * (c * axial - s * shear)
      left[node]![1] += sign * (s * axial + c * shear)
      left[node]![2] -= moment
    }
  }
  frame.base.forEach((node, b) => {
    left[node]![0] += r.reactionRight[b]!
    left[node]![1] -= r.reactionUp[b]!
    left[node]![2] += r.reactionMoment[b]!
  })
  return largest(left.flat())
}

function mirrored(made: MadeFrame): MadeFrame {
  return { ...made, nodes: made.nodes.map(([x, z]) => [-x, z] as const) }
}

describe('an elastic frame', () => {
  it('answers to several loads together as to each by itself', () => {
    fc.assert(
      fc.property(loadedFrame, fc.integer({ min: -3, max: 3 }), ({ made, loads }, factor) => {
        const half = Math.floor(loads.onMembers.length / 2)
        const rest = new Float64Array(loads.nodeDown.length)
        const parts: FrameLoads[] = [
          { nodeDown: loads.nodeDown, onMembers: loads.onMembers.slice(0, half) },
          { nodeDown: rest, onMembers: loads.onMembers.slice(half) },
        ]
        const scaled = loads.onMembers
          .slice(half)
          .map((load) => (load.kind === 'uniform' ? { ...load, w: factor * load.w } : { ...load, P: factor * load.P }))
        const whole: FrameLoads = {
          nodeDown: loads.nodeDown,
          onMembers: [...loads.onMembers.slice(0, half), ...scaled],
        }
        const f = factorFrame(arraysOf(made))
        isSame(loadResponse(f, [whole]), combined(loadResponse(f, parts), [1, factor]))
      }),
    )
  })

  it('is reciprocal: the reaction at i for a settlement of j is that at j for a settlement of i (Maxwell, Betti)', () => {
    fc.assert(
      fc.property(soundFrame, (made) => {
        const r = baseInfluence(factorFrame(arraysOf(made)))
        const transposed = Array.from(r.reactionUp, (_, at) => {
          const [i, j] = [Math.floor(at / r.cases), at % r.cases]
          return r.reactionUp[j * r.cases + i]!
        })
        expect(apart(r.reactionUp, transposed, SMALL)).toBeLessThan(CLOSE)
      }),
    )
  })

  it('gives the settlement under a load by the reaction that the settlement raises (Betti)', () => {
    fc.assert(
      fc.property(loadedFrame, ({ made, loads }) => {
        // Loads at nodes do work on the movements of a settlement; the reactions to them on the settlement itself.
        const f = factorFrame(arraysOf(made))
        const influence = baseInfluence(f)
        const { reactionUp } = loadResponse(f, [{ nodeDown: loads.nodeDown, onMembers: [] }])
        const n = made.nodes.length
        const work = made.bases.map((_, b) =>
          loads.nodeDown.reduce((sum, P, node) => sum + P * influence.down[b * n + node]!, 0),
        )
        expect(apart(reactionUp, work, SMALL)).toBeLessThan(CLOSE)
      }),
    )
  })

  it('is in equilibrium at every node, whatever moves or loads it', () => {
    fc.assert(
      fc.property(loadedFrame, ({ made, loads }) => {
        const frame = arraysOf(made)
        const f = factorFrame(frame)
        const influence = baseInfluence(f)
        const settled = combined(
          influence,
          made.bases.map((_, b) => Math.sin(b + 1)),
        )
        for (const [r, load] of [[settled], [tiltResponse(f)], [loadResponse(f, [loads]), loads]] as const)
          expect(unbalanced(frame, r, load) / Math.max(SMALL, largest(forcesOf(r)))).toBeLessThan(CLOSE)
      }),
    )
  })

  it('hands the ground exactly its loads: reactions balance them up, right and in moment', () => {
    fc.assert(
      fc.property(loadedFrame, ({ made, loads }) => {
        const r = loadResponse(factorFrame(arraysOf(made)), [loads])
        let [up, right, moment] = [0, 0, 0]
        function pull(P: number, x: number): void {
          up -= P
          moment += P * x
        }
        loads.nodeDown.forEach((P, node) => pull(P, made.nodes[node]![0]))
        for (const load of loads.onMembers) {
          const length = lengthOf(made, load.member)
          const { from, to } = made.members[load.member]!
          const share = load.kind === 'uniform' ? 0.5 : load.a / length
          const [a, b] = [made.nodes[from]![0], made.nodes[to]![0]]
          pull(load.kind === 'uniform' ? load.w * length : load.P, a + share * (b - a))
        }
        made.bases.forEach(([node], b) => {
          const [x, z] = made.nodes[node]!
          up += r.reactionUp[b]!
          right += r.reactionRight[b]!
          moment += r.reactionMoment[b]! - r.reactionUp[b]! * x + r.reactionRight[b]! * z
        })
        const scale = Math.max(SMALL, largest(forcesOf(r)))
        expect(largest([up, right, moment]) / scale).toBeLessThan(CLOSE)
      }),
    )
  })

  it('that sinks and tilts as a whole takes no force, exactly as a rigid body moves', () => {
    const anyTilt = fc.tuple(fc.integer({ min: -20, max: 20 }), fc.integer({ min: -5, max: 5 }))
    fc.assert(
      fc.property(soundFrame, anyTilt, (made, [sunk, tilt]) => {
        const f = factorFrame(arraysOf(made))
        const influence = baseInfluence(f)
        const weights = made.bases.map(([node]) => sunk + tilt * made.nodes[node]![0])
        const turned = combined(tiltResponse(f), [tilt])
        const r = combined(influence, weights, turned)
        const parts = Math.max(SMALL, largest(forcesOf(influence)) * largest(weights), largest(forcesOf(turned)))
        expect(largest(forcesOf(r)) / parts).toBeLessThan(CLOSE)
        const mean = made.bases.reduce((sum, [node]) => sum + made.nodes[node]![1], 0) / made.bases.length
        expect(
          apart(
            r.down,
            made.nodes.map(([x]) => sunk + tilt * x),
            1,
          ),
        ).toBeLessThan(CLOSE)
        expect(
          apart(
            r.right,
            made.nodes.map(([, z]) => tilt * (z - mean)),
            largest(weights),
          ),
        ).toBeLessThan(CLOSE)
      }),
    )
  })

  it('does not care how its nodes and members are numbered or which way a member is drawn', () => {
    fc.assert(
      fc.property(soundFrame, fc.infiniteStream(fc.nat()), (made, draw) => {
        function shuffle(count: number): number[] {
          return Array.from({ length: count }, (_, i) => [draw.next().value as number, i] as const)
            .sort((a, b) => a[0] - b[0] || a[1] - b[1])
            .map(([, i]) => i)
        }
        const nodeAt = shuffle(made.nodes.length)
        const memberAt = shuffle(made.members.length)
        const newNode = nodeAt.reduce<number[]>((to, old, now) => ((to[old] = now), to), [])
        const other: MadeFrame = {
          nodes: nodeAt.map((old) => made.nodes[old]!),
          members: memberAt.map((old) => {
            const m = made.members[old]!
            return { ...m, from: newNode[m.to]!, to: newNode[m.from]!, pinFrom: m.pinTo, pinTo: m.pinFrom }
          }),
          bases: made.bases.map(([node, spring]) => [newNode[node]!, spring] as const),
        }
        const a = baseInfluence(factorFrame(arraysOf(made)))
        const b = baseInfluence(factorFrame(arraysOf(other)))
        const m = memberAt.length
        const n = nodeAt.length
        const back: FrameResponse = {
          ...b,
          momentFrom: new Float64Array(b.cases * m),
          momentTo: new Float64Array(b.cases * m),
          axial: new Float64Array(b.cases * m),
          right: b.right.map((_, at) => b.right[Math.floor(at / n) * n + newNode[at % n]!]!),
          down: b.down.map((_, at) => b.down[Math.floor(at / n) * n + newNode[at % n]!]!),
          rotation: b.rotation.map((_, at) => b.rotation[Math.floor(at / n) * n + newNode[at % n]!]!),
        }
        for (let c = 0; c < b.cases; c++)
          memberAt.forEach((old, now) => {
            back.momentFrom[c * m + old] = b.momentTo[c * m + now]!
            back.momentTo[c * m + old] = b.momentFrom[c * m + now]!
            back.axial[c * m + old] = b.axial[c * m + now]!
          })
        isSame(back, a)
      }),
    )
  })

  it('is the same when a member is cut in two by a node of its own', () => {
    fc.assert(
      fc.property(loadedFrame, fc.nat(), fc.integer({ min: 1, max: 9 }), ({ made, loads }, pick, tenth) => {
        const cut = pick % made.members.length
        const share = tenth / 10
        const whole = made.members[cut]!
        const [a, b] = [made.nodes[whole.from]!, made.nodes[whole.to]!]
        const middle = made.nodes.length
        const other: MadeFrame = {
          ...made,
          nodes: [...made.nodes, [a[0] + share * (b[0] - a[0]), a[1] + share * (b[1] - a[1])]],
          members: [
            ...made.members.map((m, i) => (i === cut ? { ...m, to: middle, pinTo: false } : m)),
            { ...whole, from: middle, pinFrom: false },
          ],
        }
        const length = lengthOf(made, cut)
        const second = made.members.length
        const onMembers = loads.onMembers.flatMap((load) => {
          if (load.member !== cut) return [load]
          if (load.kind === 'uniform') return [load, { ...load, member: second }]
          const first = lengthOf(other, cut)
          return load.a <= first ? [load] : [{ ...load, member: second, a: Math.min(load.a - first, length - first) }]
        })
        const [f, g] = [factorFrame(arraysOf(made)), factorFrame(arraysOf(other))]
        const apartLoads: FrameLoads = { nodeDown: Float64Array.of(...loads.nodeDown, 0), onMembers }
        for (const [one, two] of [
          [loadResponse(f, [loads]), loadResponse(g, [apartLoads])],
          [tiltResponse(f), tiltResponse(g)],
        ] as const) {
          const m = second
          const joined: FrameResponse = {
            ...two,
            momentFrom: two.momentFrom.subarray(0, m),
            momentTo: two.momentTo.slice(0, m),
            axial: two.axial.subarray(0, m),
            right: two.right.subarray(0, middle),
            down: two.down.subarray(0, middle),
            rotation: two.rotation.subarray(0, middle),
          }
          joined.momentTo[cut] = two.momentTo[second]!
          isSame(joined, one)
        }
      }),
    )
  })

  it('seen from behind answers with moments and turns the other way round', () => {
    fc.assert(
      fc.property(loadedFrame, ({ made, loads }) => {
        const [f, g] = [factorFrame(arraysOf(made)), factorFrame(arraysOf(mirrored(made)))]
        for (const [a, b] of [
          [baseInfluence(f), baseInfluence(g)],
          [loadResponse(f, [loads]), loadResponse(g, [loads])],
        ] as const) {
          const turned: FrameResponse = { ...b }
          for (const kind of [
            'momentFrom',
            'momentTo',
            'right',
            'rotation',
            'reactionRight',
            'reactionMoment',
          ] as const)
            turned[kind] = b[kind].map((v) => -v)
          isSame(turned, a)
        }
      }),
    )
  })
})
