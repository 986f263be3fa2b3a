/**
 * Refuses arrays that describe no frame, before any arithmetic. Each fault lists every entry that has it;
 * whether the frame stands up is left to connect.ts and mechanism.ts.
 */
import { SolverFault, type FrameArrays } from '../types.ts'

/** A member shorter than this share of the frame's extent joins two places that are one. */
const SHORTEST = 1e-9

/** Throws the first kind of fault found: shape, not-finite, not-positive, zero-length, in this order. */
export function validateFrame(frame: FrameArrays): void {
  const n = frame.x.length
  const m = frame.from.length
  const b = frame.base.length
  requireLength(frame, n, 'z')
  requireLength(frame, m, 'to', 'EI', 'EA', 'GAs', 'pinFrom', 'pinTo')
  requireLength(frame, b, 'baseSpring')
  requireNodes('from', frame.from, n)
  requireNodes('to', frame.to, n)
  requireNodes('base', frame.base, n)
  const seen = new Set<number>()
  refuse(
    'shape',
    'base',
    frame.base,
    (node) => seen.size === seen.add(node).size,
    (entry) => frame.base[entry],
  )

  for (const key of ['x', 'z', 'EI', 'EA'] as const)
    refuse('not-finite', key, frame[key], (value) => !Number.isFinite(value))
  for (const key of ['GAs', 'baseSpring'] as const)
    refuse('not-finite', key, frame[key], (value) => Number.isNaN(value) || value === -Infinity)
  for (const key of ['EI', 'EA', 'GAs'] as const) refuse('not-positive', key, frame[key], (value) => !(value > 0))
  refuse('not-positive', 'baseSpring', frame.baseSpring, (value) => value < 0)

  const shortest = SHORTEST * Math.max(extent(frame.x), extent(frame.z))
  refuse('zero-length', 'member', frame.from, (from, i) => {
    const to = frame.to[i]
    return from === to || !(Math.hypot(frame.x[to] - frame.x[from], frame.z[to] - frame.z[from]) > shortest)
  })
}

function requireLength(frame: FrameArrays, length: number, ...keys: (keyof FrameArrays)[]): void {
  for (const key of keys) if (frame[key].length !== length) throw new SolverFault('shape', key)
}

function requireNodes(what: string, indices: Int32Array, n: number): void {
  refuse('shape', what, indices, (node) => node < 0 || node >= n)
}

function refuse(
  code: 'shape' | 'not-finite' | 'not-positive' | 'zero-length',
  what: string,
  values: ArrayLike<number>,
  isAtFault: (value: number, entry: number) => boolean,
  nameOf: (entry: number) => number = (entry) => entry,
): void {
  const at: number[] = []
  for (let entry = 0; entry < values.length; entry++) if (isAtFault(values[entry], entry)) at.push(nameOf(entry))
  if (at.length) throw new SolverFault(code, what, at)
}

function extent(values: Float64Array): number {
  let least = Infinity
  let most = -Infinity
  for (let i = 0; i < values.length; i++) {
    least = Math.min(least, values[i])
    most = Math.max(most, values[i])
  }
  return most - least
}
