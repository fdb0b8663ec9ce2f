import { moveParts } from '#shared/build/edits/revise.ts'
import { refuse, type EditOutcome, type MakeId } from '#shared/build/edits/outcome.ts'
import { leaveBay, moveToBay } from '#shared/build/edits/seat.ts'
import type { ResolvedBuild } from '#shared/build/resolve.ts'
import type { Drawing, DrawnNode } from '#shared/layout/drawing.ts'
import { grid } from '#shared/layout/metrics.ts'

type Point = { x: number; y: number }
/** Where dragged nodes were let go, in places of the sheet. */
export type Drops = ReadonlyMap<string, Point>

const snap = (point: Point): Point => ({ x: Math.round(point.x / grid) * grid, y: Math.round(point.y / grid) * grid })

/** The end of a drag as an edit: a drive goes to the bay beneath it, everything else to its new place. */
export function endOfDrag(build: ResolvedBuild, drawing: Drawing, makeId: MakeId, drops: Drops): EditOutcome {
  const nodes = new Map(drawing.nodes.map((node) => [node.id, node]))
  const [only] = drops.size === 1 ? [...drops.keys()] : []
  const row = only === undefined ? undefined : nodes.get(only)
  if (row?.kind === 'drive-row') return dropDrive(build, drawing, makeId, row, drops.get(row.id) ?? row)

  const places = new Map<string, Point>()
  for (const [id, to] of drops) {
    const node = nodes.get(id)
    if (
      node &&
      (node.kind === 'part' || node.kind === 'case' || (node.kind === 'drive-row' && node.slot === undefined))
    )
      places.set(node.part, snap(to))
  }
  return places.size === 0 ? refuse('Drives move with their case.') : moveParts(build.document, places)
}

function dropDrive(build: ResolvedBuild, drawing: Drawing, makeId: MakeId, row: DrawnNode, to: Point): EditOutcome {
  const centre = { x: to.x + row.width / 2, y: to.y + row.height / 2 }
  const bay = bayAt(drawing, build, centre, row.id)
  if (bay) return moveToBay(build, makeId, row.part, bay)
  if (row.slot === undefined) return moveParts(build.document, new Map([[row.part, snap(to)]]))
  const far = Math.abs(to.x - row.x) > row.width * 0.75
  return far ? leaveBay(build, row.part) : refuse('Nothing would change.')
}

/** The bay that a point of the sheet lies in. */
export function bayAt(
  drawing: Drawing,
  build: ResolvedBuild,
  point: Point,
  except?: string,
): { case: string; slot: number } | undefined {
  for (const node of drawing.nodes) {
    if (node.slot === undefined || node.id === except || !isInside(node, point)) continue
    const holder = node.kind === 'empty-bay' ? node.part : build.partById.get(node.part)?.part.bay?.case
    if (holder !== undefined) return { case: holder, slot: node.slot }
  }
  return undefined
}

export const isInside = (node: DrawnNode, { x, y }: Point): boolean =>
  x >= node.x && x <= node.x + node.width && y >= node.y && y <= node.y + node.height
