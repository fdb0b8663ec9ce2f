import { z } from 'zod'
import { originKinds } from '../quantity/quantity.ts'
import { railSchema } from '../quantity/rails.ts'
import { severitySchema } from './severity.ts'

/** A state of the whole machine that is computed. */
export const momentIds = ['cold-start', 'staged-start', 'wake', 'full-scan', 'write-burst', 'at-rest'] as const
export type MomentId = (typeof momentIds)[number]
export const momentIdSchema = z.enum(momentIds)

/** What a finding, ledger row or comment points at. `conductor` is an index into the model's `wiring`. */
export const subjectSchema = z.strictObject({
  kind: z.enum(['build', 'part', 'connector', 'joint', 'conductor', 'rail', 'group']),
  part: z.string().optional(),
  /** Reference designation of the part, for reading. */
  ref: z.string().optional(),
  connector: z.string().optional(),
  joint: z.string().optional(),
  conductor: z.number().optional(),
  /** Supply rail or group id. */
  rail: z.string().optional(),
})
export type Subject = z.infer<typeof subjectSchema>

/** A figure that a verdict rests on, as it was read: enough to show it and say where it comes from. */
export const figureSchema = z.strictObject({
  /** What it is, as "start current of C7 on 12 V". */
  what: z.string(),
  value: z.number().nullable(),
  low: z.number().optional(),
  high: z.number().optional(),
  unit: z.string(),
  origin: z.enum(originKinds),
  source: z.string().optional(),
  clause: z.string().optional(),
  fromMemory: z.boolean().optional(),
})
export type Figure = z.infer<typeof figureSchema>

export const findingSchema = z.strictObject({
  /** Stable for the same fault on the same subject: rule, subject and discriminator. */
  key: z.string(),
  rule: z.string(),
  severity: severitySchema,
  subjects: z.array(subjectSchema),
  moment: momentIdSchema.optional(),
  load: z.number().optional(),
  limit: z.number().optional(),
  unit: z.string().optional(),
  /** What is wrong, with numbers. */
  message: z.string(),
  /** Why it matters. */
  why: z.string(),
  /** What to do. */
  remedy: z.string(),
  /** Documents behind the rule, by title. */
  source: z.array(z.string()),
  /** Figures that decided. */
  decidedBy: z.array(figureSchema),
  /** Rests on an unknown or guessed figure. */
  about: z.boolean(),
  /** Set where a person accepted it and it has not become worse. */
  accepted: z.strictObject({ reason: z.string(), by: z.string(), on: z.string() }).optional(),
})
export type Finding = z.infer<typeof findingSchema>

export const ledgerKinds = ['rail', 'group', 'supply', 'contact', 'wire', 'device'] as const

/** One row of the power ledger. For `device` rows load and limit are volts: the voltage seen and the lowest allowed. */
export const ledgerRowSchema = z.strictObject({
  subject: subjectSchema,
  kind: z.enum(ledgerKinds),
  /** Name as it is printed, as "W6 in, 12 V". */
  name: z.string(),
  rail: z.union([railSchema, z.literal('return')]).optional(),
  moment: momentIdSchema,
  load: z.number(),
  limit: z.number().nullable(),
  unit: z.enum(['A', 'W', 'V']),
  /** Limit minus load (for voltages: seen minus lowest allowed). */
  margin: z.number().nullable(),
  /** Load as a share of the limit. */
  share: z.number().nullable(),
  /** True where the limit stands for seconds only (start currents), false where it is sustained. */
  shortTime: z.boolean(),
  /** Rests on an unknown or guessed figure. */
  about: z.boolean(),
})
export type LedgerRow = z.infer<typeof ledgerRowSchema>

/** Currents of one joint at one moment, by line, signed from a to b. */
export const jointFlowSchema = z.strictObject({
  joint: z.string(),
  current_A: z.partialRecord(z.enum(['12V', '5V', '3.3V', 'return']), z.number()),
  /** Largest share of any contact limit of the joint at this moment. */
  share: z.number().nullable(),
})
export type JointFlow = z.infer<typeof jointFlowSchema>

