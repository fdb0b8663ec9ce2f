import type { ResolvedConnector, ResolvedJoint, ResolvedPart } from '../build/resolve.ts'

export type Carries = 'power' | 'data' | 'both'

/** Slots and card edges bring power to a card too, but a builder reads them as the way to the processor: data. */
export const isSlot = (connector: ResolvedConnector): boolean =>
  connector.type.side === 'slot' || connector.type.side === 'edge'

/** What a connector of this very part carries, as the drawing tells it. */
export function carriesOf(connector: ResolvedConnector): Carries {
  if (isSlot(connector)) return 'data'
  const { contacts } = connector
  const power = contacts['12V'] + contacts['5V'] + contacts['3.3V'] > 0
  const data = connector.type.data !== undefined
  if (power && data) return 'both'
  return data ? 'data' : 'power'
}

export const carriesPower = (connector: ResolvedConnector): boolean => carriesOf(connector) !== 'data'
export const carriesData = (connector: ResolvedConnector): boolean => carriesOf(connector) !== 'power'

/** What crosses a joint, as drawn. Joints that do not mate are drawn by what both connectors could carry. */
export function jointCarries(joint: ResolvedJoint): Carries {
  const { a, b, mating } = joint
  if (isSlot(a) || isSlot(b)) return 'data'
  const power = mating.mates ? mating.power : carriesPower(a) && carriesPower(b)
  const data = mating.mates ? mating.lanes > 0 : carriesData(a) && carriesData(b)
  if (power && data) return 'both'
  if (data) return 'data'
  return power || carriesPower(a) ? 'power' : 'data'
}

/** Part of the picture that a part lives in. */
export type Region = 'strip' | 'power' | 'data'

const dataKinds = new Set(['breakout', 'cable', 'controller', 'expander', 'board'])

export function regionOf(part: ResolvedPart): Region {
  const { kind } = part.model
  if (kind === 'case' || kind === 'drive' || kind === 'backplane') return 'strip'
  return dataKinds.has(kind) || part.connectors.some(carriesData) ? 'data' : 'power'
}

/** The parts whose power connectors all take power, unless their wiring says otherwise. */
const takers = new Set(['fan', 'load', 'drive', 'controller', 'expander'])

/**
 * Ids of connectors that a part feeds: everything from a supply, and whatever the wiring of a lead leads to. Boards
 * and backplanes tie several inlets together inside, so there it is fan headers and bays that are fed.
 */
export function outletsOf(part: ResolvedPart): ReadonlySet<string> {
  const { model } = part
  const power = part.connectors.filter(carriesPower)
  const ids = (connectors: readonly ResolvedConnector[]) => new Set(connectors.map(({ connector }) => connector.id))
  if (model.kind === 'supply') return ids(power)
  const made = new Set(model.converters.flatMap(({ feeds }) => feeds))
  if (model.kind === 'board')
    return ids(power.filter(({ connector }) => /^(fan|out)/.test(connector.id) || made.has(connector.id)))
  if (model.kind === 'backplane') return ids(power.filter(({ connector }) => connector.bay !== undefined))
  const fed = model.wiring.filter((conductor) => conductor.line !== 'return').map((conductor) => conductor.to)
  if (fed.length > 0) return new Set(fed)
  return takers.has(model.kind) ? new Set() : ids(power.slice(1))
}
