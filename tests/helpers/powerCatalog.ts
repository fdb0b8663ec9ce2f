import type { BuildDocument } from '#shared/build/document.ts'
import { indexCatalog, type CatalogIndex } from '#shared/catalog/catalog.ts'
import { connectorTypeSchema } from '#shared/catalog/connectorType.ts'
import { modelClassSchema, modelSchema, type Model, type ModelInput } from '#shared/catalog/model.ts'
import type { Quantity } from '#shared/quantity/quantity.ts'
import type { Line, Rail } from '#shared/quantity/rails.ts'
import { documentOf, type BuildOptions } from './fixtures/build.ts'

type Figure = number | Quantity
/** A figure that a maker states, or a whole quantity. */
export const figure = (value: Figure): Quantity => (typeof value === 'number' ? { value, origin: 'maker' } : value)

/** Round numbers, so that every expected result can be worked out by hand. */
const contactTypes = [
  {
    id: 'sata-power-receptacle',
    side: 'receptacle',
    matesWith: ['sata-drive-plug', 'sata-power-plug'],
    contacts: { '12V': 3, '5V': 3, '3.3V': 3, return: 5 },
    rating: 1.5,
    ohm: [30, 45],
    pin3: true,
  },
  {
    id: 'sata-power-plug',
    side: 'plug',
    matesWith: ['sata-power-receptacle'],
    contacts: { '12V': 3, '5V': 3, '3.3V': 3, return: 5 },
    rating: 1.5,
    ohm: [30, 45],
    pin3: true,
  },
  {
    id: 'sata-drive-plug',
    side: 'plug',
    matesWith: ['sata-power-receptacle'],
    contacts: { '12V': 3, '5V': 3, '3.3V': 3, return: 5 },
    rating: 1.5,
    ohm: [30, 45],
    pin3: true,
  },
  {
    id: 'peripheral-receptacle',
    side: 'receptacle',
    matesWith: ['peripheral-plug'],
    contacts: { '12V': 1, '5V': 1, return: 2 },
    rating: 9,
    ohm: [3.5, 7],
    byWire: [
      [16, 10],
      [18, 9],
      [20, 7],
    ],
  },
  {
    id: 'peripheral-plug',
    side: 'plug',
    matesWith: ['peripheral-receptacle'],
    contacts: { '12V': 1, '5V': 1, return: 2 },
    rating: 9,
    ohm: [3.5, 7],
    byWire: [
      [16, 10],
      [18, 9],
      [20, 7],
    ],
  },
  {
    id: 'modular-6-socket',
    side: 'receptacle',
    matesWith: ['modular-6-plug'],
    contacts: { '12V': 2, '5V': 1, '3.3V': 1, return: 2 },
    rating: 8,
    ohm: [10, 20],
  },
  {
    id: 'modular-6-plug',
    side: 'plug',
    matesWith: ['modular-6-socket'],
    contacts: { '12V': 2, '5V': 1, '3.3V': 1, return: 2 },
    rating: 8,
    ohm: [10, 20],
  },
  {
    id: 'pcie-slot-x8',
    side: 'slot',
    matesWith: ['pcie-edge-x8'],
    contacts: { '12V': 5, '3.3V': 4, return: 10 },
    rating: 1.1,
    ohm: [30, 45],
  },
  {
    id: 'pcie-edge-x8',
    side: 'edge',
    matesWith: ['pcie-slot-x8'],
    contacts: { '12V': 5, '3.3V': 4, return: 10 },
    rating: 1.1,
    ohm: [30, 45],
  },
  {
    id: 'bare-receptacle',
    side: 'receptacle',
    matesWith: ['bare-plug'],
    contacts: { '12V': 1, '5V': 1, '3.3V': 1, return: 1 },
    rating: 1000,
    ohm: [0, 0],
  },
  {
    id: 'bare-plug',
    side: 'plug',
    matesWith: ['bare-receptacle'],
    contacts: { '12V': 1, '5V': 1, '3.3V': 1, return: 1 },
    rating: 1000,
    ohm: [0, 0],
  },
] as const

const connectorTypes = contactTypes.map((type) =>
  connectorTypeSchema.parse({
    id: type.id,
    name: type.id,
    standard: type.id.replace(/-(plug|receptacle|socket)$/, ''),
    side: type.side,
    matesWith: type.matesWith,
    power: {
      contacts: type.contacts,
      rating_A: figure(type.rating),
      contactResistance_mohm: { initial: figure(type.ohm[0]), endOfLife: figure(type.ohm[1]) },
      hasPowerDisableContact: 'pin3' in type,
      ...('byWire' in type
        ? { ratingByWire: type.byWire.map(([awg, rating]) => ({ awg, rating_A: figure(rating) })) }
        : {}),
    },
  }),
)

