import type { ResolvedConnector, ResolvedJoint, ResolvedPart } from '../build/resolve.ts'
import type { Controller } from '../catalog/model.ts'

/** A host controller of a placed part. */
export interface ResolvedController {
  part: ResolvedPart
  controller: Controller
}

/** Why lanes that are wired do not carry data. */
export type LinkFault =
  /** A forward breakout where a reverse one is needed, or the other way round; names the cable. */
  | { kind: 'reversed'; cable: ResolvedPart }
  /** Names the first part that does not speak the drive's protocol. */
  | { kind: 'protocol'; part: ResolvedPart }

/** One lane followed from a controller's port to a drive's port. */
export interface LanePath {
  controller: ResolvedController
  port: ResolvedConnector
  lane: number
  drive: ResolvedPart
  driveConnector: ResolvedConnector
  /** Port of a dual-ported drive, from 0. */
  drivePort: number
  joints: readonly ResolvedJoint[]
  /** Cables, backplanes, adapters and expanders passed, from the controller on. */
  through: readonly ResolvedPart[]
  expanders: readonly ResolvedPart[]
  /** Lowest line rate of all parts on the way; null where none is known. */
  rate_Gbps: number | null
  limitedBy: ResolvedPart | null
  fault: LinkFault | null
}

/** A link that several drives share: a wide port to an expander, or a card's slot. */
export interface SharedLink {
  kind: 'uplink' | 'slot'
  part: ResolvedPart
  /** Decimal MB/s. */
  capacity_MBps: number
  /** What the card or port could do by itself, where the slot cuts it. */
  wanted_MBps?: number
  lanes: number
  drives: readonly ResolvedPart[]
}

export interface DataResult {
  controllers: readonly ResolvedController[]
  paths: readonly LanePath[]
  /** Working and faulty paths of each drive part index. */
  pathsOf(drive: ResolvedPart): readonly LanePath[]
  shared: readonly SharedLink[]
  /** Max-min fair share while all drives scan, by drive part index; absent where no path works. */
  share_MBps: ReadonlyMap<number, number>
  scan: { hours: number | null; drivesAlone_hours: number | null; bottleneck: SharedLink | null; about: boolean }
}
