import type { Model } from '../../catalog/model.ts'

/** How long a cable is: as it is sold, else the longest way along its wires; null where nobody knows, or where it is none. */
export function lengthOf_mm(model: Model): number | null {
  if (model.cable) return model.cable.length_mm.value
  if (model.kind !== 'lead' && model.kind !== 'splitter' && model.kind !== 'adapter') return null
  const legs = model.wiring.filter(({ line }) => line !== 'return')
  if (legs.length === 0 || legs.some(({ length_mm }) => length_mm?.value == null)) return null
  const reach = new Map<string, number>()
  // Wires run from the inlet outwards; as many rounds as there are legs settle any chain, and end on a circle too.
  for (let round = 0; round < legs.length; round++) {
    let isSettled = true
    for (const { from, to, length_mm } of legs) {
      const end = (reach.get(from) ?? 0) + (length_mm?.value ?? 0)
      if (end > (reach.get(to) ?? 0)) {
        reach.set(to, end)
        isSettled = false
      }
    }
    if (isSettled) return Math.max(...reach.values(), 0) || null
  }
  return Math.max(...reach.values(), 0) || null
}
