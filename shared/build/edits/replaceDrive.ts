import type { Model } from '../../catalog/model.ts'
import type { Change } from '../changes.ts'
import type { ResolvedBuild, ResolvedJoint, ResolvedPart } from '../resolve.ts'
import { baysOf, fits } from './bays.ts'
import { outcome, refuse, type EditOutcome, type MakeId } from './outcome.ts'
import { count } from './words.ts'

/** The drive that comes in: what its label says, and its model where it is another one. */
export interface NewDrive {
  serial: string
  model?: Model
}

/**
 * Puts another drive in the place of one, as one edit: designation, bay, role and wiring stay, serial and model are the
 * new one's. Figures and notes that were taken on the old one go with it; joints that its plug does not take come off.
 */
export function replaceDrive(build: ResolvedBuild, makeId: MakeId, id: string, incoming: NewDrive): EditOutcome {
  const drive = build.partById.get(id)
  if (!drive || drive.model.kind !== 'drive') return refuse('That drive is no longer there.')
  const { ref } = drive.part
  const serial = incoming.serial.trim()
  if (serial === '') return refuse('Write the serial that the label of the new drive says.')
  if (serial === drive.part.serial?.trim()) return refuse(`${serial} is the drive that is in there now.`)
  const twin = build.document.parts.find((part) => part.id !== id && part.serial?.trim() === serial)
  if (twin) return refuse(`${serial} is ${twin.ref} already: read the label again.`)

  const model = incoming.model && incoming.model.id !== drive.part.model ? incoming.model : undefined
  if (model && model.kind !== 'drive') return refuse('Only a drive takes the place of a drive.')
  const bay = baysOf(build).find((place) => place.drives.includes(drive))?.bay
  if (model && bay && !fits(model, bay))
    return refuse(`Bay ${bay.slot} takes ${bay.size} in drives; the new one is ${model.drive?.size ?? '?'} in.`)

  const { joints, off } = model ? rejoin(build, makeId, drive, model) : { joints: [], off: 0 }
  const patch = { serial, overrides: null, ...(model && { model: model.id, pinTest: null }) }
  const loose = off > 0 ? `, ${count(off, 'joint')} off` : ''
  return outcome(`Replace ${ref}: serial ${serial}${loose}`, [
    ...joints.filter(({ op }) => op === 'removeJoint'),
    { op: 'updatePart', id, patch },
    ...joints.filter(({ op }) => op === 'addJoint'),
  ])
}

/** Joints of the old drive on the plug of the new model, as far as they mate. */
function rejoin(
  build: ResolvedBuild,
  makeId: MakeId,
  drive: ResolvedPart,
  model: Model,
): { joints: Change[]; off: number } {
  const joints: Change[] = []
  let off = 0
  for (const joint of new Set(drive.connectors.flatMap((plug) => plug.joints))) {
    const [own, other] = endsOf(joint, drive)
    const index = drive.model.connectors.findIndex(({ id }) => id === own.connector.id)
    const plug = model.connectors.find(({ id }) => id === own.connector.id) ?? model.connectors[index]
    const type = plug && build.catalog.connectorTypes.get(plug.type)
    const fitsOn =
      plug !== undefined && type !== undefined && (type.matesWith.includes(other.type.id) || plug.type === own.type.id)
    if (fitsOn && plug.id === own.connector.id) continue
    joints.push({ op: 'removeJoint', id: joint.joint.id })
    if (!fitsOn) off++
    else {
      const a = { part: drive.part.id, connector: plug.id }
      const b = { part: other.part.part.id, connector: other.connector.id }
      joints.push({ op: 'addJoint', joint: { id: makeId('j'), a, b } })
    }
  }
  return { joints, off }
}

const endsOf = (joint: ResolvedJoint, drive: ResolvedPart) =>
  joint.a.part === drive ? ([joint.a, joint.b] as const) : ([joint.b, joint.a] as const)
