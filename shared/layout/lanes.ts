import type { Link, LoomPlan } from './loom.ts'

/** Most places kept free for passing runs; beyond that a diagram is no longer read by eye and runs go straight. */
const mostLanes = 20_000

/** The heights at which a long run passes the columns between its ends, from the strip outwards. */
export interface Lane {
  link: Link
  first: number
  heights: number[]
}

/** Room for runs that pass columns. */
export function lanesOf({ links, columns, under }: LoomPlan): Lane[] {
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

/** Two points a column: where the run enters its lane and where it leaves it, in the run's own direction. */
export function viaOf(lane: Lane, side: 'left' | 'right', edges: readonly number[], widths: readonly number[]) {
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
