import type { ResolvedBuild } from '../build/resolve.ts'
import type { Drawing, DrawnNode } from './drawing.ts'
import { loom, snap } from './metrics.ts'

/**
 * Puts parts where people moved them. Everything else stays where the automatic arrangement has it, so that moving
 * one tag moves only that tag; what would lie under a moved tag gives way downwards.
 */
export function applyOwnPositions(build: ResolvedBuild, drawing: Drawing): void {
  const moved = new Set<string>()
  const movedNodes: DrawnNode[] = []
  for (const node of drawing.nodes) {
    if (node.kind !== 'part') continue
    const own = build.partById.get(node.part)?.part.position
    if (!own) continue
    node.x = own.x
    node.y = own.y
    moved.add(node.id)
    movedNodes.push(node)
  }
  if (movedNodes.length === 0) return
  for (const run of drawing.runs)
    if (moved.has(run.from.node) || moved.has(run.to.node)) {
      delete run.via
      delete run.bends
    }
  const free = drawing.nodes.filter((node) => (node.kind === 'part' || node.kind === 'stub') && !moved.has(node.id))
  giveWay(free, movedNodes)
}

const overlap = (a: DrawnNode, b: DrawnNode): boolean =>
  a.x < b.x + b.width && b.x < a.x + a.width && a.y < b.y + b.height && b.y < a.y + a.height

/** Moves what lies under a moved tag to the next free height of its column. */
function giveWay(free: readonly DrawnNode[], moved: readonly DrawnNode[]): void {
  const hidden = free.filter((node) => moved.some((tag) => overlap(node, tag)))
  for (const node of hidden) {
    const others = [...free, ...moved].filter(
      (other) => other !== node && other.x < node.x + node.width && node.x < other.x + other.width,
    )
    others.sort((a, b) => a.y - b.y)
    for (const other of others) if (overlap(node, other)) node.y = snap(other.y + other.height + loom.compactGap + 2)
  }
}
