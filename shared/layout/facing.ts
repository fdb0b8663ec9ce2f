import type { ResolvedBuild, ResolvedConnector, ResolvedJoint, ResolvedPart } from '../build/resolve.ts'
import { carriesData, jointCarries, regionOf } from './carries.ts'

/** Hosts are where data ends: cards and boards with a controller. */
const isHost = (part: ResolvedPart): boolean =>
  part.model.controllers.length > 0 || part.model.kind === 'controller' || part.model.kind === 'board'

export const otherEnd = (joint: ResolvedJoint, connector: ResolvedConnector): ResolvedConnector =>
  joint.a === connector ? joint.b : joint.a

/** Joints to the nearest host, for every part that one can be reached from. */
export function hostDistances(build: ResolvedBuild): Map<ResolvedPart, number> {
  const distances = new Map<ResolvedPart, number>()
  let frontier = build.parts.filter(isHost)
  for (const host of frontier) distances.set(host, 0)
  for (let distance = 1; frontier.length > 0; distance++) {
    const next: ResolvedPart[] = []
    for (const part of frontier)
      for (const connector of part.connectors)
        for (const joint of connector.joints) {
          const neighbour = otherEnd(joint, connector).part
          if (distances.has(neighbour) || jointCarries(joint) === 'power') continue
          distances.set(neighbour, distance)
          if (neighbour.model.kind !== 'drive') next.push(neighbour)
        }
    frontier = next
  }
  return distances
}

export interface Facing {
  /** Connectors that face the strip. */
  left: ResolvedConnector[]
  /** Connectors that face the processor. */
  right: ResolvedConnector[]
}

/**
 * Which edge each data connector of a part stands on: towards drives on the left, towards the host on the right.
 * What a connector is joined to decides; else its part's nature does, so that a lone cable lies as it will be used.
 */
export function facingOf(part: ResolvedPart, distances: ReadonlyMap<ResolvedPart, number>): Facing {
  const connectors = part.connectors.filter(carriesData)
  const sides = connectors.map((connector) => joinedSide(part, connector, distances))
  const isCable = part.model.kind === 'cable' || part.model.kind === 'breakout' || part.model.kind === 'adapter'
  if (isCable) {
    // The ends of a cable face opposite ways: legs together, the multilane or second end on the other side.
    const ends = connectors.map((connector) => isHostEnd(part, connector, connectors))
    const joined = sides.findIndex((side) => side !== undefined)
    const hostEndIsRight = joined < 0 ? true : (sides[joined] === 'right') === ends[joined]
    connectors.forEach((_, i) => (sides[i] ??= ends[i] === hostEndIsRight ? 'right' : 'left'))
  } else connectors.forEach((connector, i) => (sides[i] ??= connector.type.side === 'edge' ? 'right' : 'left'))
  return {
    left: connectors.filter((_, i) => sides[i] === 'left'),
    right: connectors.filter((_, i) => sides[i] === 'right'),
  }
}

function joinedSide(
  part: ResolvedPart,
  connector: ResolvedConnector,
  distances: ReadonlyMap<ResolvedPart, number>,
): 'left' | 'right' | undefined {
  if (connector.type.side === 'edge') return 'right'
  if (isHost(part)) return 'left'
  for (const joint of connector.joints) {
    const neighbour = otherEnd(joint, connector).part
    if (regionOf(neighbour) === 'strip') return 'left'
    const own = distances.get(part)
    const theirs = distances.get(neighbour)
    if (own === undefined || theirs === undefined || own === theirs) continue
    return theirs < own ? 'right' : 'left'
  }
  return undefined
}

/** The end of a cable that goes to the host, as it is sold. */
function isHostEnd(part: ResolvedPart, connector: ResolvedConnector, all: readonly ResolvedConnector[]): boolean {
  const { id } = connector.connector
  const isLeg = id.startsWith('leg') || id.startsWith('out')
  if (part.model.cable?.direction === 'reverse') return isLeg
  if (all.length === 2 && !all.some((one) => one.connector.id.startsWith('leg')))
    return connector === hostEndOfPair(all)
  return !isLeg
}

/** Of two ends, `host` or `in`, else the second. */
const hostEndOfPair = (pair: readonly ResolvedConnector[]): ResolvedConnector | undefined =>
  pair.find(({ connector }) => connector.id === 'host' || connector.id === 'in') ?? pair[1]
