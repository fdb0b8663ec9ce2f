import type { DrawnNode } from '#shared/layout/drawing.ts'

export type Direction = 'left' | 'right' | 'up' | 'down'

const centre = (node: DrawnNode) => ({ x: node.x + node.width / 2, y: node.y + node.height / 2 })

/** The node that an arrow key leads to: the nearest in that direction, straight ahead before askew. */
export function neighbourOf(
  nodes: readonly DrawnNode[],
  from: DrawnNode | undefined,
  direction: Direction,
): DrawnNode | undefined {
  const walkable = nodes.filter((node) => node.kind !== 'empty-bay' && node.kind !== 'stub')
  if (!from) return walkable.find((node) => node.kind === 'drive-row') ?? walkable[0]
  const here = centre(from)
  let best: { node: DrawnNode; cost: number } | undefined
  for (const node of walkable) {
    if (node === from) continue
    const there = centre(node)
    const dx = there.x - here.x
    const dy = there.y - here.y
    const [ahead, aside] =
      direction === 'left' ? [-dx, dy] : direction === 'right' ? [dx, dy] : direction === 'up' ? [-dy, dx] : [dy, dx]
    if (ahead < 8) continue
    const cost = ahead + 2.5 * Math.abs(aside)
    if (!best || cost < best.cost) best = { node, cost }
  }
  return best?.node
}
