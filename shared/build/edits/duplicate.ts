import type { Change } from '../changes.ts'
import type { Part } from '../document.ts'
import { nextRef } from '../refs.ts'
import type { ResolvedBuild } from '../resolve.ts'
import { baysOf, fits, type BayPlace } from './bays.ts'
import { outcome, refuse, type EditOutcome, type MakeId } from './outcome.ts'
import { seatJoint } from './seat.ts'
import { refList } from './words.ts'

/** Copies stand this far from their original. */
const step = { x: 28, y: 28 }

/**
 * Copies parts with the joints among them, as many times as asked. Serial, pin test and measured routes belong to
 * one physical thing and are not copied; copied drives go into the next free bays.
 */
export function duplicateParts(build: ResolvedBuild, makeId: MakeId, ids: Iterable<string>, copies = 1): EditOutcome {
  const chosen = new Set(ids)
  const originals = build.parts.filter((part) => chosen.has(part.part.id))
  if (originals.length === 0) return refuse('That part is no longer there.')
  const refs = new Set(build.document.parts.map((part) => part.ref))
  const free = baysOf(build).filter((place) => place.drives.length === 0)
  const changes: Change[] = []
  const added: Part[] = []
  for (let copy = 1; copy <= copies; copy++) {
    const idOf = new Map<string, string>()
    for (const original of originals) {
      const id = makeId('p')
      const ref = nextRef(original.model.kind, refs)
      refs.add(ref)
      idOf.set(original.part.id, id)
      const { bay, serial: _serial, pinTest: _pinTest, routes_mm: _routes, position, ...kept } = original.part
      const place = bay && original.model.kind === 'drive' ? takeBay(free, original.model) : undefined
      const part: Part = {
        ...kept,
        id,
        ref,
        ...(place && { bay: { case: place.case.part.id, slot: place.bay.slot } }),
        ...(position && !place && { position: { x: position.x + step.x * copy, y: position.y + step.y * copy } }),
      }
      added.push(part)
      changes.push({ op: 'addPart', part })
      if (place) changes.push(...seatJoint(makeId, place.receptacle, { id, model: original.model }))
    }
    for (const joint of build.joints) {
      const a = idOf.get(joint.joint.a.part)
      const b = idOf.get(joint.joint.b.part)
      if (a === undefined || b === undefined || isSeat(joint.a.connector.bay, joint.b.connector.bay)) continue
      const ends = { a: { ...joint.joint.a, part: a }, b: { ...joint.joint.b, part: b } }
      changes.push({ op: 'addJoint', joint: { id: makeId('j'), ...ends } })
    }
  }
  const times = copies > 1 ? ` ${copies} times` : ''
  const names = refList(originals.map((part) => part.part.ref))
  return outcome(`Duplicate ${names}${times} as ${refList(added.map((part) => part.ref))}`, changes)
}

const isSeat = (a: number | undefined, b: number | undefined): boolean => a !== undefined || b !== undefined

function takeBay(free: BayPlace[], model: Parameters<typeof fits>[0]): BayPlace | undefined {
  const index = free.findIndex((place) => fits(model, place.bay))
  return index < 0 ? undefined : free.splice(index, 1)[0]
}
