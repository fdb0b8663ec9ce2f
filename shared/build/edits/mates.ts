import type { ResolvedBuild, ResolvedConnector } from '../resolve.ts'
import { canJoin, isFree } from './free.ts'

/** A connector that the chosen one could be joined with, or the reason why it cannot. */
export interface Mate {
  connector: ResolvedConnector
  ok: boolean
  reason?: string
}

/** Judges every other connector of the build against the chosen one: what lights up while a run is drawn. */
export function judgeMates(build: ResolvedBuild, from: ResolvedConnector): Mate[] {
  return build.connectors
    .filter((connector) => connector !== from)
    .map((connector) => {
      const verdict = canJoin(from, connector)
      return { connector, ok: verdict.ok, ...(verdict.reason !== undefined && { reason: verdict.reason }) }
    })
}

/** Connectors that mate and are free, nearest first by the given distance, then in the order of the build. */
export function freeMates(
  build: ResolvedBuild,
  from: ResolvedConnector,
  distance: (to: ResolvedConnector) => number = () => 0,
): ResolvedConnector[] {
  return build.connectors
    .filter((to) => to !== from && from.type.matesWith.includes(to.type.id) && isFree(to) && canJoin(from, to).ok)
    .map((to) => ({ to, far: distance(to) }))
    .sort((a, b) => a.far - b.far || a.to.index - b.to.index)
    .map(({ to }) => to)
}
