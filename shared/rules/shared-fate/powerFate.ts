import type { ResolvedBuild, ResolvedConnector, ResolvedPart } from '../../build/resolve.ts'
import type { PowerResult } from '../../electrical/result.ts'
import { rails, type Rail } from '../../quantity/rails.ts'
import { nearestDominators } from './dominators.ts'

/** For each drive, the parts without which one of its rails no longer arrives. */
export function powerFate(build: ResolvedBuild, power: PowerResult): Map<ResolvedPart, Set<ResolvedPart>> {
  const fate = new Map<ResolvedPart, Set<ResolvedPart>>()
  /** What each converter's output hangs on, by its part and rail. Rails come from the highest down. */
  const converters = new Map<string, readonly ResolvedPart[]>()
  for (const rail of rails) {
    const fed = power.devices.filter(
      (device) => device.rail === rail && device.part.model.drive && device.fedBy.length > 0,
    )
    const made = build.parts.flatMap((part) => part.model.converters.map((converter) => ({ part, converter })))
    if (fed.length === 0 && !made.some(({ converter }) => converter.from.rail === rail)) continue
    const { neighbours, partAt } = railGraph(build, rail)
    const nearest = nearestDominators(neighbours)
    const neededAt = ({ index }: ResolvedConnector): ResolvedPart[] => {
      const needed = new Set<ResolvedPart>()
      for (let node = index + 1; node > 0 && nearest[node] !== -1; node = nearest[node] ?? 0) {
        const on = partAt(node)
        if (!on) continue
        needed.add(on)
        for (const above of converters.get(`${on.index} ${rail}`) ?? []) needed.add(above)
      }
      return [...needed]
    }
    for (const { part, converter } of made) {
      const input = converter.from.rail === rail ? part.connectorById.get(converter.from.connector) : undefined
      if (input) converters.set(`${part.index} ${converter.rail}`, neededAt(input))
    }
    for (const { part, connector } of fed) {
      const needed = fate.get(part) ?? new Set()
      fate.set(part, needed)
      for (const on of neededAt(connector)) if (on !== part) needed.add(on)
    }
  }
  return fate
}

/** Node 0 is the mains; then every connector; then every part, as the body of a supply or converter between its outlets. */
function railGraph(build: ResolvedBuild, rail: Rail) {
  const { connectors, parts } = build
  const neighbours = new Array<number[] | undefined>(1 + connectors.length + parts.length).fill(undefined)
  const link = (a: number, b: number) => {
    ;(neighbours[a] ??= []).push(b)
    ;(neighbours[b] ??= []).push(a)
  }
  for (const part of parts) {
    const body = 1 + connectors.length + part.index
    if (part.model.supply) link(0, body)
    for (const { rail: made, feeds } of part.model.converters) {
      if (made !== rail) continue
      link(0, body)
      for (const id of feeds) {
        const end = part.connectorById.get(id)
        if (end) link(body, end.index + 1)
      }
    }
    for (const end of part.connectors) if (end.connector.feeds?.[rail] !== undefined) link(body, end.index + 1)
    for (const { from, to, line } of part.model.wiring) {
      if (line !== rail) continue
      const a = part.connectorById.get(from)
      const b = part.connectorById.get(to)
      if (a && b) link(a.index + 1, b.index + 1)
    }
  }
  for (const { a, b, mating } of build.joints)
    if (mating.power && a.contacts[rail] > 0 && b.contacts[rail] > 0) link(a.index + 1, b.index + 1)
  const partAt = (node: number): ResolvedPart | undefined =>
    node <= connectors.length ? connectors[node - 1]?.part : parts[node - 1 - connectors.length]
  return { neighbours, partAt }
}
