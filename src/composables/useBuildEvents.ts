import { useQueryClient } from '@tanstack/vue-query'
import { useDebounceFn } from '@vueuse/core'
import { onScopeDispose, ref, watch } from 'vue'
import { authorName } from '#shared/activity/words.ts'
import type { Activity } from '#shared/contract/activity.ts'
import type { LiveEvent } from '#shared/contract/live.ts'
import { openEventStream } from '../api/eventStream.ts'
import { buildEventsPath, putPresence } from '../api/live.ts'
import { ownTab, usePresenceStore } from '../stores/presence.ts'
import { useNoticesStore } from '../stores/notices.ts'
import { useSelectionStore } from '../stores/selection.ts'
import { useSessionStore } from '../stores/session.ts'
import { allBuildQueries, queriesOf } from './liveQueries.ts'

export interface BuildEventHandlers {
  /** A revision is known to exist; `by` where it is just being saved by somebody. */
  onRevision?: (revision: number, by: string | null) => void
  /** Each line of activity as it happens, or after a break. */
  onActivity?: (line: Activity) => void
  /** The stream is over for good: signed out, no longer in the build, or open in too many places. */
  onEnd?: (reason: LiveEvent<'end'>['reason']) => void
}

/** Most parts and joints that are shown to others as chosen. */
const mostChosen = 12

/**
 * Hears what happens in a build for as long as its page is open: once a page, in its view. Makes everything asked of the
 * server anew that the news touch (see `liveQueries.ts`), shows who else is there, and says what is chosen here.
 */
export function useBuildEvents(buildId: string, handlers: BuildEventHandlers = {}) {
  const client = useQueryClient()
  const presence = usePresenceStore()
  const notices = useNoticesStore()
  const selection = useSelectionStore()
  const session = useSessionStore()
  const isConnected = ref(false)
  const stale = new Set<string>()
  let known: number | null = null

  const refetch = useDebounceFn(() => {
    const keys = [...stale]
    stale.clear()
    for (const key of keys) void client.invalidateQueries({ queryKey: key === 'builds' ? [key] : [key, buildId] })
  }, 40)

  const isOwn = ({ by }: Activity): boolean => by.kind === 'member' && by.userId === session.user?.id

  function hearActivity(line: Activity): void {
    known = line.id
    for (const key of queriesOf(line.what.kind)) stale.add(key)
    void refetch()
    const { what } = line
    if (what.kind === 'revision-saved' || what.kind === 'revision-restored')
      handlers.onRevision?.(what.revision, isOwn(line) ? null : authorName(line.by))
    handlers.onActivity?.(line)
  }

  /** What was asked for before the stream stood may be older than the stream. */
  async function readAnew(): Promise<void> {
    for (const key of allBuildQueries) {
      await client.cancelQueries({ queryKey: [key, buildId] })
      void client.invalidateQueries({ queryKey: [key, buildId] })
    }
  }

  function hearHello(hello: LiveEvent<'hello'>): void {
    if (known !== hello.lastId) void readAnew()
    known = hello.lastId
    presence.present = hello.present
    if (hello.revision !== null) handlers.onRevision?.(hello.revision, null)
    if (!selection.isEmpty) void sayChosen()
  }

  const sayChosen = useDebounceFn(async () => {
    if (!isConnected.value) return
    const chosen = [...selection.parts, ...selection.joints].slice(0, mostChosen)
    await putPresence(buildId, ownTab, chosen).catch(() => {})
  }, 250)

  presence.ownId = session.user?.id ?? session.guest?.id ?? null
  notices.isCarried = true
  const close = openEventStream((after) => buildEventsPath(buildId, ownTab, after), {
    hello: hearHello,
    activity: hearActivity,
    presence: (present) => (presence.present = present),
    notices: ({ unread }) => notices.hear(unread),
    end: ({ reason }) => handlers.onEnd?.(reason),
    onConnected: (connected) => {
      isConnected.value = connected
      if (!connected) presence.present = []
    },
  })
  watch(() => [selection.parts, selection.joints], sayChosen)

  onScopeDispose(() => {
    close()
    presence.present = []
    notices.isCarried = false
  })

  return { isConnected }
}
