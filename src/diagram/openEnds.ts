import type { ResolvedBuild, ResolvedConnector } from '#shared/build/resolve.ts'
import { takenBy } from '#shared/build/edits/free.ts'
import type { Drawing } from '#shared/layout/drawing.ts'

/** Something without a partner, said in words beside its connector. */
export interface OpenEnd {
  id: string
  /** Node that it stands beside. */
  node: string
  x: number
  y: number
  side: 'left' | 'right'
  text: string
  /** True where the machine cannot work like that, not merely something left over. */
  isFault: boolean
}

/**
 * Connectors that wait for a partner: drives without power or data, and leads, splitters and cables whose own end
 * hangs free. Outlets and ports that are merely not used are no open ends.
 */
export function openEnds(drawing: Drawing, build: ResolvedBuild): OpenEnd[] {
  return drawing.nodes.flatMap((node) => {
    const part = build.partById.get(node.part)
    if (!part) return []
    return node.ports.flatMap((port): OpenEnd[] => {
      const connector = part.connectorById.get(port.connector)
      const text = connector && openWords(connector, port.side, port.key)
      if (!text) return []
      return [
        {
          id: `${node.id}/${port.key}`,
          node: node.id,
          x: node.x + port.x,
          y: node.y + port.y,
          side: port.side,
          text,
          isFault: part.model.kind === 'drive',
        },
      ]
    })
  })
}

function openWords(connector: ResolvedConnector, side: 'left' | 'right', key: string): string | undefined {
  const { model } = connector.part
  if (model.kind === 'drive') {
    const taken = takenBy(connector)
    const isPowerSide = key.endsWith(':power') || (side === 'left' && !key.endsWith(':data'))
    if (isPowerSide) return taken.power ? undefined : 'no power'
    return taken.data ? undefined : 'no data path'
  }
  if (connector.joints.length > 0) return undefined
  const { id } = connector.connector
  switch (model.kind) {
    case 'lead':
      return id === 'supply' ? 'open end' : undefined
    case 'splitter':
    case 'adapter':
      return id === 'in' ? 'open end' : undefined
    case 'breakout':
      return id === 'host' || id === 'device' ? 'open end' : id.startsWith('tail') ? 'no power' : undefined
    case 'cable':
      return 'open end'
    case 'backplane':
      return id.startsWith('power') ? 'no power' : undefined
    default:
      return undefined
  }
}
