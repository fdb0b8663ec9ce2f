import type { Change } from './changes.ts'

/** Every field of a thing at once: it was made, taken away or written as a whole. */
const whole = '*'

/** What a list of changes writes, needs and takes away. Things are named as "parts/p7" or "joints/j3". */
export interface Touched {
  /** Fields written, by thing. */
  writes: ReadonlyMap<string, ReadonlySet<string>>
  /** Things that have to be there, though nothing of them is written. */
  needs: ReadonlySet<string>
  /** Things that are no longer there, or no longer what they were. */
  gone: ReadonlySet<string>
}

/** What changes touch, so that work done at the same time can be told apart from work that collides. */
export function touched(changes: readonly Change[]): Touched {
  const writes = new Map<string, Set<string>>()
  const needs = new Set<string>()
  const gone = new Set<string>()
  const write = (thing: string, field: string = whole) => {
    const fields = writes.get(thing)
    if (fields) fields.add(field)
    else writes.set(thing, new Set([field]))
  }
  for (const change of changes) touchOne(change, write, needs, gone)
  return { writes, needs, gone }
}

function touchOne(
  change: Change,
  write: (thing: string, field?: string) => void,
  needs: Set<string>,
  gone: Set<string>,
): void {
  switch (change.op) {
    case 'addPart':
      write(`parts/${change.part.id}`)
      write(`refs/${change.part.ref}`)
      needs.add(`models/${change.part.model}`)
      if (change.part.bay) needs.add(`parts/${change.part.bay.case}`)
      return
    case 'removePart':
      write(`parts/${change.id}`)
      gone.add(`parts/${change.id}`)
      return
    case 'updatePart': {
      const thing = `parts/${change.id}`
      for (const field of Object.keys(change.patch)) write(thing, field)
      const { model, ref, bay } = change.patch
      if (ref !== undefined) write(`refs/${ref}`)
      if (bay) needs.add(`parts/${bay.case}`)
      if (model === undefined) return
      for (const field of ['overrides', 'routes_mm']) write(thing, field)
      gone.add(`${thing}/connectors`)
      needs.add(`models/${model}`)
      return
    }
    case 'addJoint':
      write(`joints/${change.joint.id}`)
      for (const end of [change.joint.a, change.joint.b]) {
        needs.add(`parts/${end.part}`)
        needs.add(`parts/${end.part}/connectors`)
      }
      return
    case 'removeJoint':
      write(`joints/${change.id}`)
      return
    case 'putModel':
      write(`models/${change.model.id}`)
      return
    case 'removeModel':
      write(`models/${change.id}`)
      gone.add(`models/${change.id}`)
      return
    case 'acceptFinding':
      write(`accepted/${change.accepted.key}`)
      return
    case 'withdrawAcceptance':
      write(`accepted/${change.key}`)
      return
    case 'updateSettings':
      write('settings')
      return
    case 'setPurchase':
      write(`purchases/${change.line}`)
      return
    case 'rename':
      write('build', 'name')
      if (change.machine !== undefined) write('build', 'machine')
      return
  }
}

/**
 * Where two lists of changes collide, sorted: "parts/p7" where one of them makes, takes away or needs what the other
 * takes away, "parts/p7/serial" where both write one field. Empty: they can be done one after the other, in either order.
 */
export function clashes(ours: Touched, theirs: Touched): string[] {
  const found = new Set<string>()
  for (const [thing, fields] of ours.writes) {
    const others = theirs.writes.get(thing)
    if (!others) continue
    if (fields.has(whole) || others.has(whole)) found.add(thing)
    else for (const field of fields) if (others.has(field)) found.add(`${thing}/${field}`)
  }
  for (const [one, other] of [
    [ours, theirs],
    [theirs, ours],
  ] as const)
    for (const thing of one.gone) if (other.needs.has(thing)) found.add(thing)
  return [...found].sort()
}
