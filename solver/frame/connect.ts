/** Which nodes members join: the graph that ordering works on, and the parts that no base carries. */
import { SolverFault, type FrameArrays } from '../types.ts'

/** Neighbours of node i: neighbour[start[i]] to neighbour[start[i + 1] - 1]; a double member counts twice. */
export interface NodeGraph {
  start: Int32Array
  neighbour: Int32Array
}

export function nodeGraph(frame: FrameArrays): NodeGraph {
  const n = frame.x.length
  const m = frame.from.length
  const start = new Int32Array(n + 1)
  for (let i = 0; i < m; i++) {
    start[frame.from[i] + 1]++
    start[frame.to[i] + 1]++
  }
  for (let i = 0; i < n; i++) start[i + 1] += start[i]
  const next = start.slice()
  const neighbour = new Int32Array(2 * m)
  for (let i = 0; i < m; i++) {
    neighbour[next[frame.from[i]]++] = frame.to[i]
    neighbour[next[frame.to[i]]++] = frame.from[i]
  }
  return { start, neighbour }
}

/** Throws `unsupported` with every node that no path of members joins to a base. */
export function requireSupport(graph: NodeGraph, base: Int32Array): void {
  const n = graph.start.length - 1
  const reached = new Uint8Array(n)
  const queue = Array.from(base)
  for (const node of queue) reached[node] = 1
  for (let head = 0; head < queue.length; head++) {
    const node = queue[head]
    for (let e = graph.start[node]; e < graph.start[node + 1]; e++) {
      const other = graph.neighbour[e]
      if (reached[other]) continue
      reached[other] = 1
      queue.push(other)
    }
  }
  if (queue.length === n) return
  const left: number[] = []
  for (let node = 0; node < n; node++) if (!reached[node]) left.push(node)
  throw new SolverFault('unsupported', 'node', left)
}
