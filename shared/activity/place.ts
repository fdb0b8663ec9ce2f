import type { Happening } from '../contract/activity.ts'

/** Where in a build something is to be seen: the query of the build's page. */
export type BuildPlace = Readonly<Partial<Record<'show' | 'thread' | 'comment' | 'round' | 'revision', string>>>

/** The very thing that a line of activity speaks of; null where it is nowhere to be seen any more. */
export function placeOf(what: Happening): BuildPlace | null {
  switch (what.kind) {
    case 'revision-saved':
    case 'revision-named':
    case 'revision-restored':
      return { show: 'history', revision: String(what.revision) }
    case 'comment-added':
    case 'comment-edited':
      return { thread: what.threadId, comment: what.commentId }
    case 'comment-deleted':
    case 'thread-resolved':
    case 'thread-reopened':
      return { thread: what.threadId }
    case 'round-asked':
    case 'verdict-given':
    case 'round-closed':
    case 'approval-lapsed':
      return { show: 'review', round: what.roundId }
    case 'link-made':
    case 'link-revoked':
    case 'guest-joined':
      return { show: 'review' }
    case 'member-joined':
    case 'member-left':
    case 'role-changed':
    case 'ownership-transferred':
    case 'build-archived':
    case 'build-restored':
      return null
  }
}

/** Path of the client to a place in a build. */
export function buildPath(buildId: string, place: BuildPlace | null = null): string {
  const query = Object.entries(place ?? {}).map(([name, value]) => `${name}=${encodeURIComponent(value)}`)
  return `/builds/${buildId}${query.length === 0 ? '' : `?${query.join('&')}`}`
}
