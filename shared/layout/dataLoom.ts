import type { ResolvedPart } from '../build/resolve.ts'
import type { Bounds } from './bounds.ts'
import type { DrawnNode } from './drawing.ts'
import { closeRanks, depthsOf } from './layers.ts'
import { linksOf } from './links.ts'
import { placeLoom } from './loom.ts'
import { loom, tag } from './metrics.ts'
import type { LoomNode } from './powerNodes.ts'
import type { PlacedRun } from './runs.ts'

/** Columns by distance from the strip; boards stand outermost with their cards beside them. */
export function placeDataLoom(members: readonly LoomNode[], runs: readonly PlacedRun[], strip: Bounds): void {
  const partOf = new Map(members.map(({ node, part }) => [node, part]))
  const steps = runs.filter((run) => run.from.port.side === 'right' && run.to.port.side === 'left')
  const isBoard = (node: DrawnNode) => partOf.get(node)?.model.kind === 'board'
  const depths = depthsOf(
    members.map(({ node }) => node),
    steps.map((run) => ({ from: run.from.node, to: run.to.node })),
    (node) => leastDataDepth(partOf.get(node)),
  )
  const outermost = Math.max(0, ...[...depths].map(([node, depth]) => (isBoard(node) ? depth : depth + 1)))
  for (const node of depths.keys()) if (isBoard(node)) depths.set(node, outermost)
  const columns = closeRanks(depths)
  placeLoom({
    side: 'right',
    edge: strip.x + strip.width,
    columns,
    under: 0,
    ceiling: -Infinity,
    links: linksOf(steps, columns, 'right'),
    homes: new Map(),
    floor: strip.y + strip.height - tag.compactHeight / 2,
    gapOf: () => loom.columnGap,
  })
}

function leastDataDepth(part: ResolvedPart | undefined): number {
  switch (part?.model.kind) {
    case 'controller':
    case 'expander':
      return 1
    case 'board':
      return 2
    default:
      return 0
  }
}
