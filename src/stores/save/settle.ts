import type { Change, Edit } from '#shared/build/changes.ts'
import type { BuildDocument } from '#shared/build/document.ts'

export type Side = 'mine' | 'theirs'

/** A place that two people changed, with what each of them has there now. */
export interface Clash {
  /** As the server names it: "parts/p7", "parts/p7/serial", "joints/j3", "settings". */
  id: string
  what: string
  mine: string
  theirs: string
}

/** Clashes in words. Taken designations are not among them: they settle themselves by moving on to the next number. */
export function describeClashes(ids: readonly string[], mine: BuildDocument, theirs: BuildDocument): Clash[] {
  return ids
    .filter((id) => !id.startsWith('refs/'))
    .map((id) => ({ id, what: whatOf(id, mine, theirs), mine: valueAt(id, mine), theirs: valueAt(id, theirs) }))
}

function partAt(id: string, document: BuildDocument) {
  const [, partId] = id.split('/')
  return document.parts.find((part) => part.id === partId)
}

function whatOf(id: string, mine: BuildDocument, theirs: BuildDocument): string {
  const [kind, key, field] = id.split('/')
  switch (kind) {
    case 'parts': {
      const ref = (partAt(id, mine) ?? partAt(id, theirs))?.ref ?? 'a part'
      return field === undefined || field === 'connectors' ? ref : `${field} of ${ref}`
    }
    case 'joints':
      return `joint ${jointWords(key, mine) ?? jointWords(key, theirs) ?? key ?? ''}`
    case 'models':
      return `own model ${key ?? ''}`
    case 'accepted':
      return 'an accepted finding'
    case 'purchases':
      return `parts list, ${key ?? ''}`
    case 'build':
      return `${key ?? 'name'} of the build`
    default:
      return 'build settings'
  }
}

function jointWords(id: string | undefined, document: BuildDocument): string | undefined {
  const joint = document.joints.find((one) => one.id === id)
  const ref = (partId: string) => document.parts.find((part) => part.id === partId)?.ref ?? '?'
  return joint && `${ref(joint.a.part)} ${joint.a.connector} to ${ref(joint.b.part)} ${joint.b.connector}`
}

function valueAt(id: string, document: BuildDocument): string {
  const [kind, key, field] = id.split('/')
  switch (kind) {
    case 'parts': {
      const part = partAt(id, document)
      if (!part) return 'removed'
      if (field === undefined || field === 'connectors') return 'kept, with changes'
      return show(part[field as keyof typeof part])
    }
    case 'joints':
      return document.joints.some((joint) => joint.id === key) ? 'connected' : 'removed'
    case 'models':
      return document.models.some((model) => model.id === key) ? 'kept, with changes' : 'removed'
    case 'accepted':
      return document.accepted.find((accepted) => accepted.key === key)?.reason ?? 'not accepted'
    case 'purchases':
      return show(document.purchases?.find(({ line }) => line === key))
    case 'build':
      return show(key === 'machine' ? document.machine : document.name)
    default:
      return `${document.settings.tolerance}, ${document.settings.wireTemperature_C} °C, start ${document.settings.spinUp.mode}`
  }
}

function show(value: unknown): string {
  if (value === undefined || value === null || value === '') return 'empty'
  if (typeof value === 'string' || typeof value === 'number') return String(value)
  if (typeof value === 'object' && 'slot' in value) return `bay ${String(value.slot)}`
  if (typeof value === 'object' && 'x' in value) return 'moved on the sheet'
  return JSON.stringify(value).slice(0, 80)
}

/**
 * One's own edits as they go on top of the other's document after choosing. What was given up is left out; what one
 * side removed and this side keeps is brought back first.
 */
export function settleEdits(
  theirs: BuildDocument,
  mine: BuildDocument,
  edits: readonly Edit[],
  choices: ReadonlyMap<string, Side>,
): Edit[] {
  const given = [...choices].flatMap(([id, side]) => (side === 'theirs' ? id : []))
  const kept = [...choices].flatMap(([id, side]) => (side === 'mine' ? id : []))
  const own = edits.flatMap((edit) => {
    const changes = edit.changes.flatMap((change) => without(change, given))
    return changes.length > 0 ? [{ ...edit, changes }] : []
  })
  const first = kept.flatMap((id) => prepare(id, theirs, mine))
  return first.length > 0 ? [{ label: 'Keep own side of a conflict', changes: first }, ...own] : own
}

/** A change without what is given up in it. */
function without(change: Change, given: readonly string[]): Change[] {
  const things = thingsOf(change)
  if (things.some((thing) => given.includes(thing))) return []
  if (change.op !== 'updatePart') return [change]
  const fields = given.flatMap((id) => (id.startsWith(`parts/${change.id}/`) ? (id.split('/')[2] ?? []) : []))
  const patch = Object.fromEntries(Object.entries(change.patch).filter(([field]) => !fields.includes(field)))
  return Object.keys(patch).length > 0 ? [{ ...change, patch }] : []
}

function thingsOf(change: Change): string[] {
  switch (change.op) {
    case 'addPart':
      return [`parts/${change.part.id}`]
    case 'removePart':
    case 'updatePart':
      return [`parts/${change.id}`]
    case 'addJoint':
      return [`joints/${change.joint.id}`, `parts/${change.joint.a.part}`, `parts/${change.joint.b.part}`]
    case 'removeJoint':
      return [`joints/${change.id}`]
    case 'putModel':
      return [`models/${change.model.id}`]
    case 'removeModel':
      return [`models/${change.id}`]
    case 'acceptFinding':
      return [`accepted/${change.accepted.key}`]
    case 'withdrawAcceptance':
      return [`accepted/${change.key}`]
    case 'updateSettings':
      return ['settings']
    case 'setPurchase':
      return [`purchases/${change.line}`]
    case 'rename':
      return ['build/name']
  }
}

/** What has to be done to the other's document so that one's own edits of a thing fit again. */
function prepare(id: string, theirs: BuildDocument, mine: BuildDocument): Change[] {
  const [kind, key, field] = id.split('/')
  if (kind !== 'parts' || (field !== undefined && field !== 'connectors')) return []
  const there = theirs.parts.some((part) => part.id === key)
  const here = mine.parts.find((part) => part.id === key)
  if (here && !there) {
    const present = new Set([...theirs.parts.map((part) => part.id), here.id])
    const joints = mine.joints.filter(
      (joint) =>
        (joint.a.part === key || joint.b.part === key) &&
        present.has(joint.a.part) &&
        present.has(joint.b.part) &&
        !theirs.joints.some((one) => one.id === joint.id),
    )
    return [{ op: 'addPart', part: here }, ...joints.map((joint): Change => ({ op: 'addJoint', joint }))]
  }
  if (!here && there)
    return theirs.joints
      .filter((joint) => joint.a.part === key || joint.b.part === key)
      .map((joint): Change => ({ op: 'removeJoint', id: joint.id }))
  return []
}
