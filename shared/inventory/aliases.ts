import type { DriveLine } from './driveMap.ts'

/** Lines for /etc/zfs/vdev_id.conf and what could not be named. */
export interface Aliases {
  text: string
  without: string[]
}

/** Prefix of the lasting names below /dev/disk/by-id that the WWN gives (systemd, 60-persistent-storage.rules). */
const linkOf = ({ wwn, protocol }: DriveLine): string =>
  protocol === 'nvme' ? `/dev/disk/by-id/nvme-eui.${wwn}` : `/dev/disk/by-id/wwn-0x${wwn}`

const nameOf = ({ case: holder, bay, ref }: DriveLine): string =>
  bay === null ? ref : `${holder === null ? '' : `${holder}-`}bay${String(bay).padStart(2, '0')}`

/**
 * One `alias NAME DEVLINK` line a drive (OpenZFS, vdev_id.conf(5)), named after its bay and tied to its WWN, which does not
 * change when a cable is moved. Drives without a WWN are told, not guessed.
 */
export function aliasLines(map: readonly DriveLine[], build: string): Aliases {
  const named = map.filter(({ wwn }) => wwn !== '')
  const lines = named.map(
    (line) =>
      `alias ${nameOf(line).padEnd(8)} ${linkOf(line)}   # ${line.ref}, serial ${line.serial || 'not recorded'}`,
  )
  const head = [
    `# ${build.replace(/[\r\n]/g, ' ')}: drives by bay. For /etc/zfs/vdev_id.conf; then run: udevadm trigger`,
  ]
  return {
    text: lines.length === 0 ? '' : `${[...head, ...lines].join('\n')}\n`,
    without: map.filter(({ wwn }) => wwn === '').map(({ ref }) => ref),
  }
}
