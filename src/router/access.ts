import type { RouteLocationNormalized, RouteLocationRaw } from 'vue-router'

/** Who a page is for. `guest` pages are skipped by people who are signed in. */
export type Access = 'anybody' | 'guest' | 'signed-in' | 'administrator'

declare module 'vue-router' {
  interface RouteMeta {
    /** Title of the window; pages with a loaded name set their own. */
    title?: string
    access?: Access
    /** Pages that fill the window, as the diagram, go without the page's margins. */
    wide?: boolean
  }
}

export interface Visitor {
  signedIn: boolean
  administrator: boolean
}

/** A path within this app, or nothing: a link must not lead elsewhere after signing in. */
export function innerPath(next: unknown): string | undefined {
  return typeof next === 'string' && /^\/(?![/\\])/.test(next) ? next : undefined
}

/** Where a visitor goes instead of the page, or true where the page is theirs. */
export function admit(
  to: Pick<RouteLocationNormalized, 'meta' | 'fullPath' | 'query'>,
  visitor: Visitor,
): true | RouteLocationRaw {
  const access = to.meta.access ?? 'signed-in'
  if (access === 'anybody') return true
  if (access === 'guest') return visitor.signedIn ? (innerPath(to.query['next']) ?? { name: 'builds' }) : true
  if (!visitor.signedIn) return { name: 'sign-in', query: to.fullPath === '/' ? {} : { next: to.fullPath } }
  if (access === 'administrator' && !visitor.administrator)
    return { name: 'not-found', params: { path: ['not-found'] } }
  return true
}
