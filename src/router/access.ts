import type { RouteLocationNormalized, RouteLocationRaw } from 'vue-router'

/**
 * Who a page is for. `guest` pages are skipped by people who are signed in; `build` pages are open to guests of a link into the
 * build of their path as well.
 */
export type Access = 'anybody' | 'guest' | 'signed-in' | 'build' | 'administrator'

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
  /** The build that the visitor came into by a link. */
  guestOf: string | null
}

/** A path within this app, or nothing: a link must not lead elsewhere after signing in. */
export function innerPath(next: unknown): string | undefined {
  return typeof next === 'string' && /^\/(?![/\\])/.test(next) ? next : undefined
}

/** Where a visitor goes instead of the page, or true where the page is theirs. */
export function admit(
  to: Pick<RouteLocationNormalized, 'meta' | 'fullPath' | 'query' | 'params' | 'name'>,
  visitor: Visitor,
): true | RouteLocationRaw {
  const access = to.meta.access ?? 'signed-in'
  if (access === 'anybody') return true
  if (access === 'guest') return visitor.signedIn ? (innerPath(to.query['next']) ?? { name: 'builds' }) : true
  if (!visitor.signedIn && visitor.guestOf !== null) {
    if (access === 'build' && to.params['buildId'] === visitor.guestOf) return true
    if (to.name === 'builds') return { name: 'build', params: { buildId: visitor.guestOf } }
  }
  if (!visitor.signedIn) return { name: 'sign-in', query: to.fullPath === '/' ? {} : { next: to.fullPath } }
  if (access === 'administrator' && !visitor.administrator)
    return { name: 'not-found', params: { path: ['not-found'] } }
  return true
}
