/** Parts of a frame line that no chain of members joins to a support. */
import type { FrameLine } from '../building.ts'
import type { Entry } from './entry.ts'

/** Notes each part that hangs on no support. The line's references must be whole. */
export function noteHanging(entry: Entry, line: FrameLine): void {
  if (line.nodes.length === 0) return
  if (line.nodes.every((node) => node.support === undefined)) {
    const element = { kind: 'line', id: line.id } as const
    entry.faults.add('line.unsupported', { path: entry.path, value: line.id, element, detail: { line: line.id } })
    return
  }
  for (const part of partsOf(line)) {
    if (part.some((i) => line.nodes[i]!.support !== undefined)) continue
    const nodes = part.map((i) => line.nodes[i]!.id)
    entry.faults.add('frame.unsupported', {
      path: `${entry.at('nodes')}[${part[0]!}]`,
      value: nodes[0],
      element: { kind: 'node', id: nodes[0]!, within: line.id },
      detail: { line: line.id, nodes },
    })
  }
}

/** Indices of nodes that members join, part by part, in the order of the nodes. */
function partsOf({ nodes, members }: FrameLine): number[][] {
  const index = new Map(nodes.map((node, i) => [node.id, i]))
  const root = nodes.map((_, i) => i)
  function rootOf(i: number): number {
    let r = i
    while (root[r] !== r) r = root[r]!
    while (root[i] !== r) [root[i], i] = [r, root[i]!]
    return r
  }
  for (const { from, to } of members) root[rootOf(index.get(from)!)] = rootOf(index.get(to)!)
  const parts = new Map<number, number[]>()
  nodes.forEach((_, i) => {
    const r = rootOf(i)
    const part = parts.get(r)
    if (part) part.push(i)
    else parts.set(r, [i])
  })
  return [...parts.values()]
}
