import nodemailer from 'nodemailer'
import type { Config } from '../config.ts'
import type { Message } from '../models/index.ts'

/**
 * Hands a message on. Resolves when it was taken over. `unsubscribe` is the address at which one request switches mails
 * of its kind off (RFC 8058); null where there is nothing to switch off.
 */
export type MailTransport = (message: Message, unsubscribe: string | null) => Promise<void>

/** A mail server that says nothing for so long is tried again later. */
const patience_ms = { connectionTimeout: 10_000, greetingTimeout: 10_000, socketTimeout: 30_000 } as const

/** The mail server, where one is set; else the local mailbox, in which the message already lies. */
export function makeTransport(config: Config): MailTransport {
  if (config.smtpUrl === null) return () => Promise.resolve()
  const server = nodemailer.createTransport({ url: config.smtpUrl, ...patience_ms })
  return async (message, unsubscribe) => {
    await server.sendMail({
      from: config.mailFrom,
      to: message.recipient,
      subject: message.subject,
      text: message.textBody,
      html: message.htmlBody,
      messageId: `<${message.id}@bayloom>`,
      headers: {
        'Auto-Submitted': 'auto-generated',
        ...(unsubscribe === null
          ? {}
          : { 'List-Unsubscribe': `<${unsubscribe}>`, 'List-Unsubscribe-Post': 'List-Unsubscribe=One-Click' }),
      },
    })
  }
}
