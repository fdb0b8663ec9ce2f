import type { Bay, Model } from '../../catalog/model.ts'
import type { ResolvedBuild, ResolvedConnector, ResolvedPart } from '../resolve.ts'

/** One bay of one case, with what is in it and what serves it. */
export interface BayPlace {
  case: ResolvedPart
  bay: Bay
  /** Drives that say they sit here; more than one is a clash that the checker reports. */
  drives: readonly ResolvedPart[]
  /** The backplane's receptacle behind the bay, where there is one. */
  receptacle?: ResolvedConnector
}

/** Every bay of every case, in the order of parts and of the case's own numbering. */
export function baysOf(build: ResolvedBuild): BayPlace[] {
  const drives = new Map<string, ResolvedPart[]>()
  const receptacles = new Map<string, ResolvedConnector>()
  for (const part of build.parts) {
    const { bay } = part.part
    if (!bay) continue
    if (part.model.kind === 'backplane')
      for (const connector of part.connectors) {
        const place = connector.connector.bay
        if (place !== undefined) receptacles.set(bayKey(bay.case, bay.slot + place - 1), connector)
      }
    else {
      const key = bayKey(bay.case, bay.slot)
      const list = drives.get(key)
      if (list) list.push(part)
      else drives.set(key, [part])
    }
  }
  return build.parts.flatMap((holder) =>
    [...holder.model.bays]
      .sort((a, b) => a.slot - b.slot)
      .map((bay) => {
        const key = bayKey(holder.part.id, bay.slot)
        const receptacle = receptacles.get(key)
        return { case: holder, bay, drives: drives.get(key) ?? [], ...(receptacle && { receptacle }) }
      }),
  )
}

export const bayKey = (caseId: string, slot: number): string => `${caseId}#${slot}`

/** Whether a drive of this model goes into the bay, by size. */
export function fits(model: Model, bay: Bay): boolean {
  const size = model.drive?.size
  return size !== undefined && (size === bay.size || bay.alsoFits.includes(size))
}
