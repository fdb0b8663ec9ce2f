import type { ResolvedBuild, ResolvedPart } from '../build/resolve.ts'
import { fairShare } from './fairShare.ts'
import { payload_MBps, pciePayload_MBps } from './lineRate.ts'
import type { DataResult, LanePath, SharedLink } from './result.ts'
import { outerRate_MBps, planScan } from './scanTime.ts'
import { sharedLinks } from './sharedLinks.ts'
import { trace } from './trace.ts'

/** Everything about data: lanes followed, links shared, rates, and how long a scan takes. Never throws. */
export function analyseData(build: ResolvedBuild): DataResult {
  const { controllers, paths, reversals, hops, loops } = trace(build)
  const byDrive = new Map<ResolvedPart, LanePath[]>()
  for (const path of paths) {
    const others = byDrive.get(path.drive)
    if (others) others.push(path)
    else byDrive.set(path.drive, [path])
  }
  const inUse = pathsInUse(byDrive)
  const shared = sharedLinks(controllers, inUse)
  const { scan, hoursWithOnly } = planScan(inUse, shared, ownLink_MBps)
  return {
    controllers,
    paths,
    pathsOf: (drive) => byDrive.get(drive) ?? [],
    reversals,
    hops,
    loops,
    shared,
    share_MBps: shares(inUse, shared),
    scan,
    hoursWithOnly,
  }
}

/** The first working path of each drive: several ways to one drive are not taken to add up. */
function pathsInUse(byDrive: ReadonlyMap<ResolvedPart, readonly LanePath[]>): LanePath[] {
  return [...byDrive.values()].flatMap((paths) => paths.find((path) => path.fault === null) ?? [])
}

/** Payload of the last hop, which a drive has for itself. */
function ownLink_MBps(path: LanePath): number | null {
  const hop = path.hops.at(-1)
  const { pcie, protocol } = path.drive.model.drive ?? {}
  if (protocol === 'nvme') {
    const uplink = path.controller.controller.uplink
    if (!pcie) return null
    const lanes = Math.min(pcie.lanes, hop?.lanes.length ?? pcie.lanes)
    return pciePayload_MBps(lanes, Math.min(pcie.generation, uplink?.generation ?? pcie.generation))
  }
  const rate_Gbps = hop?.lanes[0]?.rate_Gbps ?? null
  return rate_Gbps === null ? null : payload_MBps(rate_Gbps)
}

/** What each drive gets while all of them read at their outer tracks. */
function shares(inUse: readonly LanePath[], shared: readonly SharedLink[]): ReadonlyMap<number, number> {
  const place = new Map(inUse.map((path, i) => [path.drive, i]))
  const demands = inUse.map((path) => {
    const outer_MBps = path.drive.model.drive ? outerRate_MBps(path.drive.model.drive) : null
    return Math.min(outer_MBps ?? Infinity, ownLink_MBps(path) ?? Infinity)
  })
  const uses = shared.map((link) => ({
    capacity: link.capacity_MBps,
    users: link.drives.flatMap((drive) => place.get(drive) ?? []),
  }))
  const share = fairShare(demands, uses)
  return new Map(
    inUse.flatMap((path, i) => {
      const value = share[i]
      return value !== undefined && Number.isFinite(value) ? [[path.drive.index, value] as const] : []
    }),
  )
}
