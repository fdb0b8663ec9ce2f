import type { ResolvedConnector, ResolvedJoint, ResolvedPart } from '../build/resolve.ts'
import type { Subject } from './result.ts'

/** What a finding lights up, made from resolved things. */
export const buildSubject: Subject = { kind: 'build' }

export const partSubject = ({ part }: ResolvedPart): Subject => ({ kind: 'part', part: part.id, ref: part.ref })

export const connectorSubject = ({ part, connector }: ResolvedConnector): Subject => ({
  kind: 'connector',
  part: part.part.id,
  ref: part.part.ref,
  connector: connector.id,
})

/** A joint, filed under the part at its first end. */
export const jointSubject = ({ joint, a }: ResolvedJoint): Subject => ({
  kind: 'joint',
  joint: joint.id,
  part: a.part.part.id,
  ref: a.part.part.ref,
})

export const conductorSubject = ({ part }: ResolvedPart, index: number): Subject => ({
  kind: 'conductor',
  part: part.id,
  ref: part.ref,
  conductor: index,
})

/** A supply rail, or with `kind: 'group'` a group of them. */
export const railSubject = ({ part }: ResolvedPart, rail: string, kind: 'rail' | 'group' = 'rail'): Subject => ({
  kind,
  part: part.id,
  ref: part.ref,
  rail,
})
