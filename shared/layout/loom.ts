import type { DrawnNode, DrawnRun } from './drawing.ts'
import { loom, snap } from './metrics.ts'
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

/** Most places kept free for passing runs; beyond that a diagram is no longer read by eye and runs go straight. */
const mostLanes = 20_000

/** Something that takes room in a column: a tag, or a run on its way past. */
interface Entry {
  node?: DrawnNode
  lane?: Lane
  key: number
  order: number
  stacked: Stacked
}

/** The heights at which a long run passes the columns between its ends, from the strip outwards. */
interface Lane {
  link: Link
  first: number
  heights: number[]
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
  const gap = (column: number) => (column === 0 && under > 0 ? 0 : gapOf(column))
  let x = edge
  for (let column = 0; column < under; column++) x -= sign * (gap(column) + (widths[column] ?? 0))
  return widths.map((width, column) => {
    const own = x + sign * gap(column)
    x = own + sign * width
    return own
  })
}

/** Room for runs that pass columns. */
function lanesOf({ links, columns, under }: LoomPlan): Lane[] {
  const lanes: Lane[] = []
  let total = 0
  for (const link of links) {
    const first = (columns.get(link.near.node) ?? under - 1) + 1
    const passed = (columns.get(link.far.node) ?? 0) - first
    if (passed <= 0) continue
    total += passed
    lanes.push({ link, first, heights: [] })
  }
  return total > mostLanes ? [] : lanes
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

/** Two points a column: where the run enters its lane and where it leaves it, in the run's own direction. */
function viaOf(lane: Lane, side: 'left' | 'right', edges: readonly number[], widths: readonly number[]) {
  const sign = side === 'left' ? -1 : 1
  const points = lane.heights.flatMap((y, i) => {
    const column = lane.first + i
    const x = edges[column] ?? 0
    return [
      { x, y },
      { x: x + sign * (widths[column] ?? 0), y },
    ]
  })
  return lane.link.run.from.node === lane.link.far.node.id ? points.reverse() : points
}

/** Where along the strip every node belongs, before any is placed. */
interface Pulls {
  columns: ReadonlyMap<DrawnNode, number>
  heights: ReadonlyMap<DrawnNode, number>
  /** Nodes that lead to no row: they stand below the rest and do not draw what feeds them away from its drives. */
  low: ReadonlySet<DrawnNode>
}

function pullsOf(plan: LoomPlan, nearLinks: ReadonlyMap<DrawnNode, readonly Link[]>): Pulls {
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

function push<K, V>(map: Map<K, V[]>, key: K, value: V): void {
  const list = map.get(key)
  if (list) list.push(value)
  else map.set(key, [value])
}

function groupBy<K, V>(values: readonly V[], keyOf: (value: V) => K): Map<K, V[]> {
  const groups = new Map<K, V[]>()
  for (const value of values) push(groups, keyOf(value), value)
  return groups
}
