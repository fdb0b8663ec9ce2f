import { watch } from 'vue'
import { useRoute, useRouter } from 'vue-router'
import { useCommentsStore } from '../stores/comments.ts'
import { useIsNarrow } from './useIsNarrow.ts'

/** A link to a comment, from a mail or a notification, opens the comments at its thread once the build is there. */
export function useLinkedThread(isReady: () => boolean): void {
  const route = useRoute()
  const router = useRouter()
  const comments = useCommentsStore()
  const isNarrow = useIsNarrow()

  watch(
    [isReady, () => route.query['thread'], () => route.query['comment']],
    ([ready, thread]) => {
      if (!ready || typeof thread !== 'string') return
      if (isNarrow.value && route.query['show'] !== 'comments')
        void router.replace({ query: { ...route.query, show: 'comments' } })
      comments.showThread(thread)
    },
    { immediate: true, flush: 'post' },
  )
}
