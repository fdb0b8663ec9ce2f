import type { ResolvedConnector, ResolvedJoint, ResolvedPart } from '../build/resolve.ts'
import type { Conductor, SupplyGroup, SupplyRail } from '../catalog/model.ts'
import type { Figure, MomentId } from '../check/result.ts'
import type { Line, Rail } from '../quantity/rails.ts'

/** One value a moment, in the order of `momentIds`. Moments that do not apply hold NaN-free zeros and are not judged. */
export type PerMoment = Float64Array

/** The contacts of one joint that carry one line. */
export interface ContactLoad {
  joint: ResolvedJoint
  line: Line
  /** Contacts that meet: the fewer of both sides. */
  contacts: number
  /** Signed from end a to end b. */
  current_A: PerMoment
  /** Sustained limit of all contacts together; null where the rating is unknown. */
  limit_A: number | null
  /** Side whose rating is lower. */
  weaker: ResolvedConnector
  rating: Figure | null
  drop_V: PerMoment
  about: boolean
}

/** One conductor of one part. `index` is its place in the model's `wiring`. */
export interface ConductorLoad {
  part: ResolvedPart
  conductor: Conductor
  index: number
  /** Signed along the conductor's `from` to `to`. */
  current_A: PerMoment
  resistance_ohm: number
  /** What the whole conductor may carry; null where unknown or a board plane without a figure. */
  limit_A: number | null
  ampacity: Figure | null
  about: boolean
}

export interface SupplyRailLoad {
  part: ResolvedPart
  rail: SupplyRail
  current_A: PerMoment
  about: boolean
}

export interface SupplyGroupLoad {
  part: ResolvedPart
  group: SupplyGroup
  load: PerMoment
  unit: 'W' | 'A'
  about: boolean
}

export interface SupplyTotalLoad {
  part: ResolvedPart
  load_W: PerMoment
  about: boolean
}

/** One rail of one consuming connector. */
export interface DeviceLoad {
  part: ResolvedPart
  connector: ResolvedConnector
  rail: Rail
  current_A: PerMoment
  /** Supply rails that reach it; empty: the rail does not arrive. */
  fedBy: readonly { part: ResolvedPart; rail: SupplyRail }[]
  /** Meaningless (zero) where `fedBy` is empty. */
  voltage_V: PerMoment
  drop_V: { wire: PerMoment; contact: PerMoment; return: PerMoment }
  /** Figures that its current at each moment was taken from. */
  figures: Partial<Record<MomentId, Figure>>
  about: boolean
}

/** What the network cannot be, in data: judged by rules. */
export type NetworkProblem =
  | {
      kind: 'sources-joined'
      line: Rail
      sources: readonly { part: ResolvedPart; rail: SupplyRail }[]
      parts: readonly ResolvedPart[]
    }
  | { kind: 'no-return'; part: ResolvedPart; connector: ResolvedConnector; line: Rail }
  | { kind: 'indeterminate-loop'; line: Line; parts: readonly ResolvedPart[] }

/** A step of the staged start. */
export interface StageStep {
  from_s: number
  starting: readonly ResolvedPart[]
  /** Current of each supply rail, in the order of `rails`. */
  rails_A: Float64Array
}

export interface PowerResult {
  /** Moments that this build has. */
  applies: ReadonlySet<MomentId>
  contacts: readonly ContactLoad[]
  conductors: readonly ConductorLoad[]
  rails: readonly SupplyRailLoad[]
  groups: readonly SupplyGroupLoad[]
  totals: readonly SupplyTotalLoad[]
  devices: readonly DeviceLoad[]
  problems: readonly NetworkProblem[]
  timeline: readonly StageStep[]
  /** For each connector index and rail: the supply rails that reach it, as `connectorIndex` -> rails. */
  reaches(connector: ResolvedConnector, rail: Rail): boolean
}
