import { describe, expect, it } from 'vitest'
import { indexCatalog } from '#shared/catalog/catalog.ts'
import { figuresIn } from '#shared/catalog/figures.ts'
import { loadCatalogFiles } from '../../server/services/catalogFiles.ts'

const catalog = loadCatalogFiles()
const { connectorTypes, models } = indexCatalog(catalog)
const type = (id: string) => connectorTypes.get(id)!
const model = (id: string) => models.get(id)!

/** Published figures, each with the document that prints it. */
describe('connector figures against their documents', () => {
  it('SATA power: three contacts of 1.5 A a rail, 4.5 A; 30 mohm new [DDK SAT series]', () => {
    const { power } = type('sata-power-receptacle')
    expect(power!.contacts['12V']! * power!.rating_A.value!).toBe(4.5)
    expect(power!.contactResistance_mohm.initial.value).toBe(30)
    expect(Object.values(power!.contacts).reduce((sum, count) => sum + count, 0)).toBe(14)
  })

  it('4-pin by wire, four circuits in line [TE catalogue 82181, p. 138]', () => {
    const byWire = type('peripheral-receptacle').power!.ratingByWire!
    expect(byWire.map(({ awg, rating_A }) => [awg, rating_A.value])).toEqual([
      [14, 11],
      [16, 10],
      [18, 9],
      [20, 7],
      [22, 5],
      [24, 4],
    ])
  })

  it('4.2 mm family by wire and housing [Molex PS-43810-001, 4.2]', () => {
    const at18 = (id: string) => type(id).power!.ratingByWire!.find(({ awg }) => awg === 18)!.rating_A.value
    expect([at18('modular-6-socket'), at18('eps-8-plug'), at18('atx-24-plug')]).toEqual([8, 7, 6])
  })

  it('card power, six positions: 8 A a pin [ATX 3.1 guide, Table 5-4]', () => {
    expect(type('pcie-6-plug').power!.rating_A.value).toBe(8)
  })

  it.each([
    ['sff-8482-receptacle', '0x20'],
    ['sata-host-plug', '0x21'],
    ['sff-8482-plug', '0x22'],
    ['sata-drive-plug', '0x23'],
    ['sff-8680-receptacle', '0x28'],
    ['sff-8680-plug', '0x29'],
    ['sff-8639-receptacle', '0x2A'],
    ['sff-8639-plug', '0x2B'],
    ['sff-8484-plug', '0x10'],
    ['sff-8087-receptacle', '0x11'],
    ['sff-8643-receptacle', '0x12'],
    ['sff-8654-4i-receptacle', '0x15'],
    ['sff-8654-8i-receptacle', '0x16'],
    ['sff-8612-receptacle', '0x17'],
    ['sff-8088-receptacle', '0x02'],
    ['sff-8644-receptacle', '0x05'],
  ])('%s has element code %s [sg3_utils, sg_ses.c]', (id, code) => {
    expect(type(id).sesCode).toBe(code)
  })
})

describe('what fits what [SAS and SATA common connector; keying notch]', () => {
  const mates = (a: string, b: string) => type(a).matesWith.includes(b)

  it('a SATA drive enters SAS receptacles', () => {
    for (const id of ['sff-8482-receptacle', 'sff-8680-receptacle', 'sff-8639-receptacle'])
      expect(mates('sata-drive-plug', id)).toBe(true)
  })

  it('a SAS drive does not enter SATA receptacles', () => {
    for (const sas of ['sff-8482-plug', 'sff-8680-plug'])
      for (const id of ['sata-data-receptacle', 'sata-power-receptacle', 'sata-22-receptacle'])
        expect(mates(sas, id)).toBe(false)
  })

  it('a U.2 drive does not enter SFF-8482', () => {
    expect(mates('sff-8639-plug', 'sff-8482-receptacle')).toBe(false)
  })

  it('internal and external multilane shells differ', () => {
    expect(mates('sff-8087-plug', 'sff-8088-receptacle')).toBe(false)
    expect(mates('sff-8643-plug', 'sff-8644-receptacle')).toBe(false)
  })

  it('a card fits its own slot and wider ones', () => {
    expect(mates('pcie-edge-x8', 'pcie-slot-x16')).toBe(true)
    expect(mates('pcie-edge-x8', 'pcie-slot-x4')).toBe(false)
  })
})

