import type { Model } from '../catalog/model.ts'

/**
 * How far a cable reaches from its first connector to another: along its wires by the shortest way, or its stated
 * length where it has no wires. Null where a length is not known.
 */
export function reachOf(model: Model, connectorId: string): number | null {
  const start = model.connectors[0]?.id
  if (start === undefined || start === connectorId) return null
  const reached = new Map([[start, 0]])
  const open = [start]
  for (const at of open) {
    const soFar = reached.get(at)!
    for (const { from, to, length_mm } of model.wiring) {
      if (from !== at && to !== at) continue
      const step = length_mm?.value ?? length_mm?.low
      const next = from === at ? to : from
      if (step === undefined || soFar + step >= (reached.get(next) ?? Infinity)) continue
      reached.set(next, soFar + step)
      open.push(next)
    }
  }
  return reached.get(connectorId) ?? model.cable?.length_mm.value ?? model.cable?.length_mm.low ?? null
}
