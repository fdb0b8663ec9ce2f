import { markRaw } from 'vue'
import type { ResolvedBuild, ResolvedPart } from '#shared/build/resolve.ts'
import type { Drawing, DrawnNode, DrawnNodeKind } from '#shared/layout/drawing.ts'

/** What a node of the canvas shows. Kept out of reactivity: a new drawing brings a new one. */
export interface NodeFace {
  drawn: DrawnNode
  part: ResolvedPart | undefined
}

/** A node as the canvas library takes it. */
export interface CanvasNode {
  id: string
  type: DrawnNodeKind
  position: { x: number; y: number }
  parentNode?: string
  width: number
  height: number
  draggable: boolean
  selectable: boolean
  zIndex: number
  data: NodeFace
}

const layers: Readonly<Record<DrawnNodeKind, number>> = {
  case: 0,
  backplane: 1,
  'empty-bay': 2,
  'drive-row': 3,
  part: 3,
  stub: 3,
}

/** A drawing as canvas nodes. What did not change keeps its object, so that the canvas has nothing to do for it. */
export function toCanvasNodes(
  drawing: Drawing,
  build: ResolvedBuild,
  canEdit: boolean,
  before: ReadonlyMap<string, CanvasNode> = new Map(),
): CanvasNode[] {
  const frames = framesOf(drawing)
  return drawing.nodes.map((drawn) => {
    const part = build.partById.get(drawn.part)
    const known = before.get(drawn.id)
    const parent = frames.get(drawn.id)
    if (known && isSame(known, drawn, part, parent?.id, canEdit)) return known
    return {
      id: drawn.id,
      type: drawn.kind,
      position: { x: drawn.x - (parent?.x ?? 0), y: drawn.y - (parent?.y ?? 0) },
      ...(parent && { parentNode: parent.id }),
      width: drawn.width,
      height: drawn.height,
      draggable: canEdit && isMovable(drawn.kind),
      selectable: drawn.kind !== 'empty-bay',
      zIndex: layers[drawn.kind],
      data: markRaw({ drawn, part }),
    }
  })
}

/** Stubs follow their part, backplanes their case, and a bay stands where the case has it. */
const isMovable = (kind: DrawnNodeKind): boolean => kind === 'part' || kind === 'drive-row' || kind === 'case'

/** The case frame that rows, empty bays and backplanes stand in, so that they move with it. */
function framesOf(drawing: Drawing): Map<string, DrawnNode> {
  const frames = drawing.nodes.filter((node) => node.kind === 'case')
  const inside = new Map<string, DrawnNode>()
  for (const node of drawing.nodes) {
    if (node.kind === 'part' || node.kind === 'stub' || node.kind === 'case') continue
    const frame = frames.find((one) => contains(one, node))
    if (frame) inside.set(node.id, frame)
  }
  return inside
}

const contains = (frame: DrawnNode, node: DrawnNode): boolean =>
  node.x >= frame.x &&
  node.y >= frame.y &&
  node.x + node.width <= frame.x + frame.width &&
  node.y + node.height <= frame.y + frame.height

function isSame(
  known: CanvasNode,
  drawn: DrawnNode,
  part: ResolvedPart | undefined,
  parent: string | undefined,
  canEdit: boolean,
): boolean {
  const old = known.data.drawn
  return (
    known.parentNode === parent &&
    known.draggable === (canEdit && isMovable(drawn.kind)) &&
    part?.part === known.data.part?.part &&
    part?.model === known.data.part?.model &&
    old.kind === drawn.kind &&
    old.x === drawn.x &&
    old.y === drawn.y &&
    old.width === drawn.width &&
    old.height === drawn.height &&
    old.slot === drawn.slot &&
    samePorts(old, drawn) &&
    JSON.stringify(old.headings) === JSON.stringify(drawn.headings)
  )
}

const samePorts = (a: DrawnNode, b: DrawnNode): boolean =>
  a.ports.length === b.ports.length &&
  a.ports.every((port, i) => {
    const other = b.ports[i]
    return (
      other !== undefined &&
      port.key === other.key &&
      port.x === other.x &&
      port.y === other.y &&
      port.side === other.side &&
      port.joined === other.joined
    )
  })
