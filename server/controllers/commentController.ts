import type { z } from 'zod'
import type {
  editCommentRequestSchema,
  ReplyRequest,
  setThreadStateRequestSchema,
  StartThreadRequest,
} from '#shared/contract/comments.ts'
import { created, ok, type Answer, type Call } from '../middleware/call.ts'
import { deleteComment, editComment, reply, setResolved, startThread } from '../services/commentService.ts'
import { findThread, listMentionable, listPinMarks, listThreads, type ThreadQuery } from '../services/threadList.ts'
import { Refusal } from '../services/refusal.ts'
import { reviewerOf } from './reviewerOf.ts'

type OfThread<Body = unknown> = Call<{ buildId: string; threadId: string }, unknown, Body>
type OfComment<Body = unknown> = Call<{ buildId: string; commentId: string }, unknown, Body>

export async function readThreads(call: Call<{ buildId: string }, ThreadQuery>): Promise<Answer> {
  return ok(await listThreads(call.context, call.params.buildId, reviewerOf(call), call.query))
}

export async function readThread(call: OfThread): Promise<Answer> {
  const thread = await findThread(call.context, call.params.buildId, call.params.threadId, reviewerOf(call))
  if (!thread) throw new Refusal('not-found')
  return ok(thread)
}

export async function readPins({ context, params }: Call<{ buildId: string }>): Promise<Answer> {
  return ok(await listPinMarks(context, params.buildId))
}

export async function readMentionable({ context, params }: Call<{ buildId: string }>): Promise<Answer> {
  return ok(await listMentionable(context, params.buildId))
}

export async function postThread(call: Call<{ buildId: string }, unknown, StartThreadRequest>): Promise<Answer> {
  return created(await startThread(call.context, reviewerOf(call), call.params.buildId, call.body))
}

export async function postReply(call: OfThread<ReplyRequest>): Promise<Answer> {
  const { buildId, threadId } = call.params
  return created(await reply(call.context, reviewerOf(call), buildId, threadId, call.body))
}

export async function putThreadState(call: OfThread<z.output<typeof setThreadStateRequestSchema>>): Promise<Answer> {
  const { buildId, threadId } = call.params
  return ok(await setResolved(call.context, reviewerOf(call), buildId, threadId, call.body.resolved))
}

export async function patchComment(call: OfComment<z.output<typeof editCommentRequestSchema>>): Promise<Answer> {
  const { buildId, commentId } = call.params
  return ok(await editComment(call.context, reviewerOf(call), buildId, commentId, call.body.text))
}

export async function removeComment(call: OfComment): Promise<Answer> {
  const { buildId, commentId } = call.params
  return ok({ thread: await deleteComment(call.context, reviewerOf(call), buildId, commentId) })
}