const allLines: readonly Line[] = ['12V', '5V', '3.3V', 'return']

/** Conductors of all lines from one connector to the next along a chain. */
export function chain(
  ids: readonly string[],
  { awg = 18, length_mm = 100, lines = allLines }: { awg?: number; length_mm?: number; lines?: readonly Line[] } = {},
): NonNullable<ModelInput['wiring']> {
  return ids
    .slice(1)
    .flatMap((to, i) => lines.map((line) => ({ from: ids[i]!, to, line, awg, length_mm: figure(length_mm) })))
}

/** Conductors given by their resistance. */
export const planes = (
  pairs: readonly (readonly [from: string, to: string, mohm: number])[],
  lines: readonly Line[] = allLines,
): NonNullable<ModelInput['wiring']> =>
  pairs.flatMap(([from, to, mohm]) => lines.map((line) => ({ from, to, line, resistance_mohm: figure(mohm) })))

export const connector = (id: string, type: string, more: object = {}) => ({ id, label: id, type, ...more })

type Raw = Omit<ModelInput, 'id' | 'name'>
export const model = (id: string, raw: Raw): Model => modelSchema.parse({ id, name: id, ...raw })

export interface SupplyOptions {
  limits?: Partial<Record<Rail, Figure>>
  setPoints?: Partial<Record<Rail, Figure>>
  peak?: { peak_A: Figure; peak_s?: Figure }
  total_W?: Figure
  groups?: NonNullable<ModelInput['supply']>['groups']
  family?: string
  sockets?: number
  type?: string
  extra?: Partial<Raw>
}

const nominal: Record<Rail, number> = { '12V': 12, '5V': 5, '3.3V': 3.3 }

/** A supply with one rail of each voltage and sockets `s1`, `s2`... */
export function supply(id: string, options: SupplyOptions = {}): Model {
  const { limits = {}, setPoints = {}, peak, total_W = 2000, groups = [], family, sockets = 4 } = options
  const railIds: readonly Rail[] = ['12V', '5V', '3.3V']
  return model(id, {
    kind: 'supply',
    ...(family === undefined ? {} : { pinoutFamily: family }),
    connectors: Array.from({ length: sockets }, (_, i) =>
      connector(`s${i + 1}`, options.type ?? 'bare-receptacle', {
        feeds: { '12V': '12V', '5V': '5V', '3.3V': '3.3V' },
      }),
    ),
    supply: {
      rails: railIds.map((rail) => ({
        id: rail,
        rail,
        setPoint_V: figure(setPoints[rail] ?? nominal[rail]),
        limit_A: figure(limits[rail] ?? 100),
        ...(peak && rail === '12V'
          ? { peak_A: figure(peak.peak_A), ...(peak.peak_s === undefined ? {} : { peak_s: figure(peak.peak_s) }) }
          : {}),
      })),
      groups,
      total_W: figure(total_W),
      toleranceAt: 'socket',
      efficiency: [
        { share: 0.2, efficiency: figure(0.8) },
        { share: 1, efficiency: figure(0.9) },
      ],
    },
    ...options.extra,
  })
}

export interface DriveOptions {
  start_A?: Figure
  start_s?: Figure
  /** Drawn on 12 V and 5 V. */
  rest_A?: readonly [Figure, Figure]
  scan_A?: readonly [Figure, Figure]
  write5_A?: Figure
  sleep_A?: readonly [Figure, Figure]
  start5_A?: Figure
  plug?: string
  drive?: Partial<NonNullable<ModelInput['drive']>>
  extra?: Partial<Raw>
}

/** A 3.5 in drive: 2 A at start, 0.5 A resting and 0.6 A scanning on 12 V; 0.5 A on 5 V. */
export function motorDrive(id: string, options: DriveOptions = {}): Model {
  const { rest_A = [0.5, 0.5], scan_A = [0.6, 0.5], start_A = 2, start_s = 10, start5_A = 0.5 } = options
  return model(id, {
    kind: 'drive',
    connectors: [connector('plug', options.plug ?? 'sata-drive-plug')],
    load: {
      '12V': {
        rest_A: figure(rest_A[0]),
        scan_A: figure(scan_A[0]),
        ...(options.sleep_A ? { sleep_A: figure(options.sleep_A[0]) } : {}),
        start: { peak_A: figure(start_A), seconds: figure(start_s) },
      },
      '5V': {
        rest_A: figure(rest_A[1]),
        scan_A: figure(scan_A[1]),
        ...(options.sleep_A ? { sleep_A: figure(options.sleep_A[1]) } : {}),
        start: { peak_A: figure(start5_A), seconds: figure(start_s) },
      },
    },
    drive: {
      size: '3.5',
      capacity_TB: figure(3),
      protocol: 'sata',
      rotation_rpm: 7200,
      startControl: ['standby-command'],
      powerDisable: 'no',
      ...options.drive,
    },
    ...options.extra,
  })
}

