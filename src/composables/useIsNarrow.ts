import { useMediaQuery } from '@vueuse/core'

/** A phone, or a window as narrow as one. */
export const useIsNarrow = () => useMediaQuery('(width < 620px)')
/** Too little room for shelf, sheet and findings side by side. */
export const useIsTight = () => useMediaQuery('(width < 1100px)')
