/** Frames for the solver's tests: written by hand in a line each, as grids, or at random. kN, m, rad. */
import fc from 'fast-check'
import type { FrameArrays, FrameLoads, MemberLoadValue } from '../../solver/index.ts'

export interface MadeMember {
  from: number
  to: number
  EI: number
  EA: number
  GAs?: number
  pinFrom?: boolean
  pinTo?: boolean
}

export interface MadeFrame {
  /** x, z */
  nodes: readonly (readonly [number, number])[]
  members: readonly MadeMember[]
  /** node, rotational spring */
  bases: readonly (readonly [number, number])[]
}

export const FIXED = Infinity
export const PINNED = 0

export function arraysOf({ nodes, members, bases }: MadeFrame): FrameArrays {
  return {
    x: Float64Array.from(nodes, (n) => n[0]),
    z: Float64Array.from(nodes, (n) => n[1]),
    from: Int32Array.from(members, (m) => m.from),
    to: Int32Array.from(members, (m) => m.to),
    EI: Float64Array.from(members, (m) => m.EI),
    EA: Float64Array.from(members, (m) => m.EA),
    GAs: Float64Array.from(members, (m) => m.GAs ?? Infinity),
    pinFrom: Uint8Array.from(members, (m) => Number(m.pinFrom ?? false)),
    pinTo: Uint8Array.from(members, (m) => Number(m.pinTo ?? false)),
    base: Int32Array.from(bases, (b) => b[0]),
    baseSpring: Float64Array.from(bases, (b) => b[1]),
  }
}

/** A beam over supports at the given places; its inner supports are pinned, its ends as asked. */
export function continuousBeam(places: readonly number[], EI: number, ends: readonly [number, number]): MadeFrame {
  return {
    nodes: places.map((x) => [x, 0] as const),
    members: places.slice(1).map((_, i) => ({ from: i, to: i + 1, EI, EA: 1e6 })),
    bases: places.map((_, i) => [i, i === 0 ? ends[0] : i === places.length - 1 ? ends[1] : PINNED] as const),
  }
}

/** Columns and beams of a regular frame; node (column i, level k) is number k * columns + i. */
export function gridFrame(columns: number, levels: number, bay = 6, storey = 3.5): MadeFrame {
  const nodes: [number, number][] = []
  const members: MadeMember[] = []
  for (let k = 0; k < levels; k++)
    for (let i = 0; i < columns; i++) {
      nodes.push([i * bay, k * storey])
      const node = k * columns + i
      if (k > 0) members.push({ from: node - columns, to: node, EI: 1.2e5, EA: 6e6 })
      if (k > 0 && i > 0) members.push({ from: node - 1, to: node, EI: 8e4, EA: 5e6 })
    }
  return { nodes, members, bases: Array.from({ length: columns }, (_, i) => [i, FIXED] as const) }
}

/** In a million steps, so that nothing shrinks to figures no building has. */
function between(min: number, max: number): fc.Arbitrary<number> {
  return fc.integer({ min: 0, max: 1_000_000 }).map((step) => min + ((max - min) * step) / 1_000_000)
}

/** Stiffnesses over some orders, as sections of one building differ. */
function spread(least: number, orders: number): fc.Arbitrary<number> {
  return between(0, orders).map((e) => least * 10 ** e)
}

/**
 * Frames of 1 to 4 bays and 1 to 3 storeys: uneven spacings, nodes out of line, beams missing or pinned, members
 * with shear, pinned braces, bases of every kind. Columns run through from fixed or sprung bases, or the
 * frame is whole, so that none is a mechanism.
 */
