import { defineStore } from 'pinia'
import { ref, shallowRef } from 'vue'
import type { Pin, PinMark } from '#shared/contract/comments.ts'

/** What a new comment will be pinned to, with the words for it. */
export interface CommentTarget {
  pin: Pin
  about: string
}

export const wholeBuild: CommentTarget = { pin: { kind: 'build' }, about: 'the build' }

/** The comments of the open build as the page shows them: the panel, what is written about, the thread in view. */
export const useCommentsStore = defineStore('comments', () => {
  /** Raised each time that somebody asks for the panel. */
  const asked = ref(0)
  const target = shallowRef<CommentTarget | null>(null)
  /** Thread to be brought into view. */
  const focused = ref<string | null>(null)
  /** Spot to be brought into view. */
  const spot = shallowRef<{ x: number; y: number } | null>(null)
  /** Open threads of the build, by what they are pinned to (`pinKey`), and by the part that they are about. */
  const byKey = shallowRef<ReadonlyMap<string, readonly PinMark[]>>(new Map())
  const byPart = shallowRef<ReadonlyMap<string, readonly PinMark[]>>(new Map())
  /** The next click on the sheet says where the comment goes. */
  const placing = ref(false)

  function commentOn(pin: Pin, about: string): void {
    target.value = { pin, about: about.slice(0, 200) }
    focused.value = null
    placing.value = false
    asked.value++
  }

  function showThread(threadId: string): void {
    focused.value = threadId
    asked.value++
  }

  function reset(): void {
    target.value = null
    focused.value = null
    placing.value = false
    spot.value = null
    byKey.value = new Map()
    byPart.value = new Map()
  }

  return { asked, target, focused, spot, byKey, byPart, placing, commentOn, showThread, reset }
})
