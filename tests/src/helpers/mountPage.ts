import { QueryClient, VueQueryPlugin } from '@tanstack/vue-query'
import { flushPromises, mount, type VueWrapper } from '@vue/test-utils'
import { createPinia, setActivePinia, type Pinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { afterEach, vi } from 'vitest'
import type { Component } from 'vue'
import { createMemoryHistory, type Router } from 'vue-router'
import { connectSession } from '../../../src/api/client.ts'
import { useNotices } from '../../../src/composables/useNotices.ts'
import { makeRouter } from '../../../src/router/index.ts'
import { useSessionStore } from '../../../src/stores/session.ts'

export interface Page {
  wrapper: VueWrapper
  router: Router
  pinia: Pinia
}

let mounted: VueWrapper[] = []

/** The parts of the app around a component, as `main.ts` puts them together. */
export function makeApp(): { pinia: Pinia; router: Router; plugins: unknown[] } {
  const pinia = createPinia()
  setActivePinia(pinia)
  const session = useSessionStore()
  connectSession({
    csrfToken: () => session.session?.csrfToken ?? '',
    renewToken: session.renewToken,
    signInAgain: session.signInAgain,
  })
  const router = makeRouter(createMemoryHistory())
  const queryClient = new QueryClient({ defaultOptions: { queries: { retry: false, networkMode: 'always' } } })
  return { pinia, router, plugins: [pinia, router, [PrimeVue, { theme: 'none' }], [VueQueryPlugin, { queryClient }]] }
}

/** Mounts one component with the app's plugins, its session loaded. `fakeServer` has to answer `GET /api/session`. */
export async function mountPage(component: Component, props: Record<string, unknown> = {}): Promise<Page> {
  const { pinia, router, plugins } = makeApp()
  await useSessionStore().ensure()
  const wrapper = mount(component, { props, attachTo: document.body, global: { plugins: plugins as never } })
  mounted.push(wrapper)
  await flushPromises()
  return { wrapper, router, pinia }
}

/** The visible words of the page, spaces made one. */
export const words = (root: Element = document.body): string =>
  (root.textContent ?? '').replace(/[\s\u00a0]+/g, ' ').trim()

afterEach(() => {
  for (const wrapper of mounted) wrapper.unmount()
  mounted = []
  const { notices, dismiss } = useNotices()
  for (const notice of notices.value) dismiss(notice.id)
  document.body.innerHTML = ''
  vi.unstubAllGlobals()
})
