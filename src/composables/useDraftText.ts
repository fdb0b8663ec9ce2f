import { useLocalStorage } from '@vueuse/core'
import { watch, type Ref } from 'vue'

/** Text that is being written, kept on this computer until it is sent: a reload or a closed tab loses none of it. */
export function useDraftText(key: () => string): Ref<string> {
  const text = useLocalStorage(() => `bayloom.draft.${key()}`, '', { writeDefaults: false })
  // What was sent or emptied leaves nothing behind.
  watch(text, (value) => {
    if (value === '') localStorage.removeItem(`bayloom.draft.${key()}`)
  })
  return text
}
