import type { ResolvedPart } from '../build/resolve.ts'
import type { Drive } from '../catalog/model.ts'
import { lockStep, type Pacer } from './lockStep.ts'
import { isShaky, lowFigure, highFigure } from './parts.ts'
import type { Bottleneck, LanePath, ScanResult, SharedLink } from './result.ts'
import { capLine, driveLine } from './trackProfile.ts'

/** Inner track against outer where a model states only the outer one. Common practice: one half to two thirds. */
export const innerShare = 0.5

/** A drive that takes part in the scan, with the figures that set its pace. */
interface Scanning {
  path: LanePath
  drive: ResolvedPart
  capacity_TB: number
  outer_MBps: number | null
  inner_MBps: number | null
  about: boolean
}

/** Drives that an array check reads: all but those kept for cache, boot or as spares. */
export const takesPartInScan = (drive: ResolvedPart): boolean =>
  drive.part.role === undefined || drive.part.role === 'data' || drive.part.role === 'parity'

/** Rate at the outer track; null where the model does not say. */
export const outerRate_MBps = (drive: Drive): number | null => lowFigure(drive.outerRate_MBps)

function scanning(path: LanePath): Scanning | null {
  const figures = path.drive.model.drive
  const capacity_TB = highFigure(figures?.capacity_TB)
  if (!figures || capacity_TB === null || capacity_TB <= 0) return null
  const outer_MBps = outerRate_MBps(figures)
  const turns = figures.rotation_rpm > 0
  const stated = lowFigure(figures.innerRate_MBps)
  const inner_MBps = outer_MBps === null ? null : (stated ?? (turns ? outer_MBps * innerShare : outer_MBps))
  const about =
    isShaky(figures.capacity_TB) || isShaky(figures.outerRate_MBps) || (turns && isShaky(figures.innerRate_MBps))
  return { path, drive: path.drive, capacity_TB, outer_MBps, inner_MBps, about }
}

type Owner = Bottleneck | 'drive'

export interface ScanPlan {
  scan: ScanResult
  hoursWithOnly(link: SharedLink): number | null
}

/** Time for an array to be read once in step, and what slows it. `paths` holds the path in use of each drive. */
export function planScan(
  paths: readonly LanePath[],
  shared: readonly SharedLink[],
  ownLink_MBps: (path: LanePath) => number | null,
): ScanPlan {
  const drives = paths.filter((path) => takesPartInScan(path.drive)).flatMap((path) => scanning(path) ?? [])
  const capacities = new Map(drives.map((drive) => [drive.drive, drive.capacity_TB]))
  const media = mediaPacers(drives)
  const links = new Map(shared.map((link) => [link, linkPacers(link, capacities)]))
  const all = lockStep<Owner>([...media, ...ownPacers(drives, ownLink_MBps), ...[...links.values()].flat()])
  const alone = lockStep<Owner>(media)
  const complete = drives.every((drive) => drive.outer_MBps !== null)
  return {
    scan: {
      hours: all?.hours ?? null,
      drivesAlone_hours: complete ? (alone?.hours ?? null) : null,
      bottleneck: all && alone && all.hours > alone.hours * (1 + 1e-6) ? longestPacer(all.paced) : null,
      about: drives.some((drive) => drive.about),
    },
    hoursWithOnly: (link) => lockStep<Owner>([...media, ...(links.get(link) ?? [])])?.hours ?? null,
  }
}

/** One pacer for each kind of drive: many drives of a build are alike. */
function mediaPacers(drives: readonly Scanning[]): Pacer<Owner>[] {
  const kinds = new Map<string, Pacer<Owner>>()
  for (const { capacity_TB, outer_MBps, inner_MBps } of drives)
    if (outer_MBps !== null && inner_MBps !== null)
      kinds.set(`${capacity_TB}/${outer_MBps}/${inner_MBps}`, {
        ...driveLine(capacity_TB, outer_MBps, inner_MBps),
        owner: 'drive',
      })
  return [...kinds.values()]
}

/** Links of single drives that are slower than the drive's own outer track. */
function ownPacers(drives: readonly Scanning[], ownLink_MBps: (path: LanePath) => number | null): Pacer<Owner>[] {
  const slowest = new Map<string, Pacer<Owner>>()
  for (const { path, capacity_TB, outer_MBps } of drives) {
    const link_MBps = ownLink_MBps(path)
    if (link_MBps === null || (outer_MBps !== null && outer_MBps <= link_MBps)) continue
    const key = `${capacity_TB}/${link_MBps}`
    if (!slowest.has(key)) slowest.set(key, { ...capLine(link_MBps, capacity_TB), owner: { kind: 'own', path } })
  }
  return [...slowest.values()]
}

/** A link divides by the drives still reading: fewer of them past the end of the smaller ones. */
function linkPacers(link: SharedLink, capacities: ReadonlyMap<ResolvedPart, number>): Pacer<Owner>[] {
  const ends = link.drives.flatMap((drive) => capacities.get(drive) ?? []).sort((a, b) => a - b)
  const owner: Bottleneck = { kind: 'shared', link }
  return ends.flatMap((end, i) =>
    end === ends[i - 1] ? [] : [{ ...capLine(link.capacity_MBps / (ends.length - i), end), owner }],
  )
}

function longestPacer(paced: ReadonlyMap<Owner, number>): Bottleneck | null {
  let longest: Bottleneck | null = null
  let most = 0
  for (const [owner, hours] of paced)
    if (owner !== 'drive' && hours > most * (1 + 1e-9)) {
      longest = owner
      most = hours
    }
  return longest
}
