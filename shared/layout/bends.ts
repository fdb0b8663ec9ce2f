import type { DrawnRun } from './drawing.ts'
import type { PlacedRun } from './runs.ts'

/** The stretch of a run across one gap between columns. */
interface Crossing {
  run: DrawnRun
  gap: number
  x0: number
  y0: number
  x1: number
  y1: number
}

/** A rise smaller than this leaves a curve room enough where it is. */
const leastRise = 24
const widestPitch = 16
const edge = 20

/**
 * Gives runs that climb or fall side by side in one gap bends of their own, nested so that they need not cross: of
 * runs that fall the upper turns later, of runs that climb the lower does.
 */
export function spreadBends(runs: readonly PlacedRun[]): void {
  const gaps = new Map<string, Crossing[]>()
  for (const placed of runs) {
    const { run, from, to } = placed
    if (run.kind === 'seat') continue
    const via = run.via ?? []
    for (let gap = 0; gap <= via.length / 2; gap++) {
      const start = via[2 * gap - 1]
      const end = via[2 * gap]
      const x0 = start?.x ?? from.node.x + from.port.x
      const y0 = start?.y ?? from.node.y + from.port.y
      const x1 = end?.x ?? to.node.x + to.port.x
      const y1 = end?.y ?? to.node.y + to.port.y
      if (x1 <= x0 || Math.abs(y1 - y0) < leastRise) continue
      const key = `${run.carries === 'power' ? x0 : x1} ${y1 > y0 ? 'falls' : 'climbs'}`
      const crossing = { run, gap, x0, y0, x1, y1 }
      const list = gaps.get(key)
      if (list) list.push(crossing)
      else gaps.set(key, [crossing])
    }
  }
  for (const crossings of gaps.values()) for (const cluster of clustersOf(crossings)) spread(cluster)
}

/** Crossings whose heights overlap, directly or through others. */
function clustersOf(crossings: Crossing[]): Crossing[][] {
  const clusters: Crossing[][] = []
  let reach = -Infinity
  crossings.sort((a, b) => Math.min(a.y0, a.y1) - Math.min(b.y0, b.y1))
  for (const crossing of crossings) {
    const cluster = clusters.at(-1)
    if (cluster && Math.min(crossing.y0, crossing.y1) < reach) cluster.push(crossing)
    else clusters.push([crossing])
    reach = Math.max(reach, crossing.y0, crossing.y1)
  }
  return clusters
}

function spread(cluster: Crossing[]): void {
  if (cluster.length < 2) return
  cluster.sort((a, b) => (a.y1 > a.y0 ? b.y0 - a.y0 : a.y0 - b.y0))
  const left = Math.max(...cluster.map(({ x0 }) => x0))
  const right = Math.min(...cluster.map(({ x1 }) => x1))
  const pitch = Math.max(0, Math.min(widestPitch, (right - left - 2 * edge) / (cluster.length - 1)))
  const first = (left + right - pitch * (cluster.length - 1)) / 2
  cluster.forEach(({ run, gap }, i) => {
    run.bends ??= []
    run.bends[gap] = Math.round(first + i * pitch)
  })
}