/** What one device sees at its plug at one moment. */
export const deviceVoltageSchema = z.strictObject({
  part: z.string(),
  connector: z.string(),
  rail: railSchema,
  current_A: z.number(),
  /** Null where the rail does not arrive. */
  voltage_V: z.number().nullable(),
  drop_V: z.strictObject({ wire: z.number(), contact: z.number(), return: z.number() }).nullable(),
})
export type DeviceVoltage = z.infer<typeof deviceVoltageSchema>

export const momentResultSchema = z.strictObject({
  moment: momentIdSchema,
  label: z.string(),
  /** False where the plan or the machine does not have this moment (no staging planned, no solid-state drive). */
  applies: z.boolean(),
  joints: z.array(jointFlowSchema),
  devices: z.array(deviceVoltageSchema),
  dc_W: z.number(),
  wall_W: z.number().nullable(),
  wall_VA: z.number().nullable(),
})
export type MomentResult = z.infer<typeof momentResultSchema>

/** One data path from a controller's lane to a drive. */
export const dataPathSchema = z.strictObject({
  drive: z.string(),
  driveConnector: z.string(),
  /** Port of a dual-ported drive, from 0. */
  drivePort: z.number(),
  controllerPart: z.string(),
  controller: z.string(),
  port: z.string(),
  lane: z.number(),
  /** Joints passed, from the controller on. */
  joints: z.array(z.string()),
  expanders: z.array(z.string()),
  rate_Gbps: z.number().nullable(),
  /** Part whose rate is lowest. */
  limitedBy: z.string().optional(),
  /** Decimal MB/s left to the drive when all drives scan at once. */
  share_MBps: z.number().nullable(),
  works: z.boolean(),
  reason: z.string().optional(),
})
export type DataPath = z.infer<typeof dataPathSchema>

/** Time for every drive to be read once, all at the same time. */
export const scanTimeSchema = z.strictObject({
  hours: z.number().nullable(),
  /** Hours that the drives alone would take. */
  drivesAlone_hours: z.number().nullable(),
  /** Where the bottleneck sits, in words. */
  bottleneck: z.string().optional(),
  about: z.boolean(),
})
export type ScanTime = z.infer<typeof scanTimeSchema>

/** One step of a staged start: from `from_s` on the supply rails carry these currents. */
export const timelineStepSchema = z.strictObject({
  from_s: z.number(),
  /** Supply part and rail id to amperes. */
  rails: z.array(z.strictObject({ part: z.string(), rail: z.string(), current_A: z.number() })),
  starting: z.array(z.string()),
})
export type TimelineStep = z.infer<typeof timelineStepSchema>

/** The answer of the checker: the same object in browser, server and command line. */
export const checkResultSchema = z.strictObject({
  build: z.strictObject({
    name: z.string(),
    machine: z.string().optional(),
    parts: z.number(),
    joints: z.number(),
    drives: z.number(),
  }),
  /** Worst finding that nobody accepted. Null: all within the stated limits. */
  worst: severitySchema.nullable(),
  counts: z.strictObject({
    danger: z.number(),
    fault: z.number(),
    caution: z.number(),
    note: z.number(),
    accepted: z.number(),
  }),
  /** The weakest hop in one sentence, where anything is over or near its limit. */
  weakestHop: z.string().nullable(),
  findings: z.array(findingSchema),
  ledger: z.array(ledgerRowSchema),
  moments: z.array(momentResultSchema),
  timeline: z.array(timelineStepSchema),
  dataPaths: z.array(dataPathSchema),
  scan: scanTimeSchema,
  energy_kWhPerYear: z.number().nullable(),
  ups_VA: z.number().nullable(),
})
export type CheckResult = z.infer<typeof checkResultSchema>
