import { rankRefs } from '../build/refOrder.ts'
import type { ResolvedBuild, ResolvedPart } from '../build/resolve.ts'
import type { SpinUpMeans } from '../catalog/model.ts'
import type { DataResult } from '../datapath/result.ts'
import { isMotorDrive } from './deviceCurrents.ts'

/** Why a drive does not take part in a planned staged start, and which part is to blame. */
export interface IdleStart {
  drive: ResolvedPart
  culprit: ResolvedPart
  reason: 'drive' | 'controller' | 'expander' | 'contact-grounded' | 'contact-unknown'
}

/** Which drive starts when. */
export interface StartPlan {
  staged: boolean
  by: SpinUpMeans
  interval_s: number
  /** Drives that start together, in their order. Drives that cannot be delayed start with the first group. */
  groups: readonly (readonly ResolvedPart[])[]
  /** Group of each staged drive, by part index. */
  groupOf: ReadonlyMap<number, number>
  idle: readonly IdleStart[]
}

/**
 * Lays out the start: motor drives in the order of their designations, in groups. A drive that the planned means
 * cannot delay, or that no part of its path passes it on to, starts with the power: the sums follow what will
 * happen, not what is wished.
 */
export function planStart(build: ResolvedBuild, data: DataResult): StartPlan {
  const { mode, by, groupSize, interval_s } = build.settings.spinUp
  const staged = mode === 'staged'
  const motors = inRefOrder(build.parts.filter(isMotorDrive))
  if (!staged) return { staged, by, interval_s, groups: [motors], groupOf: new Map(), idle: [] }
  const idle: IdleStart[] = []
  const groups: ResolvedPart[][] = []
  const groupOf = new Map<number, number>()
  let delayed = 0
  for (const drive of motors) {
    const hindrance = hindranceOf(drive, by, data)
    if (hindrance) {
      idle.push({ drive, ...hindrance })
      continue
    }
    const group = Math.floor(delayed++ / groupSize)
    ;(groups[group] ??= []).push(drive)
    groupOf.set(drive.index, group)
  }
  return { staged, by, interval_s, groups, groupOf, idle }
}

function inRefOrder(parts: readonly ResolvedPart[]): ResolvedPart[] {
  const rank = rankRefs(parts.map(({ part }) => part.ref))
  return parts
    .map((part, i) => ({ part, rank: rank[i]! }))
    .sort((a, b) => a.rank - b.rank)
    .map(({ part }) => part)
}

function hindranceOf(drive: ResolvedPart, by: SpinUpMeans, data: DataResult): Omit<IdleStart, 'drive'> | null {
  if (!drive.model.drive?.startControl.includes(by)) return { culprit: drive, reason: 'drive' }
  if (by === 'device-pin') return pinHindrance(drive)
  // A command from the system passes every controller; a start given by the controller needs the whole path.
  if (by === 'standby-command') return null
  const working = data.pathsOf(drive).filter((path) => path.fault === null)
  if (working.length === 0) return null
  for (const path of working) {
    const expander = path.expanders.find(({ model }) => !model.expander?.startControl.includes(by))
    if (!path.controller.controller.startControl.includes(by))
      return { culprit: path.controller.part, reason: 'controller' }
    if (expander) return { culprit: expander, reason: 'expander' }
  }
  return null
}

/** Contact 11 must float for the drive to wait; the part that feeds the drive's power says so. */
function pinHindrance(drive: ResolvedPart): Omit<IdleStart, 'drive'> | null {
  for (const connector of drive.connectors)
    for (const { a, b, mating } of connector.joints) {
      if (!mating.power) continue
      const feeding = a === connector ? b : a
      const contact = feeding.connector.contact11
      if (contact === 'floating') return null
      return { culprit: feeding.part, reason: contact === 'grounded' ? 'contact-grounded' : 'contact-unknown' }
    }
  return null
}
