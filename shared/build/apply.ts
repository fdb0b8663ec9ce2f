import type { BuildDocument, Part, Purchase } from './document.ts'
import type { Change, PartPatch } from './changes.ts'

/** Thrown when a change does not fit the document it is applied to. `index` is the change's place in the list. */
export class ChangeError extends Error {
  readonly index: number
  constructor(index: number, message: string) {
    super(message)
    this.name = 'ChangeError'
    this.index = index
  }
}

/** The lists of a document by id while a list of changes is carried out: linear in changes, not in document times changes. */
interface Draft {
  document: BuildDocument
  parts: Map<string, Part>
  joints: Map<string, BuildDocument['joints'][number]>
  models: Map<string, BuildDocument['models'][number]>
  accepted: Map<string, BuildDocument['accepted'][number]>
  /** Joints at each part, counted, so that a held part is not removed. */
  held: Map<string, number>
}

/**
 * Carries out changes in order on a copy; the document given is not touched.
 * Order of parts and joints is kept; what is added comes last, so names on screen never shift.
 * @throws ChangeError naming the first change that does not fit; nothing is applied then.
 */
export function apply(document: BuildDocument, changes: readonly Change[]): BuildDocument {
  const draft = open(document)
  changes.forEach((change, index) => applyOne(draft, change, index))
  return close(draft)
}

function open(document: BuildDocument): Draft {
  const held = new Map<string, number>()
  for (const joint of document.joints)
    for (const end of [joint.a, joint.b]) held.set(end.part, (held.get(end.part) ?? 0) + 1)
  return {
    document: { ...document },
    parts: new Map(document.parts.map((part) => [part.id, part])),
    joints: new Map(document.joints.map((joint) => [joint.id, joint])),
    models: new Map(document.models.map((model) => [model.id, model])),
    accepted: new Map(document.accepted.map((accepted) => [accepted.key, accepted])),
    held,
  }
}

function close(draft: Draft): BuildDocument {
  return {
    ...draft.document,
    parts: [...draft.parts.values()],
    joints: [...draft.joints.values()],
    models: [...draft.models.values()],
    accepted: [...draft.accepted.values()],
  }
}

function hold(draft: Draft, partId: string, by: number): void {
  draft.held.set(partId, (draft.held.get(partId) ?? 0) + by)
}

function applyOne(draft: Draft, change: Change, index: number): void {
  const refuse = (message: string): never => {
    throw new ChangeError(index, message)
  }
  switch (change.op) {
    case 'addPart': {
      if (draft.parts.has(change.part.id)) refuse(`part "${change.part.id}" is already there`)
      draft.parts.set(change.part.id, change.part)
      return
    }
    case 'removePart': {
      if (!draft.parts.has(change.id)) refuse(`no part "${change.id}"`)
      if ((draft.held.get(change.id) ?? 0) > 0) refuse(`part "${change.id}" is still joined`)
      draft.parts.delete(change.id)
      return
    }
    case 'updatePart': {
      const part = draft.parts.get(change.id) ?? refuse(`no part "${change.id}"`)
      draft.parts.set(change.id, patchPart(part, change.patch))
      return
    }
    case 'addJoint': {
      const { joint } = change
      if (draft.joints.has(joint.id)) refuse(`joint "${joint.id}" is already there`)
      for (const end of [joint.a, joint.b]) {
        if (!draft.parts.has(end.part)) refuse(`no part "${end.part}" to join`)
        hold(draft, end.part, 1)
      }
      draft.joints.set(joint.id, joint)
      return
    }
    case 'removeJoint': {
      const joint = draft.joints.get(change.id) ?? refuse(`no joint "${change.id}"`)
      hold(draft, joint.a.part, -1)
      hold(draft, joint.b.part, -1)
      draft.joints.delete(change.id)
      return
    }
    case 'putModel': {
      draft.models.set(change.model.id, change.model)
      return
    }
    case 'removeModel': {
      if (!draft.models.delete(change.id)) refuse(`no own model "${change.id}"`)
      return
    }
    case 'acceptFinding': {
      draft.accepted.set(change.accepted.key, change.accepted)
      return
    }
    case 'withdrawAcceptance': {
      if (!draft.accepted.delete(change.key)) refuse(`finding "${change.key}" was not accepted`)
      return
    }
    case 'updateSettings': {
      draft.document.settings = change.settings
      return
    }
    case 'setPurchase': {
      draft.document = withPurchase(draft.document, change.line, change.purchase)
      return
    }
    case 'rename': {
      draft.document.name = change.name
      if (change.machine === null) delete draft.document.machine
      else if (change.machine !== undefined) draft.document.machine = change.machine
      return
    }
  }
}

/** A copy of the part with the patch's fields set; `null` clears. */
export function patchPart(part: Part, patch: PartPatch): Part {
  const result: Record<string, unknown> = { ...part }
  for (const [field, value] of Object.entries(patch)) {
    if (value === null) delete result[field]
    else if (value !== undefined) result[field] = value
  }
  return result as Part
}

/** The last note taken away leaves no empty list behind: the document is again what it was. */
function withPurchase(
  { purchases = [], ...document }: BuildDocument,
  line: string,
  purchase: Omit<Purchase, 'line'> | null,
): BuildDocument {
  const place = purchases.findIndex((one) => one.line === line)
  const next = purchases.filter((one) => one.line !== line)
  if (purchase) next.splice(place < 0 ? next.length : place, 0, { line, ...purchase })
  return next.length === 0 ? document : { ...document, purchases: next }
}
