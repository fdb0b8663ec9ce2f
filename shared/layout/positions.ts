import type { ResolvedBuild } from '../build/resolve.ts'
import type { Drawing, DrawnNode } from './drawing.ts'
import { loom, snap } from './metrics.ts'

/**
 * Puts parts where people moved them; a case takes what stands in it along. Everything else stays where the automatic
 * arrangement has it, so that moving one tag moves only that tag; what would lie under a moved one gives way downwards.
 */
export function applyOwnPositions(build: ResolvedBuild, drawing: Drawing): void {
  if (build.parts.every(({ part }) => part.position === undefined)) return
  const held = heldByFrames(drawing.nodes)
  const inFrame = new Set([...held.values()].flat())
  const moved = new Set<DrawnNode>()
  for (const node of drawing.nodes) {
    const own = build.partById.get(node.part)?.part.position
    if (!own || inFrame.has(node) || node.kind === 'stub') continue
    const [dx, dy] = [own.x - node.x, own.y - node.y]
    for (const one of [node, ...(held.get(node) ?? [])]) {
      one.x += dx
      one.y += dy
      moved.add(one)
    }
  }
  const movedIds = new Set([...moved].map((node) => node.id))
  for (const run of drawing.runs)
    if (movedIds.has(run.from.node) || movedIds.has(run.to.node)) {
      delete run.via
      delete run.bends
    }
  const free = drawing.nodes.filter((node) => (node.kind === 'part' || node.kind === 'stub') && !moved.has(node))
  giveWay(free, [...moved])
}

/** What stands in each case, or in a backplane that no case holds. A frame comes before what it holds. */
function heldByFrames(nodes: readonly DrawnNode[]): Map<DrawnNode, DrawnNode[]> {
  const held = new Map<DrawnNode, DrawnNode[]>()
  let frame: DrawnNode | undefined
  for (const node of nodes) {
    if (frame && contains(frame, node)) held.get(frame)?.push(node)
    else if (node.kind === 'case' || node.kind === 'backplane') {
      frame = node
      held.set(node, [])
    }
  }
  return held
}

const contains = (outer: DrawnNode, inner: DrawnNode): boolean =>
  outer.x <= inner.x &&
  outer.y <= inner.y &&
  inner.x + inner.width <= outer.x + outer.width &&
  inner.y + inner.height <= outer.y + outer.height

const overlap = (a: DrawnNode, b: DrawnNode): boolean =>
  a.x < b.x + b.width && b.x < a.x + a.width && a.y < b.y + b.height && b.y < a.y + a.height

/** Moves what lies under a moved node to the next free height of its column. */
function giveWay(free: readonly DrawnNode[], moved: readonly DrawnNode[]): void {
  const hidden = free.filter((node) => moved.some((other) => overlap(node, other)))
  for (const node of hidden) {
    const others = [...free, ...moved].filter(
      (other) => other !== node && other.x < node.x + node.width && node.x < other.x + other.width,
    )
    others.sort((a, b) => a.y - b.y)
    for (const other of others) if (overlap(node, other)) node.y = snap(other.y + other.height + loom.compactGap + 2)
  }
}
