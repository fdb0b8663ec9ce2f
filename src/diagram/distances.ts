import type { ResolvedConnector } from '#shared/build/resolve.ts'
import type { Drawing } from '#shared/layout/drawing.ts'

/** How far other connectors stand from one on the sheet. What is not drawn counts as far. */
export function distancesOn(drawing: Drawing, from: ResolvedConnector): (to: ResolvedConnector) => number {
  const places = new Map<string, { x: number; y: number }[]>()
  for (const node of drawing.nodes)
    for (const port of node.ports) {
      const key = `${node.part}/${port.connector}`
      const list = places.get(key)
      const place = { x: node.x + port.x, y: node.y + port.y }
      if (list) list.push(place)
      else places.set(key, [place])
    }
  const of = (connector: ResolvedConnector) => places.get(`${connector.part.part.id}/${connector.connector.id}`) ?? []
  const starts = of(from)
  return (to) => Math.min(...starts.flatMap((a) => of(to).map((b) => Math.hypot(a.x - b.x, a.y - b.y))), Infinity)
}
