import { QueryTypes, type Sequelize, type Transaction } from 'sequelize'
import type { MailTransport } from '../mail/transport.ts'
import { Message } from '../models/index.ts'
import type { Worker } from './queue.ts'
import type { QueueData } from './queues.ts'

/**
 * Sends one message. Its row stays locked meanwhile and is marked in the transaction that takes the job away. In the
 * local mailbox that is the delivery itself, so each arrives once. A mail server that took a mail over just before a
 * crash gets it again under the same Message-ID, by which it is known as the same.
 */
export function sendMail(
  database: Sequelize,
  transport: MailTransport,
  publicUrl: () => string,
): Worker<QueueData['mail']> {
  return {
    isDiscreet: true,
    async work({ messageId }, transaction) {
      const message = await Message.findByPk(messageId, { transaction, lock: transaction.LOCK.UPDATE })
      if (message?.state !== 'queued') return null
      if (await hasLeft(database, message, transaction)) {
        await message.update({ state: 'dropped' }, { transaction })
        return null
      }
      const attempts = message.attempts + 1
      const { unsubscribeToken } = message
      const link = unsubscribeToken === null ? null : `${publicUrl()}/api/unsubscribe/${unsubscribeToken}`
      try {
        await transport(message, link)
      } catch (error) {
        const reason = error instanceof Error ? error : new Error(String(error))
        await message.update({ attempts, lastError: reason.message }, { transaction })
        return reason
      }
      await message.update({ state: 'sent', attempts, sentAt: new Date(), lastError: null }, { transaction })
      return null
    },
    async failed({ messageId }, error, nextTryAt, transaction) {
      await Message.update(
        { lastError: error.message, ...(nextTryAt ? { nextTryAt } : { state: 'failed' as const }) },
        { where: { id: messageId, state: 'queued' }, transaction },
      )
    },
  }
}

/** A mail about a build is not for people who do not belong to it any more, nor for accounts that are shut. */
async function hasLeft(database: Sequelize, message: Message, transaction: Transaction): Promise<boolean> {
  if (message.userId === null) return false
  const rows = await database.query(
    `SELECT 1 FROM users u WHERE u.id = $1 AND u.disabled_at IS NULL AND ($2::uuid IS NULL OR EXISTS (
       SELECT 1 FROM build_members m WHERE m.build_id = $2::uuid AND m.user_id = u.id))`,
    { bind: [message.userId, message.buildId], type: QueryTypes.SELECT, transaction },
  )
  return rows.length === 0
}
