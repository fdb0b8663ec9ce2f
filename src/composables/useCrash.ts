import { readonly, shallowRef } from 'vue'

const crash = shallowRef<unknown>()

/** Takes errors that nobody handled. They go to the console for those who look there, and to `useCrash`. */
export function reportCrash(error: unknown): void {
  console.error(error)
  crash.value = error
}

/** The last unhandled error, shown in place of the page until the person goes on. */
export function useCrash() {
  return { crash: readonly(crash), clear: () => (crash.value = undefined) }
}
