import { compareRefs } from '../build/refOrder.ts'
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

/** A joint, filed under the end whose designation comes first, whichever way round it was drawn. */
export function jointSubject({ joint, a, b }: ResolvedJoint): Subject {
  const { part } = compareRefs(a.part.part.ref, b.part.part.ref) <= 0 ? a.part : b.part
  return { kind: 'joint', joint: joint.id, part: part.id, ref: part.ref }
}

/** The first subject is what a finding is filed under; the others follow in an order that lists cannot shift. */
export function inOrder(subjects: readonly Subject[]): Subject[] {
  const [first, ...others] = subjects
  if (!first) return []
  return [
    first,
    ...others.sort(
      (a, b) => compareRefs(a.ref ?? '', b.ref ?? '') || compareText(a.connector ?? '', b.connector ?? ''),
    ),
  ]
}

const compareText = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0)

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
