import type { Transaction } from 'sequelize'
import { enqueue } from '../jobs/queue.ts'
import { passwordResetMail } from '../mail/templates.ts'
import { PasswordReset, User } from '../models/index.ts'
import type { JobContext } from '../jobs/allJobs.ts'
import type { Context } from './context.ts'
import { queueMail } from './mailboxService.ts'
import { hashToken, makeToken } from './tokens.ts'

const resetLifetime_ms = 60 * 60_000

/**
 * Notes that somebody asked for a reset link. The account is looked up later, by a job: the answer and its time are the
 * same whether it exists.
 */
export async function askPasswordReset(context: Context, email: string): Promise<void> {
  await context.database.transaction((transaction) =>
    enqueue(context.database, 'password-reset', { email }, transaction),
  )
  context.jobs.wake()
}

/** Answers one request: link and mail are written as it is taken away, or not at all. */
export async function answerPasswordReset(context: JobContext, email: string, transaction: Transaction): Promise<void> {
  const user = await User.findOne({ where: { email }, transaction })
  if (!user || user.disabledAt !== null) return
  const token = makeToken()
  const expiresAt = new Date(Date.now() + resetLifetime_ms)
  await PasswordReset.create({ tokenHash: hashToken(token), userId: user.id, expiresAt }, { transaction })
  const mail = passwordResetMail({ name: user.name, publicUrl: context.publicUrl, token })
  await queueMail(context, { to: user.email, kind: 'password-reset', mail, userId: user.id }, transaction)
}
