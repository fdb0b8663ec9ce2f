import { z } from 'zod'
import { quantitySchema } from '../quantity/quantity.ts'
import { lineSchema, railSchema } from '../quantity/rails.ts'
import { contactsSchema } from './connectorType.ts'
import { catalogIdSchema, localIdSchema } from './ids.ts'

export const modelKinds = [
  'supply',
  'lead',
  'splitter',
  'adapter',
  'breakout',
  'cable',
  'controller',
  'expander',
  'backplane',
  'board',
  'case',
  'drive',
  'fan',
  'load',
] as const
export type ModelKind = (typeof modelKinds)[number]

export const protocols = ['sata', 'sas', 'nvme'] as const
export type Protocol = (typeof protocols)[number]
export const protocolSchema = z.enum(protocols)

export const bySpinUpMeans = ['controller', 'device-pin', 'standby-command'] as const
export const spinUpMeansSchema = z.enum(bySpinUpMeans)
export type SpinUpMeans = z.infer<typeof spinUpMeansSchema>

/** A connector of a model, listed in the physical order of the real part. */
export const modelConnectorSchema = z.strictObject({
  id: localIdSchema,
  /** Short name printed on the part, tape and phone: "1", "leg 3", "port A". */
  label: z.string().min(1).max(40),
  type: catalogIdSchema,
  /** Contacts really wired in this part, where fewer than (or, for modular sockets, other than) the type's. */
  contacts: contactsSchema.optional(),
  /** Supply outlets: which supply rail (id in `supply.rails`) feeds each rail of this connector. */
  feeds: z.partialRecord(railSchema, localIdSchema).optional(),
  /** Contact 3 of a 15-contact power segment: left open, or fed with 3.3 V whenever 3.3 V arrives. Default: fed. */
  contact3: z.enum(['fed', 'open']).optional(),
  /** Contact 11 of a 15-contact power segment: grounded (drive starts at once) or left floating (drive waits). */
  contact11: z.enum(['grounded', 'floating']).optional(),
  /** Bay receptacles of a backplane: which bay of it, from 1. */
  bay: z.int().min(1).max(400).optional(),
  /** Slots of a board: lanes really wired, and PCI Express generation. */
  slot: z.strictObject({ lanes: z.int().min(1).max(16), generation: z.int().min(1).max(6) }).optional(),
})
export type ModelConnector = z.infer<typeof modelConnectorSchema>

/** As `from` of a conductor of a supply: the supply's own board, where the rail that feeds `to` comes out. */
export const supplyInside = 'inside'

/** A conductor between two connectors of one part: wire by AWG or area, or a plane given as a resistance. */
export const conductorSchema = z
  .strictObject({
    from: localIdSchema,
    to: localIdSchema,
    line: lineSchema,
    awg: z.int().min(0).max(40).optional(),
    area_mm2: quantitySchema.optional(),
    /** Equal wires in parallel. */
    wires: z.int().min(1).max(16).default(1),
    length_mm: quantitySchema.optional(),
    /** Instead of gauge and length: a printed-board plane or measured conductor. */
    resistance_mohm: quantitySchema.optional(),
    /** Instead of the table for the gauge: what the whole conductor (all wires) may carry. */
    ampacity_A: quantitySchema.optional(),
    /** Wire style, as "UL 1007". */
    style: z.string().max(40).optional(),
  })
  .superRefine((conductor, context) => {
    const byGauge = conductor.awg !== undefined || conductor.area_mm2 !== undefined
    if (conductor.resistance_mohm === undefined && (!byGauge || conductor.length_mm === undefined))
      context.addIssue({ code: 'custom', message: 'give awg or area_mm2 with length_mm, or resistance_mohm' })
    if (conductor.from === conductor.to)
      context.addIssue({ code: 'custom', path: ['to'], message: 'a conductor needs two different connectors' })
  })
export type Conductor = z.infer<typeof conductorSchema>

/** `count` lanes from one connector's lane onwards to another's. Undirected: a lane can be followed either way. */
export const laneRouteSchema = z.strictObject({
  from: localIdSchema,
  fromLane: z.int().min(0).max(15).default(0),
  to: localIdSchema,
  toLane: z.int().min(0).max(15).default(0),
  count: z.int().min(1).max(16).default(1),
})
export type LaneRoute = z.infer<typeof laneRouteSchema>

