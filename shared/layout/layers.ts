import type { DrawnNode } from './drawing.ts'

/** One step of a way through a loom: `from` stands in an earlier column than `to`. */
export interface Step {
  from: DrawnNode
  to: DrawnNode
}

/**
 * Column of every node: one past the furthest of what comes before it, and never before its kind's own column.
 * Nodes that feed each other in a circle keep their kind's column. Linear in nodes and steps.
 */
export function depthsOf(
  nodes: readonly DrawnNode[],
  steps: readonly Step[],
  leastDepth: (node: DrawnNode) => number,
): Map<DrawnNode, number> {
  const depths = new Map(nodes.map((node) => [node, leastDepth(node)]))
  const waiting = new Map<DrawnNode, number>()
  const onwards = new Map<DrawnNode, DrawnNode[]>()
  for (const { from, to } of steps) {
    if (!depths.has(from) || !depths.has(to) || from === to) continue
    waiting.set(to, (waiting.get(to) ?? 0) + 1)
    const list = onwards.get(from)
    if (list) list.push(to)
    else onwards.set(from, [to])
  }
  const ready = nodes.filter((node) => !waiting.has(node))
  for (let node = ready.pop(); node; node = ready.pop())
    for (const to of onwards.get(node) ?? []) {
      depths.set(to, Math.max(depths.get(to) ?? 0, (depths.get(node) ?? 0) + 1))
      const left = (waiting.get(to) ?? 1) - 1
      waiting.set(to, left)
      if (left === 0) ready.push(to)
    }
  return depths
}

/** Renumbers columns so that none is empty. */
export function closeRanks(depths: Map<DrawnNode, number>): Map<DrawnNode, number> {
  const used = [...new Set(depths.values())].sort((a, b) => a - b)
  const rank = new Map(used.map((depth, i) => [depth, i]))
  return new Map([...depths].map(([node, depth]) => [node, rank.get(depth) ?? 0]))
}
