import type { Sequelize } from 'sequelize'
import type { Logger } from 'pino'
import type { Author } from '#shared/contract/activity.ts'
import type { Present } from '#shared/contract/live.ts'
import { makePresence, presenceWordSchema, type PresenceWord } from './presence.ts'
import { presenceChannel } from './publish.ts'
import type { Stream } from './stream.ts'

/** Changes are gathered for so long before the browsers are told. */
const gather_ms = 80

/** Keeps every process's idea of who is there the same, by saying and hearing words, and tells the browsers. */
export function makeAttendance(database: Sequelize, streams: ReadonlySet<Stream>, log: Logger) {
  const presence = makePresence(() => Date.now())
  const changed = new Map<string, NodeJS.Timeout>()

  async function say(word: PresenceWord): Promise<void> {
    try {
      await database.query('SELECT pg_notify($1, $2)', { bind: [presenceChannel, JSON.stringify(word)] })
    } catch (error) {
      log.debug({ err: error }, 'presence could not be told')
    }
  }

  /** The streams of this process that show somebody, of one build or of all. */
  const own = (build?: string) =>
    [...streams].flatMap((stream) =>
      stream.buildId !== null && stream.tab !== null && (build === undefined || stream.buildId === build)
        ? [{ build: stream.buildId, tab: stream.tab, by: stream.by }]
        : [],
    )

  const sayHere = ({ build, tab, by }: { build: string; tab: string; by: Author }): Promise<void> =>
    say({ say: 'here', build, present: { tab, by, chosen: presence.find(build, tab)?.chosen ?? [] } })

  function show(build: string): void {
    if (changed.has(build)) return
    const timer = setTimeout(() => {
      changed.delete(build)
      const present = presence.of(build)
      for (const stream of streams) if (stream.buildId === build) stream.send('presence', present)
    }, gather_ms)
    timer.unref()
    changed.set(build, timer)
  }

  return {
    of: (build: string | null): Present[] => (build === null ? [] : presence.of(build)),
    hear(payload: string): void {
      const word = presenceWordSchema.parse(JSON.parse(payload))
      if (presence.hear(word)) show(word.build)
      if (word.say === 'who') for (const one of own(word.build)) void sayHere(one)
      // A tab that came back elsewhere before its old connection was missed is still here.
      if (word.say === 'gone') for (const one of own(word.build)) if (one.tab === word.tab) void sayHere(one)
    },
    enter(stream: Stream): void {
      const { buildId, tab, by } = stream
      if (buildId === null) return
      const others = [...streams].filter((one) => one.buildId === buildId)
      if (others.length <= 1) void say({ say: 'who', build: buildId })
      if (tab !== null) void sayHere({ build: buildId, tab, by })
    },
    leave({ buildId, tab }: Stream): void {
      if (buildId === null || tab === null || own(buildId).some((one) => one.tab === tab)) return
      void say({ say: 'gone', build: buildId, tab })
    },
    async leaveAll(): Promise<void> {
      for (const timer of changed.values()) clearTimeout(timer)
      await Promise.all(own().map(({ build, tab }) => say({ say: 'gone', build, tab })))
    },
    choose: (build: string, tab: string, by: Author, chosen: readonly string[]): Promise<void> =>
      say({ say: 'chosen', build, tab, by, chosen: [...chosen] }),
    /** Says again who is here, so that the others go on to know, and forgets who is not. */
    refresh(): void {
      for (const one of own()) void sayHere(one)
      for (const build of presence.forget()) show(build)
    },
    /** Asks who is there, after words may have been missed. */
    ask(): void {
      for (const build of new Set(own().map((one) => one.build))) void say({ say: 'who', build })
    },
  }
}