export const supplyRailSchema = z.strictObject({
  id: localIdSchema,
  rail: railSchema,
  setPoint_V: quantitySchema,
  limit_A: quantitySchema,
  /** Peak that the maker states, with the seconds it holds. Absent: none stated, the limit stands at start too. */
  peak_A: quantitySchema.optional(),
  peak_s: quantitySchema.optional(),
})
export type SupplyRail = z.infer<typeof supplyRailSchema>

/** Rails that share one limit: a 5 V + 3.3 V group in watts, or 12 V rails behind one converter in amperes. */
export const supplyGroupSchema = z.strictObject({
  id: localIdSchema,
  name: z.string().min(1).max(80),
  rails: z.array(localIdSchema).min(1).max(16),
  limit_W: quantitySchema.optional(),
  limit_A: quantitySchema.optional(),
})
export type SupplyGroup = z.infer<typeof supplyGroupSchema>

export const supplySchema = z.strictObject({
  rails: z.array(supplyRailSchema).min(1).max(16),
  groups: z.array(supplyGroupSchema).max(16).default([]),
  total_W: quantitySchema,
  peakTotal_W: quantitySchema.optional(),
  /** Where the stated tolerance holds: at the far end of the supply's own captive leads, or at its sockets. */
  toleranceAt: z.enum(['lead-end', 'socket']),
  /** Share of rated watts (0 to 1) against efficiency (0 to 1), rising in share. */
  efficiency: z
    .array(z.strictObject({ share: z.number().min(0).max(1.5), efficiency: quantitySchema }))
    .max(12)
    .default([]),
  powerFactor: quantitySchema.optional(),
})
export type Supply = z.infer<typeof supplySchema>

/** A rail that a board or backplane makes from another one, as 5 V for drives from a supply that gives 12 V only. */
export const converterSchema = z.strictObject({
  id: localIdSchema,
  /** Where it takes its power from. */
  from: z.strictObject({ rail: z.enum(['12V', '5V']), connector: localIdSchema }),
  rail: z.enum(['5V', '3.3V']),
  /** What it feeds. An outlet further along is reached by the part's own `wiring`. */
  feeds: z.array(localIdSchema).min(1).max(64),
  setPoint_V: quantitySchema,
  limit_A: quantitySchema,
  /** 0 to 1. */
  efficiency: quantitySchema,
})
export type Converter = z.infer<typeof converterSchema>

/** What one rail feeds in a device, moment by moment. A start belongs to motors; a write burst to solid-state drives. */
export const railLoadSchema = z.strictObject({
  rest_A: quantitySchema,
  scan_A: quantitySchema,
  sleep_A: quantitySchema.optional(),
  write_A: quantitySchema.optional(),
  start: z
    .strictObject({
      /** Highest current that lasts (not the instant of switching on). */
      peak_A: quantitySchema,
      mean_A: quantitySchema.optional(),
      /** Highest instant, where the maker prints one. */
      instant_A: quantitySchema.optional(),
      seconds: quantitySchema,
    })
    .optional(),
})
export type RailLoad = z.infer<typeof railLoadSchema>

export const loadSchema = z.strictObject({
  '12V': railLoadSchema.optional(),
  '5V': railLoadSchema.optional(),
  '3.3V': railLoadSchema.optional(),
})
export type Load = z.infer<typeof loadSchema>

/** Voltage a device accepts at its plug, as per cent below and above nominal. */
export const toleranceSchema = z.strictObject({
  below_pct: quantitySchema,
  above_pct: quantitySchema.optional(),
  /** A wider lower edge allowed while the motor starts, where the maker says so. */
  belowAtStart_pct: quantitySchema.optional(),
})
export type Tolerance = z.infer<typeof toleranceSchema>

export const driveSizes = ['3.5', '2.5', 'M.2'] as const

