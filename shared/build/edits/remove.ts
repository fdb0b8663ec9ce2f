import type { Change } from '../changes.ts'
import type { ResolvedBuild } from '../resolve.ts'
import { outcome, refuse, type EditOutcome } from './outcome.ts'
import { count, refList } from './words.ts'

/**
 * Removes parts together with the joints that hold them. Drives and backplanes of a removed case stay, out of their
 * bays; measured routes and pin tests of other parts are kept.
 */
export function removeParts(build: ResolvedBuild, ids: Iterable<string>): EditOutcome {
  const going = new Set(ids)
  const parts = build.document.parts.filter((part) => going.has(part.id))
  if (parts.length === 0) return refuse('That part is no longer there.')
  const joints = build.document.joints.filter((joint) => going.has(joint.a.part) || going.has(joint.b.part))
  const homeless = build.document.parts.filter((part) => part.bay && going.has(part.bay.case) && !going.has(part.id))
  const changes: Change[] = [
    ...joints.map((joint): Change => ({ op: 'removeJoint', id: joint.id })),
    ...homeless.map((part): Change => ({ op: 'updatePart', id: part.id, patch: { bay: null } })),
    ...parts.map((part): Change => ({ op: 'removePart', id: part.id })),
  ]
  const label = `Remove ${refList(parts.map((part) => part.ref))}${joints.length > 0 ? ` and ${count(joints.length, 'joint')}` : ''}`
  return outcome(label, changes)
}

/** Removes chosen parts and joints in one gesture. */
export function removeChosen(build: ResolvedBuild, parts: Iterable<string>, joints: Iterable<string>): EditOutcome {
  const partIds = new Set(parts)
  const withParts = partIds.size > 0 ? removeParts(build, partIds) : null
  const done = new Set(
    withParts?.ok ? withParts.edit.changes.flatMap((change) => (change.op === 'removeJoint' ? change.id : [])) : [],
  )
  const more = [...joints].filter((id) => !done.has(id) && build.document.joints.some((joint) => joint.id === id))
  const changes: Change[] = [
    ...more.map((id): Change => ({ op: 'removeJoint', id })),
    ...(withParts?.ok ? withParts.edit.changes : []),
  ]
  const label = withParts?.ok ? withParts.edit.label : `Remove ${count(more.length, 'joint')}`
  return outcome(label, changes, ['Nothing is chosen.'])
}
