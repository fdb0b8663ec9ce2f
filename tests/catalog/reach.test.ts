import { describe, expect, it } from 'vitest'
import { buildDocumentSchema } from '#shared/build/document.ts'
import { refLetter } from '#shared/build/refs.ts'
import { indexCatalog } from '#shared/catalog/catalog.ts'
import type { Model } from '#shared/catalog/model.ts'
import { check } from '#shared/check/check.ts'
import { loadCatalogFiles } from '../../server/services/catalogFiles.ts'

const catalog = loadCatalogFiles()
const index = indexCatalog(catalog)
const model = (id: string): Model => {
  const found = index.models.get(id)
  if (!found) throw new Error(`no model "${id}"`)
  return found
}

/** A build put together in a few lines. */
class Bench {
  readonly parts: { id: string; model: string; ref: string }[] = []
  readonly joints: { id: string; a: { part: string; connector: string }; b: { part: string; connector: string } }[] = []

  add(id: string): string {
    const ref = `${refLetter[model(id).kind]}${this.parts.length + 1}`
    this.parts.push({ id: ref, model: id, ref })
    return ref
  }

  join(a: string, aConnector: string, b: string, bConnector: string): void {
    this.joints.push({
      id: `j${this.joints.length}`,
      a: { part: a, connector: aConnector },
      b: { part: b, connector: bConnector },
    })
  }

  check() {
    const document = buildDocumentSchema.parse({
      format: 'bayloom-build',
      version: 1,
      name: 'bench',
      settings: { spinUp: { mode: 'staged', groupSize: 1 } },
      parts: this.parts,
      joints: this.joints,
    })
    return check(document, index, { strict: true })
  }
}

const driveFor: Readonly<Record<string, string>> = {
  'sff-8482-receptacle': 'hdd-35-7200-sas-3tb',
  'sff-8680-receptacle': 'hdd-35-7200-sas-12tb',
  'sff-8639-receptacle': 'ssd-u2-nvme-800gb',
  'sff-ta-1001-receptacle': 'ssd-u3-nvme-1.92tb',
  'sata-22-receptacle': 'hdd-35-7200-sata-3tb',
  'sata-data-receptacle': 'hdd-35-7200-sata-3tb',
}
/** A controller and port for each multilane end, by the connector type at the cable or board. */
const hostFor: Readonly<Record<string, string>> = {
  'sff-8087-plug': 'controller-sas-6g-8i',
  'sff-8643-plug': 'controller-sas-12g-8i',
  'sff-8643-8i-plug': 'controller-sas-12g-16i-8i',
  'sff-8654-8i-plug': 'controller-tri-12g-16i',
  'sff-8484-receptacle': 'controller-sas-3g-8i-8484',
}
const inletLead = (type: string) => (type === 'peripheral-plug' ? 'lead-4pin-4-b' : 'lead-sata-4-b')

/** Feeds every connector given from sockets of a large supply, one outlet each. */
function feed(bench: Bench, part: string, inlets: readonly { id: string; type: string }[]): void {
  const outlets = new Map<string, [lead: string, outlet: number]>()
  let supply = ''
  let socket = 6
  for (const inlet of inlets) {
    let outlet = outlets.get(inlet.type)
    if (!outlet || outlet[1] === 4) {
      if (++socket > 6) [supply, socket] = [bench.add('supply-atx-1000'), 1]
      const lead = bench.add(inletLead(inlet.type))
      bench.join(supply, `drive-${socket}`, lead, 'supply')
      outlets.set(inlet.type, (outlet = [lead, 0]))
    }
    outlet[1]++
    bench.join(outlet[0], `out-${outlet[1]}`, part, inlet.id)
  }
}

const startsWith = (of: Model, prefix: string) => of.connectors.filter(({ id }) => id.startsWith(prefix))
const ofKind = (kind: Model['kind']) => catalog.models.filter((candidate) => candidate.kind === kind)

