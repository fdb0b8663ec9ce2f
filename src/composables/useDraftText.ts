import { useLocalStorage } from '@vueuse/core'
import { watch, type Ref } from 'vue'

/**
 * Text that is being written, kept on this computer until it is sent: a reload or a closed tab loses none of it. `requestId`
 * names one try at sending given words, and the next one of the same words, also after a reload: so that the server
 * makes of both only one.
 */
export function useDraftText(key: () => string): { text: Ref<string>; requestId: (words: string) => string } {
  const place = () => `bayloom.draft.${key()}`
  const text = useLocalStorage(place, '', { writeDefaults: false })
  // What was sent or emptied leaves nothing behind.
  watch(text, (value) => {
    if (value !== '') return
    localStorage.removeItem(place())
    localStorage.removeItem(`${place()}.sending`)
  })

  function requestId(words: string): string {
    const [id, ...sent] = (localStorage.getItem(`${place()}.sending`) ?? '').split(' ')
    if (id && sent.join(' ') === words) return id
    const fresh = crypto.randomUUID()
    localStorage.setItem(`${place()}.sending`, `${fresh} ${words}`)
    return fresh
  }

  return { text, requestId }
}
