import type { DrawnNode } from './drawing.ts'
import type { Link, LoomPlan } from './loom.ts'

/** Where along the strip every node belongs, before any is placed. */
export interface Pulls {
  columns: ReadonlyMap<DrawnNode, number>
  heights: ReadonlyMap<DrawnNode, number>
  /** Nodes that lead to no row: they stand below the rest and do not draw what feeds them away from its drives. */
  low: ReadonlySet<DrawnNode>
}

/** Works inwards out what every node leads to, then outwards where those stand that lead nowhere. */
export function pullsOf(plan: LoomPlan, nearLinks: ReadonlyMap<DrawnNode, readonly Link[]>): Pulls {
  const { columns, homes, links, floor } = plan
  const heights = new Map<DrawnNode, number>()
  const low = new Set<DrawnNode>()
  const inwards = [...columns.keys()].sort((a, b) => (columns.get(a) ?? 0) - (columns.get(b) ?? 0))
  for (const node of inwards) {
    const reached = (nearLinks.get(node) ?? []).flatMap((link) => {
      if (!columns.has(link.near.node)) return [link.near.node.y + link.near.port.y]
      return low.has(link.near.node) ? [] : (heights.get(link.near.node) ?? [])
    })
    if (reached.length > 0) heights.set(node, mean(reached))
    else low.add(node)
  }
  const farLink = new Map<DrawnNode, Link>()
  for (const link of links) if (!farLink.has(link.near.node)) farLink.set(link.near.node, link)
  for (const node of inwards.reverse()) {
    if (!low.has(node)) continue
    const link = farLink.get(node)
    const isIdle = link && !homes.has(node) && !nearLinks.has(node)
    const beside = isIdle ? besideSiblings(link, nearLinks.get(link.far.node) ?? [], heights, low) : undefined
    heights.set(node, beside ?? homes.get(node) ?? floor)
    if (beside !== undefined) low.delete(node)
  }
  return { columns, heights, low }
}

/** An outlet that leads nowhere yet stands between what its neighbours lead to. */
function besideSiblings(
  link: Link,
  siblings: readonly Link[],
  heights: ReadonlyMap<DrawnNode, number>,
  low: ReadonlySet<DrawnNode>,
): number | undefined {
  let above: number | undefined
  let below: number | undefined
  for (const { near, far } of siblings) {
    if (near.node === link.near.node || low.has(near.node)) continue
    const height = heights.get(near.node) ?? near.node.y + near.port.y
    if (far.port.y < link.far.port.y) above = Math.max(above ?? -Infinity, height)
    else below = Math.min(below ?? Infinity, height)
  }
  if (above !== undefined && below !== undefined) return (above + below) / 2
  if (above !== undefined) return above + 32
  return below === undefined ? undefined : below - 32
}

const mean = (values: readonly number[]): number => values.reduce((sum, value) => sum + value, 0) / values.length
