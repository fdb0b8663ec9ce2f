import type { ResolvedBuild } from '../build/resolve.ts'
import type { CheckResult } from '../check/result.ts'
import { contradictionsOf } from './contradictions.ts'
import { driveMap, type DriveLine } from './driveMap.ts'
import { fittingModel, type FittingModel } from './fittingModel.ts'
import type { ObservedDrive } from './observed.ts'
import { serialKey } from './read.ts'

/** By what a drive of the listing was found in the build; `size`: only kind and capacity fit, its bay has to be looked at. */
export type MatchedBy = 'serial' | 'wwn' | 'bay' | 'position' | 'size'

/** One drive of the listing against the build. */
export interface MatchLine {
  observed: ObservedDrive
  /** The part it is taken for; null: it is new to the build. */
  drive: DriveLine | null
  by: MatchedBy | null
  contradictions: string[]
  /** For a drive that is new, or whose part has another size or protocol. */
  model: FittingModel | null
}

/** What a listing comes to, before anything is done. */
export interface MatchPreview {
  lines: MatchLine[]
  /** Drives of the build with a serial that the listing does not show. */
  missing: DriveLine[]
}

/** Capacities within this share of each other are the same class. */
const sameSize = 0.02

/**
 * Finds each drive of a listing in the build: by serial, else world wide name, else the bay it states, else the phy or port it
 * hangs on, else the first drive without a serial of its kind and size. A part is taken once.
 */
export function matchDrives(
  build: ResolvedBuild,
  result: CheckResult | null,
  observed: readonly ObservedDrive[],
): MatchPreview {
  const map = driveMap(build, result)
  const hangsOn = byPosition(map, observed)
  const taken = new Set<DriveLine>()
  const found = new Map<ObservedDrive, { drive: DriveLine; by: MatchedBy }>()
  const ways: readonly [MatchedBy, (drive: ObservedDrive, line: DriveLine) => boolean][] = [
    [
      'serial',
      (drive, line) =>
        drive.serial !== undefined && line.serial !== '' && serialKey(drive.serial) === serialKey(line.serial),
    ],
    ['wwn', (drive, line) => drive.wwn !== undefined && drive.wwn === line.wwn],
    ['bay', (drive, line) => drive.bay !== undefined && drive.bay === line.bay],
    ['position', (drive, line) => hangsOn(drive) === line],
    ['size', (drive, line) => line.serial === '' && isOfSize(drive, line)],
  ]
  for (const [by, fits] of ways)
    for (const drive of observed) {
      if (found.has(drive)) continue
      const line = map.find((one) => !taken.has(one) && fits(drive, one))
      if (!line) continue
      taken.add(line)
      found.set(drive, { drive: line, by })
    }
  const lines = observed.map((drive): MatchLine => {
    const match = found.get(drive)
    const line = match?.drive ?? null
    const needsModel = !line || !isOfSize(drive, line)
    return {
      observed: drive,
      drive: line,
      by: match?.by ?? null,
      contradictions: contradictionsOf(drive, line, match?.by ?? null, map),
      model: needsModel ? fittingModel(build, drive, line?.part.model) : null,
    }
  })
  return { lines, missing: map.filter((line) => line.serial !== '' && !taken.has(line)) }
}

/**
 * The drive of the build at the place that a listing tells, where only one can be meant: with two adapters a phy number alone
 * does not say which, and expanders are told apart by addresses that a build does not know.
 */
function byPosition(map: readonly DriveLine[], observed: readonly ObservedDrive[]) {
  const only = (lines: readonly DriveLine[]) => (lines.length === 1 ? lines[0] : undefined)
  const expanders = new Set(observed.flatMap(({ place }) => (place?.kind === 'phy' ? (place.expander ?? []) : [])))
  return ({ place }: ObservedDrive): DriveLine | undefined => {
    if (place?.kind === 'ata')
      return only(map.filter((line) => line.protocol === 'sata' && line.phy === place.port - 1))
    if (place?.kind !== 'phy') return undefined
    if (place.expander === null) return only(map.filter((line) => line.protocol !== 'nvme' && line.phy === place.phy))
    return expanders.size === 1 ? only(map.filter((line) => line.expanderPhy === place.phy)) : undefined
  }
}

/** Same protocol, same motor or none, same capacity: as far as both are known. */
function isOfSize(drive: ObservedDrive, line: DriveLine): boolean {
  if (drive.protocol !== undefined && line.protocol !== null && drive.protocol !== line.protocol) return false
  const rpm = line.part.model.drive?.rotation_rpm
  if (drive.rotation_rpm !== undefined && rpm !== undefined && (drive.rotation_rpm === 0) !== (rpm === 0)) return false
  if (!drive.capacity_B || line.capacity_TB === null) return true
  const tolerance = drive.isRounded ? 0.06 : sameSize
  return Math.abs(drive.capacity_B / 1e12 - line.capacity_TB) <= tolerance * line.capacity_TB
}
