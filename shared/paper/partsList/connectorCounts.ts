import type { ResolvedPart } from '../../build/resolve.ts'
import type { connectorSides, ConnectorType } from '../../catalog/connectorType.ts'

/** Connectors of one kind on a part, told apart as plug and receptacle: what a buyer mixes up first. */
export interface ConnectorCount {
  type: string
  name: string
  side: (typeof connectorSides)[number]
  count: number
}

export function connectorCounts(part: ResolvedPart): ConnectorCount[] {
  const counts = new Map<string, ConnectorCount>()
  for (const { type } of part.connectors) {
    const known = counts.get(type.id)
    if (known) known.count++
    else counts.set(type.id, { type: type.id, name: nameOf(type), side: type.side, count: 1 })
  }
  return [...counts.values()]
}

/** A shape is bought by the number of its standard as often as by its name. */
function nameOf({ name, standard, side }: ConnectorType): string {
  const sided = name.toLowerCase().includes(side) ? name : `${name}, ${side}`
  const [number] = /^SFF-[A-Z]*-?\d+/.exec(standard) ?? []
  return number && !sided.includes(number) ? `${sided} (${number})` : sided
}

/** "1 x Mini SAS 4i plug (SFF-8087); 4 x SAS drive receptacle, 29-position (SFF-8482)" */
export const connectorWords = (counts: readonly ConnectorCount[]): string =>
  counts.map(({ count, name }) => `${count} x ${name}`).join('; ')
