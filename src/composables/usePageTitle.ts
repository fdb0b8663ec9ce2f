import { toValue, watchEffect, type MaybeRefOrGetter } from 'vue'

/** The window's title: the page first, then the product. */
export const setPageTitle = (title: string | undefined): void => {
  document.title = title ? `${title} · Bayloom` : 'Bayloom'
}

/** For pages whose title holds something loaded, as a build's name. */
export function usePageTitle(title: MaybeRefOrGetter<string | undefined>): void {
  watchEffect(() => {
    const known = toValue(title)
    if (known) setPageTitle(known)
  })
}
