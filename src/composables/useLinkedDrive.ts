import { watch } from 'vue'
import { useRoute, useRouter } from 'vue-router'
import { useSelectionStore } from '../stores/selection.ts'
import { useIsNarrow } from './useIsNarrow.ts'

/** A link to a drive, from the search over all builds, chooses it on the sheet; on a phone the drives are listed. */
export function useLinkedDrive(isReady: () => boolean): void {
  const route = useRoute()
  const router = useRouter()
  const selection = useSelectionStore()
  const isNarrow = useIsNarrow()

  watch(
    [isReady, () => route.query['drive']],
    ([ready, drive]) => {
      if (!ready || typeof drive !== 'string') return
      selection.choose({ parts: [drive] })
      selection.reveal([drive], [], true)
      if (isNarrow.value && route.query['show'] === undefined)
        void router.replace({ query: { ...route.query, show: 'drives' } })
    },
    { immediate: true, flush: 'post' },
  )
}