describe('model figures against their documents', () => {
  const nearline = model('hdd-35-7200-sas-3tb').load!

  it('idle watts of a 7200 rpm nearline drive: 6.43, printed 6.4 [WD Re manual, 2.4.2]', () => {
    expect(nearline['12V']!.rest_A.value! * 12 + nearline['5V']!.rest_A.value! * 5).toBeCloseTo(6.43, 6)
  })

  it('sequential read watts: 8.05, printed 8.1 [WD Re manual, 2.4.2]', () => {
    expect(nearline['12V']!.scan_A.value! * 12 + nearline['5V']!.scan_A.value! * 5).toBeCloseTo(8.05, 6)
  })

  it('start of a 3.5 in drive is about 2 A (common practice), within 1.9 to 2.5 [WD Re manual, 2.4.2]', () => {
    expect(nearline['12V']!.start!.peak_A).toMatchObject({ value: 2, low: 1.9, high: 2.5, origin: 'common practice' })
    expect(1.9 / nearline['12V']!.start!.mean_A!.value!).toBeCloseTo(1.55, 2)
  })

  it('300 W example: 12V1 8 A, 10 A at peak for 17 s; 12V2 14 A [ATX12V 2.0, Tables 3 to 6]', () => {
    const [first, second] = model('supply-atx-300').supply!.rails
    expect([first!.limit_A.value, first!.peak_A!.value, first!.peak_s!.value]).toEqual([8, 10, 17])
    expect([second!.limit_A.value, second!.peak_A]).toEqual([14, undefined])
  })

  it('12 V server module: 62 A, 70 A at peak for 20 s [P4000IP specification]', () => {
    const [rail] = model('supply-server-750-12v').supply!.rails
    expect([rail!.limit_A.value, rail!.peak_A!.value, rail!.peak_s!.value]).toEqual([62, 70, 20])
  })

  it.each([
    ['supply-atx-300', [0.82, 0.85, 0.82], [0.8, 0.8, 0.8]],
    ['supply-atx-400', [0.85, 0.88, 0.85], [0.82, 0.85, 0.82]],
    ['supply-atx-650', [0.9, 0.92, 0.89], [0.87, 0.9, 0.87]],
    ['supply-atx-1000', [0.92, 0.94, 0.9], [0.9, 0.92, 0.89]],
  ])('%s: least efficiency at 230 and 115 V [80 Plus table]', (id, at230, at115) => {
    const points = model(id).supply!.efficiency
    expect(points.map(({ efficiency }) => efficiency.value)).toEqual(at230)
    expect(points.map(({ efficiency }) => efficiency.low)).toEqual(at115)
  })

  it('U.2: 25 W over 12 V is 2.08 A [DC P3700 specification]', () => {
    expect(model('ssd-u2-nvme-800gb').load!['12V']!.scan_A.value).toBeCloseTo(25 / 12, 2)
  })

  it('2.5 in laptop drive: 5.0 W start over 5 V is 1.0 A [5K320 specification, Table 14]', () => {
    expect(model('hdd-25-5400-sata-320gb').load!['5V']!.start!.peak_A.value).toBe(1)
  })

  it('a 3 TB drive alone is read in less than the 14 h 34 min that a real parity pass took (common practice)', () => {
    const { outerRate_MBps, innerRate_MBps } = model('hdd-35-7200-sas-3tb').drive!
    const mean_MBps = (outerRate_MBps!.value! + innerRate_MBps!.value!) / 2
    expect(3e6 / mean_MBps / 3600).toBeLessThan(14 + 34 / 60)
  })

  it('inner tracks run at 0.478 to two thirds of the outer [Deskstar 7K500 specification, 4.4.4]', () => {
    for (const { drive, id } of catalog.models) {
      const { value, low, high } = drive?.innerRate_MBps ?? {}
      if (!value || drive!.rotation_rpm === 0) continue
      const outer = drive!.outerRate_MBps!.value!
      expect(low! / outer, id).toBeCloseTo(0.478, 2)
      expect(high! / outer, id).toBeCloseTo(0.667, 2)
    }
  })
})

describe('customs of the catalog', () => {
  it('names classes, not products: no maker of a cited document stands in a name', () => {
    const makers = catalog.sources.flatMap(({ publisher }) => publisher?.split(/[ /]/)[0] ?? [])
    const standards = new Set(['SNIA', 'INCITS', 'IEC', 'PCI-SIG', 'UL', 'Server'])
    const brands = [...new Set(makers)].filter((maker) => maker.length > 2 && !standards.has(maker))
    expect(brands.length).toBeGreaterThan(20)
    for (const { id, name, summary } of catalog.models)
      for (const brand of brands)
        expect(`${name} ${summary ?? ''}`.split(/[^A-Za-z0-9]+/), `${id} and ${brand}`).not.toContain(brand)
  })

  it('cites documents, not addresses', () => {
    for (const source of catalog.sources) expect(JSON.stringify(source), source.id).not.toMatch(/https?:|www\.|\.com\b/)
  })

  it('never takes zero for unknown: a known zero says where it comes from', () => {
    for (const { id, load } of catalog.models)
      for (const { quantity } of figuresIn(load ?? {}))
        if (quantity.value === 0) expect(quantity.low === 0 && quantity.high !== undefined, id).toBe(true)
  })

  it.each([
    ['case', ['8', '12', '15', '16', '24', '36', '45', '60']],
    ['supply', ['300', '400', '460', '650', '850', '1000']],
  ])('has every size of %s', (kind, sizes) => {
    const names = catalog.models.filter((candidate) => candidate.kind === kind).map(({ name }) => name)
    for (const size of sizes)
      expect(
        names.some((name) => new RegExp(`\\b${size}\\b`).test(name)),
        size,
      ).toBe(true)
  })
})
