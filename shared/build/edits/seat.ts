import type { Change } from '../changes.ts'
import type { ResolvedBuild, ResolvedConnector, ResolvedPart } from '../resolve.ts'
import { baysOf, fits, type BayPlace } from './bays.ts'
import { outcome, refuse, type EditOutcome, type MakeId } from './outcome.ts'

export interface BayTarget {
  case: string
  slot: number
}

/** The joint that seats a drive in a bay with a backplane behind it; none where it does not mate or is held by another plug. */
export function seatJoint(
  makeId: MakeId,
  receptacle: ResolvedConnector | undefined,
  drive: { id: string; model: ResolvedPart['model'] },
  freed: ReadonlySet<string> = new Set(),
): Change[] {
  const plug = drive.model.connectors[0]
  if (receptacle?.joints.some((joint) => !freed.has(joint.joint.id))) return []
  if (!receptacle || !plug || !receptacle.type.matesWith.includes(plug.type)) return []
  const a = { part: receptacle.part.part.id, connector: receptacle.connector.id }
  return [{ op: 'addJoint', joint: { id: makeId('j'), a, b: { part: drive.id, connector: plug.id } } }]
}

/** Joints between a drive and the receptacle of a backplane: they end when the drive leaves the bay. */
export function seatedJoints(drive: ResolvedPart): string[] {
  return drive.connectors.flatMap((plug) =>
    plug.joints
      .filter((joint) => (joint.a === plug ? joint.b : joint.a).connector.bay !== undefined)
      .map((joint) => joint.joint.id),
  )
}

/** Moves a drive into a bay; the drive that is there changes places with it. Cables stay with their drive. */
export function moveToBay(build: ResolvedBuild, makeId: MakeId, driveId: string, target: BayTarget): EditOutcome {
  const drive = build.partById.get(driveId)
  if (!drive || drive.model.kind !== 'drive') return refuse('Only a drive goes into a bay.')
  const places = baysOf(build)
  const find = (at: BayTarget | undefined): BayPlace | undefined =>
    at && places.find((place) => place.case.part.id === at.case && place.bay.slot === at.slot)
  const to = find(target)
  if (!to) return refuse(`There is no bay ${target.slot}.`)
  if (to.drives.includes(drive)) return refuse(`${drive.part.ref} is already in bay ${target.slot}.`)
  if (!fits(drive.model, to.bay))
    return refuse(
      `Bay ${target.slot} takes ${to.bay.size} in drives; ${drive.part.ref} is ${drive.model.drive?.size ?? '?'} in.`,
    )

  const from = find(drive.part.bay)
  const there = to.drives[0]
  if (there && from && !fits(there.model, from.bay))
    return refuse(`${there.part.ref} in bay ${target.slot} does not fit bay ${from.bay.slot}.`)
  const freed = new Set([drive, ...(there ? [there] : [])].flatMap(seatedJoints))
  const changes = [...freed].map((id): Change => ({ op: 'removeJoint', id }))
  changes.push(...placeIn(makeId, drive, to, freed))
  if (there) changes.push(...(from ? placeIn(makeId, there, from, freed) : [takeOut(there)]))
  const label = there
    ? from
      ? `Swap ${drive.part.ref} and ${there.part.ref}`
      : `Move ${drive.part.ref} to bay ${target.slot}, ${there.part.ref} out`
    : `Move ${drive.part.ref} to bay ${target.slot}`
  return outcome(label, changes)
}

/** Takes a drive out of its bay and leaves it beside the case. */
export function leaveBay(build: ResolvedBuild, driveId: string): EditOutcome {
  const drive = build.partById.get(driveId)
  if (!drive?.part.bay) return refuse('That drive is in no bay.')
  return outcome(`Take ${drive.part.ref} out of bay ${drive.part.bay.slot}`, [
    ...seatedJoints(drive).map((id): Change => ({ op: 'removeJoint', id })),
    takeOut(drive),
  ])
}

const takeOut = (drive: ResolvedPart): Change => ({
  op: 'updatePart',
  id: drive.part.id,
  patch: { bay: null, position: null },
})

/** A drive that hangs on cables keeps them and is not seated: pulling plugs is for the person to decide. */
function placeIn(makeId: MakeId, drive: ResolvedPart, place: BayPlace, freed: ReadonlySet<string>): Change[] {
  const bay = { case: place.case.part.id, slot: place.bay.slot }
  const joints = drive.connectors.reduce((sum, plug) => sum + plug.joints.length, 0)
  const cabled = joints > seatedJoints(drive).length
  return [
    { op: 'updatePart', id: drive.part.id, patch: { bay, position: null } },
    ...(cabled ? [] : seatJoint(makeId, place.receptacle, { id: drive.part.id, model: drive.model }, freed)),
  ]
}
