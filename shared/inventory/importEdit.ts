import { baysOf, fits, type BayPlace } from '../build/edits/bays.ts'
import { outcome, type EditOutcome, type MakeId } from '../build/edits/outcome.ts'
import { seatJoint } from '../build/edits/seat.ts'
import type { Change, PartPatch } from '../build/changes.ts'
import { nextRef } from '../build/refs.ts'
import type { ResolvedBuild } from '../build/resolve.ts'
import type { Model } from '../catalog/model.ts'
import { counted } from '../check/words.ts'
import type { MatchLine } from './match.ts'
import type { ObservedDrive } from './observed.ts'

/** What the person chose to do with one drive of the listing. */
export type ImportChoice =
  | { kind: 'ignore' }
  /** Writes what was seen into the part; `model`: it gets this model, too. */
  | { kind: 'update'; drive: string; model: Model | null }
  /** Adds the drive; into this bay, or into none. */
  | { kind: 'add'; model: Model; bay: { case: string; slot: number } | null }

/** How a line is treated unless the person says otherwise. A serial against another serial is never overwritten unasked. */
export function usualChoice(line: MatchLine): ImportChoice {
  if (line.drive) {
    const isOther = line.by !== 'serial' && line.drive.serial !== '' && line.observed.serial !== undefined
    return isOther ? { kind: 'ignore' } : { kind: 'update', drive: line.drive.id, model: null }
  }
  return line.model ? { kind: 'add', model: line.model.model, bay: null } : { kind: 'ignore' }
}

/**
 * The usual choices for all lines of a listing: new drives take the bay of the same number as they state, else the free bays
 * in their order, each once.
 */
export function usualChoices(build: ResolvedBuild, lines: readonly MatchLine[]): ImportChoice[] {
  const taken = new Set<string>()
  return lines.map((line) => {
    const choice = usualChoice(line)
    if (choice.kind !== 'add') return choice
    const free = freeBaysFor(build, choice.model).filter((place) => !taken.has(keyOf(place)))
    const place = free.find(({ bay }) => bay.slot === line.observed.bay) ?? free[0]
    if (!place) return choice
    taken.add(keyOf(place))
    return { ...choice, bay: { case: place.case.part.id, slot: place.bay.slot } }
  })
}

const keyOf = (place: BayPlace): string => `${place.case.part.id}#${place.bay.slot}`

/** Free bays that take a drive of a model, in the case's order. */
export const freeBaysFor = (build: ResolvedBuild, model: Model): BayPlace[] =>
  baysOf(build).filter((place) => place.drives.length === 0 && fits(model, place.bay))

/** Everything that was chosen as one edit, undone as one. Bays given twice, or taken, are left out with a note. */
export function importEdit(
  build: ResolvedBuild,
  makeId: MakeId,
  chosen: readonly { observed: ObservedDrive; choice: ImportChoice }[],
): EditOutcome {
  const refs = new Set(build.document.parts.map((part) => part.ref))
  const own = new Set(build.document.models.map(({ id }) => id))
  const taken = new Set<string>()
  const notes: string[] = []
  let added = 0
  let updated = 0
  const changes = chosen.flatMap(({ observed, choice }): Change[] => {
    if (choice.kind === 'ignore') return []
    if (choice.kind === 'update') {
      const made = updateChanges(build, own, observed, choice)
      if (made.length > 0) updated++
      return made
    }
    const id = makeId('p')
    const ref = nextRef('drive', refs)
    refs.add(ref)
    added++
    const place = placeFor(build, choice, taken, (words) => notes.push(`${ref}: ${words}`))
    const model = modelChange(build, own, choice.model)
    return [
      ...model,
      {
        op: 'addPart',
        part: {
          id,
          model: choice.model.id,
          ref,
          ...seenFields(observed),
          ...(place && { bay: { case: place.case.part.id, slot: place.bay.slot } }),
        },
      },
      ...(place ? seatJoint(makeId, place.receptacle, { id, model: choice.model }) : []),
    ]
  })
  const words = [
    updated > 0 && `${counted(updated, 'drive')} brought up to date`,
    added > 0 && `${counted(added, 'drive')} added`,
  ]
  return outcome(`Import: ${words.filter(Boolean).join(', ') || 'nothing'}`, changes, notes)
}

const seenFields = ({ serial, wwn, makerModel }: ObservedDrive) => ({
  ...(serial !== undefined && { serial }),
  ...(wwn !== undefined && { wwn }),
  ...(makerModel !== undefined && { makerModel }),
})

function updateChanges(
  build: ResolvedBuild,
  own: Set<string>,
  observed: ObservedDrive,
  choice: Extract<ImportChoice, { kind: 'update' }>,
): Change[] {
  const part = build.partById.get(choice.drive)
  if (!part) return []
  const seen: PartPatch = seenFields(observed)
  const patch = Object.fromEntries(
    Object.entries(seen).filter(([field, value]) => part.part[field as keyof typeof part.part] !== value),
  ) as PartPatch
  const model = choice.model && choice.model.id !== part.part.model ? choice.model : null
  // Own figures belong to the model that goes.
  const turned: PartPatch = model ? { ...patch, model: model.id, overrides: null } : patch
  if (Object.keys(turned).length === 0) return []
  return [...(model ? modelChange(build, own, model) : []), { op: 'updatePart', id: choice.drive, patch: turned }]
}

/** A model of a person's own comes into the document with its first part. */
function modelChange(build: ResolvedBuild, own: Set<string>, model: Model): Change[] {
  if (build.catalog.models.has(model.id) || own.has(model.id)) return []
  own.add(model.id)
  return [{ op: 'putModel', model }]
}

function placeFor(
  build: ResolvedBuild,
  { bay, model }: Extract<ImportChoice, { kind: 'add' }>,
  taken: Set<string>,
  tell: (words: string) => void,
): BayPlace | undefined {
  if (!bay) return undefined
  const key = `${bay.case}#${bay.slot}`
  const place = freeBaysFor(build, model).find((one) => one.case.part.id === bay.case && one.bay.slot === bay.slot)
  if (!place || taken.has(key)) {
    tell(`bay ${bay.slot} is not free for it; it stands beside the case.`)
    return undefined
  }
  taken.add(key)
  return place
}