/** Voltage at every placed drive while all are read; a rail that does not arrive is null. */
const drivesSee = (result: ReturnType<Bench['check']>, rail: string) =>
  result.moments
    .find(({ moment }) => moment === 'full-scan')!
    .devices.filter((device) => device.part.startsWith('C') && device.rail === rail)
    .map(({ voltage_V }) => voltage_V)

describe('every backplane', () => {
  it.each(ofKind('backplane').map(({ id }) => id))('%s feeds and reaches each of its bays', (id) => {
    const bench = new Bench()
    const backplane = bench.add(id)
    feed(bench, backplane, startsWith(model(id), 'power-'))
    const data = startsWith(model(id), 'data-')
    data.forEach((connector, i) => connectData(bench, backplane, connector, i, id))
    const bays = startsWith(model(id), 'bay-')
    for (const bay of bays) bench.join(backplane, bay.id, bench.add(driveFor[bay.type]!), 'plug')

    const result = bench.check()
    expect(result.findings.filter(({ rule }) => rule === 'wrong-mating')).toEqual([])
    expect(new Set(result.dataPaths.filter(({ works }) => works).map(({ drive }) => drive)).size).toBe(bays.length)
    const voltages = drivesSee(result, '12V')
    expect(voltages).toHaveLength(bays.length)
    for (const voltage of voltages) expect(voltage).toBeGreaterThan(11.4)
    for (const voltage of drivesSee(result, '5V')) expect(voltage).toBeGreaterThan(4.5)
  })
})

let host = ''
/** Hosts are given ports in turn; expanders take every link from one host. */
function connectData(
  bench: Bench,
  backplane: string,
  { id, type }: { id: string; type: string },
  i: number,
  of: string,
) {
  if (type === 'sata-host-plug') {
    const isMultiplier = model(of).expander !== undefined
    if (i % 4 === 0) host = bench.add(isMultiplier ? 'controller-sata-2-multiplier' : 'controller-sas-6g-8i')
    const cable = bench.add(isMultiplier ? 'cable-sata' : 'breakout-8087-sata')
    if (isMultiplier) bench.join(host, 'port-a', cable, 'a')
    else if (i % 4 === 0) bench.join(host, 'port-a', cable, 'host')
    if (isMultiplier) return bench.join(cable, 'b', backplane, id)
    if (i % 4 === 0) breakout = cable
    else bench.parts.pop()
    return bench.join(breakout, `leg-${(i % 4) + 1}`, backplane, id)
  }
  if (type === 'sff-8654-8i-receptacle') {
    if (i % 2 === 0) host = bench.add('controller-tri-12g-16i')
    const wide = bench.add('cable-8654-8i-8654-8i')
    bench.join(host, `port-${'ab'[i % 2]}`, wide, 'a')
    return bench.join(wide, 'b', backplane, id)
  }
  const isNvme = of.includes('nvme')
  const is8643 = type === 'sff-8643-receptacle'
  const controller = isNvme ? 'controller-nvme-16i' : is8643 ? 'controller-sas-12g-16i' : 'controller-sas-6g-16i'
  if (i % 4 === 0) host = bench.add(controller)
  const cable = bench.add(is8643 ? 'cable-8643-8643' : 'cable-8087-8087')
  bench.join(host, `port-${'abcd'[i % 4]}`, cable, 'a')
  bench.join(cable, 'b', backplane, id)
}
let breakout = ''

