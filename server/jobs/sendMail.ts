import { Op, type Sequelize } from 'sequelize'
import type { Logger } from 'pino'
import type { MailTransport } from '../mail/transport.ts'
import { Message } from '../models/index.ts'
import type { Job } from './jobLoop.ts'

const mostAttempts = 8
const minute_ms = 60_000

/**
 * Sends the mail that has waited longest. Its row stays locked meanwhile, so no other process takes it, and is marked
 * in the same transaction. In the local mailbox that is the delivery itself, so each arrives once. A mail server that
 * took a mail over just before a crash gets it again under the same Message-ID, by which it is known as the same.
 */
export function sendMail(database: Sequelize, transport: MailTransport, log: Logger): Job {
  return () =>
    database.transaction(async (transaction) => {
      const message = await Message.findOne({
        where: { state: 'queued', nextTryAt: { [Op.lte]: new Date() } },
        order: ['nextTryAt'],
        transaction,
        lock: transaction.LOCK.UPDATE,
        skipLocked: true,
      })
      if (!message) return false
      const attempts = message.attempts + 1
      try {
        await transport(message)
        await message.update({ state: 'sent', attempts, sentAt: new Date(), lastError: null }, { transaction })
      } catch (error) {
        log.warn({ err: error, message: message.id, attempts }, 'mail was not taken over')
        const nextTryAt = new Date(Date.now() + minute_ms * 2 ** attempts)
        const lastError = error instanceof Error ? error.message : String(error)
        await message.update(
          { attempts, lastError, nextTryAt, state: attempts < mostAttempts ? 'queued' : 'failed' },
          { transaction },
        )
      }
      return true
    })
}
