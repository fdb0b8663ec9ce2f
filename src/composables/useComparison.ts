import { keepPreviousData, useQuery } from '@tanstack/vue-query'
import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import { compareRevisions } from '../api/revisions.ts'

/**
 * What changed from one revision of a build to another. Null as `to` is the newest one, whatever that is by now; null as
 * `from` asks for nothing.
 */
export function useComparison(
  buildId: MaybeRefOrGetter<string>,
  from: MaybeRefOrGetter<number | null>,
  to: MaybeRefOrGetter<number | null>,
) {
  return useQuery({
    queryKey: computed(() => ['revisions', toValue(buildId), 'comparison', toValue(from), toValue(to)]),
    queryFn: ({ signal }) => compareRevisions(toValue(buildId), toValue(from) ?? 1, toValue(to) ?? undefined, signal),
    enabled: () => toValue(from) !== null,
    placeholderData: keepPreviousData,
  })
}
