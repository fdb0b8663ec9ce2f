import type { ResolvedConnector, ResolvedPart } from '../build/resolve.ts'
import { carriesPower, outletsOf } from './carries.ts'
import type { DrawnNode } from './drawing.ts'
import { makeStub, makeTag, type Places } from './tag.ts'

/** A node with what its column and height depend on. */
export interface LoomNode {
  node: DrawnNode
  part: ResolvedPart
}

/** Tag of a part of the power loom: inlets on the left, outlets on the right. */
export function makePowerTag(places: Places, part: ResolvedPart): LoomNode {
  const outlets = outletsOf(part)
  const feeds = (connector: ResolvedConnector) => outlets.has(connector.connector.id)
  const left = part.connectors.filter((connector) => !feeds(connector))
  return { part, node: makeTag(places, part, 'power', left, part.connectors.filter(feeds)) }
}

/** Stubs of a part on the data side: one for each power inlet, with the outlets that its wires lead to. */
export function makeStubs(places: Places, part: ResolvedPart): LoomNode[] {
  const power = part.connectors.filter(carriesPower)
  if (power.length === 0) return []
  const outlets = outletsOf(part)
  const inlets = power.filter((connector) => !outlets.has(connector.connector.id))
  const left = new Set(power.filter((connector) => outlets.has(connector.connector.id)))
  const stubs: LoomNode[] = []
  for (const inlet of inlets) {
    const reached = reachedFrom(part, inlet)
    const own = [...left].filter((outlet) => reached.has(outlet.connector.id))
    for (const outlet of own) left.delete(outlet)
    stubs.push({ part, node: makeStub(places, part, inlet, own) })
  }
  if (left.size > 0) stubs.push({ part, node: makeStub(places, part, undefined, [...left]) })
  return stubs
}

/** Ids of connectors that the wires of a part lead to from one of them. */
function reachedFrom(part: ResolvedPart, start: ResolvedConnector): Set<string> {
  const onwards = new Map<string, string[]>()
  for (const { from, to, line } of part.model.wiring)
    if (line !== 'return') onwards.set(from, [...(onwards.get(from) ?? []), to])
  const reached = new Set([start.connector.id])
  for (const id of reached) for (const next of onwards.get(id) ?? []) reached.add(next)
  return reached
}
