import { QueryTypes } from 'sequelize'
import { PasswordReset, User } from '../models/index.ts'
import { passwordResetMail } from '../mail/templates.ts'
import type { Context } from './context.ts'
import { queueMail } from './mailboxService.ts'
import { hashToken, makeToken } from './tokens.ts'

const resetLifetime_ms = 60 * 60_000

/**
 * Notes that somebody asked for a reset link. The account is looked up later, by a job: the answer and its time are the
 * same whether it exists.
 */
export async function askPasswordReset(context: Context, email: string): Promise<void> {
  await context.database.query('INSERT INTO password_reset_requests (email) VALUES ($1)', { bind: [email] })
  context.jobs.wake()
}

/** Answers one noted request, if there is one: link and mail are written with it, or not at all. */
export async function answerPasswordReset(context: Context): Promise<boolean> {
  return context.database.transaction(async (transaction) => {
    const taken = await context.database.query<{ email: string }>(
      `DELETE FROM password_reset_requests WHERE id = (
         SELECT id FROM password_reset_requests ORDER BY id LIMIT 1 FOR UPDATE SKIP LOCKED
       ) RETURNING email`,
      { transaction, type: QueryTypes.SELECT },
    )
    const email = taken[0]?.email
    if (email === undefined) return false
    const user = await User.findOne({ where: { email }, transaction })
    if (!user || user.disabledAt !== null) return true
    const token = makeToken()
    const expiresAt = new Date(Date.now() + resetLifetime_ms)
    await PasswordReset.create({ tokenHash: hashToken(token), userId: user.id, expiresAt }, { transaction })
    await queueMail(
      user.email,
      passwordResetMail({ name: user.name, publicUrl: context.publicUrl, token }),
      transaction,
    )
    return true
  })
}
