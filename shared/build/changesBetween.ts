import type { Change, PartPatch } from './changes.ts'
import { partPatchSchema } from './changes.ts'
import type { BuildDocument, Part } from './document.ts'
import { same } from './same.ts'

/**
 * The changes that lead from one state of a build to another, so that going back to an old state is an edit like any
 * other: it can be undone, and merged with what others do. Applied to `from` they give the content of `to`; lists may
 * end in another order. Notes about buying stay as they are: what is in the house does not leave it with an old plan.
 */
export function changesBetween(from: BuildDocument, to: BuildDocument): Change[] {
  const joints = lists(from.joints, to.joints)
  const parts = lists(from.parts, to.parts)
  const models = lists(from.models, to.models)
  const accepted = lists(byKey(from.accepted), byKey(to.accepted))
  const purchases = lists(byLine(from.purchases), byLine(to.purchases))
  // Joints first go and last come: a part that is held is not removed, and one that is not there holds nothing.
  return [
    ...[...joints.gone, ...joints.changed.map(({ was }) => was)].map(({ id }): Change => ({ op: 'removeJoint', id })),
    ...parts.gone.map(({ id }): Change => ({ op: 'removePart', id })),
    ...[...models.come, ...models.changed.map(({ is }) => is)].map((model): Change => ({ op: 'putModel', model })),
    ...parts.changed.map(({ was, is }): Change => ({ op: 'updatePart', id: is.id, patch: patchBetween(was, is) })),
    ...parts.come.map((part): Change => ({ op: 'addPart', part })),
    ...models.gone.map(({ id }): Change => ({ op: 'removeModel', id })),
    ...[...joints.come, ...joints.changed.map(({ is }) => is)].map((joint): Change => ({ op: 'addJoint', joint })),
    ...accepted.gone.map(({ key }): Change => ({ op: 'withdrawAcceptance', key })),
    ...[...accepted.come, ...accepted.changed.map(({ is }) => is)].map(({ id: _id, ...entry }): Change => ({
      op: 'acceptFinding',
      accepted: entry,
    })),
    ...purchases.gone.map(({ line }): Change => ({ op: 'setPurchase', line, purchase: null })),
    ...[...purchases.come, ...purchases.changed.map(({ is }) => is)].map(({ id: _id, line, ...purchase }): Change => ({
      op: 'setPurchase',
      line,
      purchase,
    })),
    ...(same(from.settings, to.settings) ? [] : [{ op: 'updateSettings' as const, settings: to.settings }]),
    ...renaming(from, to),
  ]
}

/** Accepted findings go by their key. */
const byKey = (accepted: BuildDocument['accepted']) => accepted.map((entry) => ({ ...entry, id: entry.key }))

/** Notes on buying go by the line of the parts list that they stand at. */
const byLine = (purchases: BuildDocument['purchases']) =>
  (purchases ?? []).map((purchase) => ({ ...purchase, id: purchase.line }))

interface Lists<T> {
  gone: T[]
  come: T[]
  changed: { was: T; is: T }[]
}

function lists<T extends { id: string }>(from: readonly T[], to: readonly T[]): Lists<T> {
  const old = new Map(from.map((item) => [item.id, item]))
  const now = new Set(to.map((item) => item.id))
  return {
    gone: from.filter((item) => !now.has(item.id)),
    come: to.filter((item) => !old.has(item.id)),
    changed: to.flatMap((is) => {
      const was = old.get(is.id)
      return was && !same(was, is) ? [{ was, is }] : []
    }),
  }
}

function patchBetween(was: Part, is: Part): PartPatch {
  const patch: Record<string, unknown> = {}
  for (const field of Object.keys(partPatchSchema.shape) as (keyof PartPatch & keyof Part)[])
    if (!same(was[field], is[field])) patch[field] = is[field] ?? null
  return patch as PartPatch
}

function renaming(from: BuildDocument, to: BuildDocument): Change[] {
  const machine = from.machine === to.machine ? {} : { machine: to.machine ?? null }
  return from.name === to.name && from.machine === to.machine ? [] : [{ op: 'rename', name: to.name, ...machine }]
}
