import type { Change } from '../changes.ts'
import type { JointEnd } from '../document.ts'
import type { ResolvedBuild, ResolvedConnector } from '../resolve.ts'
import { canJoin } from './free.ts'
import { outcome, refuse, type EditOutcome, type MakeId } from './outcome.ts'
import { connectorName, count, jointName } from './words.ts'

export const endOf = (connector: ResolvedConnector): JointEnd => ({
  part: connector.part.part.id,
  connector: connector.connector.id,
})

export function findConnector(build: ResolvedBuild, end: JointEnd): ResolvedConnector | undefined {
  return build.partById.get(end.part)?.connectorById.get(end.connector)
}

export const addJoint = (makeId: MakeId, a: ResolvedConnector, b: ResolvedConnector): Change => ({
  op: 'addJoint',
  joint: { id: makeId('j'), a: endOf(a), b: endOf(b) },
})

/** Joins two connectors, or says why they cannot be. */
export function connect(build: ResolvedBuild, makeId: MakeId, from: JointEnd, to: JointEnd): EditOutcome {
  const a = findConnector(build, from)
  const b = findConnector(build, to)
  if (!a || !b) return refuse('One of the two connectors is no longer there.')
  const verdict = canJoin(a, b)
  if (!verdict.ok) return refuse(verdict.reason ?? 'They cannot be joined.')
  return outcome(`Connect ${connectorName(a)} to ${connectorName(b)}`, [addJoint(makeId, a, b)])
}

/** Pulls plugs apart. */
export function removeJoints(build: ResolvedBuild, ids: readonly string[]): EditOutcome {
  const joints = ids.flatMap((id) => build.document.joints.find((joint) => joint.id === id) ?? [])
  const [first] = joints
  if (!first) return refuse('That joint is no longer there.')
  const resolved = build.jointById.get(first.id)
  const label =
    joints.length === 1 && resolved ? `Remove joint ${jointName(resolved)}` : `Remove ${count(joints.length, 'joint')}`
  return outcome(
    label,
    joints.map((joint) => ({ op: 'removeJoint', id: joint.id })),
  )
}
