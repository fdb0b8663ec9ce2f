import type { z } from 'zod'
import { buildDocumentSchema, type BuildDocumentInput } from '#shared/build/document.ts'
import { resolve, type ResolvedBuild } from '#shared/build/resolve.ts'
import { indexCatalog, type CatalogIndex } from '#shared/catalog/catalog.ts'
import { connectorTypeSchema } from '#shared/catalog/connectorType.ts'
import { modelSchema, type ModelInput } from '#shared/catalog/model.ts'

/*
 * A handful of parts, just enough to draw: figures play no role in an arrangement, so every one is a guess of 1.
 */

const one = { value: 1, origin: 'guess' } as const
const powerContacts = { '12V': 1, '5V': 1, return: 2 }

type TypeInput = z.input<typeof connectorTypeSchema>

const type = (
  id: string,
  side: TypeInput['side'],
  carries: { power?: true; lanes?: number },
  matesWith: string[],
): TypeInput => ({
  id,
  name: id,
  standard: 'none',
  side,
  matesWith,
  ...(carries.power && {
    power: {
      contacts: powerContacts,
      rating_A: one,
      contactResistance_mohm: { initial: one, endOfLife: one },
    },
  }),
  ...(carries.lanes && { data: { lanes: carries.lanes } }),
})

const types: TypeInput[] = [
  type('socket', 'receptacle', { power: true }, ['socket-plug']),
  type('socket-plug', 'plug', { power: true }, ['socket']),
  type('outlet', 'receptacle', { power: true }, ['inlet', 'drive-plug']),
  type('inlet', 'plug', { power: true }, ['outlet']),
  type('drive-plug', 'plug', { power: true, lanes: 2 }, ['outlet', 'data-receptacle', 'both-receptacle']),
  type('data-receptacle', 'receptacle', { lanes: 1 }, ['drive-plug', 'host-plug']),
  type('host-plug', 'plug', { lanes: 1 }, ['data-receptacle']),
  type('both-receptacle', 'receptacle', { power: true, lanes: 2 }, ['drive-plug']),
  type('multi-receptacle', 'receptacle', { lanes: 4 }, ['multi-plug']),
  type('multi-plug', 'plug', { lanes: 4 }, ['multi-receptacle']),
  type('slot', 'slot', { power: true, lanes: 8 }, ['edge']),
  type('edge', 'edge', { power: true, lanes: 8 }, ['slot']),
]

const conductors = (pairs: [string, string][]): ModelInput['wiring'] =>
  pairs.flatMap(([from, to]) =>
    (['12V', '5V', 'return'] as const).map((line) => ({ from, to, line, resistance_mohm: one })),
  )

const named = (prefix: string, count: number, of: string) =>
  Array.from({ length: count }, (_, i) => ({ id: `${prefix}-${i + 1}`, label: `${prefix} ${i + 1}`, type: of }))

const lead = (outlets: number): ModelInput => ({
  id: `lead-${outlets}`,
  kind: 'lead',
  name: `lead, ${outlets} outlets`,
  connectors: [{ id: 'supply', label: 'supply end', type: 'socket-plug' }, ...named('out', outlets, 'outlet')],
  wiring: conductors(
    Array.from({ length: outlets }, (_, i) => [i === 0 ? 'supply' : `out-${i}`, `out-${i + 1}`] as [string, string]),
  ),
})

const splitter = (outlets: number): ModelInput => ({
  id: `splitter-${outlets}`,
  kind: 'splitter',
  name: `1 to ${outlets}`,
  connectors: [{ id: 'in', label: 'in', type: 'inlet' }, ...named('out', outlets, 'outlet')],
  wiring: conductors(Array.from({ length: outlets }, (_, i) => ['in', `out-${i + 1}`] as [string, string])),
})

const caseOf = (bays: number, columns = 4, cages = 1): ModelInput => ({
  id: `case-${bays}`,
  kind: 'case',
  name: `${bays} bays`,
  bayView: 'front',
  bays: Array.from({ length: bays }, (_, i) => ({
    slot: i + 1,
    size: '3.5' as const,
    cage: `cage ${1 + Math.floor((i * cages) / bays)}`,
    row: Math.floor(i / columns),
    column: i % columns,
  })),
})

const backplane = (bays: number, inlets: number): ModelInput => ({
  id: `backplane-${bays}`,
  kind: 'backplane',
  name: `backplane, ${bays} bays`,
  connectors: [
    ...named('power', inlets, 'inlet'),
    ...named('data', Math.ceil(bays / 4), 'multi-receptacle'),
    ...named('bay', bays, 'both-receptacle').map((connector, i) => ({ ...connector, bay: i + 1 })),
  ],
  wiring: conductors(
    Array.from({ length: bays }, (_, i) => [`power-${1 + (i % inlets)}`, `bay-${i + 1}`] as [string, string]),
  ),
  lanes: Array.from({ length: bays }, (_, i) => ({
    from: `data-${1 + Math.floor(i / 4)}`,
    fromLane: i % 4,
    to: `bay-${i + 1}`,
  })),
})

