import type { ResolvedBuild, ResolvedConnector, ResolvedPart } from '../resolve.ts'
import { addJoint } from './connect.ts'
import { baysOf, type BayPlace } from './bays.ts'
import { canJoin, isFree } from './free.ts'
import { outcome, refuse, type EditOutcome, type MakeId } from './outcome.ts'
import { bayRange, connectorName, count } from './words.ts'

/** One joint that the gesture would make. `slot` where the far end is reached by its bay. */
export interface PlannedJoint {
  from: ResolvedConnector
  to: ResolvedConnector
  slot?: number
}

/** What "connect outlets to bays" would do, shown before it is done. */
export interface ConsecutivePlan {
  joints: readonly PlannedJoint[]
  /** Bays passed over and outlets left, in words. */
  notes: readonly string[]
}

/** Target connectors of a bay: the drive in it, and the backplane's own data connector that leads to it. */
function targetsOf(place: BayPlace): ResolvedConnector[] {
  const targets = place.drives.flatMap((drive) => drive.connectors)
  const { receptacle } = place
  if (receptacle)
    for (const lane of receptacle.part.model.lanes) {
      const far =
        lane.from === receptacle.connector.id ? lane.to : lane.to === receptacle.connector.id ? lane.from : null
      const connector = far === null ? undefined : receptacle.part.connectorById.get(far)
      if (connector) targets.push(connector)
    }
  return targets
}

/** Free connectors of a part, in physical order, that mate with something behind a bay. */
export function outletsForBays(build: ResolvedBuild, part: ResolvedPart): ResolvedConnector[] {
  const types = new Set(baysOf(build).flatMap((place) => targetsOf(place).map((target) => target.type.id)))
  return part.connectors.filter(
    (connector) => isFree(connector) && connector.type.matesWith.some((type) => types.has(type)),
  )
}

/** Pairs a part's free outlets with the bays from the first one on, passing over bays that cannot take one. */
export function planToBays(
  build: ResolvedBuild,
  part: ResolvedPart,
  first: { case: string; slot: number },
  most = Infinity,
): ConsecutivePlan {
  const outlets = outletsForBays(build, part).slice(0, most)
  const joints: PlannedJoint[] = []
  const notes: string[] = []
  let next = 0
  for (const place of baysOf(build)) {
    const from = outlets[next]
    if (!from) break
    if (place.case.part.id !== first.case || place.bay.slot < first.slot) continue
    const targets = targetsOf(place)
    const to = targets.find((target) => canJoin(from, target).ok && !joints.some((joint) => joint.to === target))
    if (to) {
      joints.push({ from, to, slot: place.bay.slot })
      next++
    } else notes.push(whyPassed(place, from, targets))
  }
  const left = outlets.length - next
  if (left > 0) notes.push(`${count(left, 'outlet')} of ${part.part.ref} left without a bay.`)
  return { joints, notes }
}

function whyPassed(place: BayPlace, from: ResolvedConnector, targets: readonly ResolvedConnector[]): string {
  const [target] = targets
  if (!target) return `Bay ${place.bay.slot} is empty: passed over.`
  return `Bay ${place.bay.slot} passed over. ${canJoin(from, target).reason ?? ''}`.trim()
}

/** Pairs a part's free connectors with those of another part, in physical order on both sides. */
export function planToPart(part: ResolvedPart, other: ResolvedPart, most = Infinity): ConsecutivePlan {
  const joints: PlannedJoint[] = []
  const used = new Set<ResolvedConnector>()
  for (const from of part.connectors) {
    if (joints.length >= most) break
    const to = other.connectors.find((candidate) => !used.has(candidate) && canJoin(from, candidate).ok)
    if (!to) continue
    used.add(to)
    joints.push({ from, to })
  }
  return { joints, notes: [] }
}

/** Carries out a plan as one edit. */
export function connectPlanned(makeId: MakeId, plan: ConsecutivePlan): EditOutcome {
  const [first] = plan.joints
  if (!first) return refuse(plan.notes[0] ?? 'No free connectors here mate with each other.')
  const slots = plan.joints.flatMap((joint) => joint.slot ?? [])
  const target = slots.length > 0 ? bayRange(slots) : first.to.part.part.ref
  const label =
    plan.joints.length === 1
      ? `Connect ${connectorName(first.from)} to ${connectorName(first.to)}`
      : `Connect ${first.from.part.part.ref} to ${target}`
  return outcome(
    label,
    plan.joints.map(({ from, to }) => addJoint(makeId, from, to)),
    plan.notes,
  )
}
