import { z } from 'zod'
import { authorSchema } from '#shared/contract/activity.ts'
import { presentSchema, type Present } from '#shared/contract/live.ts'

/** What processes say to each other about who has which build open. */
export const presenceWordSchema = z.discriminatedUnion('say', [
  z.object({ say: z.literal('here'), build: z.string(), present: presentSchema }),
  z.object({
    say: z.literal('chosen'),
    build: z.string(),
    tab: z.string(),
    by: authorSchema,
    chosen: z.array(z.string()),
  }),
  z.object({ say: z.literal('gone'), build: z.string(), tab: z.string() }),
  /** A process that begins to show a build asks the others who is there. */
  z.object({ say: z.literal('who'), build: z.string() }),
])
export type PresenceWord = z.infer<typeof presenceWordSchema>

/** Somebody of whom nothing was heard for so long is gone: their server died with them. */
export const presenceKeeps_ms = 90_000

const idOf = ({ by }: { by: Present['by'] }): string =>
  by.kind === 'member' ? by.userId : by.kind === 'guest' ? by.guestId : ''

/** Who has which build open, as far as this process has heard. Kept in memory only. */
export function makePresence(now: () => number) {
  const builds = new Map<string, Map<string, { present: Present; heardAt: number }>>()

  return {
    /** Takes a word in; true where it changed who is shown. */
    hear(word: PresenceWord): boolean {
      if (word.say === 'who') return false
      const tabs = builds.get(word.build) ?? new Map<string, { present: Present; heardAt: number }>()
      if (word.say === 'gone') {
        const went = tabs.delete(word.tab)
        if (tabs.size === 0) builds.delete(word.build)
        return went
      }
      builds.set(word.build, tabs)
      if (word.say === 'here') {
        const before = tabs.get(word.present.tab)
        tabs.set(word.present.tab, { present: word.present, heardAt: now() })
        return JSON.stringify(before?.present) !== JSON.stringify(word.present)
      }
      const known = tabs.get(word.tab)
      if (!known || idOf(known.present) !== idOf(word)) return false
      tabs.set(word.tab, { present: { ...known.present, chosen: word.chosen }, heardAt: now() })
      return true
    },
    of: (build: string): Present[] => [...(builds.get(build)?.values() ?? [])].map(({ present }) => present),
    find: (build: string, tab: string): Present | undefined => builds.get(build)?.get(tab)?.present,
    /** Forgets whom nothing was heard of; answers the builds where that changed something. */
    forget(): string[] {
      const limit = now() - presenceKeeps_ms
      return [...builds].flatMap(([build, tabs]) => {
        const gone = [...tabs].filter(([, { heardAt }]) => heardAt < limit)
        for (const [tab] of gone) tabs.delete(tab)
        if (tabs.size === 0) builds.delete(build)
        return gone.length > 0 ? [build] : []
      })
    },
  }
}
