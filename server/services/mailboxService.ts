import { randomUUID } from 'node:crypto'
import type { Transaction } from 'sequelize'
import type { Message as MessageView } from '#shared/contract/mailbox.ts'
import type { Mail } from '../mail/templates.ts'
import { Message } from '../models/index.ts'

/** Messages shown at most. */
const newest = 200

/** Queues a mail in the transaction of its cause: it is sent once that is committed, and never without it. */
export async function queueMail(recipient: string, mail: Mail, transaction: Transaction): Promise<void> {
  await Message.create(
    { id: randomUUID(), recipient, subject: mail.subject, textBody: mail.text, htmlBody: mail.html },
    { transaction },
  )
}

/** The newest messages, for the administrator. */
export async function listMessages(): Promise<MessageView[]> {
  const messages = await Message.findAll({ order: [['queuedAt', 'DESC']], limit: newest })
  return messages.map((message) => ({
    id: message.id,
    to: message.recipient,
    subject: message.subject,
    text: message.textBody,
    html: message.htmlBody,
    state: message.state,
    queuedAt: message.queuedAt.toISOString(),
    sentAt: message.sentAt?.toISOString() ?? null,
  }))
}
