import type { HappeningKind } from '#shared/contract/activity.ts'

/** First part of the keys under which things of a build are asked for: `[name, buildId]`. */
export const allBuildQueries = ['activity', 'revisions', 'comments', 'rounds', 'members', 'links', 'guests'] as const

const byTopic = {
  revision: ['revisions', 'rounds', 'builds'],
  comment: ['comments'],
  thread: ['comments'],
  round: ['rounds'],
  verdict: ['rounds'],
  approval: ['rounds'],
  member: ['members', 'builds'],
  role: ['members', 'builds'],
  ownership: ['members', 'builds'],
  link: ['links', 'guests'],
  guest: ['guests', 'links'],
  build: ['builds'],
} as const

/** What a line of activity makes old. */
export function queriesOf(kind: HappeningKind): readonly string[] {
  const topic = kind.split('-')[0] as keyof typeof byTopic
  return ['activity', ...byTopic[topic]]
}
