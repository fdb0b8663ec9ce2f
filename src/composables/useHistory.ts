import { useInfiniteQuery, useMutation, useQueryClient } from '@tanstack/vue-query'
import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import { revisionsPageSize, type DescribeRevisionRequest, type Revision } from '#shared/contract/revisions.ts'
import { describeRevision, listRevisions } from '../api/revisions.ts'

/** The revisions of a build, newest first, as far as they were asked for; from `before` on, or the named ones only. */
export function useHistory(
  buildId: string,
  view: { named: MaybeRefOrGetter<boolean>; before: MaybeRefOrGetter<number | null> },
) {
  const client = useQueryClient()
  const query = useInfiniteQuery({
    queryKey: computed(() => ['revisions', buildId, 'list', toValue(view.named), toValue(view.before)]),
    queryFn: ({ pageParam, signal }) => {
      const before = pageParam ?? undefined
      return listRevisions(
        buildId,
        { named: toValue(view.named) ? 'yes' : 'no', ...(before === undefined ? {} : { before }) },
        signal,
      )
    },
    initialPageParam: toValue(view.before),
    getNextPageParam: (page: Revision[]) =>
      page.length < revisionsPageSize ? undefined : (page.at(-1)?.revision ?? null),
  })
  const describe = useMutation({
    mutationFn: ({ revision, ...words }: DescribeRevisionRequest & { revision: number }) =>
      describeRevision(buildId, revision, words),
    onSuccess: () => client.invalidateQueries({ queryKey: ['revisions', buildId] }),
  })
  const revisions = computed(() => query.data.value?.pages.flat() ?? [])
  const renew = () => client.invalidateQueries({ queryKey: ['revisions', buildId] })
  return { ...query, revisions, describe, renew }
}
