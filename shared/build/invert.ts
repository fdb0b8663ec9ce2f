import { apply } from './apply.ts'
import type { Change, PartPatch } from './changes.ts'
import type { BuildDocument, Part } from './document.ts'

/** The way back: applied after `changes`, gives the document's content again (lists may end in another order). */
export function invert(document: BuildDocument, changes: readonly Change[]): Change[] {
  const back: Change[] = []
  let current = document
  for (const change of changes) {
    back.unshift(invertOne(current, change))
    current = apply(current, [change])
  }
  return back
}

function invertOne(document: BuildDocument, change: Change): Change {
  switch (change.op) {
    case 'addPart':
      return { op: 'removePart', id: change.part.id }
    case 'removePart':
      return { op: 'addPart', part: required(document.parts, change.id) }
    case 'updatePart':
      return { op: 'updatePart', id: change.id, patch: inversePatch(required(document.parts, change.id), change.patch) }
    case 'addJoint':
      return { op: 'removeJoint', id: change.joint.id }
    case 'removeJoint':
      return { op: 'addJoint', joint: required(document.joints, change.id) }
    case 'putModel': {
      const before = document.models.find((model) => model.id === change.model.id)
      return before ? { op: 'putModel', model: before } : { op: 'removeModel', id: change.model.id }
    }
    case 'removeModel':
      return { op: 'putModel', model: required(document.models, change.id) }
    case 'acceptFinding': {
      const before = document.accepted.find((accepted) => accepted.key === change.accepted.key)
      return before ? { op: 'acceptFinding', accepted: before } : { op: 'withdrawAcceptance', key: change.accepted.key }
    }
    case 'withdrawAcceptance': {
      const before = document.accepted.find((accepted) => accepted.key === change.key)
      if (!before) throw new Error(`finding "${change.key}" was not accepted`)
      return { op: 'acceptFinding', accepted: before }
    }
    case 'updateSettings':
      return { op: 'updateSettings', settings: document.settings }
    case 'setPurchase': {
      const before = document.purchases?.find(({ line }) => line === change.line)
      if (!before) return { op: 'setPurchase', line: change.line, purchase: null }
      const { line, ...purchase } = before
      return { op: 'setPurchase', line, purchase }
    }
    case 'rename':
      return { op: 'rename', name: document.name, machine: document.machine ?? null }
  }
}

function required<T extends { id: string }>(items: readonly T[], id: string): T {
  const found = items.find((item) => item.id === id)
  if (!found) throw new Error(`no "${id}" in this document`)
  return found
}

function inversePatch(part: Part, patch: PartPatch): PartPatch {
  const back: Record<string, unknown> = {}
  for (const field of Object.keys(patch)) back[field] = part[field as keyof Part] ?? null
  return back as PartPatch
}
