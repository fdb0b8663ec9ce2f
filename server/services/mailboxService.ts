import { randomUUID } from 'node:crypto'
import type { Transaction } from 'sequelize'
import type { ListMailbox, Message as MessageView, MessageKind } from '#shared/contract/mailbox.ts'
import { enqueue } from '../jobs/queue.ts'
import type { Mail } from '../mail/compose.ts'
import { Message } from '../models/index.ts'
import type { Context } from './context.ts'
import { Refusal } from './refusal.ts'

/** Messages shown at most. */
const newest = 200

export interface Letter {
  to: string
  kind: MessageKind
  mail: Mail
  /** The person it is for, where they have an account. */
  userId?: string
  /** The build it is about: who has left it by then does not get it. */
  buildId?: string
  /** The line of activity it is about: each person gets one mail of it. */
  activityId?: number
  unsubscribeToken?: string
}

/** Queues a mail in the transaction of its cause: it is sent once that is committed, and never without it. */
export async function queueMail(
  context: Pick<Context, 'database'>,
  letter: Letter,
  transaction: Transaction,
): Promise<void> {
  const id = randomUUID()
  await Message.create(
    {
      id,
      recipient: letter.to,
      kind: letter.kind,
      subject: letter.mail.subject,
      textBody: letter.mail.text,
      htmlBody: letter.mail.html,
      userId: letter.userId ?? null,
      buildId: letter.buildId ?? null,
      activityId: letter.activityId ?? null,
      unsubscribeToken: letter.unsubscribeToken ?? null,
    },
    { transaction },
  )
  await enqueue(context.database, 'mail', { messageId: id }, transaction)
}

/** The newest messages, for the administrator. */
export async function listMessages({ state }: ListMailbox): Promise<MessageView[]> {
  const messages = await Message.findAll({
    ...(state === undefined ? {} : { where: { state } }),
    order: [['queuedAt', 'DESC']],
    limit: newest,
  })
  return messages.map(toView)
}

/** Sends a message once more that was given up, or at once what waits. */
export async function tryAgain(context: Context, messageId: string): Promise<MessageView> {
  const message = await context.database.transaction(async (transaction) => {
    const found = await Message.findByPk(messageId, { transaction, lock: transaction.LOCK.UPDATE })
    if (!found) throw new Refusal('not-found')
    if (found.state === 'queued' || found.state === 'failed') {
      await found.update({ state: 'queued', nextTryAt: new Date() }, { transaction })
      await enqueue(context.database, 'mail', { messageId }, transaction)
    }
    return found
  })
  context.jobs.wake()
  return toView(message)
}

const toView = (message: Message): MessageView => ({
  id: message.id,
  to: message.recipient,
  kind: message.kind,
  subject: message.subject,
  text: message.textBody,
  html: message.htmlBody,
  state: message.state,
  attempts: message.attempts,
  lastError: message.lastError,
  queuedAt: message.queuedAt.toISOString(),
  nextTryAt: message.state === 'queued' ? message.nextTryAt.toISOString() : null,
  sentAt: message.sentAt?.toISOString() ?? null,
})
