import type { ResolvedConnector, ResolvedPart } from '../../build/resolve.ts'
import { connectorSubject, partSubject } from '../../check/subjects.ts'
import { nameOf, placeOf } from '../../check/words.ts'
import { follow } from '../../datapath/follow.ts'
import { activePorts, laneCount, type ActivePort } from '../../datapath/parts.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  drive: ResolvedPart
  /** Where the lane from the drive ends instead. */
  stop:
    | { kind: 'open' }
    | { kind: 'wrong plug' }
    | { kind: 'other lanes'; at: ResolvedConnector }
    | { kind: 'dead end'; at: ResolvedConnector }
    | { kind: 'expander'; part: ResolvedPart }
    | { kind: 'other'; part: ResolvedPart }
}

export const noDataPath = defineRule<Facts>({
  meta: {
    id: 'no-data-path',
    title: 'A drive that no controller reaches',
    severities: ['fault', 'note'],
    finds: 'A drive whose data connector leads to no controller.',
    why: 'Without a data path the system will not see the drive, whatever its power looks like.',
    needs: ['lanes from every controller'],
    sources: ['R2'],
  },
  check({ build, data }) {
    const lost = build.parts.filter((part) => part.model.drive && data.pathsOf(part).length === 0)
    if (lost.length === 0) return []
    const ports = activePorts(build)
    return lost.map((drive) => {
      const stop = whereItStops(drive, ports)
      const onTheShelf = drive.part.role === 'spare' && drive.connectors.every((end) => end.joints.length === 0)
      const at = 'at' in stop ? [connectorSubject(stop.at)] : 'part' in stop ? [partSubject(stop.part)] : []
      return {
        severity: onTheShelf ? 'note' : 'fault',
        subjects: [partSubject(drive), ...at],
        facts: { drive, stop },
      }
    })
  },
  words({ facts: { drive, stop } }) {
    const name = nameOf(drive)
    switch (stop.kind) {
      case 'open':
        return {
          message: `${name} has no data connection yet.`,
          remedy: 'Join its plug to a breakout leg, a data cable or a backplane bay that a controller reaches.',
        }
      case 'wrong plug':
        return {
          message: `${name} has a data connector on its plug that does not mate.`,
          remedy: 'Use a leg, cable or backplane whose receptacle fits this plug.',
        }
      case 'other lanes':
        return {
          message: `${name} goes into ${placeOf(stop.at)}, but its lanes stand on other contacts (${stop.at.type.name}): the link stays dark.`,
          remedy: 'Use a bay wired for this kind of drive, or a drive made for this bay.',
        }
      case 'dead end':
        return {
          message: `The data path of ${name} ends at ${placeOf(stop.at)}: no controller reaches it.`,
          remedy: `Join ${placeOf(stop.at)} to a controller or expander port, or use a lane that is wired through.`,
        }
      case 'expander':
        return {
          message: `${name} reaches the expander ${nameOf(stop.part)}, but no controller reaches that expander.`,
          remedy: `Join a port of ${nameOf(stop.part)} to a SAS controller.`,
        }
      case 'other':
        return {
          message: `The data path of ${name} leads to ${nameOf(stop.part)}, not to a controller.`,
          remedy: 'Bring the other end of the cable to a controller or expander port.',
        }
    }
  },
})

/** Places that a plug goes into although no lane meets there. */
const darkPartners = (plug: ResolvedConnector): ResolvedConnector[] =>
  plug.joints
    .filter(({ mating }) => mating.mates && mating.lanes === 0)
    .map(({ a, b }) => (a === plug ? b : a))
    .filter(({ type }) => type.data !== undefined)

function whereItStops(drive: ResolvedPart, ports: readonly (ActivePort | undefined)[]): Facts['stop'] {
  const plugs = drive.connectors.filter((connector) => laneCount(connector) > 0)
  const plug = plugs.find((connector) => connector.joints.some((joint) => joint.mating.lanes > 0))
  if (!plug) {
    const other = plugs.flatMap(darkPartners)[0]
    if (other) return { kind: 'other lanes', at: other }
    const clash = plugs.some((connector) => connector.joints.some((joint) => !joint.mating.mates))
    return clash ? { kind: 'wrong plug' } : { kind: 'open' }
  }
  const { lanes, deadEnds } = follow(plug, 0, ports)
  const met = lanes[0]?.to
  if (met && ports[met.index]?.kind === 'expander') return { kind: 'expander', part: met.part }
  if (met) return { kind: 'other', part: met.part }
  const at = deadEnds.find((end) => end.part !== drive)
  return at ? { kind: 'dead end', at } : { kind: 'open' }
}
