import type { ResolvedPart } from '../build/resolve.ts'
import type { SupplyRail } from '../catalog/model.ts'
import type { MomentId } from '../check/result.ts'
import { placeOf } from '../check/words.ts'
import { lineName } from './lines.ts'
import type { ConductorLoad, ContactLoad } from './result.ts'

/** Moments as they are read. */
export const momentName: Readonly<Record<MomentId, string>> = {
  'cold-start': 'Cold start',
  'staged-start': 'Staged start',
  wake: 'Wake',
  'full-scan': 'Full scan',
  'write-burst': 'Write burst',
  'at-rest': 'At rest',
}

/** "at cold start" */
export const atMoment = (moment: MomentId): string =>
  moment === 'at-rest' ? 'at rest' : `at ${momentName[moment].toLowerCase()}`

/** "W6 in, 12 V": the contact by the side that may carry less. */
export const contactName = ({ weaker, line }: ContactLoad): string => `${placeOf(weaker)}, ${lineName[line]}`

/** "W6 in to out 2, 12 V" */
export const conductorName = ({ part, conductor }: ConductorLoad): string =>
  `${part.part.ref} ${labelOf(part, conductor.from)} to ${labelOf(part, conductor.to)}, ${lineName[conductor.line]}`

const labelOf = (part: ResolvedPart, connector: string): string =>
  part.connectorById.get(connector)?.connector.label ?? connector

/** "T1 12V1", or "T1 12 V" where the supply has no names for its rails. */
export const railName = ({ part }: ResolvedPart, { id, rail }: SupplyRail): string =>
  `${part.ref} ${id === rail ? lineName[rail] : id}`
