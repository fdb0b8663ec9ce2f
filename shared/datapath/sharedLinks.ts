import type { ResolvedConnector, ResolvedPart } from '../build/resolve.ts'
import { payload_MBps, pciePayload_MBps } from './lineRate.ts'
import type { Hop, LanePath, ResolvedController, SharedLink } from './result.ts'

/** Every wide port to an expander and every controller's way to the processor, with the drives that cross it. */
export function sharedLinks(controllers: readonly ResolvedController[], inUse: readonly LanePath[]): SharedLink[] {
  return [...uplinks(inUse), ...slots(controllers, inUse)]
}

function uplinks(inUse: readonly LanePath[]): SharedLink[] {
  const drivesOf = new Map<Hop, ResolvedPart[]>()
  for (const path of inUse)
    for (const hop of path.hops.slice(0, -1)) {
      const drives = drivesOf.get(hop)
      if (drives) drives.push(path.drive)
      else drivesOf.set(hop, [path.drive])
    }
  return [...drivesOf].flatMap(([hop, drives]) => {
    const capacity_MBps = hop.lanes.reduce((sum, lane) => sum + (lane.rate_Gbps ? payload_MBps(lane.rate_Gbps) : 0), 0)
    return capacity_MBps > 0
      ? [{ kind: 'uplink' as const, part: hop.to, capacity_MBps, lanes: hop.lanes.length, drives }]
      : []
  })
}

/** Controllers behind one card edge share the slot; a controller wired on a board has its way for itself. */
function slots(controllers: readonly ResolvedController[], inUse: readonly LanePath[]): SharedLink[] {
  const drivesOf = new Map<ResolvedController, ResolvedPart[]>(controllers.map((controller) => [controller, []]))
  for (const path of inUse) drivesOf.get(path.controller)?.push(path.drive)

  const links = new Map<string, SharedLink & { drives: ResolvedPart[] }>()
  for (const controller of controllers) {
    const { uplink } = controller.controller
    if (!uplink) continue
    const { part } = controller
    const edge = uplink.connector === undefined ? undefined : part.connectorById.get(uplink.connector)
    const key = edge ? `${edge.index}` : `${part.index}.${controller.controller.id}`
    const drives = drivesOf.get(controller) ?? []
    const known = links.get(key)
    if (known) known.drives.push(...drives)
    else links.set(key, { ...slotLink(part, uplink, edge && slotOf(edge)), drives: [...drives] })
  }
  return [...links.values()]
}

function slotOf(edge: ResolvedConnector): ResolvedConnector | undefined {
  for (const joint of edge.joints) {
    const other = joint.a === edge ? joint.b : joint.a
    if (joint.mating.mates && other.connector.slot) return other
  }
  return undefined
}

/** A card runs at the fewer lanes and the older generation of card and slot. */
function slotLink(
  part: ResolvedPart,
  uplink: { lanes: number; generation: number },
  slot: ResolvedConnector | undefined,
): Omit<SharedLink, 'drives'> {
  const wired = slot?.connector.slot
  const lanes = Math.min(uplink.lanes, wired?.lanes ?? uplink.lanes)
  const generation = Math.min(uplink.generation, wired?.generation ?? uplink.generation)
  return {
    kind: 'slot',
    part,
    ...(slot ? { slot } : {}),
    capacity_MBps: pciePayload_MBps(lanes, generation),
    wanted_MBps: pciePayload_MBps(uplink.lanes, uplink.generation),
    lanes,
    generation,
  }
}
