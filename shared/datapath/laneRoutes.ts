import type { Model } from '../catalog/model.ts'

export interface LaneEnd {
  connector: string
  lane: number
}

/** For each connector of a model, by lane: where that lane goes on inside the part. */
type RoutesOfModel = ReadonlyMap<string, readonly (readonly LaneEnd[] | undefined)[]>

const cache = new WeakMap<Model, RoutesOfModel>()

/** Routes of a model, both ways, worked out once for each model. */
export function laneRoutes(model: Model): RoutesOfModel {
  const known = cache.get(model)
  if (known) return known
  const routes = new Map<string, LaneEnd[][]>()
  const add = (from: string, fromLane: number, to: string, toLane: number) => {
    const lanes = routes.get(from) ?? []
    routes.set(from, lanes)
    ;(lanes[fromLane] ??= []).push({ connector: to, lane: toLane })
  }
  for (const { from, fromLane, to, toLane, count } of model.lanes)
    for (let i = 0; i < count; i++) {
      add(from, fromLane + i, to, toLane + i)
      add(to, toLane + i, from, fromLane + i)
    }
  cache.set(model, routes)
  return routes
}

/** Lanes of a connector that the part wires to anywhere. */
export function wiredLanes(model: Model, connector: string): number {
  let wired = 0
  for (const ends of laneRoutes(model).get(connector) ?? []) if (ends && ends.length > 0) wired++
  return wired
}
