import type { ResolvedBuild, ResolvedPart } from '../../build/resolve.ts'
import type { PowerResult } from '../../electrical/result.ts'
import { rails, type Rail } from '../../quantity/rails.ts'
import { nearestDominators } from './dominators.ts'

/** For each drive, the parts without which one of its rails no longer arrives. */
export function powerFate(build: ResolvedBuild, power: PowerResult): Map<ResolvedPart, Set<ResolvedPart>> {
  const fate = new Map<ResolvedPart, Set<ResolvedPart>>()
  for (const rail of rails) {
    const fed = power.devices.filter(
      (device) => device.rail === rail && device.part.model.drive && device.fedBy.length > 0,
    )
    if (fed.length === 0) continue
    const { neighbours, partAt } = railGraph(build, rail)
    const nearest = nearestDominators(neighbours)
    for (const { part, connector } of fed) {
      const needed = fate.get(part) ?? new Set()
      fate.set(part, needed)
      for (let node = connector.index + 1; node > 0 && nearest[node] !== -1; node = nearest[node] ?? 0) {
        const on = partAt(node)
        if (on && on !== part) needed.add(on)
      }
    }
  }
  return fate
}

/** Node 0 is the mains; then every connector; then every part, as the body of a supply between its outlets. */
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
