import type { Response } from 'express'
import type { Sequelize } from 'sequelize'
import type { Logger } from 'pino'
import type { Activity, Author } from '#shared/contract/activity.ts'
import type { Config } from '../config.ts'
import { activityByIds } from '../services/activityService.ts'
import { countUnread } from '../services/notificationService.ts'
import { Refusal } from '../services/refusal.ts'
import { whyEnd, type Reader } from './access.ts'
import { catchUp, greet } from './catchUp.ts'
import { makeListener } from './listener.ts'
import { makeAttendance } from './attendance.ts'
import { accessChannel, activityChannel, noticesChannel, presenceChannel, readActivityWord } from './publish.ts'
import { openStream, type Stream } from './stream.ts'

/** Everything that one process shows live to the browsers connected to it. */
export interface Live {
  /** Begins to hear what happens, here and in other processes. */
  start(): Promise<void>
  /** Takes over a response and writes events to it until the browser leaves or may no longer listen. */
  open(response: Response, who: Visit): Promise<void>
  /** Says what is chosen in a tab that is open somewhere. */
  choose(buildId: string, tab: string, by: Author, chosen: readonly string[]): Promise<void>
  stop(): Promise<void>
}

/** Who opens a stream, and from which line of activity on. */
export interface Visit {
  reader: Reader
  by: Author
  address: string
  /** Null: a stream of the person's own notifications, without a build. */
  buildId: string | null
  tab: string | null
  after: number | null
}

/** Most streams of one person and of one address. A person's newest take the place of their oldest. */
export const streamLimits = { person: 12, address: 120 } as const
const beat_ms = 20_000

const personOf = (reader: Reader): string => (reader.kind === 'member' ? reader.userId : reader.guestId)

/** Makes the live side of a process. `onNews` is called where people are to be told, so that the waiting job is done at once. */
export function makeLive(
  config: Config,
  database: Sequelize,
  log: Logger,
  onNews: () => void,
  pause_ms: number = beat_ms,
): Live {
  const streams = new Set<Stream>()
  const attendance = makeAttendance(database, streams, log)
  let heard: number[] = []
  let telling: Promise<void> | null = null
  let beats: NodeJS.Timeout | undefined

  const listener = makeListener({
    url: config.databaseUrl,
    channels: [activityChannel, noticesChannel, presenceChannel, accessChannel],
    onHeard(channel, payload) {
      if (channel === activityChannel) hearActivity(payload)
      else if (channel === noticesChannel) void attempt(() => tellUnread(payload))
      else if (channel === presenceChannel) attendance.hear(payload)
      else void attempt(() => recheck(concerned(payload)))
    },
    onGap() {
      onNews()
      for (const stream of streams) void attempt(() => catchUp(database, stream))
      for (const user of readers()) void attempt(() => tellUnread(user))
      void attempt(() => recheck([...streams]))
      attendance.ask()
    },
    log,
  })

  /** Runs what must not break the process; a database that is away is noticed by the listener as well. */
  async function attempt(work: () => Promise<void>): Promise<void> {
    try {
      await work()
    } catch (error) {
      log.warn({ err: error }, 'an event could not be told')
    }
  }

  function hearActivity(word: string): void {
    const { id, isNews } = readActivityWord(word)
    if (isNews) onNews()
    heard.push(id)
    telling ??= attempt(tellHeard).finally(() => (telling = null))
  }

  async function tellHeard(): Promise<void> {
    while (heard.length > 0) {
      const ids = heard
      heard = []
      const listening = [...streams].filter((stream) => stream.buildId !== null)
      if (listening.length === 0) continue
      try {
        for (const line of await activityByIds({ database }, ids)) for (const one of listening) tell(one, line)
      } catch (error) {
        await Promise.all(listening.map((stream) => attempt(() => catchUp(database, stream))))
        throw error
      }
    }
  }

  function tell(stream: Stream, line: Activity): void {
    if (stream.buildId !== line.buildId || line.id <= stream.lastId) return
    if (stream.catchingUp) stream.again = true
    else {
      stream.lastId = line.id
      stream.send('activity', line, line.id)
    }
  }

  const readers = (): Set<string> =>
    new Set([...streams].flatMap(({ reader }) => (reader.kind === 'member' ? [reader.userId] : [])))

  async function tellUnread(userId: string): Promise<void> {
    const own = [...streams].filter(({ reader }) => reader.kind === 'member' && reader.userId === userId)
    if (own.length === 0) return
    const unread = await countUnread({ database }, userId)
    for (const stream of own) stream.send('notices', { unread })
  }

  /** Streams that a word about access may concern: "session:…" or "build:…". */
  function concerned(word: string): Stream[] {
    const [kind, id] = word.split(':')
    return [...streams].filter(({ reader, buildId }) =>
      kind === 'session' ? reader.kind === 'member' && reader.sessionId === id : buildId === id,
    )
  }

  async function recheck(some: readonly Stream[]): Promise<void> {
    for (const stream of some) {
      const reason = await whyEnd(database, stream.reader, stream.buildId)
      if (reason === null) continue
      stream.send('end', { reason })
      stream.close()
    }
  }

  function beat(): void {
    for (const stream of streams) stream.beat()
    void attempt(() => recheck([...streams]))
    attendance.refresh()
  }

  function makeRoom(who: Visit): void {
    const here = [...streams].filter(({ address }) => address === who.address)
    if (here.length >= streamLimits.address * config.rateLimitFactor)
      throw new Refusal('too-many-requests', { retryAfter_s: 30 })
    const own = [...streams].filter(({ reader }) => personOf(reader) === personOf(who.reader))
    for (const oldest of own.slice(0, Math.max(0, own.length - streamLimits.person + 1))) {
      oldest.send('end', { reason: 'too-many' })
      oldest.close()
    }
  }

  return {
    async start() {
      if (!beats) {
        beats = setInterval(beat, pause_ms)
        beats.unref()
      }
      await listener.start()
    },
    async open(response, who) {
      await this.start()
      makeRoom(who)
      const stream = openStream(response, { ...who, lastId: who.after ?? 0 })
      const greeting = greet(database, stream, who.after, () => attendance.of(who.buildId))
      stream.catchingUp = greeting
      streams.add(stream)
      response.on('close', () => {
        streams.delete(stream)
        attendance.leave(stream)
      })
      attendance.enter(stream)
      await greeting
      if (who.reader.kind === 'member') await tellUnread(who.reader.userId)
    },
    choose: (buildId, tab, by, chosen) => attendance.choose(buildId, tab, by, chosen),
    async stop() {
      clearInterval(beats)
      for (const stream of streams) stream.close()
      await attendance.leaveAll()
      await listener.stop()
      await telling
    },
  }
}
