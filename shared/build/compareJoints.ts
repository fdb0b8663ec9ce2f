import type { BuildDocument, Joint, JointEnd } from './document.ts'

/** One end of a joint with the designation of its part, for reading. */
export interface NamedEnd extends JointEnd {
  ref: string
}

export type JointDifference =
  | { kind: 'joint added' | 'joint removed'; joint: string; a: NamedEnd; b: NamedEnd }
  /** One end stays where it is and goes to another partner. */
  | { kind: 'rewired'; joint: string; at: NamedEnd; from: NamedEnd; to: NamedEnd }

interface Loose {
  joint: Joint
  ends: [NamedEnd, NamedEnd]
}

/** Joints by what they join, whatever their ids and direction. A joint gone and a new one at the same connector are a rewiring. */
export function compareJoints(before: BuildDocument, after: BuildDocument): JointDifference[] {
  const gone = missingIn(before, after)
  const come = missingIn(after, before)
  const rewired: JointDifference[] = []
  const left = gone.filter((old) => {
    const i = come.findIndex((now) => sharedEnd(old, now) !== null)
    const now = come[i]
    const ends = now && sharedEnd(old, now)
    if (!now || !ends) return true
    come.splice(i, 1)
    rewired.push({ kind: 'rewired', joint: now.joint.id, ...ends })
    return false
  })
  return [
    ...left.map(({ joint, ends: [a, b] }) => ({ kind: 'joint removed' as const, joint: joint.id, a, b })),
    ...rewired,
    ...come.map(({ joint, ends: [a, b] }) => ({ kind: 'joint added' as const, joint: joint.id, a, b })),
  ]
}

/** Joints of one document that the other does not have; two joints drawn alike count as two. */
function missingIn(document: BuildDocument, other: BuildDocument): Loose[] {
  const there = new Map<string, number>()
  for (const joint of other.joints) there.set(keyOf(joint), (there.get(keyOf(joint)) ?? 0) + 1)
  const refs = new Map(document.parts.map((part) => [part.id, part.ref]))
  const named = (end: JointEnd): NamedEnd => ({ ...end, ref: refs.get(end.part) ?? end.part })
  return document.joints.flatMap((joint): Loose[] => {
    const key = keyOf(joint)
    const left = there.get(key) ?? 0
    if (left > 0) {
      there.set(key, left - 1)
      return []
    }
    return [{ joint, ends: [named(joint.a), named(joint.b)] }]
  })
}

const endKey = ({ part, connector }: JointEnd): string => `${part}:${connector}`
const keyOf = ({ a, b }: Joint): string => [endKey(a), endKey(b)].sort().join('~')

function sharedEnd(old: Loose, now: Loose): { at: NamedEnd; from: NamedEnd; to: NamedEnd } | null {
  for (const i of [0, 1] as const)
    for (const j of [0, 1] as const)
      if (endKey(old.ends[i]) === endKey(now.ends[j]))
        return { at: now.ends[j], from: old.ends[1 - i]!, to: now.ends[1 - j]! }
  return null
}