/** A 2.5 in solid-state drive on 5 V alone. */
export function solidState(
  id: string,
  { scan_A = 0.5, write_A = 0.9 }: { scan_A?: Figure; write_A?: Figure } = {},
): Model {
  return model(id, {
    kind: 'drive',
    connectors: [connector('plug', 'sata-drive-plug')],
    load: { '5V': { rest_A: figure(0.1), scan_A: figure(scan_A), write_A: figure(write_A) } },
    drive: {
      size: '2.5',
      capacity_TB: figure(1),
      protocol: 'sata',
      rotation_rpm: 0,
      powerDisable: 'no',
    },
  })
}

/** Something that takes the same current at all times. */
export const steadyLoad = (id: string, amperes: Partial<Record<Rail, Figure>>, type = 'bare-plug'): Model =>
  model(id, {
    kind: 'load',
    connectors: [connector('power', type)],
    load: Object.fromEntries(
      Object.entries(amperes).map(([rail, value]) => [rail, { rest_A: figure(value), scan_A: figure(value) }]),
    ),
  })

const models: readonly Model[] = [
  supply('supply'),
  supply('supply-a', { type: 'modular-6-socket', family: 'family-a' }),
  motorDrive('drive'),
  solidState('ssd'),
  // Four SATA outlets on a lead, 18 AWG.
  model('lead', {
    kind: 'lead',
    connectors: [
      connector('supply', 'bare-plug'),
      ...['out-1', 'out-2', 'out-3', 'out-4'].map((id) => connector(id, 'sata-power-receptacle')),
    ],
    wiring: chain(['supply', 'out-1', 'out-2', 'out-3', 'out-4'], { length_mm: 50 }),
  }),
  model('lead-thin', {
    kind: 'lead',
    connectors: [
      connector('supply', 'bare-plug'),
      ...['out-1', 'out-2', 'out-3', 'out-4'].map((id) => connector(id, 'sata-power-receptacle')),
    ],
    wiring: chain(['supply', 'out-1', 'out-2', 'out-3', 'out-4'], { awg: 22, length_mm: 50 }),
  }),
  model('lead-a', {
    kind: 'lead',
    pinoutFamily: 'family-a',
    connectors: [
      connector('supply', 'modular-6-plug'),
      ...['out-1', 'out-2', 'out-3', 'out-4'].map((id) => connector(id, 'sata-power-receptacle')),
    ],
    wiring: chain(['supply', 'out-1', 'out-2', 'out-3', 'out-4'], { length_mm: 50 }),
  }),
  model('splitter-2', {
    kind: 'splitter',
    connectors: [
      connector('in', 'sata-power-plug'),
      ...['out-1', 'out-2'].map((id) => connector(id, 'sata-power-receptacle')),
    ],
    wiring: [...chain(['in', 'out-1'], { length_mm: 10 }), ...chain(['in', 'out-2'], { length_mm: 10 })],
  }),
  model('splitter-4', {
    kind: 'splitter',
    connectors: [
      connector('in', 'sata-power-plug'),
      ...['out-1', 'out-2', 'out-3', 'out-4'].map((id) => connector(id, 'sata-power-receptacle')),
    ],
    wiring: ['out-1', 'out-2', 'out-3', 'out-4'].flatMap((id) => chain(['in', id], { length_mm: 10 })),
  }),
]

const classes = [
  modelClassSchema.parse({
    id: 'hungry',
    kind: 'drive',
    name: 'hungry',
    load: { '12V': { rest_A: figure(1), scan_A: figure({ value: 1, high: 1.4, origin: 'class default' }) } },
  }),
]

export const powerCatalog: CatalogIndex = indexCatalog({
  connectorTypes: [...connectorTypes],
  classes,
  models: [...models],
  sources: [],
})

/** A document in shorthand, as `documentOf`. */
export const powerDocument = (
  parts: Parameters<typeof documentOf>[0],
  joints: readonly string[] = [],
  options: BuildOptions = {},
): BuildDocument => documentOf(parts, joints, options)