export const driveSchema = z.strictObject({
  size: z.enum(driveSizes),
  height_mm: quantitySchema.optional(),
  capacity_TB: quantitySchema,
  protocol: protocolSchema,
  /** Line rate of the drive's port, Gb/s; for NVMe give `pcie`. */
  rate_Gbps: quantitySchema.optional(),
  pcie: z.strictObject({ lanes: z.int().min(1).max(4), generation: z.int().min(1).max(6) }).optional(),
  ports: z.int().min(1).max(2).default(1),
  /** 0 for solid-state drives. */
  rotation_rpm: z.int().min(0).max(20000),
  sectors: z
    .strictObject({ logical_B: z.int().min(512).max(4224), physical_B: z.int().min(512).max(16384) })
    .optional(),
  /** Sequential rate at the outer and inner track, decimal MB/s. */
  outerRate_MBps: quantitySchema.optional(),
  innerRate_MBps: quantitySchema.optional(),
  /** Means of delaying the start that the drive understands. */
  startControl: z.array(spinUpMeansSchema).max(3).default([]),
  /** Does 3.3 V on contact 3 keep the drive off. */
  powerDisable: z.enum(['yes', 'no', 'unknown']),
  tolerance: z.partialRecord(railSchema, toleranceSchema).default({}),
})
export type Drive = z.infer<typeof driveSchema>

/** One host controller on a card or board. */
export const controllerSchema = z.strictObject({
  id: localIdSchema,
  name: z.string().min(1).max(80),
  ports: z.array(localIdSchema).min(1).max(32),
  protocols: z.array(protocolSchema).min(1).max(3),
  rate_Gbps: quantitySchema,
  maxDevices: quantitySchema,
  /** Largest drive it can address whole. */
  maxCapacity_TB: quantitySchema.optional(),
  /** Logical sector sizes it hands on. */
  sectors_B: z.array(z.int().min(512).max(4224)).max(8).optional(),
  modes: z
    .array(z.enum(['pass-through', 'combined']))
    .min(1)
    .max(2),
  startControl: z.array(spinUpMeansSchema).max(3).default([]),
  /** Way to the processor: through a card edge in a slot, or wired on the board. Absent: not a bottleneck. */
  uplink: z
    .strictObject({
      connector: localIdSchema.optional(),
      lanes: z.int().min(1).max(16),
      generation: z.int().min(1).max(6),
    })
    .optional(),
})
export type Controller = z.infer<typeof controllerSchema>

/** Any of its ports reaches any other. */
export const expanderSchema = z.strictObject({
  ports: z.array(localIdSchema).min(1).max(64),
  protocols: z.array(protocolSchema).min(1).max(3),
  rate_Gbps: quantitySchema,
  maxDevices: quantitySchema,
  startControl: z.array(spinUpMeansSchema).max(3).default([]),
})
export type Expander = z.infer<typeof expanderSchema>

export const cableSchema = z.strictObject({
  /** Multilane at the controller and legs at drives (forward), legs at host ports (reverse), or the same both ways. */
  direction: z.enum(['forward', 'reverse', 'symmetric']).default('symmetric'),
  length_mm: quantitySchema,
  /** Highest line rate it is sold for. */
  rate_Gbps: quantitySchema.optional(),
  /** Bridges or adapters that change shape only, not protocol. */
  note: z.string().max(300).optional(),
})
export type Cable = z.infer<typeof cableSchema>

export const baySchema = z.strictObject({
  slot: z.int().min(1).max(400),
  size: z.enum(['3.5', '2.5']),
  /** Smaller drives that also fit, with or without a tray adapter. */
  alsoFits: z.array(z.enum(driveSizes)).max(3).default([]),
  cage: z.string().min(1).max(40),
  /** Place on the case front as the hand meets it: row from the top, column from the left, from 0. */
  row: z.int().min(0).max(60),
  column: z.int().min(0).max(60),
})
export type Bay = z.infer<typeof baySchema>

export const constructions = ['crimped', 'insulation-displacement', 'moulded', 'board', 'unknown'] as const

