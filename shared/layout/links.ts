import type { DrawnNode } from './drawing.ts'
import type { Link } from './loom.ts'
import type { PlacedRun } from './runs.ts'

/** A card stands at its slot's height, whatever else the board is joined to. */
const slotWeight = 1000

/** Runs that lie within one loom and lead away from the strip, column by column. */
export function linksOf(
  runs: readonly PlacedRun[],
  columns: ReadonlyMap<DrawnNode, number>,
  side: 'left' | 'right',
): Link[] {
  const links: Link[] = []
  for (const { run, from, to, inSlot } of runs) {
    const [near, far] = side === 'left' ? [to, from] : [from, to]
    const column = columns.get(far.node)
    const isFrame = near.node.kind !== 'part' && near.node.kind !== 'stub'
    if (column === undefined || !(isFrame || columns.has(near.node))) continue
    if ((columns.get(near.node) ?? -1) < column)
      links.push({ run, near, far, weight: inSlot && !isFrame ? slotWeight : 1 })
  }
  return links
}
