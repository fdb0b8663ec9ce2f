import { catalogSchema, indexCatalog, type CatalogIndex } from '#shared/catalog/catalog.ts'
import { buildDocumentSchema, type BuildDocument, type BuildDocumentInput } from '#shared/build/document.ts'
import { resolve, type ResolvedBuild } from '#shared/build/resolve.ts'
import type { MakeId } from '#shared/build/edits/outcome.ts'

const figure = (value: number) => ({ value, origin: 'common practice' as const })

const powerType = (id: string, matesWith: string[], side: 'plug' | 'receptacle') => ({
  id,
  name: id,
  standard: 'test',
  side,
  power: {
    contacts: { '12V': 3, '5V': 3, return: 5 },
    rating_A: figure(1.5),
    contactResistance_mohm: { initial: figure(30), endOfLife: figure(50) },
  },
  matesWith,
})

const dataType = (id: string, matesWith: string[], side: 'plug' | 'receptacle', lanes = 1) => ({
  id,
  name: id,
  standard: 'test',
  side,
  data: { lanes },
  matesWith,
})

const driveModel = (id: string, size: '3.5' | '2.5', plug: string) => ({
  id,
  kind: 'drive' as const,
  name: id,
  connectors: [{ id: 'plug', label: 'plug', type: plug }],
  drive: {
    size,
    capacity_TB: figure(3),
    protocol: 'sata' as const,
    rotation_rpm: 7200,
    powerDisable: 'no' as const,
  },
})

/** A handful of models, just enough for every gesture. */
export const smallCatalog: CatalogIndex = indexCatalog(
  catalogSchema.parse({
    connectorTypes: [
      { ...powerType('power-plug', ['power-receptacle'], 'plug') },
      { ...powerType('power-receptacle', ['power-plug', 'drive-plug'], 'receptacle') },
      { ...powerType('socket', ['socket-plug'], 'receptacle') },
      { ...powerType('socket-plug', ['socket'], 'plug') },
      { ...powerType('drive-plug', ['power-receptacle', 'data-receptacle', 'seat'], 'plug'), data: { lanes: 1 } },
      { ...powerType('seat', ['drive-plug'], 'receptacle'), data: { lanes: 1 } },
      dataType('data-receptacle', ['drive-plug', 'data-plug'], 'receptacle'),
      dataType('data-plug', ['data-receptacle'], 'plug'),
      dataType('wide-receptacle', ['wide-plug'], 'receptacle', 4),
      dataType('wide-plug', ['wide-receptacle'], 'plug', 4),
    ],
    classes: [],
    sources: [],
    models: [
      {
        id: 'box',
        kind: 'case',
        name: 'Box',
        bays: [1, 2, 3, 4, 5, 6, 7, 8].map((slot) => ({
          slot,
          size: slot > 6 ? '2.5' : '3.5',
          cage: slot > 6 ? 'B' : 'A',
          row: slot - 1,
          column: 0,
        })),
      },
      {
        id: 'supply',
        kind: 'supply',
        name: 'Supply',
        connectors: ['1', '2'].map((n) => ({ id: `drive-${n}`, label: n, type: 'socket' })),
        supply: {
          rails: [{ id: '12V1', rail: '12V', setPoint_V: figure(12), limit_A: figure(30) }],
          total_W: figure(400),
          toleranceAt: 'socket',
        },
      },
      {
        id: 'lead-4',
        kind: 'lead',
        name: 'Lead, 4 outlets',
        connectors: [
          { id: 'supply', label: 'supply', type: 'socket-plug' },
          ...[1, 2, 3, 4].map((n) => ({ id: `out-${n}`, label: String(n), type: 'power-receptacle' })),
        ],
      },
      {
        id: 'splitter-2',
        kind: 'splitter',
        name: 'Splitter, 1 to 2',
        connectors: [
          { id: 'in', label: 'in', type: 'power-plug' },
          ...[1, 2].map((n) => ({ id: `out-${n}`, label: String(n), type: 'power-receptacle' })),
        ],
      },
      {
        id: 'breakout-4',
        kind: 'breakout',
        name: 'Breakout, 4 legs',
        connectors: [
          { id: 'host', label: 'host', type: 'wide-plug' },
          ...[1, 2, 3, 4].map((n) => ({ id: `leg-${n}`, label: `leg ${n}`, type: 'data-receptacle' })),
        ],
      },
      {
        id: 'plane-4',
        kind: 'backplane',
        name: 'Backplane, 4 bays',
        connectors: [
          { id: 'power-1', label: 'power 1', type: 'power-plug' },
          ...[1, 2, 3, 4].map((n) => ({ id: `data-${n}`, label: `data ${n}`, type: 'data-plug' })),
          ...[1, 2, 3, 4].map((n) => ({ id: `bay-${n}`, label: `bay ${n}`, type: 'seat', bay: n })),
        ],
        lanes: [1, 2, 3, 4].map((n) => ({ from: `data-${n}`, to: `bay-${n}` })),
      },
      driveModel('disk-35', '3.5', 'drive-plug'),
      driveModel('disk-25', '2.5', 'drive-plug'),
    ],
  }),
)

export const documentOf = (input: Partial<BuildDocumentInput> = {}): BuildDocument =>
  buildDocumentSchema.parse({ format: 'bayloom-build', version: 1, name: 'Test', parts: [], joints: [], ...input })

export const buildOf = (input: Partial<BuildDocumentInput> = {}): ResolvedBuild =>
  resolve(documentOf(input), smallCatalog)

/** Ids in a row, so that a failing test prints the same every time. */
export function countingIds(): MakeId {
  let n = 0
  return (prefix) => `${prefix}-n${++n}`
}

const at = (slot: number) => ({ case: 'a', slot })

/** A case with three drives in bays 1 to 3, a supply, a lead and a breakout; nothing joined. */
export const looseParts: Partial<BuildDocumentInput> = {
  parts: [
    { id: 'a', model: 'box', ref: 'A1' },
    { id: 't', model: 'supply', ref: 'T1' },
    { id: 'w', model: 'lead-4', ref: 'W1' },
    { id: 'b', model: 'breakout-4', ref: 'W2' },
    { id: 'c1', model: 'disk-35', ref: 'C1', bay: at(1), serial: 'SN-0001' },
    { id: 'c2', model: 'disk-35', ref: 'C2', bay: at(2) },
    { id: 'c3', model: 'disk-35', ref: 'C3', bay: at(3) },
  ],
}
