import { mate } from '../../build/mating.ts'
import { compareRefs } from '../../build/refOrder.ts'
import type { ResolvedBuild, ResolvedConnector, ResolvedJoint } from '../../build/resolve.ts'
import { connectorSubject, jointSubject } from '../../check/subjects.ts'
import { listed, placeOf } from '../../check/words.ts'
import { defineRule, type RawFinding } from '../rule.ts'

type Facts =
  | { kind: 'mismatch'; joint: ResolvedJoint; reason: string }
  | { kind: 'self'; joint: ResolvedJoint }
  | { kind: 'outputs'; joint: ResolvedJoint }
  | { kind: 'drawn twice'; joint: ResolvedJoint; times: number }
  | { kind: 'crowded'; connector: ResolvedConnector; joints: readonly ResolvedJoint[] }

export const wrongMating = defineRule<Facts>({
  meta: {
    id: 'wrong-mating',
    title: 'Connectors that do not mate',
    severities: ['danger', 'fault'],
    finds: 'A joint whose connector types, sides or keys do not mate, or a connector that is joined twice.',
    why: 'A joint that cannot be made in the hand carries nothing here: whatever hangs on it counts as unconnected.',
    needs: ['joints', 'connector types: what mates with what', 'supply outlets'],
    sources: ['R2', 'R1', 'R29'],
  },
  check({ build }) {
    return [...wrongJoints(build), ...drawnTwice(build), ...crowdedConnectors(build)]
  },
  words({ facts }) {
    if (facts.kind === 'crowded') {
      const others = facts.joints.map((joint) => placeOf(joint.a === facts.connector ? joint.b : joint.a)).sort()
      return {
        message: `${placeOf(facts.connector)} (${facts.connector.type.name}) is joined to ${listed(others)} at once.`,
        remedy: 'Keep one of these joints and remove the others, or put a splitter between for power.',
      }
    }
    const [a, b] = endsOf(facts.joint)
    const both = `${placeOf(a)} and ${placeOf(b)}`
    if (facts.kind === 'drawn twice')
      return {
        message: `${both} are joined ${facts.times} times over.`,
        remedy: 'Remove all but one of these joints.',
      }
    if (facts.kind === 'self')
      return {
        message: `${both} are two ends of the same part.`,
        remedy: 'Join one of the ends to another part, or remove the joint.',
      }
    if (facts.kind === 'outputs')
      return {
        message: `${both} are both outlets of a supply: one feeds into the other.`,
        remedy: 'Disconnect from the mains and separate the two outlets before anything is switched on.',
      }
    return {
      message: `${both} do not mate: ${facts.reason}.`,
      remedy: `Choose a part whose connector mates with ${a.type.name}, or put a fitting adapter between.`,
    }
  },
})

/** Both ends in the order of their designations, whichever way round the joint was drawn. */
function endsOf({ a, b }: ResolvedJoint): [ResolvedConnector, ResolvedConnector] {
  const order = compareRefs(a.part.part.ref, b.part.part.ref) || a.index - b.index
  return order <= 0 ? [a, b] : [b, a]
}

function wrongJoints(build: ResolvedBuild): RawFinding<Facts>[] {
  return build.joints.flatMap((joint): RawFinding<Facts>[] => {
    const { a, b, mating } = joint
    const subjects = [jointSubject(joint), ...endsOf(joint).map(connectorSubject)]
    if (a.part === b.part) return [{ severity: 'fault', subjects, facts: { kind: 'self', joint } }]
    if (!mating.mates) {
      const [first, second] = endsOf(joint)
      const reason = mate(first.type, second.type).reason ?? 'the shells differ'
      return [{ severity: 'fault', subjects, facts: { kind: 'mismatch', joint, reason } }]
    }
    const bothFeed = a.connector.feeds !== undefined && b.connector.feeds !== undefined
    return bothFeed ? [{ severity: 'danger', subjects, facts: { kind: 'outputs', joint } }] : []
  })
}

/** Joints between the same two connectors: one of them is real. */
function drawnTwice(build: ResolvedBuild): RawFinding<Facts>[] {
  const byEnds = new Map<string, ResolvedJoint[]>()
  for (const joint of build.joints) {
    if (joint.a.joints.length < 2 || joint.b.joints.length < 2) continue
    const key = endsOf(joint)
      .map(({ index }) => index)
      .join(' ')
    byEnds.set(key, [...(byEnds.get(key) ?? []), joint])
  }
  return [...byEnds.values()].flatMap((joints): RawFinding<Facts>[] => {
    const [joint] = joints
    if (!joint || joints.length < 2) return []
    const subjects = [...joints.map(jointSubject), ...endsOf(joint).map(connectorSubject)]
    return [
      {
        severity: 'fault',
        subjects,
        detail: 'drawn twice',
        facts: { kind: 'drawn twice', joint, times: joints.length },
      },
    ]
  })
}

/** The other end of a joint. */
const partnerOf = (connector: ResolvedConnector, { a, b }: ResolvedJoint): ResolvedConnector =>
  a === connector ? b : a

/** One joint for each partner. */
function toDifferent(connector: ResolvedConnector, joints: readonly ResolvedJoint[]): ResolvedJoint[] {
  const byPartner = new Map([...joints].reverse().map((joint) => [partnerOf(connector, joint), joint]))
  return joints.filter((joint) => byPartner.get(partnerOf(connector, joint)) === joint)
}

/** A drive plug takes a data and a power receptacle side by side; anything else takes one partner. */
function crowdedConnectors(build: ResolvedBuild): RawFinding<Facts>[] {
  return build.connectors.flatMap((connector): RawFinding<Facts>[] => {
    if (connector.joints.length < 2) return []
    const mated = toDifferent(
      connector,
      connector.joints.filter((joint) => joint.mating.mates),
    )
    const power = mated.filter((joint) => joint.mating.power)
    const data = mated.filter((joint) => joint.mating.lanes > 0)
    const neither = mated.filter((joint) => !joint.mating.power && joint.mating.lanes === 0)
    const crowd =
      power.length > 1 ? power : data.length > 1 ? data : neither.length > 0 && mated.length > 1 ? mated : []
    if (crowd.length === 0) return []
    const joints = [...new Set([...crowd, ...(power.length > 1 ? power : []), ...(data.length > 1 ? data : [])])]
    return [
      {
        severity: 'fault',
        subjects: [connectorSubject(connector), ...joints.map(jointSubject)],
        facts: { kind: 'crowded', connector, joints },
      },
    ]
  })
}
