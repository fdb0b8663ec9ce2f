import { z } from 'zod'
import {
  deletedCommentSchema,
  mentionableSchema,
  pinMarkSchema,
  threadListSchema,
  threadSchema,
  type Mentionable,
  type PinMark,
  type ReplyRequest,
  type StartThreadRequest,
  type Thread,
  type ThreadList,
} from '#shared/contract/comments.ts'
import { request, step } from './client.ts'

export interface ThreadsQuery {
  state: 'open' | 'resolved' | 'all'
  of: 'all' | 'mine' | 'mentioning-me'
  page: number
}

const path = (buildId: string, rest: string): string => `/api/builds/${step(buildId)}${rest}`

export const listThreads = (buildId: string, query: ThreadsQuery, signal?: AbortSignal): Promise<ThreadList> =>
  request(threadListSchema, 'GET', path(buildId, '/threads'), { query: { ...query }, signal })

export const readThread = (buildId: string, threadId: string, signal?: AbortSignal): Promise<Thread> =>
  request(threadSchema, 'GET', path(buildId, `/threads/${step(threadId)}`), { signal })

export const listPins = (buildId: string, signal?: AbortSignal): Promise<PinMark[]> =>
  request(z.array(pinMarkSchema), 'GET', path(buildId, '/pins'), { signal })

export const listMentionable = (buildId: string, signal?: AbortSignal): Promise<Mentionable[]> =>
  request(z.array(mentionableSchema), 'GET', path(buildId, '/mentionable'), { signal })

export const startThread = (buildId: string, wanted: StartThreadRequest): Promise<Thread> =>
  request(threadSchema, 'POST', path(buildId, '/threads'), { body: wanted })

export const reply = (buildId: string, threadId: string, wanted: ReplyRequest): Promise<Thread> =>
  request(threadSchema, 'POST', path(buildId, `/threads/${step(threadId)}/comments`), { body: wanted })

export const setThreadState = (buildId: string, threadId: string, resolved: boolean): Promise<Thread> =>
  request(threadSchema, 'PUT', path(buildId, `/threads/${step(threadId)}/state`), { body: { resolved } })

export const editComment = (buildId: string, commentId: string, text: string): Promise<Thread> =>
  request(threadSchema, 'PATCH', path(buildId, `/comments/${step(commentId)}`), { body: { text } })

export const deleteComment = (buildId: string, commentId: string): Promise<z.infer<typeof deletedCommentSchema>> =>
  request(deletedCommentSchema, 'DELETE', path(buildId, `/comments/${step(commentId)}`))