describe('every forward breakout', () => {
  const sold = ofKind('breakout').filter(
    ({ cable, connectors }) => cable?.direction === 'forward' && hostFor[connectors[0]!.type],
  )
  it.each(sold.map(({ id }) => id))('%s reaches and, with power tails, feeds a drive on each leg', (id) => {
    const bench = new Bench()
    const cable = bench.add(id)
    const isNvme = id.includes('u2')
    const controller = bench.add(isNvme ? 'controller-nvme-16i' : hostFor[model(id).connectors[0]!.type]!)
    bench.join(controller, 'port-a', cable, 'host')
    const tails = startsWith(model(id), 'tail-')
    feed(bench, cable, tails)
    const legs = startsWith(model(id), 'leg-')
    for (const leg of legs) bench.join(cable, leg.id, bench.add(driveFor[leg.type]!), 'plug')

    const result = bench.check()
    expect(result.findings.filter(({ rule }) => ['wrong-mating', 'breakout-reversed'].includes(rule))).toEqual([])
    const paths = result.dataPaths.filter(({ works }) => works)
    expect(new Set(paths.map(({ drive }) => drive)).size).toBe(legs.length)
    if (!isNvme) expect(paths.map(({ lane }) => lane).sort((a, b) => a - b)).toEqual(legs.map((_, i) => i))
    if (tails.length > 0) for (const voltage of drivesSee(result, '12V')) expect(voltage).toBeGreaterThan(11.4)
  })
})

describe('every reverse breakout', () => {
  const sold = ofKind('breakout').filter(({ cable }) => cable?.direction === 'reverse')
  it.each(sold.map(({ id }) => id))('%s joins board ports to a backplane', (id) => {
    const bench = new Bench()
    const is8643 = id.includes('8643')
    const [board, cable, backplane] = [
      bench.add('board-desktop-6-sata'),
      bench.add(id),
      bench.add(is8643 ? 'backplane-4-8643' : 'backplane-4-8087'),
    ]
    bench.join(cable, 'device', backplane, 'data-1')
    for (let i = 1; i <= 4; i++) {
      bench.join(board, `sata-${i}`, cable, `leg-${i}`)
      bench.join(backplane, `bay-${i}`, bench.add('hdd-35-7200-sata-3tb'), 'plug')
    }
    const result = bench.check()
    expect(result.findings.filter(({ rule }) => rule === 'breakout-reversed')).toEqual([])
    expect(result.dataPaths.filter(({ works }) => works)).toHaveLength(4)
  })
})

describe('every modular drive lead of a known family', () => {
  const leads = ofKind('lead').filter(
    ({ pinoutFamily, connectors }) => pinoutFamily !== undefined && connectors[0]!.type === 'modular-6-plug',
  )
  it.each(leads.map(({ id }) => id))('%s feeds a drive at each outlet', (id) => {
    const bench = new Bench()
    const { pinoutFamily } = model(id)
    const supply = bench.add(pinoutFamily === 'family-a' ? 'supply-atx-850' : 'supply-atx-1000')
    const lead = bench.add(id)
    bench.join(supply, 'drive-1', lead, 'supply')
    for (const outlet of startsWith(model(id), 'out-')) {
      const drive = bench.add('hdd-35-7200-sata-3tb')
      if (outlet.type === 'sata-power-receptacle') bench.join(lead, outlet.id, drive, 'plug')
      else {
        const adapter = bench.add('adapter-4pin-sata-1-crimped')
        bench.join(lead, outlet.id, adapter, 'in')
        bench.join(adapter, 'out-1', drive, 'plug')
      }
    }
    const result = bench.check()
    for (const rail of ['12V', '5V']) expect(drivesSee(result, rail)).not.toContain(null)
    expect(result.findings.filter(({ rule }) => rule === 'foreign-lead')).toEqual([])
  })
})

