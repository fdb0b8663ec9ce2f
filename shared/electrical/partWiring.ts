import type { ResolvedPart } from '../build/resolve.ts'
import type { Settings } from '../build/document.ts'
import { supplyInside, type Conductor, type Model } from '../catalog/model.ts'
import { readConductor, type ConductorFigures } from './conductors.ts'
import { lineIndex } from './lines.ts'
import type { FeedWire } from './network.ts'

/** One conductor between two connectors of a part, counted from the part's first. */
export interface PartWire {
  line: number
  from: number
  to: number
  ohm: number
  conductor: Conductor
  index: number
  figures: ConductorFigures
}

/** The wires of a part, ready to be laid into a network. */
export interface PartWiring {
  between: readonly PartWire[]
  /** First stretches of captive leads, by "line|connector". */
  fromInside: ReadonlyMap<string, FeedWire[]>
}

interface Kept {
  settings: string
  wiring: PartWiring
}

/** Models do not change, so what was read of one is kept for the next check. */
const kept = new WeakMap<Model, Kept>()

/** Reads the wires of a part's model once, under the settings that decide resistance and ampacity. */
export function readPartWiring(part: ResolvedPart, settings: Settings): PartWiring {
  const { model } = part
  const key = `${settings.wireTemperature_C} ${settings.bundleFactor}`
  const known = kept.get(model)
  if (known?.settings === key) return known.wiring
  const wiring = read(part, settings)
  // A model with a connector that the catalog does not know counts its connectors otherwise.
  if (part.connectors.length === model.connectors.length) kept.set(model, { settings: key, wiring })
  return wiring
}

function read({ model, connectorById, connectors }: ResolvedPart, settings: Settings): PartWiring {
  const first = connectors[0]?.index ?? 0
  const atLeadEnd = model.supply?.toleranceAt === 'lead-end'
  const between: PartWire[] = []
  const fromInside = new Map<string, FeedWire[]>()
  model.wiring.forEach((conductor, index) => {
    const from = connectorById.get(conductor.from)
    const to = connectorById.get(conductor.to)
    const isFirst = model.supply !== undefined && conductor.from === supplyInside
    if (!to || !(from || isFirst)) return
    const figures = readConductor(conductor, settings)
    if (!from) {
      const end = `${conductor.line}|${conductor.to}`
      fromInside.set(end, [...(fromInside.get(end) ?? []), { conductor, index, figures }])
      return
    }
    between.push({
      line: lineIndex[conductor.line],
      from: from.index - first,
      to: to.index - first,
      ohm: atLeadEnd ? 0 : figures.resistance_ohm,
      conductor,
      index,
      figures,
    })
  })
  return { between, fromInside }
}
