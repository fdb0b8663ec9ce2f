import type { ResolvedPart } from '../build/resolve.ts'
import type { Bounds } from './bounds.ts'
import type { DrawnNode } from './drawing.ts'
import { closeRanks, depthsOf } from './layers.ts'
import { linksOf } from './links.ts'
import { placeLoom } from './loom.ts'
import { loom, tag } from './metrics.ts'
import type { LoomNode } from './powerNodes.ts'
import type { PlacedRun } from './runs.ts'

/** Columns by depth from the supply; the tails of cables stand nearest the strip. */
export function placePowerLoom(members: readonly LoomNode[], runs: readonly PlacedRun[], strip: Bounds): void {
  const partOf = new Map(members.map(({ node, part }) => [node, part]))
  const steps = runs.filter((run) => run.from.port.side === 'right' && run.to.port.side === 'left')
  const leading = new Set(steps.map((run) => run.from.node))
  const isTail = (node: DrawnNode) =>
    node.kind === 'stub' && leading.has(node) && partOf.get(node)?.model.kind !== 'board'
  const hasLeads = members.some(({ part }) => part.model.kind === 'lead')
  const depths = depthsOf(
    members.map(({ node }) => node),
    steps.map((run) => ({ from: run.from.node, to: run.to.node })),
    (node) => leastPowerDepth(partOf.get(node), hasLeads),
  )
  const isLow = (node: DrawnNode) => (node.kind === 'stub' ? !isTail(node) : isConsumer(partOf.get(node)))
  const deepest = Math.max(0, ...[...depths].map(([node, depth]) => (isLow(node) || isTail(node) ? 0 : depth)))
  for (const node of depths.keys()) if (isTail(node)) depths.set(node, deepest + 1)
  const columns = mirrored(closeRanks(depths))
  const hasTails = members.some(({ node }) => isTail(node))
  const under = columnsUnder(columns, isLow, strip.width + (hasTails ? loom.tailGap : loom.columnGap))

  const low = members.filter(({ node }) => isLow(node))
  const below = strip.y + strip.height + 48
  const homes = lowHomes(
    low.map(({ node }) => node),
    steps,
    below,
  )
  const floor = Math.max(below, ...homes.values()) + 48
  for (const { node, part } of members) if (part.model.kind === 'supply') homes.set(node, strip.y + node.height / 2)
  const outermost = Math.max(0, ...columns.values())
  placeLoom({
    side: 'left',
    edge: strip.x,
    columns,
    under,
    ceiling: below,
    links: linksOf(steps, columns, 'left'),
    homes,
    floor,
    gapOf(column) {
      if (column === under && hasTails) return loom.tailGap
      return column === outermost ? loom.supplyGap : loom.columnGap
    },
  })
}

/**
 * How many columns next to the strip hold nothing but what stands below it. Those go on underneath the strip, where
 * there is room, instead of pushing the loom away from it.
 */
function columnsUnder(
  columns: ReadonlyMap<DrawnNode, number>,
  isLow: (node: DrawnNode) => boolean,
  room: number,
): number {
  let first = Infinity
  const widths: number[] = []
  for (const [node, column] of columns) {
    if (!isLow(node)) first = Math.min(first, column)
    widths[column] = Math.max(widths[column] ?? 0, node.width)
  }
  if (first === Infinity) return 0
  const wide = widths.slice(0, first).reduce((sum, width) => sum + width + loom.columnGap, -loom.columnGap)
  return wide <= room - loom.nodeGap ? first : 0
}

/** Heights below the strip, one after the other; what hangs on one of them stands level with it. */
function lowHomes(low: readonly DrawnNode[], steps: readonly PlacedRun[], top: number): Map<DrawnNode, number> {
  const members = new Set(low)
  const hanging = new Map<DrawnNode, DrawnNode[]>()
  const hung = new Set<DrawnNode>()
  for (const { from, to } of steps) {
    if (!members.has(from.node) || !members.has(to.node) || hung.has(to.node) || hanging.has(to.node)) continue
    hung.add(to.node)
    hanging.set(from.node, [...(hanging.get(from.node) ?? []), to.node])
  }
  const homes = new Map<DrawnNode, number>()
  let cursor = top
  for (const node of low) {
    if (hung.has(node)) continue
    const group = hanging.get(node) ?? []
    const room = Math.max(node.height, group.length * tag.compactHeight) + loom.compactGap
    for (const member of [node, ...group]) homes.set(member, cursor + room / 2)
    cursor += room
  }
  return homes
}

const isConsumer = (part: ResolvedPart | undefined): boolean =>
  part?.model.kind === 'fan' || part?.model.kind === 'load'

function leastPowerDepth(part: ResolvedPart | undefined, hasLeads: boolean): number {
  switch (part?.model.kind) {
    case 'supply':
      return 0
    case 'lead':
      return 1
    default:
      return hasLeads ? 2 : 1
  }
}

function mirrored(ranks: ReadonlyMap<DrawnNode, number>): Map<DrawnNode, number> {
  const last = Math.max(0, ...ranks.values())
  return new Map([...ranks].map(([node, rank]) => [node, last - rank]))
}
