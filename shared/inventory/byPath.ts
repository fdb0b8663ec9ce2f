import type { ObservedPlace } from './observed.ts'

/** A line of `ls -l /dev/disk/by-path`: where a device hangs. */
export interface DevicePlace {
  device: string
  place: ObservedPlace
}

/**
 * Reads the names below /dev/disk/by-path (systemd, udev-builtin-path_id.c): "…-sas-phy5-lun-0" is phy 5 of the adapter,
 * "…-sas-exp0x…-phy12-lun-0" phy 12 of that expander, "…-ata-2.0" the second AHCI port. Names of RAID adapters
 * ("…-scsi-0:0:3:0") are not stable and say nothing. Partitions are passed over.
 */
export function readByPath(text: string): DevicePlace[] {
  const places: DevicePlace[] = []
  for (const [, name = '', device = ''] of text.matchAll(/(\S*pci-\S+)\s+->\s+\S*?\/?([a-z0-9]+)\s*$/gim)) {
    const place = /-part\d+$/.test(name) ? undefined : placeIn(name)
    if (place) places.push({ device, place })
  }
  return places
}

function placeIn(name: string): ObservedPlace | undefined {
  const expander = /-sas-exp(?:0x)?([0-9a-f]{16})-phy(\d{1,3})-lun-/i.exec(name)
  if (expander) return { kind: 'phy', phy: Number(expander[2]), expander: expander[1]?.toLowerCase() ?? '' }
  const phy = /-sas-phy(\d{1,3})-lun-/i.exec(name)
  if (phy) return { kind: 'phy', phy: Number(phy[1]), expander: null }
  const ata = /-ata-(\d{1,3})(?:\.0)?$/i.exec(name)
  return ata ? { kind: 'ata', port: Number(ata[1]) } : undefined
}
