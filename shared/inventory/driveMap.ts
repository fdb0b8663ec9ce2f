import { baysOf } from '../build/edits/bays.ts'
import type { Role } from '../build/document.ts'
import type { ResolvedBuild, ResolvedPart } from '../build/resolve.ts'
import type { CheckResult, DataPath } from '../check/result.ts'
import type { Protocol } from '../catalog/model.ts'
import { dataPathWords } from '../paper/dataWays.ts'
import { powerWays, powerWords } from '../paper/powerWays.ts'

/** One drive of a build with everything by which it is found. */
export interface DriveLine {
  id: string
  part: ResolvedPart
  ref: string
  /** Case designation where there are several cases; bay number; null: in no bay. */
  case: string | null
  bay: number | null
  serial: string
  wwn: string
  makerModel: string
  model: string
  capacity_TB: number | null
  protocol: Protocol | null
  role: Role | null
  /** Controller port and lane, and everything passed; empty: not reached, or not yet checked. */
  data: string
  power: string
  /** Phy of its controller, counted over the ports in their order; null where an expander stands between, or no path works. */
  phy: number | null
  /** The controller that the phy belongs to. */
  host: string | null
  /** Phy of the backplane's own expander: taken for the bays in their order, common practice. */
  expanderPhy: number | null
  sectors: string
  /** The rate that the link can run at by its parts, Gb/s. */
  rate_Gbps: number | null
  note: string
}

/** Every drive of a build: by case and bay, then those in no bay. */
export function driveMap(build: ResolvedBuild, result: CheckResult | null): DriveLine[] {
  const cases = build.parts.filter(({ model }) => model.kind === 'case')
  const placed = baysOf(build).flatMap(({ drives }) => drives)
  const rank = new Map(placed.map((drive, i) => [drive, i]))
  return build.parts
    .filter(({ model }) => model.kind === 'drive')
    .sort((a, b) => (rank.get(a) ?? placed.length) - (rank.get(b) ?? placed.length))
    .map((part) => lineOf(build, result, part, cases.length > 1))
}

function lineOf(build: ResolvedBuild, result: CheckResult | null, part: ResolvedPart, several: boolean): DriveLine {
  const { id, ref, bay, serial, wwn, makerModel, role, note } = part.part
  const { drive } = part.model
  const path = result?.dataPaths.find((one) => one.drive === id && one.works)
  return {
    id,
    part,
    ref,
    case: several && bay ? (build.partById.get(bay.case)?.part.ref ?? null) : null,
    bay: bay?.slot ?? null,
    serial: serial ?? '',
    wwn: wwn ?? '',
    makerModel: makerModel ?? '',
    model: part.model.name,
    capacity_TB: drive?.capacity_TB.value ?? null,
    protocol: drive?.protocol ?? null,
    role: role ?? null,
    data: result ? dataPathWords(build, result.dataPaths, part) : '',
    power: powerWords(powerWays(part)),
    phy: path ? phyOf(build, path) : null,
    host: path ? `${path.controllerPart}/${path.controller}` : null,
    expanderPhy: expanderPhyOf(part),
    sectors: drive?.sectors ? `${drive.sectors.logical_B}/${drive.sectors.physical_B}` : '',
    rate_Gbps: path?.rate_Gbps ?? null,
    note: note ?? '',
  }
}

/** Lanes of the ports before it, and its lane. That phys follow the ports in this order is common practice, not certain. */
export function phyOf(build: ResolvedBuild, path: DataPath): number | null {
  if (path.expanders.length > 0) return null
  const host = build.partById.get(path.controllerPart)
  const controller = host?.model.controllers.find(({ id }) => id === path.controller)
  if (!host || !controller) return null
  let before = 0
  for (const port of controller.ports) {
    if (port === path.port) return before + path.lane
    before += host.connectorById.get(port)?.type.data?.lanes ?? 0
  }
  return null
}

function expanderPhyOf(part: ResolvedPart): number | null {
  for (const plug of part.connectors)
    for (const joint of plug.joints) {
      const { connector, part: holder } = joint.a === plug ? joint.b : joint.a
      if (holder.model.expander && connector.bay !== undefined) return connector.bay - 1
    }
  return null
}
