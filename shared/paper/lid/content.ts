import type { Severity } from '../../check/severity.ts'

/*
 * What a lid sheet says, before anything is placed: the same for the page, the PDF, the tables and the text. Words are
 * final, lengths of paper unknown.
 */

export const paperNames = ['a4', 'a5', 'letter'] as const
export type PaperName = (typeof paperNames)[number]

export const viewNames = ['front', 'rear', 'top'] as const
export type ViewName = (typeof viewNames)[number]

/** One bay of the map, where the hand finds it. Row and column count in bays; a gap of the case makes them broken. */
export interface LidBay {
  slot: number
  row: number
  column: number
  drives: readonly LidDrive[]
}

export interface LidMap {
  ref: string
  /** "Bays as seen from the front" */
  title: string
  rows: number
  columns: number
  bays: readonly LidBay[]
}

export interface LidDrive {
  ref: string
  /** "07"; with the case where there are several; empty outside the bays. */
  bay: string
  serial: string
  /** What can be read of the serial in its bay; "no serial" where none is on record. */
  tail: string
  capacity: string
  role: string
  model: string
  power: string
  data: string
  /** The way is not whole: nothing arrives. */
  powerIsOpen: boolean
  dataIsOpen: boolean
}

/** A supply rail, group or supply, or the most loaded hop of a lead, at its worst start and its worst running moment. */
export interface LidBudget {
  name: string
  start: LidLoad | null
  running: LidLoad | null
  unit: 'A' | 'W'
  /** Rests on an unknown or guessed figure. */
  about: boolean
}

export interface LidLoad {
  load: number
  limit: number | null
  moment: string
}

export interface LidFinding {
  severity: Severity
  message: string
  /** Who accepted it and why; empty where it is open. */
  accepted: string
}

/** One inlet or port of a backplane with what comes to it. */
export interface LidFeed {
  inlet: string
  power: string
}

export interface LidContent {
  name: string
  machine: string
  /** "Storage server, 12 bays, 11 drives, T1 ATX supply, 460 W" */
  summary: string
  revision: string
  date: string
  checked: string
  checkedBy: string
  within: string
  isWithin: boolean
  weakestHop: string
  maps: readonly LidMap[]
  drives: readonly LidDrive[]
  feeds: readonly LidFeed[]
  budgets: readonly LidBudget[]
  /** "Start: worst of cold start and wake" */
  startMoments: string
  startGroups: readonly string[]
  open: readonly LidFinding[]
  accepted: readonly LidFinding[]
  /** What is not known or only guessed, in sentences. */
  assumed: readonly string[]
  contact: string
  /** Opens the live plan; also the code. */
  address: string
}

export const beforePulling = [
  'Find the bay by its number; read the last four of the serial aloud and compare.',
  'Is the array healthy? One member at a time, never two.',
  'Power off, unless every part on the drive’s way allows a change while running.',
  'Write the new serial into the plan and print the changed label and sheet.',
] as const

export const cautions = [
  'Disconnect the mains and wait before touching.',
  'Leads that fit may be wired differently: never mix modular leads between supply families.',
  'Measure before mating. When in doubt follow the makers’ manuals, local codes and licensed practice.',
  'Computed from stated figures; “within” means within the stated limits.',
] as const
