import type { Protocol } from '../catalog/model.ts'
import type { DriveLine } from './driveMap.ts'
import type { MatchedBy } from './match.ts'
import type { ObservedDrive } from './observed.ts'
import { serialKey } from './read.ts'

const protocolWords: Readonly<Record<Protocol, string>> = { sata: 'SATA (ATA)', sas: 'SAS', nvme: 'NVMe' }
const terabytes = (value: number): string => `${Number(value.toPrecision(3))} TB`

/** Where a listing and the build do not agree about one drive, and what in the listing itself is a bad sign. */
export function contradictionsOf(
  observed: ObservedDrive,
  line: DriveLine | null,
  by: MatchedBy | null,
  map: readonly DriveLine[],
): string[] {
  return [...signsOf(observed), ...(line ? disagreements(observed, line, by) : []), ...twiceIn(observed, map)]
}

/** A disk of 0 bytes is what a system shows of sectors that it cannot use (520 or 528 bytes). */
function signsOf({ device, alsoAs, capacity_B, logical_B, rate_Gbps, mostRate_Gbps }: ObservedDrive): string[] {
  const signs: string[] = []
  if (alsoAs)
    signs.push(
      `Seen as ${[device, ...alsoAs].join(' and ')}: one drive by two paths, or two drives that tell one serial.`,
    )
  if (capacity_B === 0)
    signs.push('The system sees 0 bytes: its sectors are of a size that the system does not take (520 or 528 bytes).')
  else if (logical_B !== undefined && logical_B !== 512 && logical_B !== 4096)
    signs.push(`Sectors of ${logical_B} bytes: most systems do not take them until it is formatted anew.`)
  if (rate_Gbps !== undefined && mostRate_Gbps !== undefined && rate_Gbps < mostRate_Gbps)
    signs.push(
      `Linked at ${rate_Gbps} Gb/s, though the drive can do ${mostRate_Gbps} Gb/s: look at cable, backplane and port.`,
    )
  return signs
}

function disagreements(observed: ObservedDrive, line: DriveLine, by: MatchedBy | null): string[] {
  const { ref } = line
  const said: string[] = []
  if (by !== 'serial' && observed.serial !== undefined && line.serial !== '')
    said.push(`${ref} has serial ${line.serial} in the build, ${observed.serial} in the listing.`)
  if (by === 'serial' && observed.wwn !== undefined && line.wwn !== '' && observed.wwn !== line.wwn)
    said.push(`${ref} has WWN ${line.wwn} in the build, ${observed.wwn} in the listing.`)
  if (observed.protocol !== undefined && line.protocol !== null && observed.protocol !== line.protocol)
    said.push(
      `${ref} is ${protocolWords[line.protocol]} in the build; the disk says ${protocolWords[observed.protocol]}.`,
    )
  if (observed.capacity_B && line.capacity_TB !== null) {
    const seen_TB = observed.capacity_B / 1e12
    if (Math.abs(seen_TB - line.capacity_TB) > (observed.isRounded ? 0.06 : 0.02) * line.capacity_TB)
      said.push(`${ref} holds ${terabytes(line.capacity_TB)} in the build, ${terabytes(seen_TB)} in the listing.`)
  }
  if (observed.bay !== undefined && line.bay !== null && observed.bay !== line.bay)
    said.push(`${ref} sits in bay ${line.bay} in the build, in bay ${observed.bay} in the listing.`)
  return [...said, ...sectorsAndRate(observed, line)]
}

function sectorsAndRate({ logical_B, physical_B, rate_Gbps, mostRate_Gbps }: ObservedDrive, line: DriveLine): string[] {
  const said: string[] = []
  const { sectors } = line.part.model.drive ?? {}
  if (sectors && logical_B !== undefined && logical_B !== sectors.logical_B)
    said.push(`${line.ref} has sectors of ${sectors.logical_B} bytes in the build, ${logical_B} in the listing.`)
  else if (sectors && physical_B !== undefined && physical_B !== sectors.physical_B)
    said.push(
      `${line.ref} has physical sectors of ${sectors.physical_B} bytes in the build, ${physical_B} in the listing.`,
    )
  // A link below what the drive itself can do was told already.
  const isTold = rate_Gbps !== undefined && mostRate_Gbps !== undefined && rate_Gbps < mostRate_Gbps
  if (!isTold && rate_Gbps !== undefined && line.rate_Gbps !== null && rate_Gbps < line.rate_Gbps - 0.01)
    said.push(`${line.ref} is linked at ${rate_Gbps} Gb/s on a path of ${line.rate_Gbps} Gb/s: look at cable and port.`)
  return said
}

function twiceIn({ serial }: ObservedDrive, map: readonly DriveLine[]): string[] {
  if (serial === undefined) return []
  const same = map.filter((line) => line.serial !== '' && serialKey(line.serial) === serialKey(serial))
  return same.length > 1 ? [`Serial ${serial} stands at ${same.map(({ ref }) => ref).join(' and ')} in the build.`] : []
}
