import { keepPreviousData, useMutation, useQuery, useQueryClient } from '@tanstack/vue-query'
import { computed, onScopeDispose, reactive, toRefs, watch } from 'vue'
import { pinKey } from '#shared/comments/pinKey.ts'
import type { PinMark, ReplyRequest, StartThreadRequest } from '#shared/contract/comments.ts'
import * as api from '../api/comments.ts'
import type { OpenBuild } from '../api/builds.ts'
import { useCommentsStore } from '../stores/comments.ts'
import { useSessionStore } from '../stores/session.ts'

export const commentsKey = (buildId: string) => ['comments', buildId] as const

/** A list of threads, narrowed and paged, and everything that can be done with them. */
export function useThreads(buildId: string) {
  const client = useQueryClient()
  const wanted = reactive<api.ThreadsQuery>({ state: 'open', of: 'all', page: 1 })
  const query = useQuery({
    queryKey: [...commentsKey(buildId), 'list', wanted],
    queryFn: ({ signal }) => api.listThreads(buildId, { ...wanted }, signal),
    placeholderData: keepPreviousData,
  })
  return { ...toRefs(wanted), ...query, ...useCommentActs(buildId, client) }
}

function useCommentActs(buildId: string, client: ReturnType<typeof useQueryClient>) {
  const onSuccess = () => client.invalidateQueries({ queryKey: commentsKey(buildId) })
  return {
    start: useMutation({ mutationFn: (wanted: StartThreadRequest) => api.startThread(buildId, wanted), onSuccess }),
    reply: useMutation({
      mutationFn: ({ threadId, ...wanted }: ReplyRequest & { threadId: string }) =>
        api.reply(buildId, threadId, wanted),
      onSuccess,
    }),
    setResolved: useMutation({
      mutationFn: ({ threadId, resolved }: { threadId: string; resolved: boolean }) =>
        api.setThreadState(buildId, threadId, resolved),
      onSuccess,
    }),
    edit: useMutation({
      mutationFn: ({ commentId, text }: { commentId: string; text: string }) =>
        api.editComment(buildId, commentId, text),
      onSuccess,
    }),
    remove: useMutation({ mutationFn: (commentId: string) => api.deleteComment(buildId, commentId), onSuccess }),
  }
}

/** The thread that a pin or a link leads to, wherever in the list it stands; null where none is asked for. */
export function useThread(buildId: string, threadId: () => string | null) {
  const { data } = useQuery({
    queryKey: [...commentsKey(buildId), 'thread', threadId],
    queryFn: ({ signal }) => api.readThread(buildId, threadId() ?? '', signal),
    enabled: () => threadId() !== null,
    retry: false,
  })
  return computed(() => (threadId() === null ? null : (data.value ?? null)))
}

/** Keeps the store's marks of open threads true while a build is open: once a page, in its view. */
export function usePinMarks(buildId: string): void {
  const comments = useCommentsStore()
  const { data } = useQuery({
    queryKey: [...commentsKey(buildId), 'pins'],
    queryFn: ({ signal }) => api.listPins(buildId, signal),
  })
  watch(data, (marks = []) => {
    comments.byKey = groupMarks(marks, ({ pin }) => pinKey(pin))
    comments.byPart = groupMarks(marks, ({ pin }) => ('part' in pin ? pin.part : undefined))
  })
  onScopeDispose(() => comments.reset())
}

function groupMarks(marks: readonly PinMark[], keyOf: (mark: PinMark) => string | undefined) {
  const groups = new Map<string, PinMark[]>()
  for (const mark of marks) {
    const key = keyOf(mark)
    if (key !== undefined) groups.set(key, [...(groups.get(key) ?? []), mark])
  }
  return groups
}

/** People who may be mentioned in a build; nobody for those who may not write. */
export function useMentionable(buildId: string, enabled: () => boolean) {
  const { data } = useQuery({
    queryKey: ['members', buildId, 'mentionable'],
    queryFn: ({ signal }) => api.listMentionable(buildId, signal),
    enabled,
  })
  return computed(() => data.value ?? [])
}

/** Whether whoever has the build open may comment on it. */
export function useMayComment(buildId: string, summary: () => OpenBuild | null) {
  const session = useSessionStore()
  return computed(() => {
    const role = summary()?.role
    if (role) return role !== 'reader'
    return session.guest?.buildId === buildId && session.guest.right === 'review'
  })
}
