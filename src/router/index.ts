import { createRouter, createWebHistory, type Router, type RouterHistory } from 'vue-router'
import { setPageTitle } from '../composables/usePageTitle.ts'
import { useSessionStore } from '../stores/session.ts'
import { admit } from './access.ts'
import { routes } from './routes.ts'

/** The router with its guard: who is signed in is asked once, before the first page. */
export function makeRouter(history: RouterHistory = createWebHistory()): Router {
  const router = createRouter({
    history,
    routes,
    scrollBehavior: (to, from, saved) => saved ?? (to.path === from.path ? {} : { top: 0 }),
  })

  router.beforeEach(async (to) => {
    const session = useSessionStore()
    await session.ensure()
    return admit(to, {
      signedIn: session.user !== null,
      administrator: session.isAdministrator,
      guestOf: session.guest?.buildId ?? null,
    })
  })

  router.afterEach((to, _from, failure) => {
    if (!failure) setPageTitle(to.meta.title)
  })
  return router
}
