import type { ResolvedConnector, ResolvedJoint, ResolvedPart } from '../build/resolve.ts'
import type { Controller, Protocol } from '../catalog/model.ts'

/** A host controller of a placed part. */
export interface ResolvedController {
  part: ResolvedPart
  controller: Controller
}

/** Why lanes that are wired do not carry data. */
export type LinkFault =
  /** A forward breakout where a reverse one is needed, or the other way round; names the cable. */
  | { kind: 'reversed'; cable: ResolvedPart }
  /** Names the first part that does not speak the protocol that the path needs there. */
  | { kind: 'protocol'; part: ResolvedPart; needs: Protocol }

/** A cable passed against the way it is wired. */
export interface Reversal {
  cable: ResolvedPart
  /** Connector by which the controller's side came in. */
  enteredAt: ResolvedConnector
}

/** One lane between the phys of two active parts: controller, expander or drive. */
export interface HopLane {
  from: ResolvedConnector
  fromLane: number
  to: ResolvedConnector
  toLane: number
  joints: readonly ResolvedJoint[]
  /** Cables, backplanes and adapters passed, from the controller's side on. */
  through: readonly ResolvedPart[]
  reversed: Reversal | null
  /** Lengths of all cables passed; null where one is not known. */
  length_mm: number | null
  /** Lowest line rate of the cables passed and the parts at both ends; null where none is known. */
  rate_Gbps: number | null
  limitedBy: ResolvedPart | null
}

/** All lanes that run in parallel between two active parts: a wide port where there are several. */
export interface Hop {
  from: ResolvedPart
  to: ResolvedPart
  lanes: readonly HopLane[]
}

/** The way from a controller's port to a drive's port. Through a wide port it stands for all of the port's lanes. */
export interface LanePath {
  controller: ResolvedController
  port: ResolvedConnector
  lane: number
  drive: ResolvedPart
  driveConnector: ResolvedConnector
  /** Port of a dual-ported drive, from 0. */
  drivePort: number
  /** One hop, and one more for each expander passed. */
  hops: readonly Hop[]
  joints: readonly ResolvedJoint[]
  /** Cables, backplanes, adapters and expanders passed, from the controller on. */
  through: readonly ResolvedPart[]
  expanders: readonly ResolvedPart[]
  /** Lowest line rate of all parts on the way; null where none is known. For NVMe: of one PCI Express lane. */
  rate_Gbps: number | null
  limitedBy: ResolvedPart | null
  fault: LinkFault | null
}

/** A link that several drives share: a wide port to an expander, or a controller's way to the processor. */
export interface SharedLink {
  kind: 'uplink' | 'slot'
  /** Part that the link leads to or sits in: the expander, or the controller's card or board. */
  part: ResolvedPart
  /** Where the lanes of a slot come from: the board's connector; absent where the way is wired on the part itself. */
  slot?: ResolvedConnector
  /** Decimal MB/s. */
  capacity_MBps: number
  /** What the card or port could do by itself, where the slot cuts it. */
  wanted_MBps?: number
  lanes: number
  /** PCI Express generation of a slot. */
  generation?: number
  drives: readonly ResolvedPart[]
}

/** What slows a scan most: a shared link, or one drive's own link. */
export type Bottleneck = { kind: 'shared'; link: SharedLink } | { kind: 'own'; path: LanePath }

export interface ScanResult {
  hours: number | null
  drivesAlone_hours: number | null
  bottleneck: Bottleneck | null
  about: boolean
}

/** Expanders joined in a ring, which is an error of the domain. */
export interface ExpanderLoop {
  controller: ResolvedController
  expander: ResolvedPart
}

export interface DataResult {
  controllers: readonly ResolvedController[]
  paths: readonly LanePath[]
  /** Working and faulty paths of a drive. */
  pathsOf(drive: ResolvedPart): readonly LanePath[]
  /** Cables passed the wrong way, whether or not a drive hangs on them. */
  reversals: readonly Reversal[]
  /** Stretches that a controller reaches, each once. */
  hops: readonly Hop[]
  loops: readonly ExpanderLoop[]
  shared: readonly SharedLink[]
  /** Max-min fair share while all drives scan, by drive part index; absent where no path works or nothing limits it. */
  share_MBps: ReadonlyMap<number, number>
  scan: ScanResult
  /** Hours of the scan when only this link stood in the way; null where no scan can be computed. */
  hoursWithOnly(link: SharedLink): number | null
}
