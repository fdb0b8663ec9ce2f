import type { Model } from '../../catalog/model.ts'
import type { Change } from '../changes.ts'
import type { Part } from '../document.ts'
import { nextRef } from '../refs.ts'
import type { ResolvedBuild } from '../resolve.ts'
import { baysOf, fits, type BayPlace } from './bays.ts'
import { outcome, refuse, type EditOutcome, type MakeId } from './outcome.ts'
import { seatJoint, type BayTarget } from './seat.ts'
import { bayRange, refList } from './words.ts'

/** Where new parts go: drives and backplanes into bays from the given one on, others at a point of the sheet. */
export interface Placement {
  count?: number
  /** First bay that may be taken; the first free one of the build otherwise. */
  from?: BayTarget
  position?: { x: number; y: number }
}

/** Own models of the build win over catalog models of the same id. */
export function modelOf(build: ResolvedBuild, id: string): Model | undefined {
  return build.document.models.find((model) => model.id === id) ?? build.catalog.models.get(id)
}

/**
 * Adds parts of one model. Drives go into the next free bays that take them and are seated where a backplane stands
 * behind; a backplane takes the next bays that none serves; a lone part goes where it was dropped. A model from a
 * person's own library comes into the document with its first part.
 */
export function addParts(
  build: ResolvedBuild,
  makeId: MakeId,
  wantedModel: string | Model,
  placement: Placement = {},
): EditOutcome {
  const model = typeof wantedModel === 'string' ? modelOf(build, wantedModel) : wantedModel
  if (!model) return refuse('This model is no longer in the catalog.')
  const wanted = Math.max(1, Math.floor(placement.count ?? 1))
  const bays = nextBays(build, model, placement.from)
  const refs = new Set(build.document.parts.map((part) => part.ref))
  const changes: Change[] = modelOf(build, model.id) ? [] : [{ op: 'putModel', model }]
  const added: Part[] = []
  for (let i = 0; i < wanted; i++) {
    const ref = nextRef(model.kind, refs)
    refs.add(ref)
    const place = bays.next()
    const part: Part = {
      id: makeId('p'),
      model: model.id,
      ref,
      ...(place && { bay: { case: place.case.part.id, slot: place.bay.slot } }),
      ...(placement.position && !place && { position: stagger(placement.position, i) }),
    }
    added.push(part)
    changes.push({ op: 'addPart', part })
    if (place && model.kind === 'drive') changes.push(...seatJoint(makeId, place.receptacle, { id: part.id, model }))
  }
  return outcome(labelFor(added), changes, notesFor(model, added, placement.from))
}

/** Copies dropped at one point stand a little apart, so that each can be seen. */
const stagger = (at: { x: number; y: number }, i: number) => ({ x: at.x + 24 * i, y: at.y + 24 * i })

function labelFor(added: readonly Part[]): string {
  const refs = refList(added.map((part) => part.ref))
  const slots = added.flatMap((part) => part.bay?.slot ?? [])
  return slots.length > 0 ? `Add ${refs} in ${bayRange(slots)}` : `Add ${refs}`
}

function notesFor(model: Model, added: readonly Part[], from: BayTarget | undefined): string[] {
  const loose = added.filter((part) => !part.bay).map((part) => part.ref)
  if (loose.length === 0 || (model.kind !== 'drive' && model.kind !== 'backplane')) return []
  const where = from ? `from bay ${from.slot} on` : 'left'
  return [`No bay ${where} for ${refList(loose)}: ${loose.length === 1 ? 'it stands' : 'they stand'} beside the case.`]
}

/** Hands out bays one by one, so that each is taken once within an edit. */
function nextBays(build: ResolvedBuild, model: Model, from: BayTarget | undefined) {
  const after = (place: BayPlace) => !from || (place.case.part.id === from.case && place.bay.slot >= from.slot)
  const places = baysOf(build).filter(after)
  if (model.kind === 'drive') {
    const free = places.filter((place) => place.drives.length === 0 && fits(model, place.bay))
    return { next: () => free.shift() }
  }
  if (model.kind !== 'backplane') return { next: () => undefined }
  const span = Math.max(1, ...model.connectors.map((connector) => connector.bay ?? 0))
  const unserved = places.filter((place) => !place.receptacle)
  return {
    next: () => {
      const [first] = unserved
      if (!first) return undefined
      unserved.splice(0, span)
      return first
    },
  }
}
