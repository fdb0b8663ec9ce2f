import { refDebounced } from '@vueuse/core'
import { computed, type Ref } from 'vue'
import type { ReviewState } from '#shared/contract/reviewState.ts'
import { lidContent } from '#shared/paper/lid/make.ts'
import { lidPages } from '#shared/paper/lid/pages.ts'
import { isoDay } from '../../composables/useDiagramExport.ts'
import { useChecksStore } from '../../stores/checks.ts'
import { useDiagramStore } from '../../stores/diagram.ts'
import type { SaveState } from '../../stores/save/state.ts'
import { codeModules } from './codeModules.ts'
import type { useLidOptions } from './useLidOptions.ts'

/** Long enough that typing a contact does not set the sheet anew at every letter. */
const pause_ms = 300

/** The lid sheet of the open build, as it stands on the screen now. */
export function useLidSheet(
  { options, goodAddress }: ReturnType<typeof useLidOptions>,
  state: Readonly<Ref<SaveState | null>>,
  review: Readonly<Ref<ReviewState | null>>,
) {
  const diagram = useDiagramStore()
  const checks = useChecksStore()
  const settled = refDebounced(
    computed(() => ({ ...options.value, address: goodAddress.value })),
    pause_ms,
  )
  const isSaved = computed(() => state.value?.kind === 'saved')
  const revision = computed<number | string>(() => {
    const number = state.value?.revision
    if (number === undefined) return 'not saved'
    return isSaved.value ? number : `${number}, changed since`
  })

  const content = computed(() => {
    const { build } = diagram
    const { result } = checks
    if (!build || !result) return null
    const { seenFrom, contact, address } = settled.value
    return lidContent({
      build,
      result,
      revision: revision.value,
      date: isoDay(new Date()),
      review: review.value,
      ...(seenFrom !== 'case' && { seenFrom }),
      contact,
      address,
    })
  })
  const paper = computed(() => {
    const { build, drawing } = diagram
    const { result } = checks
    if (!content.value || !build || !drawing || !result) return null
    const moment = result.moments.find(({ applies }) => applies)?.moment ?? 'cold-start'
    const code = codeModules(content.value.address)
    return lidPages({ content: content.value, code, diagram: { build, drawing, result, moment } }, settled.value)
  })
  return { content, paper, revision, isSaved }
}
