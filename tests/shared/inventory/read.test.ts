import fc from 'fast-check'
import Papa from 'papaparse'
import { describe, expect, test } from 'vitest'
import { readCsvDrives } from '#shared/inventory/csv.ts'
import type { Inventory } from '#shared/inventory/observed.ts'
import { readListing as readListingWith } from '#shared/inventory/read.ts'

const readListing = (text: string) =>
  readListingWith(text, (table) => Papa.parse<string[]>(table, { skipEmptyLines: 'greedy' }))

/** Shapes as in the sources of smartmontools 7.3 to 8.0 and util-linux 2.38; serials and names are invented. */
const ata = {
  json_format_version: [1, 0],
  smartctl: { version: [7, 4], exit_status: 64 },
  device: { name: '/dev/sdc', info_name: '/dev/sdc [SAT]', type: 'sat', protocol: 'ATA' },
  model_name: 'EXAMPLE D8000',
  serial_number: 'ZX00A1B2',
  firmware_version: '0A07',
  wwn: { naa: 5, oui: 1193046, id: 20016041479 },
  user_capacity: { blocks: 15628053168, bytes: 8001563222016 },
  logical_block_size: 512,
  physical_block_size: 4096,
  rotation_rate: 7200,
  interface_speed: {
    max: { sata_value: 14, string: '6.0 Gb/s', units_per_second: 60, bits_per_unit: 100000000 },
    current: { sata_value: 2, string: '3.0 Gb/s', units_per_second: 30, bits_per_unit: 100000000 },
  },
}
const sas = {
  json_format_version: [1, 0],
  smartctl: { version: [7, 3], exit_status: 0 },
  device: { name: '/dev/sdd', type: 'scsi', protocol: 'SCSI' },
  scsi_vendor: 'EXAMPLE',
  scsi_product: 'S3000SS        ',
  scsi_revision: 'E007',
  device_type: { scsi_value: 0, name: 'disk' },
  scsi_transport_protocol: { name: 'SAS (SPL-4)', value: 6 },
  logical_unit_id: '0x5000c500abcdef01',
  serial_number: 'SB3T0007   ',
  user_capacity: { blocks: 5860533168, bytes: 3000592982016 },
  logical_block_size: 512,
  rotation_rate: 7200,
  scsi_sas_port_0: {
    phy_0: {
      identifier: 0,
      attached_device_type: 'SAS or SATA device',
      negotiated_logical_link_rate: 'phy enabled; 6 Gbps',
      attached_sas_address: '0x500605b001234560',
      attached_phy_identifier: 5,
    },
  },
}
const nvme = {
  smartctl: { version: [7, 2] },
  device: { name: '/dev/nvme0', type: 'nvme', protocol: 'NVMe' },
  model_name: 'EXAMPLE N1',
  serial_number: 'NV1',
  firmware_version: '1.0',
  nvme_namespaces: [{ id: 1, eui64: { oui: 6083300, ext_id: 495931670 } }],
  user_capacity: { bytes: 1024209543168 },
  logical_block_size: 512,
}
const lsblk = {
  blockdevices: [
    {
      name: 'sdc', type: 'disk', size: 8001563222016, model: 'EXAMPLE D8000', serial: 'ZX00A1B2', wwn: '0x51234564a90c8e07',
      tran: 'sas', rota: true, 'log-sec': 512, 'phy-sec': 4096, vendor: 'ATA     ', rev: '0A07',
      children: [{ name: 'sdc1', type: 'part', size: 8001562156544 }],
    },
    { name: 'sde', type: 'disk', size: 0, model: 'S3000SS', serial: 'SB520', wwn: null, tran: 'sas', vendor: 'EXAMPLE', rota: true },
    { name: 'sr0', type: 'rom', size: 1073741312, model: 'X', serial: 'OPT' },
    { name: 'vda', type: 'disk', size: 10, serial: null, wwn: null },
  ],
} // prettier-ignore

const drivesOf = (text: string): Inventory => {
  const listing = readListing(text)
  if (listing.kind !== 'drives') throw new Error(`read as ${listing.kind}`)
  return listing.inventory
}
const text = (...values: unknown[]) => values.map((value) => JSON.stringify(value, null, 2)).join('\n')