/** One thing that can be bought, with its connectors in physical order and every figure with its origin. */
export const modelSchema = z
  .strictObject({
    id: catalogIdSchema,
    kind: z.enum(modelKinds),
    name: z.string().min(1).max(120),
    summary: z.string().max(400).optional(),
    /** Class by which unknown figures are taken, as "hdd-3.5-7200". */
    class: catalogIdSchema.optional(),
    connectors: z.array(modelConnectorSchema).max(200).default([]),
    wiring: z.array(conductorSchema).max(1000).default([]),
    lanes: z.array(laneRouteSchema).max(400).default([]),
    supply: supplySchema.optional(),
    converters: z.array(converterSchema).max(8).default([]),
    /** Family of the supply-side pinout: supplies and their modular leads only work within one family. */
    pinoutFamily: z.string().min(1).max(60).optional(),
    /** How the plugs are made. Matters for adapters. */
    construction: z.enum(constructions).optional(),
    load: loadSchema.optional(),
    /** Connector at which each rail's load is drawn. Absent: the part's first connector that carries the rail. */
    loadAt: z.partialRecord(railSchema, localIdSchema).optional(),
    drive: driveSchema.optional(),
    controllers: z.array(controllerSchema).max(8).default([]),
    expander: expanderSchema.optional(),
    cable: cableSchema.optional(),
    bays: z.array(baySchema).max(400).default([]),
    /** From where the bay map is seen. */
    bayView: z.enum(['front', 'rear', 'top']).optional(),
    sources: z.array(z.string().max(60)).max(20).default([]),
    note: z.string().max(600).optional(),
  })
  .superRefine((model, context) => {
    const known = new Set<string>()
    model.connectors.forEach((connector, i) => {
      if (known.has(connector.id))
        context.addIssue({
          code: 'custom',
          path: ['connectors', i, 'id'],
          message: `connector "${connector.id}" appears twice`,
        })
      known.add(connector.id)
    })
    const check = (id: string, path: (string | number)[]) => {
      if (!known.has(id)) context.addIssue({ code: 'custom', path, message: `no connector "${id}" on this model` })
    }
    model.wiring.forEach((conductor, i) => {
      if (!model.supply || conductor.from !== supplyInside) check(conductor.from, ['wiring', i, 'from'])
      check(conductor.to, ['wiring', i, 'to'])
    })
    model.lanes.forEach((lane, i) => {
      check(lane.from, ['lanes', i, 'from'])
      check(lane.to, ['lanes', i, 'to'])
    })
    model.controllers.forEach((controller, i) =>
      controller.ports.forEach((port, j) => check(port, ['controllers', i, 'ports', j])),
    )
    model.expander?.ports.forEach((port, j) => check(port, ['expander', 'ports', j]))
    for (const [rail, id] of Object.entries(model.loadAt ?? {})) check(id, ['loadAt', rail])
    model.converters.forEach((converter, i) => {
      check(converter.from.connector, ['converters', i, 'from', 'connector'])
      converter.feeds.forEach((id, j) => check(id, ['converters', i, 'feeds', j]))
      if (converter.from.rail === converter.rail)
        context.addIssue({ code: 'custom', path: ['converters', i, 'rail'], message: 'a converter makes another rail' })
    })
    if (model.supply && known.has(supplyInside))
      context.addIssue({
        code: 'custom',
        path: ['connectors'],
        message: `"${supplyInside}" stands for the supply itself and names no connector`,
      })
    const supplyRails = new Set(model.supply?.rails.map((rail) => rail.id))
    model.connectors.forEach((connector, i) => {
      for (const [rail, id] of Object.entries(connector.feeds ?? {}))
        if (!supplyRails.has(id))
          context.addIssue({
            code: 'custom',
            path: ['connectors', i, 'feeds', rail],
            message: `no supply rail "${id}" on this model`,
          })
    })
    const slots = new Set<number>()
    model.bays.forEach((bay, i) => {
      if (slots.has(bay.slot))
        context.addIssue({ code: 'custom', path: ['bays', i, 'slot'], message: `bay ${bay.slot} appears twice` })
      slots.add(bay.slot)
    })
    if (model.kind === 'supply' && !model.supply)
      context.addIssue({ code: 'custom', path: ['supply'], message: 'a supply needs its rails' })
    if (model.kind === 'drive' && !model.drive)
      context.addIssue({ code: 'custom', path: ['drive'], message: 'a drive needs its drive figures' })
    if (model.kind === 'case' && model.bays.length === 0)
      context.addIssue({ code: 'custom', path: ['bays'], message: 'a case needs bays' })
  })
export type Model = z.infer<typeof modelSchema>
export type ModelInput = z.input<typeof modelSchema>

/** Pessimistic figures of a class, taken where a model of the class leaves a figure unknown. */
export const modelClassSchema = z.strictObject({
  id: catalogIdSchema,
  kind: z.enum(modelKinds),
  name: z.string().min(1).max(120),
  load: loadSchema.optional(),
  note: z.string().max(400).optional(),
})
export type ModelClass = z.infer<typeof modelClassSchema>