const models: ModelInput[] = [
  {
    id: 'supply',
    kind: 'supply',
    name: 'supply 650 W',
    connectors: named('drive', 6, 'socket'),
    supply: {
      rails: [{ id: '12V1', rail: '12V', setPoint_V: one, limit_A: one }],
      total_W: one,
      toleranceAt: 'socket',
    },
  },
  lead(3),
  lead(4),
  splitter(2),
  splitter(4),
  {
    id: 'breakout-data',
    kind: 'breakout',
    name: 'breakout, 4 legs',
    connectors: [{ id: 'host', label: 'host', type: 'multi-plug' }, ...named('leg', 4, 'data-receptacle')],
    lanes: [1, 2, 3, 4].map((leg) => ({ from: 'host', fromLane: leg - 1, to: `leg-${leg}` })),
    cable: { direction: 'forward', length_mm: one },
  },
  {
    id: 'breakout-tails',
    kind: 'breakout',
    name: 'breakout, 4 legs with tails',
    connectors: [
      { id: 'host', label: 'host', type: 'multi-plug' },
      ...named('leg', 4, 'both-receptacle'),
      ...named('tail', 4, 'inlet'),
    ],
    wiring: conductors([1, 2, 3, 4].map((leg) => [`tail-${leg}`, `leg-${leg}`] as [string, string])),
    lanes: [1, 2, 3, 4].map((leg) => ({ from: 'host', fromLane: leg - 1, to: `leg-${leg}` })),
    cable: { direction: 'forward', length_mm: one },
  },
  {
    id: 'cable-multi',
    kind: 'cable',
    name: 'multilane cable',
    connectors: [
      { id: 'a', label: 'a', type: 'multi-plug' },
      { id: 'b', label: 'b', type: 'multi-plug' },
    ],
    lanes: [{ from: 'a', to: 'b', count: 4 }],
    cable: { length_mm: one },
  },
  {
    id: 'cable-data',
    kind: 'cable',
    name: 'data cable',
    connectors: [
      { id: 'a', label: 'a', type: 'data-receptacle' },
      { id: 'b', label: 'b', type: 'data-receptacle' },
    ],
    lanes: [{ from: 'a', to: 'b' }],
    cable: { length_mm: one },
  },
  {
    id: 'controller',
    kind: 'controller',
    name: '8 lanes, 6 Gb/s',
    connectors: [
      { id: 'port-a', label: 'port A', type: 'multi-receptacle' },
      { id: 'port-b', label: 'port B', type: 'multi-receptacle' },
      { id: 'edge', label: 'edge', type: 'edge' },
    ],
    controllers: [
      {
        id: 'c',
        name: 'controller',
        ports: ['port-a', 'port-b'],
        protocols: ['sas', 'sata'],
        rate_Gbps: one,
        maxDevices: one,
        modes: ['pass-through'],
      },
    ],
  },
  {
    id: 'expander',
    kind: 'expander',
    name: 'expander, 6 ports',
    connectors: [...named('port', 6, 'multi-receptacle'), { id: 'power', label: 'power', type: 'inlet' }],
    expander: {
      ports: [1, 2, 3, 4, 5, 6].map((i) => `port-${i}`),
      protocols: ['sas', 'sata'],
      rate_Gbps: one,
      maxDevices: one,
    },
  },
  {
    id: 'board',
    kind: 'board',
    name: 'board',
    connectors: [
      { id: 'main', label: 'main', type: 'inlet' },
      { id: 'eps-1', label: 'eps 1', type: 'inlet' },
      ...named('slot', 2, 'slot'),
      ...named('sata', 6, 'host-plug'),
      { id: 'fan-1', label: 'fan 1', type: 'outlet' },
    ],
  },
  caseOf(12),
  caseOf(24, 4, 6),
  caseOf(60, 6, 5),
  backplane(12, 2),
  backplane(4, 1),
  {
    id: 'drive',
    kind: 'drive',
    name: '3 TB SAS, 7200',
    connectors: [{ id: 'plug', label: 'plug', type: 'drive-plug' }],
    drive: { size: '3.5', capacity_TB: one, protocol: 'sas', rotation_rpm: 7200, powerDisable: 'no' },
  },
  { id: 'fan', kind: 'fan', name: 'fan', connectors: [{ id: 'power', label: 'power', type: 'inlet' }] },
]

export const smallCatalog: CatalogIndex = indexCatalog({
  connectorTypes: types.map((input) => connectorTypeSchema.parse(input)),
  classes: [],
  models: models.map((input) => modelSchema.parse(input)),
  sources: [],
})

/** Writes a document by hand: parts as "id model", joints as "part.connector part.connector". */
export function buildOf(
  parts: ({ id: string; model: string } & Partial<BuildDocumentInput['parts'][number]>)[],
  joints: string[] = [],
): ResolvedBuild {
  const counts = new Map<string, number>()
  const letter = (model: string): string => {
    const kind = smallCatalog.models.get(model)?.kind
    if (kind === 'supply') return 'T'
    if (kind === 'drive') return 'C'
    if (kind === 'case') return 'A'
    if (kind === 'backplane') return 'U'
    return kind === 'board' || kind === 'controller' || kind === 'expander' ? 'K' : kind === 'fan' ? 'G' : 'W'
  }
  const document = buildDocumentSchema.parse({
    format: 'bayloom-build',
    version: 1,
    name: 'Reel vault, north room',
    machine: 'RV-N-01',
    parts: parts.map((part) => {
      const first = letter(part.model)
      counts.set(first, (counts.get(first) ?? 0) + 1)
      return { ref: `${first}${counts.get(first)}`, ...part }
    }),
    joints: joints.map((text, i) => {
      const [a = '', b = ''] = text.split(' ')
      const end = (place: string) => ({ part: place.split('.')[0] ?? '', connector: place.split('.')[1] ?? '' })
      return { id: `j${i + 1}`, a: end(a), b: end(b) }
    }),
  })
  return resolve(document, smallCatalog)
}
