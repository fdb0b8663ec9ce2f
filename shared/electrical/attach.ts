import type { ResolvedConnector, ResolvedPart } from '../build/resolve.ts'
import { rails, type Rail } from '../quantity/rails.ts'
import { coursesOf, type Course } from './courses.ts'
import type { CurrentReader, RailCurrents } from './deviceCurrents.ts'
import { lineIndex, returnIndex } from './lines.ts'
import type { LineNetwork, PowerNetwork } from './network.ts'
import type { StartPlan } from './startPlan.ts'

/** Where a device takes current from one rail: all of it, or a share at each of several inlets. */
export interface Draw {
  part: ResolvedPart
  connector: ResolvedConnector
  rail: Rail
  currents: RailCurrents
  /** 0 to 1. */
  share: number
  /** The rail and the return both arrive: current flows. */
  flows: boolean
  /** The rail arrives, the return does not. */
  lacksReturn: boolean
  /** What it does in each moment, in the order of `momentIds`. */
  courses: readonly Course[]
  /** Ampere on the return at this connector for each ampere from the rail; 1 for devices. */
  onReturn: number
}

/**
 * Decides at which connectors every device draws.
 *
 * The model's `loadAt` names the connector. Without it a device draws at the inlets that a source reaches from
 * outside, in proportion to what their contacts may carry; wires or planes inside the model join them.
 */
export function attachLoads(network: PowerNetwork, reader: CurrentReader, plan: StartPlan): Draw[] {
  const draws: Draw[] = []
  for (const part of network.build.parts) {
    if (!part.model.load || part.model.supply || part.connectors.length === 0) continue
    const read = reader.read(part)
    for (const rail of rails) {
      const currents = read.find((entry) => entry.rail === rail)
      if (currents) attach(network, part, currents, coursesOf(part, currents, plan), draws)
    }
  }
  return draws
}

function attach(
  network: PowerNetwork,
  part: ResolvedPart,
  currents: RailCurrents,
  courses: readonly Course[],
  draws: Draw[],
): void {
  const { rail } = currents
  const supplied = network.byLine[lineIndex[rail]]!
  const returned = network.byLine[returnIndex]!
  const places = placesOf(supplied, part, rail)
  const weights = places.map((connector) => connector.contacts[rail] * (connector.type.power?.rating_A.value ?? 1))
  const total = weights.reduce((sum, weight) => sum + weight, 0)
  places.forEach((connector, i) => {
    const arrives = supplied.plan.reached[connector.index] === 1
    const returns = returned.plan.reached[connector.index] === 1
    draws.push({
      part,
      connector,
      rail,
      currents,
      share: total > 0 ? weights[i]! / total : 1 / places.length,
      flows: arrives && returns,
      lacksReturn: arrives && !returns,
      courses,
      onReturn: 1,
    })
  })
}

function placesOf(network: LineNetwork, part: ResolvedPart, rail: Rail): readonly ResolvedConnector[] {
  const named = part.model.loadAt?.[rail]
  const stated = named === undefined ? undefined : part.connectorById.get(named)
  if (stated) return [stated]
  const able = part.connectors.filter((connector) => connector.contacts[rail] > 0)
  if (able.length === 1) return able
  const inlets = able.filter((connector) => isInlet(network, connector))
  if (inlets.length > 0) return inlets
  return [able[0] ?? part.connectors[0]!]
}

/** Current arrives here through a joint, not through the part's own wires. */
export function isInlet(
  { plan, branches, towardsSource, inLoops }: LineNetwork,
  connector: ResolvedConnector,
): boolean {
  const node = connector.index
  if (plan.reached[node] === 0) return false
  const branch = towardsSource[node]!
  if (branch >= 0) return branches[branch]!.kind === 'contact'
  return inLoops.get(node)?.some((inLoop) => branches[inLoop]!.kind === 'contact') ?? false
}