describe('smartctl', () => {
  test('a SATA drive behind a SAS adapter is told by its own protocol, its name made of three numbers', () => {
    expect(drivesOf(text(ata)).drives).toEqual([
      {
        from: 'line 1',
        device: 'sdc',
        serial: 'ZX00A1B2',
        wwn: '51234564a90c8e07',
        makerModel: 'EXAMPLE D8000',
        firmware: '0A07',
        capacity_B: 8001563222016,
        logical_B: 512,
        physical_B: 4096,
        protocol: 'sata',
        rotation_rpm: 7200,
        rate_Gbps: 3,
        mostRate_Gbps: 6,
      },
    ])
  })

  test('a SAS drive has its model in two fields, its name in another, and tells its lane', () => {
    expect(drivesOf(text(sas)).drives).toMatchObject([
      {
        serial: 'SB3T0007',
        makerModel: 'EXAMPLE S3000SS',
        firmware: 'E007',
        wwn: '5000c500abcdef01',
        protocol: 'sas',
        rate_Gbps: 6,
        physical_B: 512,
        place: { kind: 'phy', phy: 5, expander: null },
      },
    ])
  })

  test('an NVMe drive has neither motor nor rotation field', () => {
    const [drive] = drivesOf(text(nvme)).drives
    expect(drive).toMatchObject({ protocol: 'nvme', rotation_rpm: 0, serial: 'NV1', device: 'nvme0' })
    expect(drive?.wwn).toBe('5cd2e4001d8f5116')
  })

  test('capacities may come as text, and 0 rpm of a SCSI drive says nothing', () => {
    const [drive] = drivesOf(text({ ...sas, user_capacity: { bytes_s: '3000592982016' }, rotation_rate: 0 })).drives
    expect(drive?.capacity_B).toBe(3000592982016)
    expect(drive?.rotation_rpm).toBeUndefined()
  })

  test('an enclosure is no drive, and a drive that could not be opened says why', () => {
    const failed = {
      smartctl: { exit_status: 2, messages: [{ string: 'Smartctl open device: /dev/sdx failed: Permission denied', severity: 'error' }] },
      device: { name: '/dev/sdx', protocol: 'SCSI' },
    } // prettier-ignore
    const { drives, troubles, leftOut } = drivesOf(text({ ...sas, device_type: { name: 'enclosure' } }, failed))
    expect(drives).toEqual([])
    expect(leftOut).toBe(1)
    expect(troubles).toEqual([{ from: expect.stringContaining('object 2'), message: expect.stringContaining('Permission denied') }]) // prettier-ignore
  })

  test.each([
    ['one after the other', text(ata, sas, nvme)],
    ['without a break', JSON.stringify(ata) + JSON.stringify(sas) + JSON.stringify(nvme)],
    ['as one array', JSON.stringify([ata, sas, nvme])],
    ['with prompts between', `$ smartctl -x --json /dev/sdc\n${text(ata)}\n$ next\n${text(sas)}\n${text(nvme)}\n$`],
  ])('several outputs are read %s', (_how, pasted) => {
    expect(drivesOf(pasted).drives.map(({ serial }) => serial)).toEqual(['ZX00A1B2', 'SB3T0007', 'NV1'])
    expect(drivesOf(pasted).troubles).toEqual([])
  })

  test('what is cut off is told by its line, and the rest is read', () => {
    const { drives, troubles } = drivesOf(`${text(ata)}\n${text(sas).slice(0, 300)}`)
    expect(drives).toHaveLength(1)
    expect(troubles[0]?.from).toMatch(/line 4\d/)
    expect(troubles[0]?.message).toMatch(/never ends/)
  })
})

describe('lsblk', () => {
  test('tells SATA from SAS by the vendor, leaves out what is no disk, and lists what has no name', () => {
    const { drives, troubles, leftOut } = drivesOf(text(lsblk))
    expect(drives).toMatchObject([
      { serial: 'ZX00A1B2', protocol: 'sata', capacity_B: 8001563222016, wwn: '51234564a90c8e07', physical_B: 4096 },
      { serial: 'SB520', protocol: 'sas', capacity_B: 0 },
    ])
    expect(leftOut).toBe(2)
    expect(troubles).toEqual([{ from: 'line 1, device 4', message: expect.stringContaining('vda') }])
  })

  test('older output is all text, and sizes without -b are rounded', () => {
    const old = {
      blockdevices: [{ name: 'sdb', size: '2.7T', serial: 'S1', rota: '0', tran: 'sata', 'log-sec': '512' }],
    }
    expect(drivesOf(text(old)).drives).toMatchObject([
      { serial: 'S1', isRounded: true, capacity_B: 2.7 * 2 ** 40, rotation_rpm: 0, logical_B: 512 },
    ])
  })

  test('is put together with what smartctl says of the same drive', () => {
    const { drives } = drivesOf(text(lsblk, ata))
    expect(drives).toHaveLength(2)
    expect(drives[0]).toMatchObject({ serial: 'ZX00A1B2', rate_Gbps: 3, protocol: 'sata' })
  })
})

