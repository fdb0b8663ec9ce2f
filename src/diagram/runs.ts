import type { Drawing, DrawnNode, DrawnRun } from '#shared/layout/drawing.ts'
import { runPath, type RunCourse, type RunEnd } from '#shared/layout/route.ts'

/** A run ready to be drawn. */
export interface CanvasRun {
  id: string
  joint: string | undefined
  kind: DrawnRun['kind']
  carries: DrawnRun['carries']
  d: string
  course: RunCourse
}

type Point = { x: number; y: number }
/** How far each node stands from its place in the drawing while it is being dragged. */
export type Shifts = ReadonlyMap<string, Point>

const still: Shifts = new Map()

/** Works out runs from a drawing, once or again for those whose nodes are on the move. */
export function runMaker(drawing: Drawing) {
  const nodes = new Map(drawing.nodes.map((node) => [node.id, node]))
  const byNode = new Map<string, DrawnRun[]>()
  for (const run of drawing.runs)
    for (const id of new Set([run.from.node, run.to.node])) {
      const list = byNode.get(id)
      if (list) list.push(run)
      else byNode.set(id, [run])
    }

  function make(run: DrawnRun, shifts: Shifts = still): CanvasRun | undefined {
    const course = courseOf(run, shifts)
    return (
      course && {
        id: run.id,
        joint: run.joint,
        kind: run.kind,
        carries: run.carries,
        d: runPath(course),
        course,
      }
    )
  }

  function courseOf(run: DrawnRun, shifts: Shifts): RunCourse | undefined {
    const from = endOf(nodes.get(run.from.node), run.from.port, shifts)
    const to = endOf(nodes.get(run.to.node), run.to.port, shifts)
    if (!from || !to) return undefined
    const moved = shifts.has(run.from.node) || shifts.has(run.to.node)
    if (moved) return { from, to }
    return { from, to, ...(run.via && { via: run.via }), ...(run.bends && { bends: run.bends }) }
  }

  const all = (): CanvasRun[] => drawing.runs.flatMap((run) => make(run) ?? [])

  /** Runs that hang on any of the nodes. */
  function touching(ids: Iterable<string>): DrawnRun[] {
    return [...new Set([...ids].flatMap((id) => byNode.get(id) ?? []))]
  }

  return { make, all, touching, nodes }
}

function endOf(node: DrawnNode | undefined, key: string, shifts: Shifts): RunEnd | undefined {
  const port = node?.ports.find((one) => one.key === key)
  if (!node || !port) return undefined
  const shift = shifts.get(node.id)
  return { x: node.x + port.x + (shift?.x ?? 0), y: node.y + port.y + (shift?.y ?? 0), side: port.side }
}
