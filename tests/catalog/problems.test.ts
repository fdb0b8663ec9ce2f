import { describe, expect, it } from 'vitest'
import type { Catalog } from '#shared/catalog/catalog.ts'
import { catalogProblems } from '#shared/catalog/problems.ts'
import type { Model } from '#shared/catalog/model.ts'
import { loadCatalogFiles } from '../../server/services/catalogFiles.ts'

const shipped = loadCatalogFiles()

function pick<T extends { id: string }>(items: readonly T[], id: string): T {
  const item = items.find((candidate) => candidate.id === id)
  if (!item) throw new Error(`the catalog has no "${id}"`)
  return item
}

const model = (catalog: Catalog, id: string): Model => pick(catalog.models, id)
const connector = (from: Model, id: string) => pick(from.connectors, id)

describe('the shipped catalog', () => {
  it('has no problems', () => {
    expect(catalogProblems(shipped)).toEqual([])
  })
})

/** One break for each check: what is changed, and the path and words that must come back. */
const breaks: [name: string, change: (catalog: Catalog) => void, path: string | RegExp, message: RegExp][] = [
  [
    'an id twice',
    (catalog) => catalog.models.push(model(catalog, 'fan-120')),
    /^models\[\d+\]\.id$/,
    /"fan-120" appears twice/,
  ],
  [
    'mating that is not returned',
    (catalog) => pick(catalog.connectorTypes, 'sata-host-plug').matesWith.push('sff-8087-plug'),
    'connectorTypes.sata-host-plug.matesWith',
    /"sff-8087-plug" does not name "sata-host-plug" in return/,
  ],
  [
    'mating with a type that is not there',
    (catalog) => pick(catalog.connectorTypes, 'sata-host-plug').matesWith.push('no-such-type'),
    'connectorTypes.sata-host-plug.matesWith',
    /no connector type "no-such-type"/,
  ],
  [
    'a type that mates with nothing',
    (catalog) => {
      pick(catalog.connectorTypes, 'esata-plug').matesWith = []
    },
    'connectorTypes.esata-plug.matesWith',
    /mates with nothing/,
  ],
  [
    'a type whose mate no model carries',
    (catalog) => {
      delete pick(catalog.connectorTypes, 'esata-receptacle').note
      catalog.models = catalog.models.filter(({ id }) => id !== 'cable-esata')
    },
    'connectorTypes.esata-receptacle.matesWith',
    /no model carries a connector that it mates with/,
  ],
  [
    'a figure whose source is not listed',
    (catalog) => {
      pick(catalog.connectorTypes, 'sata-power-plug').power!.rating_A.source = 'S999'
    },
    'connectorTypes.sata-power-plug.power.rating_A',
    /no source "S999"/,
  ],
  [
    'a maker’s figure without a source',
    (catalog) => {
      delete model(catalog, 'fan-120').load!['12V']!.scan_A.source
    },
    'models.fan-120.load.12V.scan_A',
    /origin "maker" needs a source/,
  ],
  [
    'a measured figure without who and when',
    (catalog) => {
      model(catalog, 'fan-120').load!['12V']!.scan_A = { value: 0.3, origin: 'measured', by: 'A. Fitter' }
    },
    'models.fan-120.load.12V.scan_A',
    /needs "by" and "on"/,
  ],
  [
    'an unknown figure without its range',
    (catalog) => {
      model(catalog, 'fan-120').load!['12V']!.rest_A = { value: null, high: 1, origin: 'class default' }
    },
    'models.fan-120.load.12V.rest_A',
    /low and high of its class/,
  ],
  [
    'a model that cites an unlisted document',
    (catalog) => model(catalog, 'fan-120').sources.push('S999'),
    /^models\.fan-120\.sources\[\d+\]$/,
    /no source "S999"/,
  ],
  [
    'a class that is not there',
    (catalog) => {
      model(catalog, 'fan-120').class = 'no-such-class'
    },
    'models.fan-120.class',
    /no class "no-such-class"/,
  ],
  [
    'a connector of an unknown type',
    (catalog) => {
      connector(model(catalog, 'cable-sata'), 'a').type = 'no-such-type'
    },
    'models.cable-sata.connectors[0].type',
    /no connector type "no-such-type"/,
  ],
  [
    'power contacts on a data connector',
    (catalog) => {
      connector(model(catalog, 'cable-sata'), 'a').contacts = { '12V': 1 }
    },
    'models.cable-sata.connectors[0].contacts',
    /carries no power contacts/,
  ],
  [
    'more contacts than the type has',
    (catalog) => {
      connector(model(catalog, 'splitter-sata-2'), 'in').contacts = { '12V': 4 }
    },
    'models.splitter-sata-2.connectors[0].contacts.12V',
    /more contacts than "sata-power-plug" has/,
  ],
  [
    'contact 3 on a connector that has none',
    (catalog) => {
      connector(model(catalog, 'splitter-4pin-2'), 'out-1').contact3 = 'open'
    },
    'models.splitter-4pin-2.connectors[1].contact3',
    /has no contact 3/,
  ],
  [
    'a slot wider than its type',
    (catalog) => {
      connector(model(catalog, 'board-desktop-6-sata'), 'slot-3').slot = { lanes: 4, generation: 3 }
    },
    /slot\.lanes$/,
    /more lanes than "pcie-slot-x1" has/,
  ],
  [
    'a bay receptacle that is not on a backplane',
    (catalog) => {
      connector(model(catalog, 'cable-sata'), 'b').bay = 1
    },
    'models.cable-sata.connectors[1].bay',
    /only backplanes/,
  ],
  [
    'a wire to a connector without that contact',
    (catalog) => {
      model(catalog, 'splitter-4pin-2').wiring[0]!.line = '3.3V'
    },
    'models.splitter-4pin-2.wiring[0].from',
    /has no 3.3V contact/,
  ],
  [
    'lanes past the end of a connector',
    (catalog) => {
      model(catalog, 'breakout-8087-sata').lanes[3]!.fromLane = 4
    },
    'models.breakout-8087-sata.lanes[3].from',
    /"host" has 4 lanes/,
  ],
  [
    'lanes past the end of the other connector',
    (catalog) => {
      model(catalog, 'breakout-8087-sata').lanes[3]!.toLane = 1
    },
    'models.breakout-8087-sata.lanes[3].to',
    /"leg-4" has 1 lanes/,
  ],
  [
    'a controller port without lanes',
    (catalog) => {
      connector(model(catalog, 'controller-sas-6g-4i'), 'port-a').type = 'peripheral-plug'
    },
    'models.controller-sas-6g-4i.connectors.port-a',
    /a port needs data lanes/,
  ],
  [
    'an uplink through a connector that is not there',
    (catalog) => {
      model(catalog, 'controller-sas-6g-4i').controllers[0]!.uplink!.connector = 'edge-2'
    },
    'models.controller-sas-6g-4i.controllers[0].uplink.connector',
    /no connector "edge-2"/,
  ],
  [
    'an uplink wider than its edge',
    (catalog) => {
      model(catalog, 'controller-sas-6g-4i').controllers[0]!.uplink!.lanes = 8
    },
    'models.controller-sas-6g-4i.controllers[0].uplink.lanes',
    /"edge" has 4 lanes/,
  ],
  [
    'a lead that feeds',
    (catalog) => {
      connector(model(catalog, 'lead-sata-4-a'), 'out-1').feeds = {}
    },
    /feeds$/,
    /only a supply feeds/,
  ],
  [
    'an outlet fed from a rail of another voltage',
    (catalog) => {
      connector(model(catalog, 'supply-atx-650'), 'drive-1').feeds!['5V'] = '12V'
    },
    /feeds\.5V$/,
    /rail "12V" is not 5V/,
  ],
  [
    'an outlet fed where it has no contact',
    (catalog) => {
      connector(model(catalog, 'supply-atx-650'), 'eps-1').feeds!['5V'] = '5V'
    },
    /feeds\.5V$/,
    /"eps-1" has no 5V contact/,
  ],
  [
    'an outlet of a supply that nothing feeds',
    (catalog) => {
      delete connector(model(catalog, 'supply-atx-650'), 'drive-1').feeds
    },
    /feeds$/,
    /is fed or hangs on one that is/,
  ],
  [
    'a rail that feeds nothing',
    (catalog) => {
      const { supply } = model(catalog, 'supply-atx-650')
      supply!.rails.push({ ...supply!.rails[0]!, id: '12V9' })
    },
    /supply\.rails\[3\]$/,
    /rail "12V9" feeds no connector/,
  ],
  [
    'a group of rails that are not there',
    (catalog) => {
      model(catalog, 'supply-atx-650').supply!.groups[0]!.rails = ['12V9']
    },
    /supply\.groups\[0\]\.rails$/,
    /no supply rail "12V9"/,
  ],
  [
    'a group without a limit',
    (catalog) => {
      delete model(catalog, 'supply-atx-650').supply!.groups[0]!.limit_W
    },
    /supply\.groups\[0\]$/,
    /a group needs a limit/,
  ],
  [
    'an efficiency curve that does not rise in share',
    (catalog) => {
      model(catalog, 'supply-atx-650').supply!.efficiency.reverse()
    },
    /efficiency\[1\]\.share$/,
    /shares rise/,
  ],
  [
    'an efficiency above one',
    (catalog) => {
      model(catalog, 'supply-atx-650').supply!.efficiency[0]!.efficiency = { value: 90, origin: 'guess' }
    },
    /efficiency\[0\]$/,
    /at most 1/,
  ],
  [
    'two bays in one place',
    (catalog) => {
      Object.assign(model(catalog, 'case-tower-8').bays[1]!, { row: 0, column: 0 })
    },
    'models.case-tower-8.bays[1]',
    /another bay is at row 0, column 0/,
  ],
  [
    'two receptacles for one bay',
    (catalog) => {
      connector(model(catalog, 'backplane-4-sata'), 'bay-2').bay = 1
    },
    'models.backplane-4-sata.connectors',
    /two receptacles serve one bay/,
  ],
  [
    'a drive whose connector has another name',
    (catalog) => {
      connector(model(catalog, 'ssd-25-sata-1tb'), 'plug').id = 'data'
    },
    'models.ssd-25-sata-1tb.connectors',
    /a drive has one connector, "plug"/,
  ],
  [
    'a splitter without its second outlet',
    (catalog) => {
      const splitter = model(catalog, 'splitter-sata-2')
      splitter.connectors.pop()
      splitter.wiring = []
    },
    'models.splitter-sata-2.connectors',
    /has a connector "out-2"/,
  ],
  [
    'a case with a connector',
    (catalog) => model(catalog, 'case-tower-8').connectors.push({ id: 'x', label: 'x', type: 'peripheral-plug' }),
    'models.case-tower-8.connectors',
    /a case has no connectors/,
  ],
  [
    'a breakout without a multilane end',
    (catalog) => {
      connector(model(catalog, 'breakout-8087-sata'), 'host').id = 'end'
    },
    'models.breakout-8087-sata.connectors',
    /multilane end/,
  ],
  [
    'a cable without direction and length',
    (catalog) => {
      delete model(catalog, 'cable-sata').cable
    },
    'models.cable-sata.cable',
    /needs its direction and length/,
  ],
  [
    'a controller that controls nothing',
    (catalog) => {
      model(catalog, 'controller-sas-6g-4i').controllers = []
    },
    'models.controller-sas-6g-4i.controllers',
    /needs its ports described/,
  ],
  [
    'an expander that joins nothing',
    (catalog) => {
      delete model(catalog, 'expander-6g-24-4pin').expander
    },
    'models.expander-6g-24-4pin.expander',
    /needs its ports described/,
  ],
  [
    'a place for a load that is not there',
    (catalog) => {
      model(catalog, 'backplane-12-exp-6g').loadAt = { '5V': 'power-1' }
    },
    'models.backplane-12-exp-6g.loadAt.5V',
    /no 5V load/,
  ],
]

describe('catalogProblems', () => {
  it.each(breaks)('finds %s', (_name, change, path, message) => {
    const broken = structuredClone(shipped)
    change(broken)
    const found = catalogProblems(broken).filter((problem) => message.test(problem.message))
    expect(found.length).toBeGreaterThan(0)
    const [first] = found
    if (typeof path === 'string') expect(first?.path).toBe(path)
    else expect(first?.path).toMatch(path)
  })
})
