import type { ResolvedBuild, ResolvedConnector, ResolvedPart } from '../build/resolve.ts'
import { compareRefs } from '../build/refOrder.ts'
import type { Controller } from '../catalog/model.ts'
import type { Quantity } from '../quantity/quantity.ts'
import type { ResolvedController } from './result.ts'

/** What sits at the end of a lane: a phy that speaks. Everything else only passes lanes on. */
export type ActivePort = { kind: 'controller'; controller: Controller } | { kind: 'expander' } | { kind: 'drive' }

/** Kinds that only pass lanes on. `rate_Gbps` and length come from their `cable`. */
export function activePorts(build: ResolvedBuild): (ActivePort | undefined)[] {
  const ports = new Array<ActivePort | undefined>(build.connectors.length)
  for (const part of build.parts) {
    const { model } = part
    for (const controller of model.controllers)
      for (const id of controller.ports) setPort(ports, part, id, { kind: 'controller', controller })
    for (const id of model.expander?.ports ?? []) setPort(ports, part, id, { kind: 'expander' })
    if (model.drive) for (const connector of part.connectors) ports[connector.index] = { kind: 'drive' }
  }
  return ports
}

function setPort(ports: (ActivePort | undefined)[], part: ResolvedPart, id: string, port: ActivePort): void {
  const connector = part.connectorById.get(id)
  if (connector) ports[connector.index] ??= port
}

/** Every host controller of the build, by reference designation and then in the model's order. */
export function controllersOf(build: ResolvedBuild): ResolvedController[] {
  return build.parts
    .filter((part) => part.model.controllers.length > 0)
    .sort(byRef)
    .flatMap((part) => part.model.controllers.map((controller) => ({ part, controller })))
}

/** Parts in the natural order of their designations, so that results do not hang on the order of lists. */
export const byRef = (a: ResolvedPart, b: ResolvedPart): number => compareRefs(a.part.ref, b.part.ref)

/** Lanes that a connector has by its type. */
export const laneCount = (connector: ResolvedConnector): number => connector.type.data?.lanes ?? 0

/** The figure to plan with: its value, else the end that is worse for the plan, else nothing. */
export const lowFigure = (quantity: Quantity | undefined): number | null => quantity?.value ?? quantity?.low ?? null
export const highFigure = (quantity: Quantity | undefined): number | null => quantity?.value ?? quantity?.high ?? null

/** True where a figure is unknown or only guessed. */
export const isShaky = (quantity: Quantity | undefined): boolean =>
  quantity === undefined || quantity.value === null || quantity.origin === 'guess'