describe('every board', () => {
  it('for a supply of 12 V only takes 12 V, and makes 5 V for the drives at its outlets', () => {
    const bench = new Bench()
    const [supply, board] = [bench.add('supply-atx12vo-500'), bench.add('board-small-12vo-4-sata')]
    bench.join(supply, 'main', board, 'main')
    bench.join(supply, 'eps-1', board, 'eps-1')
    for (const outlet of ['out-1', 'out-2']) {
      const lead = bench.add('lead-board-sata-2')
      bench.join(board, outlet, lead, 'supply')
      bench.join(lead, 'out-1', bench.add('hdd-35-7200-sata-8tb-pd'), 'plug')
    }
    const result = bench.check()
    const wrong = ['rail-missing', 'unpowered', 'power-disable', 'wrong-mating', 'voltage-out-of-tolerance']
    expect(result.findings.filter(({ rule }) => wrong.includes(rule))).toEqual([])
    expect(drivesSee(result, '12V')).toHaveLength(2)
    for (const voltage of drivesSee(result, '5V')) expect(voltage).toBeGreaterThan(4.75)
    const made = result.ledger.find(({ name, moment }) => name === `${board} 5 V` && moment === 'full-scan')
    expect(made).toMatchObject({ kind: 'rail', rail: '5V', limit: 6 })
  })

  const withMain24 = ofKind('board').filter(({ connectors }) => connectors[0]!.type === 'atx-24-receptacle')
  it.each(withMain24.map(({ id }) => id))('%s takes its three rails from a supply', (id) => {
    const bench = new Bench()
    const [supply, board, main] = [bench.add('supply-atx-1000'), bench.add(id), bench.add('lead-main-24-b')]
    bench.join(supply, 'main', main, 'supply')
    bench.join(main, 'out-1', board, 'main')
    startsWith(model(id), 'eps-').forEach((inlet, i) => {
      const lead = bench.add(inlet.type === 'eps-8-receptacle' ? 'lead-eps-8-b' : 'lead-atx12v-4-b')
      bench.join(supply, `eps-${i + 1}`, lead, 'supply')
      bench.join(lead, 'out-1', board, inlet.id)
    })
    const devices = bench.check().moments.find(({ moment }) => moment === 'full-scan')!.devices
    expect(devices.map(({ rail }) => rail).sort()).toEqual(['12V', '3.3V', '5V'])
    for (const { rail, voltage_V } of devices)
      expect(voltage_V, rail).toBeGreaterThan({ '12V': 11.4, '5V': 4.75, '3.3V': 3.14 }[rail])
  })
})

describe('a U.3 bay', () => {
  const seat = (drive: string) => {
    const bench = new Bench()
    const backplane = bench.add('backplane-4-u3')
    feed(bench, backplane, startsWith(model('backplane-4-u3'), 'power-'))
    const [controller, cable] = [bench.add('controller-tri-12g-16i'), bench.add('cable-8654-8i-8654-8i')]
    bench.join(controller, 'port-a', cable, 'a')
    bench.join(cable, 'b', backplane, 'data-1')
    bench.join(backplane, 'bay-1', bench.add(drive), 'plug')
    return bench.check()
  }

  it('links SATA, SAS and U.3 drives [R12]', () => {
    for (const drive of ['hdd-35-7200-sata-3tb', 'hdd-35-7200-sas-3tb', 'ssd-u3-nvme-1.92tb'])
      expect(seat(drive).dataPaths.filter(({ works }) => works).length, drive).toBeGreaterThan(0)
  })

  it('takes a U.2 drive and leaves it dark, and says why [R12]', () => {
    const { findings } = seat('ssd-u2-nvme-800gb')
    expect(findings.filter(({ rule }) => rule === 'wrong-mating')).toEqual([])
    const [dark] = findings.filter(({ rule }) => rule === 'no-data-path')
    expect(dark?.severity).toBe('fault')
    expect(dark?.message).toContain('its lanes stand on other contacts')
  })
})

describe('every model alone', () => {
  it.each(catalog.models.map(({ id }) => id))('%s does nothing that hurts', (id) => {
    const bench = new Bench()
    bench.add(id)
    const limits = ['rail-over-limit', 'group-over-limit', 'contact-over-rating', 'wire-over-ampacity']
    const { findings } = bench.check()
    expect(findings.filter(({ rule, severity }) => severity === 'danger' || limits.includes(rule))).toEqual([])
  })
})
