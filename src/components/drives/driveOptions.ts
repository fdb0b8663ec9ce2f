import { baysOf, fits } from '#shared/build/edits/bays.ts'
import type { ResolvedBuild } from '#shared/build/resolve.ts'
import type { Model } from '#shared/catalog/model.ts'

/** Models that can take the place of a drive: other ones that fit its bay, by name. */
export function driveOptions(build: ResolvedBuild, drive: string): { value: string; words: string; model: Model }[] {
  const own = build.partById.get(drive)
  const bay = baysOf(build).find((place) => place.drives.some(({ part }) => part.id === drive))?.bay
  return [
    ...new Map([...build.catalog.models.values(), ...build.document.models].map((model) => [model.id, model])).values(),
  ]
    .filter((model) => model.kind === 'drive' && model.id !== own?.part.model && (!bay || fits(model, bay)))
    .map((model) => ({ value: model.id, words: model.name, model }))
    .sort((a, b) => a.words.localeCompare(b.words))
}
