import { defineStore } from 'pinia'
import { ref } from 'vue'

/** How many notifications wait, as the stream of events says. */
export const useNoticesStore = defineStore('notices', () => {
  const unread = ref(0)
  /** Raised with every word of the server, also where the number stays. */
  const heardAt = ref(0)
  /** The stream of an open build carries the word as well: no second one is needed. */
  const isCarried = ref(false)

  function hear(count: number): void {
    unread.value = count
    heardAt.value++
  }

  return { unread, heardAt, isCarried, hear }
})