export const soundFrame: fc.Arbitrary<MadeFrame> = fc
  .record({ bays: fc.integer({ min: 1, max: 4 }), storeys: fc.integer({ min: 1, max: 3 }), isWhole: fc.boolean() })
  .chain(({ bays, storeys, isWhole }) => {
    const count = (bays + 1) * (storeys + 1)
    return fc.record({
      spacing: fc.array(between(2, 9), { minLength: bays, maxLength: bays }),
      height: fc.array(between(2.5, 5), { minLength: storeys, maxLength: storeys }),
      shift: fc.array(fc.tuple(between(-0.6, 0.6), between(-0.6, 0.6)), { minLength: count, maxLength: count }),
      member: fc.array(
        fc.record({
          EI: spread(5e3, 2),
          EA: spread(5e5, 1.5),
          GAs: fc.option(spread(2e4, 2), { nil: Infinity }),
          pins: isWhole ? fc.constant(0) : fc.integer({ min: 0, max: 6 }),
          turned: fc.boolean(),
        }),
        { minLength: 3 * count, maxLength: 3 * count },
      ),
      spring: fc.array(fc.oneof(fc.constant(FIXED), spread(2e3, 2), ...(isWhole ? [fc.constant(PINNED)] : [])), {
        minLength: bays + 1,
        maxLength: bays + 1,
      }),
      bays: fc.constant(bays),
      storeys: fc.constant(storeys),
    })
  })
  .map(({ spacing, height, shift, member, spring, bays, storeys }) => {
    const columns = bays + 1
    const nodes: [number, number][] = []
    const members: MadeMember[] = []
    let drawn = 0
    function join(from: number, to: number, kind: 'column' | 'beam' | 'brace'): void {
      const { EI, EA, GAs, pins, turned } = member[drawn++ % member.length]!
      if (kind === 'beam' && pins === 4) return
      if (kind === 'brace' && pins !== 5) return
      const pinFrom = kind === 'brace' || (kind === 'beam' && (pins === 1 || pins === 3))
      const pinTo = kind === 'brace' || (kind === 'beam' && (pins === 2 || pins === 3))
      members.push(
        turned
          ? { from: to, to: from, EI, EA, GAs, pinFrom: pinTo, pinTo: pinFrom }
          : { from, to, EI, EA, GAs, pinFrom, pinTo },
      )
    }
    for (let k = 0; k <= storeys; k++)
      for (let i = 0; i < columns; i++) {
        const node = k * columns + i
        nodes.push([total(spacing, i) + shift[node]![0], total(height, k) + shift[node]![1]])
        if (k === 0) continue
        join(node - columns, node, 'column')
        if (i > 0) join(node - 1, node, 'beam')
        if (i > 0) join(node - columns - 1, node, 'brace')
      }
    return { nodes, members, bases: spring.map((s, i) => [i, s] as const) }
  })

/** A sound frame with loads at nodes and on members. */
export const loadedFrame: fc.Arbitrary<{ made: MadeFrame; loads: FrameLoads }> = soundFrame.chain((made) => {
  const onMember = fc
    .record({
      member: fc.integer({ min: 0, max: made.members.length - 1 }),
      size: between(-40, 40),
      share: between(0, 1),
    })
    .chain(({ member, size, share }) =>
      fc.constantFrom<MemberLoadValue>(
        { member, kind: 'uniform', w: size },
        { member, kind: 'point', P: size, a: share * lengthOf(made, member) },
      ),
    )
  return fc.record({
    made: fc.constant(made),
    loads: fc.record({
      nodeDown: fc
        .array(between(-100, 100), { minLength: made.nodes.length, maxLength: made.nodes.length })
        .map((v) => Float64Array.from(v)),
      onMembers: fc.array(onMember, { maxLength: 8 }),
    }),
  })
})

export function lengthOf(made: MadeFrame, member: number): number {
  const { from, to } = made.members[member]!
  const [a, b] = [made.nodes[from]!, made.nodes[to]!]
  return Math.hypot(b[0] - a[0], b[1] - a[1])
}

/** Largest difference of two rows of figures, as a share of the largest figure met (or of `scale`). */
export function apart(a: ArrayLike<number>, b: ArrayLike<number>, scale = 0): number {
  if (a.length !== b.length) return Infinity
  let most = scale
  let difference = 0
  for (let i = 0; i < a.length; i++) {
    most = Math.max(most, Math.abs(a[i]!), Math.abs(b[i]!))
    const d = Math.abs(a[i]! - b[i]!)
    if (!(d <= difference)) difference = d
  }
  return difference === 0 ? 0 : difference / most
}

export function largest(values: ArrayLike<number>): number {
  return Array.from(values).reduce((most, v) => Math.max(most, Math.abs(v)), 0)
}

function total(values: readonly number[], end: number): number {
  return values.slice(0, end).reduce((a, b) => a + b, 0)
}
