import type { ResolvedBuild, ResolvedConnector, ResolvedPart } from '../build/resolve.ts'
import { carriesData, carriesPower } from './carries.ts'
import type { DrawnNode } from './drawing.ts'
import { snap, strip } from './metrics.ts'
import { bayConnectors, groupRows, seatedDrive, type Row, type RowGroup } from './rows.ts'
import { addPort, type Places } from './tag.ts'

/** Every strip under the other, at x = 0. Frames come before what stands in them. */
export function placeStrips(build: ResolvedBuild, places: Places): DrawnNode[] {
  const nodes: DrawnNode[] = []
  let top = 0
  for (const group of groupRows(build)) {
    const made = placeGroup(group, places, top)
    for (const node of made.nodes) nodes.push(node)
    top = made.bottom + strip.stackGap
  }
  return nodes
}

interface Spot {
  row: Row
  node: DrawnNode
}

function placeGroup({ holder, rows }: RowGroup, places: Places, y: number) {
  const x = 0
  const isCase = holder?.model.kind === 'case'
  const gutter = rows.some(({ backplane }) => backplane) || !isCase ? strip.gutter : 0
  const rowsX = x + strip.framePad + gutter
  const width = strip.rowWidth + 2 * (strip.framePad + gutter)
  const cages = new Set(rows.map(({ cage }) => cage))
  const headings: { text: string; x: number; y: number }[] = []
  const spots: Spot[] = []
  const tops = new Map<ResolvedPart, number>()
  const bottoms = new Map<ResolvedPart, number>()

  let cursor = y + (isCase ? strip.caseHeader : 0)
  let before: Row | undefined
  for (const row of rows) {
    if (before?.backplane && before.backplane !== row.backplane) {
      cursor += strip.backplanePad - strip.rowGap
      bottoms.set(before.backplane, cursor)
      cursor += strip.cageGap
    }
    if (cages.size > 1 && row.cage !== undefined && row.cage !== before?.cage) {
      if (before) cursor += strip.cageGap
      headings.push({ text: row.cage, x: rowsX - x, y: cursor - y + strip.cageHeader - 8 })
      cursor += strip.cageHeader
    }
    if (row.backplane && row.backplane !== before?.backplane) {
      tops.set(row.backplane, cursor)
      cursor += strip.backplaneHeader
    }
    spots.push({ row, node: rowNode(row, holder, rowsX, cursor) })
    cursor += strip.rowHeight + strip.rowGap
    before = row
  }
  if (before?.backplane) {
    cursor += strip.backplanePad - strip.rowGap
    bottoms.set(before.backplane, cursor)
  } else if (before) cursor -= strip.rowGap
  if (isCase) cursor += strip.framePad

  const nodes: DrawnNode[] = []
  if (isCase) {
    const frame = frameNode(holder, 'case', x, y, width, cursor - y)
    if (headings.length > 0) frame.headings = headings
    addFramePorts(places, frame, holder.connectors)
    nodes.push(frame)
  }
  for (const [backplane, top] of tops) {
    const frame = frameNode(
      backplane,
      'backplane',
      x + strip.framePad,
      top,
      strip.rowWidth + 2 * strip.gutter,
      (bottoms.get(backplane) ?? cursor) - top,
    )
    addBackplanePorts(places, frame, backplane, spots)
    nodes.push(frame)
  }
  if (holder && !isCase && tops.size === 0) {
    const frame = frameNode(holder, 'backplane', x + strip.framePad, y, strip.rowWidth + 2 * strip.gutter, 60)
    addBackplanePorts(places, frame, holder, [])
    nodes.push(frame)
    cursor = y + frame.height
  }
  for (const { row, node } of spots) {
    if (row.drive) addDrivePorts(places, node, row.drive)
    nodes.push(node)
  }
  return { nodes, bottom: cursor }
}

function rowNode(row: Row, holder: ResolvedPart | undefined, x: number, y: number): DrawnNode {
  const node: DrawnNode = {
    id: row.drive?.part.id ?? `${holder?.part.id ?? ''}#${row.slot ?? 0}`,
    kind: row.drive ? 'drive-row' : 'empty-bay',
    part: row.drive?.part.id ?? holder?.part.id ?? '',
    x,
    y,
    width: strip.rowWidth,
    height: strip.rowHeight,
    ports: [],
  }
  if (row.slot !== undefined) node.slot = row.slot
  if (row.cage !== undefined) node.cage = row.cage
  return node
}

const frameNode = (
  part: ResolvedPart,
  kind: 'case' | 'backplane',
  x: number,
  y: number,
  width: number,
  height: number,
): DrawnNode => ({ id: part.part.id, kind, part: part.part.id, x, y, width, height, ports: [] })

function addDrivePorts(places: Places, node: DrawnNode, drive: ResolvedPart): void {
  const power = drive.connectors.filter(carriesPower)
  const data = drive.connectors.filter(carriesData)
  spread(node.height, power.length).forEach((y, i) => addPort(places, node, power[i]!, 'power', 'left', 0, y))
  spread(node.height, data.length).forEach((y, i) => addPort(places, node, data[i]!, 'data', 'right', node.width, y))
}

/** Evenly spread heights on an edge, clear of its ends. */
const spread = (height: number, count: number): number[] =>
  Array.from({ length: count }, (_, i) => Math.round((height * (i + 0.5)) / count))

function addFramePorts(places: Places, frame: DrawnNode, connectors: readonly ResolvedConnector[]): void {
  const power = connectors.filter(carriesPower)
  const data = connectors.filter(carriesData)
  between(frame.height, power.length).forEach((y, i) => addPort(places, frame, power[i]!, 'power', 'left', 0, y))
  between(frame.height, data.length).forEach((y, i) =>
    addPort(places, frame, data[i]!, 'data', 'right', frame.width, y),
  )
}

/** Heights for connectors of a frame: spread over its rows, on the seams between rows where there is room for that. */
function between(height: number, count: number): number[] {
  const pitch = strip.rowHeight + strip.rowGap
  const first = strip.backplaneHeader
  return spread(height - first, count).map((y) => {
    const roomy = (height - first) / Math.max(count, 1) >= pitch
    return first + (roomy ? Math.max(Math.round(y / pitch), 1) * pitch - strip.rowGap / 2 : snap(y))
  })
}

function addBackplanePorts(places: Places, frame: DrawnNode, part: ResolvedPart, spots: readonly Spot[]): void {
  addFramePorts(
    places,
    frame,
    part.connectors.filter(({ connector }) => connector.bay === undefined),
  )
  const inside = spots.filter(({ row }) => row.backplane === part)
  const bays = bayConnectors(part)
  const heights = spread(frame.height, bays.length)
  bays.forEach((connector, i) => {
    const seated = seatedDrive(connector)
    const slot = (part.part.bay?.slot ?? 1) - 1 + (connector.connector.bay ?? 1)
    const spot =
      inside.find(({ row }) => seated !== undefined && row.drive === seated) ??
      inside.find(({ row }) => row.slot === slot)
    const y = spot ? spot.node.y + spot.node.height / 2 - frame.y : (heights[i] ?? 0)
    if (carriesPower(connector)) addPort(places, frame, connector, 'power', 'right', strip.seatInset, y)
    if (carriesData(connector)) addPort(places, frame, connector, 'data', 'left', frame.width - strip.seatInset, y)
  })
}
