import type { Protocol } from '../catalog/model.ts'
import { at, known, numberOf, textOf, wwnOf } from './fields.ts'
import type { Inventory, ObservedDrive } from './observed.ts'

/** Whether a value is an output of `lsblk --json`. */
export const isLsblk = (value: unknown): boolean => Array.isArray(at(value, 'blockdevices'))

const deepest = 12

/**
 * An output of `lsblk --json`, whatever columns were asked for (util-linux, lsblk.c): keys are the column names in lower case;
 * before 2.33 every value is text; a size is text like "7.3T" unless `-b` was given; `tran` says "sas" of a
 * SATA drive behind a SAS adapter, because it looks at the adapter.
 */
export function readLsblk(value: unknown, from: string): Inventory {
  const inventory: Inventory = { drives: [], troubles: [], leftOut: 0 }
  collect(at(value, 'blockdevices'), from, inventory, 0)
  return inventory
}

function collect(devices: unknown, from: string, into: Inventory, depth: number): void {
  if (!Array.isArray(devices) || depth > deepest) return
  devices.forEach((device: unknown, i) => {
    const place = depth === 0 ? `${from}, device ${i + 1}` : from
    if (!isDisk(device, depth)) into.leftOut++
    else {
      const drive = toDrive(device, place)
      if (drive.serial !== undefined || drive.wwn !== undefined) into.drives.push(drive)
      else into.troubles.push({ from: place, message: whyNameless(drive) })
    }
    collect(at(device, 'children'), place, into, depth + 1)
  })
}

const whyNameless = ({ device }: ObservedDrive): string =>
  `${device ?? 'it'} has neither serial nor WWN here: list with -o NAME,TYPE,SIZE,MODEL,SERIAL,WWN`

/** Without the TYPE column, whatever lies at the top and is no loop, memory or optical drive. */
function isDisk(device: unknown, depth: number): boolean {
  const type = textOf(at(device, 'type'))
  if (type !== undefined) return type === 'disk'
  return depth === 0 && !/^(loop|ram|zram|sr|dm-|md|fd)\d*/.test(textOf(at(device, 'name')) ?? '')
}

function toDrive(device: unknown, from: string): ObservedDrive {
  const size = sizeOf(at(device, 'size'))
  const logical = numberOf(at(device, 'log-sec'))
  return known<ObservedDrive>({
    from,
    device: textOf(at(device, 'name')),
    serial: textOf(at(device, 'serial')),
    wwn: wwnOf(at(device, 'wwn')),
    makerModel: textOf(at(device, 'model')),
    firmware: textOf(at(device, 'rev')),
    capacity_B: size?.bytes,
    isRounded: size?.isRounded ? true : undefined,
    logical_B: logical,
    physical_B: numberOf(at(device, 'phy-sec')),
    protocol: protocolOf(device),
    rotation_rpm: at(device, 'rota') === false || at(device, 'rota') === '0' ? 0 : undefined,
  })
}

function protocolOf(device: unknown): Protocol | undefined {
  const vendor = textOf(at(device, 'vendor'))
  switch (textOf(at(device, 'tran'))) {
    case 'nvme':
      return 'nvme'
    case 'sata':
    case 'ata':
      return 'sata'
    case 'sas':
      if (vendor === undefined) return undefined
      return vendor === 'ATA' ? 'sata' : 'sas'
    default:
      return undefined
  }
}

const factors: Readonly<Record<string, number>> = { B: 1, K: 2 ** 10, M: 2 ** 20, G: 2 ** 30, T: 2 ** 40, P: 2 ** 50 }

/** Sizes for people are in powers of 1024 and rounded to a tenth. */
function sizeOf(size: unknown): { bytes: number; isRounded: boolean } | undefined {
  const bytes = numberOf(size)
  if (bytes !== undefined) return { bytes, isRounded: false }
  const match = typeof size === 'string' ? /^\s*(\d+(?:[.,]\d+)?)\s*([BKMGTP])/i.exec(size) : null
  if (!match) return undefined
  const factor = factors[(match[2] ?? 'B').toUpperCase()] ?? 1
  return { bytes: Number(match[1]?.replace(',', '.')) * factor, isRounded: true }
}
