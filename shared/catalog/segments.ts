import type { Quantity } from '../quantity/quantity.ts'
import type { Conductor, Model } from './model.ts'

/** All conductors between one pair of connectors: one piece of cable as the hand holds it. */
export interface Segment {
  from: string
  to: string
  conductors: Conductor[]
  /** Where its conductors stand in the model's wiring. */
  indexes: number[]
  /** Where all its wires share it. */
  awg: number | undefined
  length_mm: Quantity
}

/** The pieces of cable of a model that are made of wire, in the order of its wiring. */
export function wireSegments(model: Model): Segment[] {
  const byPair = new Map<string, Segment>()
  model.wiring.forEach((conductor, i) => {
    const { from, to, awg, length_mm } = conductor
    if (!length_mm) return
    const piece = byPair.get(`${from} ${to}`)
    if (!piece) byPair.set(`${from} ${to}`, { from, to, conductors: [conductor], indexes: [i], awg, length_mm })
    else {
      piece.conductors.push(conductor)
      piece.indexes.push(i)
      if (piece.awg !== awg) piece.awg = undefined
    }
  })
  return [...byPair.values()]
}

/** The model with another gauge on one piece of cable. */
export function withGauge(model: Model, piece: { from: string; to: string }, awg: number): Model {
  const wiring = model.wiring.map((conductor) => {
    if (conductor.from !== piece.from || conductor.to !== piece.to || !conductor.length_mm) return conductor
    const { area_mm2: _before, ...rest } = conductor
    return { ...rest, awg }
  })
  return { ...model, wiring }
}
