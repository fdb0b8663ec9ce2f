import type { Model } from '../catalog/model.ts'
import type { ResolvedBuild } from '../build/resolve.ts'
import type { ObservedDrive } from './observed.ts'

/** A catalog model for a drive that was seen, and why this one. */
export interface FittingModel {
  model: Model
  reason: string
}

/**
 * The model of the same kind whose capacity is nearest. Where a listing does not tell protocol or motor, those of `like`
 * (the part it stands for, or the drives that the build has) are taken. Null where nothing is near.
 */
export function fittingModel(build: ResolvedBuild, observed: ObservedDrive, like?: Model): FittingModel | null {
  const usual = like ?? build.parts.find(({ model }) => model.kind === 'drive')?.model
  const protocol = observed.protocol ?? usual?.drive?.protocol
  const isSolid = observed.rotation_rpm === undefined ? usual?.drive?.rotation_rpm === 0 : observed.rotation_rpm === 0
  const size_TB = (observed.capacity_B ?? 0) / 1e12
  if (protocol === undefined || size_TB <= 0) return null
  const near = [...build.document.models, ...build.catalog.models.values()]
    .flatMap((model) => {
      const { drive } = model
      const capacity = drive?.capacity_TB.value
      if (!drive || typeof capacity !== 'number' || drive.protocol !== protocol) return []
      if ((drive.rotation_rpm === 0) !== isSolid) return []
      return [{ model, off: Math.abs(capacity - size_TB) / capacity, unlike: unlikeness(model, observed, usual) }]
    })
    .filter(({ off }) => off < 0.3)
    .sort((a, b) => Math.round((a.off - b.off) * 50) || a.unlike - b.unlike || a.off - b.off)
  const best = near[0]?.model
  return best ? { model: best, reason: reasonOf(observed, protocol, isSolid) } : null
}

/** Rotation, sector format and size that differ from what was seen or from the build's usual drive. */
function unlikeness({ drive }: Model, observed: ObservedDrive, usual: Model | undefined): number {
  if (!drive) return 0
  let points = 0
  if (observed.rotation_rpm && Math.abs(drive.rotation_rpm - observed.rotation_rpm) > 200) points += 4
  if (observed.logical_B !== undefined && drive.sectors && drive.sectors.logical_B !== observed.logical_B) points += 3
  if (observed.physical_B !== undefined && drive.sectors && drive.sectors.physical_B !== observed.physical_B)
    points += 1
  if (usual?.drive && drive.size !== usual.drive.size) points += 2
  return points
}

function reasonOf(
  { protocol: seen, rotation_rpm, capacity_B }: ObservedDrive,
  protocol: string,
  isSolid: boolean,
): string {
  const told = [
    `${protocol.toUpperCase()}${seen === undefined ? ' as the others here' : ''}`,
    rotation_rpm === undefined
      ? `${isSolid ? 'solid-state' : 'with a motor'} as the others here`
      : isSolid
        ? 'solid-state'
        : `${rotation_rpm} rpm`,
    `${Number(((capacity_B ?? 0) / 1e12).toPrecision(3))} TB`,
  ]
  return `nearest class: ${told.join(', ')}`
}
