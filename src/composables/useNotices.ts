import { readonly, shallowRef } from 'vue'

export interface Notice {
  id: number
  text: string
  /** A way back or onward, offered beside the words. */
  action?: { label: string; run: () => unknown }
}

/** How long a notice stays; one with a way back stays longer. Pointing at it or focusing it stops the time. */
export const noticeSeconds = { plain: 6, action: 12 } as const

const notices = shallowRef<readonly Notice[]>([])
let given = 0

const dismiss = (id: number): void => {
  notices.value = notices.value.filter((notice) => notice.id !== id)
}

const notify = (text: string, action?: Notice['action']): void => {
  notices.value = [...notices.value.slice(-2), { id: ++given, text, action }]
}

/** Short words about what was just done, shown in a corner and announced politely. */
export function useNotices() {
  return { notices: readonly(notices), notify, dismiss }
}
