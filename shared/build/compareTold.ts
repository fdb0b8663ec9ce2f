import { z } from 'zod'
import { compareBuilds, type Difference } from './compare.ts'
import type { NamedEnd } from './compareJoints.ts'
import { differenceWords, type State } from './compareWords.ts'
import type { ResolvedBuild } from './resolve.ts'

/** Where a change belongs when they are read one after the other. */
export const changeGroups = ['parts', 'bays', 'wiring', 'details', 'settings', 'models', 'accepted'] as const
export const changeMarks = ['added', 'removed', 'moved', 'changed'] as const
export type ChangeMark = (typeof changeMarks)[number]

/** One change between two states of a build: in words, and what of the sheet it concerns. */
export const toldChangeSchema = z.object({
  group: z.enum(changeGroups),
  mark: z.enum(changeMarks),
  text: z.string(),
  /** Ids of parts to light, in both states. */
  parts: z.array(z.string()),
  /** Joint of the older and of the newer state; null where that state has none. */
  joint: z.object({ before: z.string().nullable(), after: z.string().nullable() }).optional(),
})
export type ToldChange = z.infer<typeof toldChangeSchema>

/** What changed between two states of a build, each change with its words, its shape and its place on the sheet. */
export function tellChanges(
  before: ResolvedBuild,
  after: ResolvedBuild,
  finding: (key: string) => string = (key) => key,
): ToldChange[] {
  const partOf = (id: string, state: State) =>
    state === 'after' ? (after.partById.get(id) ?? before.partById.get(id)) : before.partById.get(id)
  const names = {
    model: modelNames(before, after),
    travels: (part: string) => partOf(part, 'after')?.model.kind === 'drive',
    connector: ({ part, connector }: NamedEnd, state: State) => {
      const resolved = partOf(part, state)
      if (resolved?.model.kind === 'drive' && resolved.connectors.length === 1) return null
      return resolved?.connectorById.get(connector)?.connector.label ?? connector
    },
    finding,
  }
  return compareBuilds(before.document, after.document, names).map((difference) => ({
    ...placeOf(difference),
    text: differenceWords(difference, names),
  }))
}

function modelNames(before: ResolvedBuild, after: ResolvedBuild): (id: string) => string {
  const own = new Map([...before.document.models, ...after.document.models].map(({ id, name }) => [id, name]))
  return (id) => own.get(id) ?? after.catalog.models.get(id)?.name ?? id
}

type Told = Omit<ToldChange, 'text'>

function placeOf(difference: Difference): Told {
  switch (difference.kind) {
    case 'part added':
      return { group: 'parts', mark: 'added', parts: [difference.part] }
    case 'part removed':
      return { group: 'parts', mark: 'removed', parts: [difference.part] }
    case 'part moved':
      return { group: 'bays', mark: 'moved', parts: [difference.part] }
    case 'part changed':
      return { group: difference.field === 'model' ? 'parts' : 'details', mark: 'changed', parts: [difference.part] }
    case 'figure changed':
    case 'routes changed':
    case 'pin test changed':
      return { group: 'details', mark: 'changed', parts: [difference.part] }
    case 'joint added':
      return { group: 'wiring', mark: 'added', parts: [], joint: { before: null, after: difference.joint } }
    case 'joint removed':
      return { group: 'wiring', mark: 'removed', parts: [], joint: { before: difference.joint, after: null } }
    case 'rewired':
      return {
        group: 'wiring',
        mark: 'moved',
        parts: [difference.at.part],
        joint: { before: difference.was, after: difference.joint },
      }
    case 'purchase changed':
      return { group: 'details', mark: 'changed', parts: [] }
    case 'setting changed':
    case 'build renamed':
      return { group: 'settings', mark: 'changed', parts: [] }
    case 'model added':
    case 'model removed':
    case 'model changed':
      return { group: 'models', mark: difference.kind.slice('model '.length) as ChangeMark, parts: [] }
    case 'finding accepted':
      return { group: 'accepted', mark: 'added', parts: [] }
    case 'acceptance withdrawn':
      return { group: 'accepted', mark: 'removed', parts: [] }
  }
}
