import type { ResolvedConnector, ResolvedJoint, ResolvedPart } from '../build/resolve.ts'
import type { Conductor, SupplyGroup, SupplyRail } from '../catalog/model.ts'
import type { Figure, MomentId } from '../check/result.ts'
import type { Line, Rail } from '../quantity/rails.ts'
import type { Draw } from './attach.ts'
import type { PowerNetwork } from './network.ts'
import type { StartPlan } from './startPlan.ts'
import type { AllowedBand } from './tolerance.ts'

/** One value a moment, in the order of `momentIds`. Moments that do not apply are computed too, and not judged. */
export type PerMoment = readonly number[]

/** What a load or limit may be when every figure behind it lies at its low or its high end. */
export interface LoadRange {
  low: PerMoment
  high: PerMoment
}

/** The contacts of one joint that carry one line. */
export interface ContactLoad {
  /** Branch of the line's network. */
  branch: number
  joint: ResolvedJoint
  line: Line
  /** Contacts that meet: the fewer of both sides. */
  contacts: number
  /** Signed from end a to end b. */
  current_A: PerMoment
  /** Magnitudes. */
  range_A: LoadRange
  /** Never less than any moment at the high end: a quick look before the range is asked for. */
  most_A: number
  /** With contacts as new. */
  resistance_ohm: number
  /** Sustained limit of all contacts together; null where the rating is unknown. */
  limit_A: number | null
  /** The same at the low end of the rating. */
  limitLow_A: number | null
  /** Side whose rating is lower; where both are alike, the side that is fed. */
  weaker: ResolvedConnector
  rating: Figure | null
  about: boolean
}

/** One conductor of one part. `index` is its place in the model's `wiring`. */
export interface ConductorLoad {
  /** Branch of the line's network. */
  branch: number
  part: ResolvedPart
  conductor: Conductor
  index: number
  /** Signed along the conductor's `from` to `to`. */
  current_A: PerMoment
  range_A: LoadRange
  most_A: number
  /** As it counts in the sums: zero where the supply's tolerance holds at the end of its own leads. */
  resistance_ohm: number
  /** What the whole conductor may carry; null where unknown or a board plane without a figure. */
  limit_A: number | null
  limitLow_A: number | null
  ampacity: Figure | null
  about: boolean
}

export interface SupplyRailLoad {
  part: ResolvedPart
  rail: SupplyRail
  current_A: PerMoment
  range_A: LoadRange
  about: boolean
}

export interface SupplyGroupLoad {
  part: ResolvedPart
  group: SupplyGroup
  load: PerMoment
  range: LoadRange
  unit: 'W' | 'A'
  about: boolean
}

export interface SupplyTotalLoad {
  part: ResolvedPart
  load_W: PerMoment
  range_W: LoadRange
  about: boolean
}

/** One rail of one consuming connector. */
export interface DeviceLoad {
  part: ResolvedPart
  connector: ResolvedConnector
  rail: Rail
  current_A: PerMoment
  /** What it accepts. */
  allowed: AllowedBand
  /** Supply rails that reach it; empty: the rail does not arrive. */
  fedBy: readonly { part: ResolvedPart; rail: SupplyRail }[]
  /** Share of the part's current on this rail that it takes at this connector, 0 to 1. */
  share: number
  /** Lowest of the moment, contacts as new. Meaningless (zero) where `fedBy` is empty. */
  voltage_V: PerMoment
  /** The same with every contact at the end of its life. */
  aged_V: PerMoment
  /** The same with contacts as new and every load at its high end. */
  atHigh_V: PerMoment
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
  /** For each line, in the order of `lines`, the load of each branch of its network; null for feeds without a wire. */
  byBranch: readonly (readonly (ContactLoad | ConductorLoad | null)[])[]
  startPlan: StartPlan
  network: PowerNetwork
  /** Every place where a device takes current, whether or not it flows. In the order of `devices`. */
  draws: readonly Draw[]
  /**
   * The draws whose current a branch of a line carries; for a branch of a loop, all that hang on the loop. What a
   * converter takes for a device behind it stands there as a draw of that device at the converter's input.
   */
  behind(line: Line, branch: number): readonly Draw[]
  /** A supply rail reaches this connector. */
  reaches(connector: ResolvedConnector, rail: Rail): boolean
}