test('by-path gives a device its phy, its expander or its port', () => {
  const links = [
    'lrwxrwxrwx 1 root root 9 Jan 1 pci-0000:03:00.0-sas-phy5-lun-0 -> ../../sdc',
    'lrwxrwxrwx 1 root root 10 Jan 1 pci-0000:03:00.0-sas-phy5-lun-0-part1 -> ../../sdc1',
    'pci-0000:03:00.0-sas-exp0x5001234abcd0003f-phy12-lun-0 -> ../../sde',
    'pci-0000:00:17.0-ata-2.0 -> ../../sdf',
    'pci-0000:04:00.0-scsi-0:0:3:0 -> ../../sdg',
  ].join('\n')
  const named = (device: string) => ({ name: device, type: 'disk', serial: `S-${device}`, size: 1 })
  const { drives } = drivesOf(`${text({ blockdevices: ['sdc', 'sde', 'sdf', 'sdg'].map(named) })}\n${links}`)
  expect(drives.map(({ place }) => place)).toEqual([
    { kind: 'phy', phy: 5, expander: null },
    { kind: 'phy', phy: 12, expander: '5001234abcd0003f' },
    { kind: 'ata', port: 2 },
    undefined,
  ])
})

describe('tables', () => {
  const tableOf = (csv: string) => {
    const listing = readListing(csv)
    if (listing.kind !== 'table') throw new Error(`read as ${listing.kind}`)
    return listing.table
  }

  test('columns are known by their headings, whatever separates them', () => {
    const table = tableOf('Bay;Serial number;Model;Size TB\n1;AA1;D8000;8\n2;;;\n3;AA3;D8000;8,0\n')
    expect(table.guess).toEqual(['bay', 'serial', 'makerModel', 'capacity'])
    const { drives, troubles } = readCsvDrives(table, table.guess)
    expect(drives).toMatchObject([
      { bay: 1, serial: 'AA1', makerModel: 'D8000', capacity_B: 8e12 },
      { bay: 3, serial: 'AA3', capacity_B: 8e12 },
    ])
    expect(troubles).toEqual([{ from: 'line 3', message: expect.stringContaining('neither serial nor WWN') }])
  })

  test('a person may say what a column holds', () => {
    const table = tableOf('a,b\nAA1,4 TB')
    expect(table.guess).toEqual([null, null])
    expect(readCsvDrives(table, ['serial', 'capacity']).drives).toMatchObject([
      { serial: 'a' },
      { serial: 'AA1', capacity_B: 4e12, isRounded: true },
    ])
  })
})

test('nothing is nothing', () => expect(readListing('  \n')).toEqual({ kind: 'nothing' }))

const pieces = fc.constantFrom(
  '{', '}', '[', ']', '"', '\\', ':', ',', '\n', '{"blockdevices":', '{"smartctl":{}}', '"children"', 'null', '1e999', 'x',
  '{"device":{"name":"a","protocol":"SCSI"}}', 'pci-0:0-sas-phy5-lun-0 -> ../../sdc', ';', '\ufeff', '{"__proto__":{"a":1}}',
) // prettier-ignore
const anything = fc.oneof(
  fc.array(pieces, { maxLength: 40 }).map((parts) => parts.join('')),
  fc.json({ maxDepth: 6 }),
  fc.jsonValue().map((value) => JSON.stringify({ blockdevices: [value, { serial: value, children: [value] }] })),
  fc.jsonValue().map((value) => JSON.stringify({ smartctl: value, device: value, wwn: value, user_capacity: value })),
  fc.string({ maxLength: 300 }),
)
test('whatever is pasted, reading ends and every drive has a name', () => {
  fc.assert(
    fc.property(anything, (pasted) => {
      const listing = readListing(pasted)
      const inventory =
        listing.kind === 'drives'
          ? listing.inventory
          : listing.kind === 'table'
            ? readCsvDrives(listing.table, listing.table.guess)
            : { drives: [] }
      for (const drive of inventory.drives)
        expect(drive.serial ?? drive.wwn ?? drive.makerModel, JSON.stringify(drive)).toBeTruthy()
    }),
    { numRuns: 3000 },
  )
})

test('a million brackets are read at once', () => {
  const started = performance.now()
  readListing('[\n'.repeat(500_000))
  readListing(`${'{"a":1}\n'.repeat(100_000)}`)
  // Not a measure of speed: what grows with the square would take hours.
  expect(performance.now() - started).toBeLessThan(20_000)
})
