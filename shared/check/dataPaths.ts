import type { DataResult, LanePath, LinkFault, ScanResult } from '../datapath/result.ts'
import type { DataPath, ScanTime } from './result.ts'
import { bottleneckWords } from './dataWords.ts'

/** Data paths as the answer of the checker carries them. */
export function toDataPaths(data: DataResult): DataPath[] {
  const used = new Set<LanePath['drive']>()
  return data.paths.map((path) => {
    const works = path.fault === null
    const inUse = works && !used.has(path.drive)
    if (inUse) used.add(path.drive)
    return {
      drive: path.drive.part.id,
      driveConnector: path.driveConnector.connector.id,
      drivePort: path.drivePort,
      controllerPart: path.controller.part.part.id,
      controller: path.controller.controller.id,
      port: path.port.connector.id,
      lane: path.lane,
      joints: path.joints.map((joint) => joint.joint.id),
      expanders: path.expanders.map((expander) => expander.part.id),
      rate_Gbps: path.rate_Gbps,
      ...(path.limitedBy ? { limitedBy: path.limitedBy.part.id } : {}),
      share_MBps: inUse ? (data.share_MBps.get(path.drive.index) ?? null) : null,
      works,
      ...(path.fault ? { reason: faultWords(path.fault) } : {}),
    }
  })
}

export function toScanTime(scan: ScanResult): ScanTime {
  return {
    hours: scan.hours,
    drivesAlone_hours: scan.drivesAlone_hours,
    ...(scan.bottleneck ? { bottleneck: bottleneckWords(scan.bottleneck) } : {}),
    about: scan.about,
  }
}

function faultWords(fault: LinkFault): string {
  return fault.kind === 'reversed'
    ? `${fault.cable.part.ref} is wired for the other direction: the link stays dark`
    : `${fault.part.part.ref} does not speak ${fault.needs.toUpperCase()}`
}
