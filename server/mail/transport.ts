import nodemailer from 'nodemailer'
import type { Config } from '../config.ts'
import type { Message } from '../models/index.ts'

/** Hands a message on. Resolves when it was taken over. */
export type MailTransport = (message: Message) => Promise<void>

/** The mail server, where one is set; else the local mailbox, in which the message already lies. */
export function makeTransport(config: Config): MailTransport {
  if (config.smtpUrl === null) return () => Promise.resolve()
  const server = nodemailer.createTransport(config.smtpUrl)
  return async (message) => {
    await server.sendMail({
      from: config.mailFrom,
      to: message.recipient,
      subject: message.subject,
      text: message.textBody,
      html: message.htmlBody,
      messageId: `<${message.id}@bayloom>`,
    })
  }
}
