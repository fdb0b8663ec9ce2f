import type { ResolvedBuild, ResolvedPart } from '../build/resolve.ts'
import { spreadBends } from './bends.ts'
import { regionOf } from './carries.ts'
import type { Drawing, DrawnNode } from './drawing.ts'
import { facingOf, hostDistances } from './facing.ts'
import { closeRanks, depthsOf } from './layers.ts'
import { placeLoom, type Link } from './loom.ts'
import { loom, tag } from './metrics.ts'
import { applyOwnPositions } from './positions.ts'
import { makePowerTag, makeStubs, type LoomNode } from './powerLoom.ts'
import { makeRuns, type PlacedRun } from './runs.ts'
import { placeStrips } from './strips.ts'
import { makeTag, noPlaces } from './tag.ts'

/**
 * The automatic arrangement of a build: strip of bays in the middle, power loom on the left, data loom on the right.
 * A part's own position wins over the automatic one. The same build always gives the same drawing.
 */
export function arrange(build: ResolvedBuild): Drawing {
  const places = noPlaces()
  const strips = placeStrips(build, places)
  const distances = hostDistances(build)
  const power: LoomNode[] = []
  const data: LoomNode[] = []
  for (const part of build.parts) {
    const region = regionOf(part)
    if (region === 'power') power.push(makePowerTag(places, part))
    if (region !== 'data') continue
    const { left, right } = facingOf(part, distances)
    data.push({ part, node: makeTag(places, part, 'data', left, right) })
    power.push(...makeStubs(places, part))
  }
  const runs = makeRuns(build, places)
  const bounds = boundsOf(strips)
  placePowerLoom(power, runs, bounds)
  placeDataLoom(data, runs, bounds)
  spreadBends(runs)

  const nodes = [...strips, ...power.map(({ node }) => node), ...data.map(({ node }) => node)]
  const drawing: Drawing = { nodes, runs: runs.map(({ run }) => run), bounds }
  applyOwnPositions(build, drawing)
  drawing.bounds = boundsOf(nodes)
  return drawing
}

type Bounds = Drawing['bounds']

/** Columns by depth from the supply; the tails of cables stand nearest the strip. */
function placePowerLoom(members: readonly LoomNode[], runs: readonly PlacedRun[], strip: Bounds): void {
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
  const under = columnsUnder(columns, isLow, strip.width)

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
  const hasTails = members.some(({ node }) => isTail(node))
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
  return wide <= room + loom.columnGap - loom.nodeGap ? first : 0
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

/** Columns by distance from the strip; boards stand outermost with their cards beside them. */
function placeDataLoom(members: readonly LoomNode[], runs: readonly PlacedRun[], strip: Bounds): void {
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

function mirrored(ranks: ReadonlyMap<DrawnNode, number>): Map<DrawnNode, number> {
  const last = Math.max(0, ...ranks.values())
  return new Map([...ranks].map(([node, rank]) => [node, last - rank]))
}

/** A card stands at its slot's height, whatever else the board is joined to. */
const slotWeight = 1000

/** Runs that lie within one loom and lead away from the strip, column by column. */
function linksOf(runs: readonly PlacedRun[], columns: ReadonlyMap<DrawnNode, number>, side: 'left' | 'right'): Link[] {
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

function boundsOf(nodes: readonly DrawnNode[]): Bounds {
  let [left, top, right, bottom] = [Infinity, Infinity, -Infinity, -Infinity]
  for (const { x, y, width, height } of nodes) {
    left = Math.min(left, x)
    top = Math.min(top, y)
    right = Math.max(right, x + width)
    bottom = Math.max(bottom, y + height)
  }
  return nodes.length === 0
    ? { x: 0, y: 0, width: 0, height: 0 }
    : { x: left, y: top, width: right - left, height: bottom - top }
}
