import type { ResolvedConnector, ResolvedPart } from '../build/resolve.ts'
import { carriesOf, jointCarries } from './carries.ts'
import type { DrawnNode, DrawnPort } from './drawing.ts'
import { snap, stub, tag } from './metrics.ts'

/** Where a connector's power or data stub was drawn. */
export interface Place {
  node: DrawnNode
  port: DrawnPort
}

/** Places by connector index, apart for power and data since one connector may show on both sides. */
export interface Places {
  power: Map<number, Place>
  data: Map<number, Place>
}

export const noPlaces = (): Places => ({ power: new Map(), data: new Map() })

/** Makes the stub of one connector on a node and remembers where it is. */
export function addPort(
  places: Places,
  node: DrawnNode,
  connector: ResolvedConnector,
  as: 'power' | 'data',
  side: 'left' | 'right',
  x: number,
  y: number,
): void {
  const carries = carriesOf(connector)
  const { id, label } = connector.connector
  const port: DrawnPort = {
    key: carries === 'both' ? `${id}:${as}` : id,
    connector: id,
    carries,
    side,
    x,
    y,
    label,
    gender: connector.type.side === 'plug' || connector.type.side === 'edge' ? 'plug' : 'receptacle',
    joined: connector.joints.some((joint) => carries !== 'both' || [as, 'both'].includes(jointCarries(joint))),
  }
  node.ports.push(port)
  places[as].set(connector.index, { node, port })
}

/** A tag with its connectors in physical order on both edges. Its place is set later. */
export function makeTag(
  places: Places,
  part: ResolvedPart,
  as: 'power' | 'data',
  left: readonly ResolvedConnector[],
  right: readonly ResolvedConnector[],
): DrawnNode {
  const isSupply = part.model.kind === 'supply'
  const most = Math.max(left.length, right.length)
  const compact = most <= 1 && !isSupply
  const lines = isSupply ? Math.max(most, tag.supplyLines) : most
  const node: DrawnNode = {
    id: part.part.id,
    kind: 'part',
    part: part.part.id,
    x: 0,
    y: 0,
    width: isSupply ? tag.supplyWidth : tag.width,
    height: compact ? tag.compactHeight : tag.header + lines * tag.portPitch + tag.footer,
    ports: [],
  }
  if (compact) node.compact = true
  addEdge(places, node, left, as, 'left', most)
  addEdge(places, node, right, as, 'right', most)
  return node
}

/** The longer edge fills the tag from the top; the shorter one is centred against it. */
function addEdge(
  places: Places,
  node: DrawnNode,
  connectors: readonly ResolvedConnector[],
  as: 'power' | 'data',
  side: 'left' | 'right',
  most: number,
): void {
  const x = side === 'left' ? 0 : node.width
  const first = node.compact
    ? node.height / 2
    : tag.header + tag.portPitch / 2 + snap(((most - connectors.length) * tag.portPitch) / 2)
  connectors.forEach((connector, i) => addPort(places, node, connector, as, side, x, first + i * tag.portPitch))
}

/** A power inlet of a part on the data side with the outlets that it leads to. */
export function makeStub(
  places: Places,
  part: ResolvedPart,
  inlet: ResolvedConnector | undefined,
  outlets: readonly ResolvedConnector[],
): DrawnNode {
  const named = inlet ?? outlets[0]
  const height = Math.max(stub.height, outlets.length * stub.portPitch + 8)
  const node: DrawnNode = {
    id: `${part.part.id}~${named?.connector.id ?? ''}`,
    kind: 'stub',
    part: part.part.id,
    x: 0,
    y: 0,
    width: stub.width,
    height,
    ports: [],
  }
  if (inlet) addPort(places, node, inlet, 'power', 'left', 0, height / 2)
  const first = height / 2 - ((outlets.length - 1) * stub.portPitch) / 2
  outlets.forEach((outlet, i) =>
    addPort(places, node, outlet, 'power', 'right', node.width, first + i * stub.portPitch),
  )
  return node
}
