import type { DrawnNode, DrawnRun } from './drawing.ts'
import { groupBy, push } from './groupBy.ts'
import { lanesOf, viaOf, type Lane } from './lanes.ts'
import { loom, snap } from './metrics.ts'
import { pullsOf, type Pulls } from './pulls.ts'
import { separate, type Stacked } from './separate.ts'
import type { Place } from './tag.ts'

/** A run inside a loom, with its end towards the strip and its end away from it. */
export interface Link {
  run: DrawnRun
  near: Place
  far: Place
  /** How much it insists on running level; 1 where not said. */
  weight?: number
}

export interface LoomPlan {
  side: 'left' | 'right'
  /** The strip's edge that the loom grows from. */
  edge: number
  /** Columns of the nodes, counted from the strip. */
  columns: ReadonlyMap<DrawnNode, number>
  /** So many of the first columns stand underneath the strip, not beside it, below `ceiling`. */
  under: number
  ceiling: number
  links: readonly Link[]
  /** Heights for nodes that stand below the rest whatever feeds them, as fans and the board's inlets. */
  homes: ReadonlyMap<DrawnNode, number>
  /** Height for what leads nowhere and hangs on nothing, as a part just taken from the shelf. */
  floor: number
  /** Room between a column and what lies before it, seen from the strip. */
  gapOf(column: number): number
}

/** Something that takes room in a column: a tag, or a run on its way past. */
interface Entry {
  node?: DrawnNode
  lane?: Lane
  key: number
  order: number
  stacked: Stacked
}

/**
 * Places the nodes of one loom in columns, from the strip outwards: each as level as can be with what it leads to,
 * in the order that keeps runs from crossing, and keeps a clear lane for runs that pass a column.
 */
export function placeLoom(plan: LoomPlan): void {
  const { columns, links } = plan
  const widths: number[] = []
  for (const [node, column] of columns) widths[column] = Math.max(widths[column] ?? 0, node.width)
  const edges = columnEdges(plan, widths)

  const nearLinks = groupBy(links, (link) => link.far.node)
  const lanes = lanesOf(plan)
  const laneOf = new Map(lanes.map((lane) => [lane.link, lane]))
  const pulls = pullsOf(plan, nearLinks)

  const nodesIn = groupBy([...columns.keys()], (node) => columns.get(node) ?? 0)
  const lanesIn = new Map<number, Lane[]>()
  for (const lane of lanes)
    for (let column = lane.first; column < (columns.get(lane.link.far.node) ?? 0); column++) push(lanesIn, column, lane)

  const order = new Map([...columns.keys()].map((node, i) => [node, i]))
  for (let column = 0; column < widths.length; column++) {
    const entries: Entry[] = []
    for (const node of nodesIn.get(column) ?? [])
      entries.push(nodeEntry(node, order.get(node) ?? 0, nearLinks.get(node) ?? [], laneOf, pulls, column))
    for (const lane of lanesIn.get(column) ?? []) entries.push(laneEntry(lane, order.get(lane.link.far.node) ?? 0))
    entries.sort((a, b) => a.key - b.key || a.order - b.order)
    stack(entries, column < plan.under ? plan.ceiling : -Infinity)
    for (const node of nodesIn.get(column) ?? [])
      node.x = plan.side === 'left' ? (edges[column] ?? 0) - node.width : (edges[column] ?? 0)
  }
  for (const lane of lanes) lane.link.run.via = viaOf(lane, plan.side, edges, widths)
}

/** The edge of each column that faces the strip. */
function columnEdges({ side, edge, gapOf, under }: LoomPlan, widths: readonly number[]): number[] {
  const sign = side === 'left' ? -1 : 1
  // Underneath the strip the first gap is a full one, however close the tails above stand to it.
  let x = edge + sign * (gapOf(under) - loom.columnGap)
  for (let column = 0; column < under; column++) x -= sign * ((widths[column] ?? 0) + (column > 0 ? loom.columnGap : 0))
  return widths.map((width, column) => {
    if (column === under) x = edge + sign * gapOf(column)
    else if (column > 0) x += sign * gapOf(column)
    const own = x
    x = own + sign * width
    return own
  })
}

/** Height that a link comes in at from the column before. */
function nearHeight(link: Link, laneOf: ReadonlyMap<Link, Lane>): number {
  return laneOf.get(link)?.heights.at(-1) ?? link.near.node.y + link.near.port.y
}

function nodeEntry(
  node: DrawnNode,
  order: number,
  links: readonly Link[],
  laneOf: ReadonlyMap<Link, Lane>,
  pulls: Pulls,
  column: number,
): Entry {
  const inward = links.filter((link) => (pulls.columns.get(link.near.node) ?? -1) < column)
  const leading = inward.filter((link) => !pulls.low.has(link.near.node))
  const used = leading.length > 0 ? leading : inward
  if (used.length === 0) {
    const home = pulls.heights.get(node) ?? 0
    return { node, key: home, order, stacked: { wish: home - node.height / 2, height: node.height, weight: 0.1 } }
  }
  let [weights, keys, wishes] = [0, 0, 0]
  for (const link of used) {
    const weight = link.weight ?? 1
    const height = nearHeight(link, laneOf)
    weights += weight
    keys += weight * height
    wishes += weight * (height - link.far.port.y)
  }
  return { node, key: keys / weights, order, stacked: { wish: wishes / weights, height: node.height, weight: weights } }
}

function laneEntry(lane: Lane, order: number): Entry {
  const height = lane.heights.at(-1) ?? lane.link.near.node.y + lane.link.near.port.y
  return { lane, key: height, order, stacked: { wish: height, height: 0, weight: 2 } }
}

function stack(entries: readonly Entry[], ceiling: number): void {
  const gap = (above: number, below: number): number => gapBetween(entries[above], entries[below])
  const tops = separate(
    entries.map((entry) => entry.stacked),
    gap,
  )
  let least = ceiling
  entries.forEach((entry, i) => {
    const wish = tops[i] ?? 0
    if (entry.node) entry.node.y = wish < least ? snapUp(least) : Math.max(snap(wish), snapUp(least))
    else entry.lane?.heights.push(Math.max(Math.round(wish), least))
    const top = entry.node ? entry.node.y : (entry.lane?.heights.at(-1) ?? 0)
    least = top + entry.stacked.height + gapBetween(entry, entries[i + 1])
  })
}

const snapUp = (value: number): number => (Number.isFinite(value) ? snap(value + 1.5) : value)

function gapBetween(above: Entry | undefined, below: Entry | undefined): number {
  if (!above || !below) return 0
  if (above.lane && below.lane) return loom.lanePitch
  if (above.lane || below.lane) return loom.laneGap
  const small = (node: DrawnNode | undefined) => node?.compact || node?.kind === 'stub'
  return small(above.node) || small(below.node) ? loom.compactGap : loom.nodeGap
}
