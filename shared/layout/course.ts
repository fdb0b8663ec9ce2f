import type { Drawing, DrawnNode, DrawnRun } from './drawing.ts'
import type { RunCourse, RunEnd } from './route.ts'

/** Finds runs' courses in absolute places. Build it once for a drawing. */
export function courseFinder(drawing: Drawing): (run: DrawnRun) => RunCourse | undefined {
  const nodes = new Map(drawing.nodes.map((node) => [node.id, node]))
  return (run) => {
    const from = endOf(nodes.get(run.from.node), run.from.port)
    const to = endOf(nodes.get(run.to.node), run.to.port)
    if (!from || !to) return undefined
    return { from, to, ...(run.via && { via: run.via }), ...(run.bends && { bends: run.bends }) }
  }
}

function endOf(node: DrawnNode | undefined, key: string): RunEnd | undefined {
  const port = node?.ports.find((one) => one.key === key)
  return node && port && { x: node.x + port.x, y: node.y + port.y, side: port.side }
}
