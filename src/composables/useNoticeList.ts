import { useInfiniteQuery, useQueryClient } from '@tanstack/vue-query'
import { computed, watch } from 'vue'
import type { ReadNotices } from '#shared/contract/notifications.ts'
import { listNotices, readNotices } from '../api/live.ts'
import { useNoticesStore } from '../stores/notices.ts'
import { useAttempt } from './useAttempt.ts'

/** The person's notifications, newest first, kept true while they are looked at; and marking them as read. */
export function useNoticeList() {
  const client = useQueryClient()
  const store = useNoticesStore()
  const attempt = useAttempt()
  const queryKey = ['notices'] as const

  const query = useInfiniteQuery({
    queryKey,
    queryFn: ({ pageParam, signal }) => listNotices(pageParam, signal),
    initialPageParam: undefined as number | undefined,
    getNextPageParam: (page) => (page.more ? page.items.at(-1)?.id : undefined),
    staleTime: 0,
  })
  const items = computed(() => query.data.value?.pages.flatMap((page) => page.items) ?? [])
  watch(
    () => store.heardAt,
    () => void client.invalidateQueries({ queryKey }),
  )

  const read = (which: ReadNotices) =>
    attempt(async () => {
      store.hear((await readNotices(which)).unread)
    }, 'It stays unread.')

  return {
    query,
    items,
    read,
    /** All that are here now: one that comes just then is not swallowed. */
    readAll: () => (items.value[0] ? read({ upTo: items.value[0].id }) : Promise.resolve(true)),
  }
}
