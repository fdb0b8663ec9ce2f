import { readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import { invert } from '#shared/build/invert.ts'
import { readBuild } from '#shared/build/read.ts'
import { resolve } from '#shared/build/resolve.ts'
import { indexCatalog } from '#shared/catalog/catalog.ts'
import { check } from '#shared/check/check.ts'
import { aliasLines } from '#shared/inventory/aliases.ts'
import { driveMapCsv } from '#shared/inventory/driveCsv.ts'
import { driveMap } from '#shared/inventory/driveMap.ts'
import { importEdit, usualChoices } from '#shared/inventory/importEdit.ts'
import { matchDrives } from '#shared/inventory/match.ts'
import type { ObservedDrive } from '#shared/inventory/observed.ts'
import { loadCatalogFiles } from '../../../server/services/catalogFiles.ts'

const catalog = indexCatalog(loadCatalogFiles())
const example = (id: string): BuildDocument => {
  const read = readBuild(JSON.parse(readFileSync(`examples/${id}/build.json`, 'utf8')), catalog)
  if (!read.ok) throw new Error(`example ${id} cannot be read`)
  return read.document
}
/** Ten drives on one adapter and the board, each on its own lane. */
const north = example('north-room-clean')
/** Twenty-four behind a backplane with an expander. */
const projection = example('projection-24')

const match = (document: BuildDocument, observed: readonly ObservedDrive[]) => {
  const build = resolve(document, catalog)
  return { build, ...matchDrives(build, check(document, catalog), observed) }
}
const only = (document: BuildDocument, observed: Omit<ObservedDrive, 'from'>) => {
  const [line] = match(document, [{ from: 'line 1', ...observed }]).lines
  if (!line) throw new Error('no line')
  return line
}
const without = (document: BuildDocument, refs: readonly string[]): BuildDocument => ({
  ...document,
  parts: document.parts.map(({ serial, ...part }) =>
    refs.includes(part.ref) ? part : serial === undefined ? part : { ...part, serial },
  ),
})
let ids = 0
const makeId = (prefix: string) => `${prefix}-new-${++ids}`
const serialOf = (document: BuildDocument, ref: string) => document.parts.find((part) => part.ref === ref)?.serial ?? ''

describe('a drive is found', () => {
  test('by its serial, whatever its case and blanks', () => {
    const padded = ` ${serialOf(north, 'C3').toLowerCase()} `
    expect(only(north, { serial: padded })).toMatchObject({ by: 'serial', drive: { ref: 'C3' } })
  })

  test('by its WWN, where the build has it', () => {
    const document: BuildDocument = {
      ...north,
      parts: north.parts.map((part) => (part.ref === 'C2' ? { ...part, wwn: '5000c500abcdef01' } : part)),
    }
    expect(only(document, { wwn: '5000c500abcdef01', serial: 'OTHER' })).toMatchObject({
      by: 'wwn',
      drive: { ref: 'C2' },
      contradictions: [expect.stringContaining('in the listing')],
    })
  })

  test('by the phy of the adapter it hangs on', () => {
    const map = driveMap(resolve(north, catalog), check(north, catalog))
    const sas = map.filter(({ protocol, phy }) => protocol === 'sas' && phy !== null)
    const target = sas.find(
      (line) => map.filter(({ phy, protocol }) => phy === line.phy && protocol !== 'nvme').length === 1,
    )
    if (!target) throw new Error('no phy is alone')
    expect(
      only(without(north, [target.ref]), {
        serial: 'NEW1',
        place: { kind: 'phy', phy: target.phy ?? -1, expander: null },
      }),
    ).toMatchObject({ by: 'position', drive: { ref: target.ref } })
  })

  test('by the phy of the backplane’s expander, but not where two expanders are seen', () => {
    const seen = (expander: string, phy: number): ObservedDrive => ({
      from: 'x',
      serial: `S${expander}${phy}`,
      place: { kind: 'phy', phy, expander },
    })
    const blank = without(projection, ['C5', 'C9'])
    expect(match(blank, [seen('a', 4), seen('a', 8)]).lines.map(({ by, drive }) => [by, drive?.bay])).toEqual([
      ['position', 5],
      ['position', 9],
    ])
    expect(match(blank, [seen('a', 8), seen('b', 4)]).lines.map(({ by }) => by)).toEqual(['size', 'size'])
  })

  test('by kind and size alone where nothing else is known, each part once', () => {
    const blank = without(projection, ['C1', 'C2'])
    const drive = (serial: string): ObservedDrive => ({ from: 'x', serial, protocol: 'sas', capacity_B: 12e12 })
    const { lines } = match(blank, [drive('A'), drive('B'), drive('C')])
    expect(lines.map(({ by, drive: line }) => [by, line?.ref])).toEqual([
      ['size', 'C1'],
      ['size', 'C2'],
      [null, undefined],
    ])
  })

  test('what the listing does not show is told', () => {
    const shown = north.parts.flatMap(({ serial }, i) => (serial && i % 2 === 0 ? [{ from: 'x', serial }] : []))
    const { missing } = match(north, shown)
    const all = north.parts.filter(({ serial }) => serial !== undefined).length
    expect(missing).toHaveLength(all - shown.length)
  })
})

describe('contradictions', () => {
  const serial = serialOf(projection, 'C1')
  test.each([
    ['the protocol', { protocol: 'sata' }, /is SAS in the build; the disk says SATA/],
    ['the capacity', { capacity_B: 8e12 }, /holds 12 TB in the build, 8 TB/],
    ['the sectors', { logical_B: 4096, physical_B: 4096 }, /sectors of 512 bytes in the build, 4096/],
    ['a size that the system does not take', { capacity_B: 0 }, /0 bytes.*520 or 528/],
    ['a slow link on a faster path', { rate_Gbps: 3 }, /linked at 3 Gb\/s on a path of 12 Gb\/s/],
    ['a link below what the drive can do', { rate_Gbps: 3, mostRate_Gbps: 6 }, /though the drive can do 6/],
    ['a second path', { device: 'sda', alsoAs: ['sdb'] }, /sda and sdb: one drive by two paths/],
    ['another bay', { bay: 7 }, /sits in bay 1 in the build, in bay 7/],
  ] as const)('tell %s', (_what, seen, words) => {
    const { contradictions } = only(projection, { serial, ...seen } as Omit<ObservedDrive, 'from'>)
    expect(contradictions).toHaveLength(1)
    expect(contradictions[0]).toMatch(words)
  })

  test('tell a serial that stands twice in the build', () => {
    const twice: BuildDocument = {
      ...projection,
      parts: projection.parts.map((part) => (part.ref === 'C2' ? { ...part, serial } : part)),
    }
    expect(only(twice, { serial }).contradictions).toEqual([expect.stringContaining('C1 and C2')])
  })

  test('are none where listing and build agree', () => {
    const agreed = {
      serial,
      protocol: 'sas',
      capacity_B: 12.0001e12,
      logical_B: 512,
      physical_B: 4096,
      rate_Gbps: 12,
    } as const
    expect(only(projection, agreed).contradictions).toEqual([])
  })
})

describe('the import', () => {
  const fresh = without(projection, ['C4'])
  const observed: ObservedDrive[] = [
    { from: 'a', serial: serialOf(projection, 'C1'), wwn: '5000c500abcdef01', makerModel: 'EXAMPLE S12' },
    { from: 'b', serial: 'FRESH1', protocol: 'sas', capacity_B: 12e12, rotation_rpm: 7200 },
    { from: 'c', serial: 'FRESH2', protocol: 'sas', capacity_B: 12e12, rotation_rpm: 7200 },
  ]

  test('is one edit that can be taken back whole', () => {
    const { build, lines } = match(fresh, observed)
    const choices = usualChoices(build, lines)
    expect(choices.map(({ kind }) => kind)).toEqual(['update', 'update', 'add'])
    const outcome = importEdit(
      build,
      makeId,
      lines.map((line, i) => ({ observed: line.observed, choice: choices[i]! })),
    )
    if (!outcome.ok) throw new Error(outcome.reason)
    expect(outcome.edit.label).toBe('Import: 2 drives brought up to date, 1 drive added')
    const after = apply(fresh, outcome.edit.changes)
    expect(after.parts.find((part) => part.ref === 'C1')).toMatchObject({
      wwn: '5000c500abcdef01',
      makerModel: 'EXAMPLE S12',
    })
    expect(after.parts.find((part) => part.ref === 'C4')?.serial).toBe('FRESH1')
    expect(after.parts.find((part) => part.serial === 'FRESH2')).toBeDefined()
    expect(resolve(after, catalog).problems).toEqual([])
    expect(apply(after, invert(fresh, outcome.edit.changes))).toEqual(fresh)
  })

  test('never writes a serial over another one unasked', () => {
    const taken: ObservedDrive = { from: 'x', serial: 'OTHER', place: { kind: 'phy', phy: 0, expander: 'a' } }
    const { build, lines } = match(projection, [taken])
    expect(lines[0]).toMatchObject({ by: 'position', drive: { ref: 'C1' } })
    expect(usualChoices(build, lines)).toEqual([{ kind: 'ignore' }])
  })

  test('gives a new drive the nearest class with the reason, and a bay of its own', () => {
    const emptied: BuildDocument = {
      ...projection,
      parts: projection.parts.filter((part) => !['C1', 'C2'].includes(part.ref)),
      joints: projection.joints.filter(({ a, b }) => {
        const gone = projection.parts.filter((part) => ['C1', 'C2'].includes(part.ref)).map(({ id }) => id)
        return !gone.includes(a.part) && !gone.includes(b.part)
      }),
    }
    const { build, lines } = match(emptied, observed.slice(1))
    expect(lines[0]?.model?.model.drive).toMatchObject({ protocol: 'sas', rotation_rpm: 7200 })
    expect(lines[0]?.model?.reason).toBe('nearest class: SAS, 7200 rpm, 12 TB')
    const choices = usualChoices(build, lines)
    const outcome = importEdit(
      build,
      makeId,
      lines.map((line, i) => ({ observed: line.observed, choice: choices[i]! })),
    )
    if (!outcome.ok) throw new Error(outcome.reason)
    const after = resolve(apply(emptied, outcome.edit.changes), catalog)
    const added = after.parts.filter(({ part }) => part.serial?.startsWith('FRESH'))
    expect(added.map(({ part }) => part.bay?.slot)).toEqual([1, 2])
    expect(added.every(({ connectors }) => connectors.some(({ joints }) => joints.length > 0))).toBe(true)
  })

  test('of nothing is refused in words', () => {
    const { build } = match(projection, [])
    expect(importEdit(build, makeId, [])).toMatchObject({ ok: false })
  })
})

describe('the drive map', () => {
  test('names both paths and goes by bay', () => {
    const map = driveMap(resolve(north, catalog), check(north, catalog))
    expect(map.map(({ bay }) => bay)).toEqual(map.map(({ bay }) => bay).sort((a, b) => (a ?? 99) - (b ?? 99)))
    for (const { data, power, serial } of map) for (const words of [data, power, serial]) expect(words).not.toBe('')
  })

  test('as CSV holds every serial', () => {
    const csv = driveMapCsv(driveMap(resolve(north, catalog), null))
    for (const { serial } of north.parts) if (serial) expect(csv).toContain(serial)
  })

  test('gives alias lines by bay to drives with a WWN, and names the others (vdev_id.conf(5), OpenZFS)', () => {
    const document: BuildDocument = {
      ...projection,
      parts: projection.parts.map((part) => (part.ref === 'C3' ? { ...part, wwn: '5000c500abcdef03' } : part)),
    }
    const { text, without: left } = aliasLines(driveMap(resolve(document, catalog), null), 'two\nlines')
    expect(text.split('\n').filter((line) => !line.startsWith('#') && line !== '')).toEqual([
      expect.stringMatching(/^alias bay03 +\/dev\/disk\/by-id\/wwn-0x5000c500abcdef03 +# C3, serial /),
    ])
    expect(left).not.toContain('C3')
    expect(left).toContain('C1')
  })
})
