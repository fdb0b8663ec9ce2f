import type { Protocol } from '../catalog/model.ts'
import { at, known, numberOf, textOf, wwnOf } from './fields.ts'
import type { InventoryTrouble, ObservedDrive, ObservedPlace } from './observed.ts'

/** Whether a value is an output of `smartctl --json`. */
export const isSmartctl = (value: unknown): boolean =>
  at(value, 'smartctl') !== undefined ||
  (at(value, 'device') !== undefined && at(value, 'json_format_version') !== undefined) ||
  (at(value, 'device', 'name') !== undefined && at(value, 'device', 'protocol') !== undefined)

/**
 * One output of `smartctl -x --json`. Fields and their traps as in the program's own source (smartmontools, ataprint.cpp,
 * scsiprint.cpp, nvmeprint.cpp): SAS drives of older releases have no `model_name`; an ATA name is three decimal
 * numbers; the exit status is a bit field and not "no data". `null`: it is no drive.
 */
export function readSmartctl(value: unknown, from: string): ObservedDrive | InventoryTrouble | null {
  const kind = textOf(at(value, 'device_type', 'name'))
  if (kind !== undefined && kind !== 'disk') return null
  const drive = known<ObservedDrive>({
    from,
    device: deviceOf(value),
    serial: textOf(at(value, 'serial_number')) ?? textOf(at(value, 'scsi_serial_number')),
    wwn: wwnIn(value),
    makerModel: modelOf(value),
    firmware: textOf(at(value, 'firmware_version')) ?? textOf(at(value, 'scsi_revision')),
    capacity_B: capacityOf(value),
    logical_B: numberOf(at(value, 'logical_block_size')),
    physical_B: numberOf(at(value, 'physical_block_size')) ?? numberOf(at(value, 'logical_block_size')),
    protocol: protocolOf(value),
    rotation_rpm: rotationOf(value),
    rate_Gbps: ataRate(at(value, 'interface_speed', 'current')) ?? sasRate(value),
    mostRate_Gbps: ataRate(at(value, 'interface_speed', 'max')),
    place: placeOf(value),
  })
  if (drive.serial === undefined && drive.wwn === undefined && drive.makerModel === undefined)
    return { from, message: whyEmpty(value) }
  return drive
}

const deviceOf = (value: unknown): string | undefined =>
  textOf(at(value, 'device', 'name'))
    ?.replace(/^\/dev\//, '')
    .replace(/[ ,;].*$/, '')

const modelOf = (value: unknown): string | undefined =>
  textOf(at(value, 'model_name')) ??
  textOf(at(value, 'scsi_model_name')) ??
  textOf([at(value, 'scsi_vendor'), at(value, 'scsi_product')].filter((part) => typeof part === 'string').join(' '))

function protocolOf(value: unknown): Protocol | undefined {
  switch (textOf(at(value, 'device', 'protocol'))?.toLowerCase()) {
    case 'ata':
      return 'sata'
    case 'nvme':
      return 'nvme'
    case 'scsi':
      return isSas(value) ? 'sas' : undefined
    default:
      return undefined
  }
}

/** Transport protocol 6 is SAS (SPC); older outputs name it only. A listing of SAS ports leaves no doubt either. */
const isSas = (value: unknown): boolean =>
  numberOf(at(value, 'scsi_transport_protocol', 'value')) === 6 ||
  /SAS/i.test(textOf(at(value, 'scsi_transport_protocol', 'name')) ?? '') ||
  at(value, 'scsi_sas_port_0') !== undefined

/** NAA, OUI and vendor's part are decimal numbers: 1, 6 and 9 hex digits. */
function wwnIn(value: unknown): string | undefined {
  const digits = (
    [
      ['naa', 1],
      ['oui', 6],
      ['id', 9],
    ] as const
  ).map(([field, length]) => {
    const number = numberOf(at(value, 'wwn', field))
    return number === undefined || !Number.isSafeInteger(number) ? undefined : number.toString(16).padStart(length, '0')
  })
  if (digits.every((part) => part !== undefined)) return wwnOf(digits.join(''))
  return wwnOf(at(value, 'logical_unit_id')) ?? eui64(at(value, 'nvme_namespaces', 0, 'eui64'))
}

function eui64(eui: unknown): string | undefined {
  const [oui, id] = [numberOf(at(eui, 'oui')), numberOf(at(eui, 'ext_id'))]
  if (oui === undefined || id === undefined || !Number.isSafeInteger(id)) return undefined
  return wwnOf(oui.toString(16).padStart(6, '0') + id.toString(16).padStart(10, '0'))
}

function capacityOf(value: unknown): number | undefined {
  const bytes = numberOf(at(value, 'user_capacity', 'bytes')) ?? numberOf(at(value, 'user_capacity', 'bytes_s'))
  return bytes ?? numberOf(at(value, 'nvme_total_capacity'))
}

/** A SCSI drive that says 0 may also say nothing: only an ATA 0 and an NVMe drive are surely without a motor. */
function rotationOf(value: unknown): number | undefined {
  const protocol = protocolOf(value)
  if (protocol === 'nvme') return 0
  const rpm = numberOf(at(value, 'rotation_rate'))
  return rpm === 0 && protocol !== 'sata' ? undefined : rpm
}

function ataRate(speed: unknown): number | undefined {
  const [units, bits] = [numberOf(at(speed, 'units_per_second')), numberOf(at(speed, 'bits_per_unit'))]
  if (units !== undefined && bits !== undefined) return (units * bits) / 1e9
  return gigabits(textOf(at(speed, 'string')))
}

const sasRate = (value: unknown): number | undefined =>
  gigabits(textOf(at(value, 'scsi_sas_port_0', 'phy_0', 'negotiated_logical_link_rate')))

function gigabits(text: string | undefined): number | undefined {
  const match = /(\d+(?:\.\d+)?)\s*G(?:b\/s|bps)/i.exec(text ?? '')
  return match ? Number(match[1]) : undefined
}

/** The adapter's or expander's phy that the drive's first port hangs on: the lane of the cable. */
function placeOf(value: unknown): ObservedPlace | undefined {
  const phy = at(value, 'scsi_sas_port_0', 'phy_0')
  const number = numberOf(at(phy, 'attached_phy_identifier'))
  if (number === undefined) return undefined
  const isExpander = /expander/i.test(textOf(at(phy, 'attached_device_type')) ?? '')
  return { kind: 'phy', phy: number, expander: isExpander ? (wwnOf(at(phy, 'attached_sas_address')) ?? '') : null }
}

function whyEmpty(value: unknown): string {
  const messages = at(value, 'smartctl', 'messages')
  const said = Array.isArray(messages) ? messages.flatMap((message) => textOf(at(message, 'string'), 200) ?? []) : []
  const name = textOf(at(value, 'device', 'name'))
  return `smartctl tells neither serial nor model${name ? ` of ${name}` : ''}${said.length > 0 ? `: ${said.join('; ')}` : ''}`
}
