import type { Quantity } from '../quantity/quantity.ts'
import type { Conductor, Model } from './model.ts'

/** All conductors between one pair of connectors: one piece of cable as the hand holds it. */
export interface Segment {
  from: string
  to: string
  conductors: Conductor[]
  /** Where all its wires share it. */
  awg: number | undefined
  length_mm: Quantity | undefined
}

/** The pieces of cable of a model that are made of wire, in the order of its wiring. */
export function wireSegments(model: Model): Segment[] {
  const byPair = new Map<string, Conductor[]>()
  for (const conductor of model.wiring) {
    if (!conductor.length_mm) continue
    const pair = `${conductor.from} ${conductor.to}`
    byPair.set(pair, [...(byPair.get(pair) ?? []), conductor])
  }
  return [...byPair.values()].map((conductors) => {
    const { from, to, awg, length_mm } = conductors[0]!
    const alike = conductors.every((conductor) => conductor.awg === awg)
    return { from, to, conductors, awg: alike ? awg : undefined, length_mm }
  })
}

/** The model with another length or gauge on one piece of cable. */
export function withSegment(
  model: Model,
  piece: { from: string; to: string },
  change: { length_mm?: Quantity; awg?: number },
): Model {
  const wiring = model.wiring.map((conductor) => {
    if (conductor.from !== piece.from || conductor.to !== piece.to || !conductor.length_mm) return conductor
    const changed = { ...conductor, ...change }
    if (change.awg !== undefined) delete changed.area_mm2
    return changed
  })
  return { ...model, wiring }
}
