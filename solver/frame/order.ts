/**
 * The order in which nodes are eliminated. Work grows with the square of the profile's row heights, so three
 * orders are tried and the cheapest is taken: sweeps storey by storey and bay by bay, and reverse
 * Cuthill-McKee, which also serves frames that are no grid. Nodes without a free movement are left out.
 *
 * Source of reverse Cuthill-McKee: A. George and J. W. H. Liu, Computer Solution of Large Sparse Positive
 * Definite Systems, 1981, ch. 4 (from memory).
 */
import type { NodeGraph } from './connect.ts'

/**
 * @param freedoms shape (n), number of free movements of each node, 0 to 3
 * @returns        nodes with a free movement, in the order of elimination
 */
export function eliminationOrder(
  graph: NodeGraph,
  x: Float64Array,
  z: Float64Array,
  freedoms: ArrayLike<number>,
): Int32Array {
  const candidates = [sweep(x, z, freedoms), sweep(z, x, freedoms), reverseCuthillMcKee(graph, freedoms, x, z)] as const
  let best: Int32Array = candidates[0]
  let least = Infinity
  for (const order of candidates) {
    const cost = profileCost(graph, order, freedoms)
    if (cost < least) {
      least = cost
      best = order
    }
  }
  return best
}

/** Sum of the squared row heights of the profile, which the factorisation's work is proportional to. */
export function profileCost(graph: NodeGraph, order: Int32Array, freedoms: ArrayLike<number>): number {
  const firstRow = new Int32Array(freedoms.length).fill(-1)
  let row = 0
  let cost = 0
  for (const node of order) {
    firstRow[node] = row
    let first = row
    for (let e = graph.start[node]; e < graph.start[node + 1]; e++) {
      const other = firstRow[graph.neighbour[e]]
      if (other >= 0 && other < first) first = other
    }
    for (let k = 0; k < freedoms[node]; k++, row++) cost += (row - first) * (row - first)
  }
  return cost
}

/** Nodes by their first coordinate, then by their second. */
function sweep(major: Float64Array, minor: Float64Array, freedoms: ArrayLike<number>): Int32Array {
  return movingNodes(freedoms).sort((a, b) => major[a] - major[b] || minor[a] - minor[b] || a - b)
}

function movingNodes(freedoms: ArrayLike<number>): Int32Array {
  const nodes: number[] = []
  for (let node = 0; node < freedoms.length; node++) if (freedoms[node] > 0) nodes.push(node)
  return Int32Array.from(nodes)
}

function reverseCuthillMcKee(
  graph: NodeGraph,
  freedoms: ArrayLike<number>,
  x: Float64Array,
  z: Float64Array,
): Int32Array {
  const n = freedoms.length
  const degree = new Int32Array(n)
  for (let node = 0; node < n; node++)
    for (let e = graph.start[node]; e < graph.start[node + 1]; e++) if (freedoms[graph.neighbour[e]] > 0) degree[node]++
  const seen = new Int32Array(n)
  const order: number[] = []
  let visit = 0

  /** Breadth first from a root, low degree first; gives the last node reached, of low degree, and the depth. */
  function levels(root: number, out: number[]): { far: number; depth: number } {
    visit++
    const from = out.length
    out.push(root)
    seen[root] = visit
    let depth = 0
    let levelStart = from
    let head = from
    while (head < out.length) {
      const levelEnd = out.length
      levelStart = head
      for (; head < levelEnd; head++) {
        const node = out[head]
        const own = out.length
        for (let e = graph.start[node]; e < graph.start[node + 1]; e++) {
          const other = graph.neighbour[e]
          if (seen[other] === visit || freedoms[other] === 0) continue
          seen[other] = visit
          out.push(other)
        }
        if (out.length - own > 1) {
          const reached = out.splice(own).sort((a, b) => degree[a] - degree[b] || x[a] - x[b] || z[a] - z[b] || a - b)
          out.push(...reached)
        }
      }
      depth++
    }
    let far = out[levelStart]
    for (let i = levelStart; i < out.length; i++) if (degree[out[i]] < degree[far]) far = out[i]
    return { far, depth }
  }

  const placed = new Uint8Array(n)
  for (const start of movingNodes(freedoms)) {
    if (placed[start]) continue
    // A root far out makes many narrow levels: go to the far end until that gains no depth.
    let root = start
    let reach = levels(root, [])
    for (;;) {
      const next = levels(reach.far, [])
      if (next.depth <= reach.depth) break
      root = reach.far
      reach = next
    }
    root = reach.far
    const part: number[] = []
    levels(root, part)
    for (const node of part) {
      placed[node] = 1
      order.push(node)
    }
  }
  return Int32Array.from(order.reverse())
}
