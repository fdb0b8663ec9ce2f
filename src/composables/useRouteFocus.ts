import { nextTick } from 'vue'
import { useRouter } from 'vue-router'

/**
 * Moves the focus to the new page's heading (to the page itself where it has none), so that keyboard and screen reader
 * start at its top. Changes of query or hash within one page keep the focus.
 */
export function useRouteFocus(main: () => HTMLElement | null): void {
  let isFirst = true
  useRouter().afterEach(async (to, from, failure) => {
    if (failure || (to.path === from.path && !isFirst)) return
    if (isFirst) {
      isFirst = false
      return
    }
    await nextTick()
    focusHeading(main())
  })
}

function focusHeading(main: HTMLElement | null): void {
  if (!main) return
  const heading = main.querySelector<HTMLElement>('h1')
  if (heading) {
    heading.tabIndex = -1
    heading.focus({ preventScroll: true })
  } else main.focus({ preventScroll: true })
}
