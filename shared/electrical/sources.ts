import type { ResolvedPart } from '../build/resolve.ts'
import { supplyInside, type Converter, type SupplyRail } from '../catalog/model.ts'
import { nominal_V } from '../quantity/rails.ts'
import { add, type Draft } from './draft.ts'
import { lineIndex } from './lines.ts'
import type { LineNetwork, Source } from './network.ts'
import type { PartWiring } from './partWiring.ts'

/** One source a rail and one for the return, each feeding the connectors that the supply's own wires do not reach. */
export function addSources(drafts: readonly Draft[], part: ResolvedPart, firstFree: number, wiring: PartWiring): void {
  const supply = part.model.supply!
  const reachedByWire = new Set(
    part.model.wiring.flatMap(({ from, to, line }) => (from === supplyInside ? [] : [`${line}|${to}`])),
  )
  const firstWires = wiring.fromInside
  for (const draft of drafts) {
    const { line } = draft
    const made = new Map<string, Source>()
    for (const connector of part.connectors) {
      if (connector.contacts[line] === 0 || reachedByWire.has(`${line}|${connector.connector.id}`)) continue
      const railId = line === 'return' ? '' : connector.connector.feeds?.[line]
      if (railId === undefined) continue
      const rail = line === 'return' ? null : (supply.rails.find(({ id }) => id === railId) ?? null)
      if (line !== 'return' && rail?.rail !== line) continue
      let source = made.get(railId)
      if (!source) {
        source = { node: firstFree + draft.sources.length, part, rail, above_V: aboveNominal_V(rail) }
        draft.sources.push(source)
        made.set(railId, source)
      }
      for (const wire of firstWires.get(`${line}|${connector.connector.id}`) ?? [null]) {
        const ohm = wire && supply.toleranceAt === 'socket' ? wire.figures.resistance_ohm : 0
        add(draft, { kind: 'feed', source, connector, wire }, source.node, connector.index, ohm, ohm)
      }
    }
  }
}

function aboveNominal_V(rail: SupplyRail | null): number {
  if (!rail) return 0
  const { value, low, high } = rail.setPoint_V
  return (value ?? low ?? high ?? nominal_V[rail.rail]) - nominal_V[rail.rail]
}

/** Share of its input that a converter hands on where nobody states it, at most: common practice for small ones. */
const worstEfficiency = 0.8

/** The source that a converter is for its output, where its input is live. */
export function addConverter(
  draft: Draft,
  part: ResolvedPart,
  { id, from, rail, feeds, setPoint_V, limit_A, efficiency }: Converter,
  above: readonly LineNetwork[],
  firstFree: number,
): void {
  const connector = part.connectorById.get(from.connector)
  const input = above[lineIndex[from.rail]]
  if (!connector || input?.plan.reached[connector.index] !== 1) return
  const made: SupplyRail = { id, rail, setPoint_V, limit_A }
  const kept = efficiency.value ?? efficiency.low ?? worstEfficiency
  const source: Source = {
    node: firstFree + draft.sources.length,
    part,
    rail: made,
    above_V: aboveNominal_V(made),
    takes: {
      rail: from.rail,
      connector,
      ampere: nominal_V[rail] / (nominal_V[from.rail] * (kept > 0 && kept <= 1 ? kept : worstEfficiency)),
    },
  }
  draft.sources.push(source)
  for (const fed of feeds) {
    const outlet = part.connectorById.get(fed)
    if (outlet && outlet.contacts[rail] > 0)
      add(draft, { kind: 'feed', source, connector: outlet, wire: null }, source.node, outlet.index, 0, 0)
  }
}
