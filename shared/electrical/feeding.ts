import type { ResolvedBuild, ResolvedConnector, ResolvedJoint, ResolvedPart } from '../build/resolve.ts'
import { lines, rails, type Line, type Rail } from '../quantity/rails.ts'
import { lineIndex } from './lines.ts'
import type { PowerResult } from './result.ts'

/** The other end of each joint of a connector that carries power. */
export const powerNeighbours = (connector: ResolvedConnector): ResolvedConnector[] =>
  connector.joints.filter(({ mating }) => mating.power).map((joint) => otherEnd(joint, connector))

export const otherEnd = ({ a, b }: ResolvedJoint, connector: ResolvedConnector): ResolvedConnector =>
  a === connector ? b : a

/** The return of some supply reaches this connector. */
export const returnReaches = ({ network }: PowerResult, { index }: ResolvedConnector): boolean =>
  network.byLine[lineIndex.return]!.plan.reached[index] === 1

/** Rails that a part takes current from at some time. */
export const railsNeeded = ({ model }: ResolvedPart): Rail[] => rails.filter((rail) => model.load?.[rail] !== undefined)

/** The part takes power: it is not a supply and has a load. */
export const isConsumer = (part: ResolvedPart): boolean => !part.model.supply && railsNeeded(part).length > 0

/** A power inlet of the part's own: a joint may bring a rail here, and no bay, slot or outlet hangs on it. */
export function backplaneInlets(part: ResolvedPart): ResolvedConnector[] {
  return part.connectors.filter(
    ({ connector, contacts }) => connector.bay === undefined && rails.some((rail) => contacts[rail] > 0),
  )
}

/** The connector that feeds this one, where the current has only one way. */
export function fedFrom(power: PowerResult, connector: ResolvedConnector, line: Line): ResolvedConnector | null {
  const { plan, towardsSource } = power.network.byLine[lines.indexOf(line)]!
  const branch = towardsSource[connector.index]!
  if (branch < 0) return null
  const above = plan.from[branch] === connector.index ? plan.to[branch]! : plan.from[branch]!
  return power.network.build.connectors[above] ?? null
}

/** Parts between a connector and its supply, the nearest first, on the first rail that arrives in only one way. */
export function partsAbove(power: PowerResult, connector: ResolvedConnector): ResolvedPart[] {
  const parts: ResolvedPart[] = []
  const rail = rails.find((line) => fedFrom(power, connector, line) !== null)
  if (!rail) return parts
  for (let at = fedFrom(power, connector, rail); at; at = fedFrom(power, at, rail))
    if (at.part !== connector.part && parts.at(-1) !== at.part) parts.push(at.part)
  return parts
}

/** Current comes in here from another part. */
export const isFedFromOutside = (power: PowerResult, connector: ResolvedConnector): boolean =>
  rails.some((rail) => {
    const above = fedFrom(power, connector, rail)
    return above !== null && above.part !== connector.part
  })

/** The supplies that a rail at a connector comes from in the end, through converters where there are some. */
export function suppliesBehind(power: PowerResult, connector: ResolvedConnector, rail: Rail): Set<ResolvedPart> {
  const found = new Set<ResolvedPart>()
  for (const { part, takes } of power.network.byLine[lineIndex[rail]]!.sourcesOf(connector.index))
    if (!takes) found.add(part)
    else for (const supply of suppliesBehind(power, takes.connector, takes.rail)) found.add(supply)
  return found
}

/** Supplies of a build. */
export const suppliesOf = (build: ResolvedBuild): ResolvedPart[] => build.parts.filter(({ model }) => model.supply)
