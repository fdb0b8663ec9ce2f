import type { buildSorts } from '#shared/contract/build.ts'

export type BuildSort = (typeof buildSorts)[number]

/** Names go from A on, everything else from the most on. */
export const sortDirection = (sort: BuildSort): 'ascending' | 'descending' =>
  sort === 'name' ? 'ascending' : 'descending'

export const sortWords: Readonly<Record<BuildSort, string>> = {
  changed: 'last change first',
  name: 'name, A to Z',
  worst: 'worst finding first',
  drives: 'most drives first',
}
