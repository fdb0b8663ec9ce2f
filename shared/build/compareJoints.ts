import type { BuildDocument, Joint, JointEnd } from './document.ts'

/** One end of a joint with the designation of its part, for reading. */
export interface NamedEnd extends JointEnd {
  ref: string
}

export type JointDifference =
  | { kind: 'joint added' | 'joint removed'; joint: string; a: NamedEnd; b: NamedEnd }
  /** One end stays where it is and goes to another partner; `was` is the joint that it had before. */
  | { kind: 'rewired'; joint: string; was: string; at: NamedEnd; from: NamedEnd; to: NamedEnd }

interface Loose {
  joint: Joint
  ends: [NamedEnd, NamedEnd]
}

/**
 * Joints by what they join, whatever their ids and direction. A joint gone and a new one at the same connector are a
 * rewiring; where either end could be the one that stayed, it is the end that `travels`, as a drive that moved.
 */
export function compareJoints(
  before: BuildDocument,
  after: BuildDocument,
  travels: (part: string) => boolean = () => false,
): JointDifference[] {
  const gone = missingIn(before, after)
  const come = missingIn(after, before)
  const waiting = new Set(come)
  const rewired = new Map<Loose, JointDifference>()
  const pair = (mayStay: (end: NamedEnd) => boolean) => {
    const byEnd = byEnds(waiting)
    for (const old of gone) {
      if (rewired.has(old)) continue
      for (const i of [0, 1] as const) {
        const at = old.ends[i]
        const now = mayStay(at) ? byEnd.get(endKey(at))?.find((one) => waiting.has(one)) : undefined
        if (!now) continue
        waiting.delete(now)
        rewired.set(old, rewiring(old, now, i))
        break
      }
    }
  }
  pair((end) => travels(end.part))
  pair(() => true)
  return [
    ...gone.filter((old) => !rewired.has(old)).map((old) => whole('joint removed', old)),
    ...rewired.values(),
    ...[...waiting].map((now) => whole('joint added', now)),
  ]
}

const whole = (kind: 'joint added' | 'joint removed', { joint, ends: [a, b] }: Loose): JointDifference => ({
  kind,
  joint: joint.id,
  a,
  b,
})

function rewiring(old: Loose, now: Loose, i: 0 | 1): JointDifference {
  const j = endKey(now.ends[0]) === endKey(old.ends[i]) ? 0 : 1
  const to = now.ends[j === 0 ? 1 : 0]
  return {
    kind: 'rewired',
    joint: now.joint.id,
    was: old.joint.id,
    at: now.ends[j],
    from: old.ends[i === 0 ? 1 : 0],
    to,
  }
}

function byEnds(joints: Iterable<Loose>): Map<string, Loose[]> {
  const map = new Map<string, Loose[]>()
  for (const loose of joints)
    for (const end of loose.ends) {
      const list = map.get(endKey(end))
      if (list) list.push(loose)
      else map.set(endKey(end), [loose])
    }
  return map
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
