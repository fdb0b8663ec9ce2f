import { randomUUID } from 'node:crypto'
import type { Transaction } from 'sequelize'
import type { User as UserView } from '#shared/contract/session.ts'
import { takeLock } from '../db/lock.ts'
import { PasswordReset, User } from '../models/index.ts'
import type { Context } from './context.ts'
import { hashPassword, refuseWeakPassword, verifyPassword } from './passwordService.ts'
import { Refusal } from './refusal.ts'
import { endSessionsOf, openSession, toUserView, type IssuedSession, type SignedIn } from './sessionService.ts'
import { hashToken } from './tokens.ts'

/** True until the first account of a real person exists. Demo accounts do not count. */
export async function awaitsFirstAccount(transaction?: Transaction): Promise<boolean> {
  return (
    (await User.findOne({ where: { demo: false }, attributes: ['id'], ...(transaction ? { transaction } : {}) })) ===
    null
  )
}

/** Makes an account and signs it in. The first one becomes administrator; two at once take turns. */
export async function register(
  context: Context,
  request: { email: string; name: string; password: string },
): Promise<IssuedSession> {
  refuseWeakPassword(request.password, request.email, request.name, 'password')
  const passwordHash = await hashPassword(request.password)
  return context.database.transaction(async (transaction) => {
    await takeLock(context.database, 'register', transaction)
    if (await User.findOne({ where: { email: request.email }, transaction }))
      throw new Refusal('already-there', { detail: 'An account with this e-mail address exists. Sign in instead.' })
    const role = (await awaitsFirstAccount(transaction)) ? 'administrator' : 'member'
    const user = await User.create(
      { id: randomUUID(), email: request.email, name: request.name, passwordHash, role },
      { transaction },
    )
    return openSession(context, user, transaction)
  })
}

/** Changes one's own name. */
export async function updateAccount(userId: string, request: { name: string }): Promise<UserView> {
  const user = await User.findByPk(userId)
  if (!user) throw new Refusal('not-found')
  return toUserView(await user.update({ name: request.name }))
}

/** Changes one's own password and ends every other session. */
export async function changePassword(
  context: Context,
  signedIn: SignedIn,
  request: { current: string; next: string },
): Promise<void> {
  const user = await User.findByPk(signedIn.user.id)
  if (!user) throw new Refusal('not-found')
  if (!(await verifyPassword(user.passwordHash, request.current)))
    throw new Refusal('bad-input', { errors: [{ path: 'current', message: 'this is not your current password' }] })
  refuseWeakPassword(request.next, user.email, user.name, 'next')
  const passwordHash = await hashPassword(request.next)
  await context.database.transaction(async (transaction) => {
    await user.update({ passwordHash }, { transaction })
    await voidResetLinks(user.id, transaction)
    await endSessionsOf(user.id, 'password changed', transaction, signedIn.sessionId)
  })
  context.log.info({ user: user.id }, 'password changed')
}

/** Sets a new password through a link. The link works once; every session ends. */
export async function resetPassword(context: Context, token: string, password: string): Promise<void> {
  const found = await PasswordReset.findByPk(hashToken(token))
  const user = found === null || !isOpen(found) ? null : await User.findByPk(found.userId)
  if (!user || user.disabledAt !== null) throw new Refusal('link-expired')
  refuseWeakPassword(password, user.email, user.name, 'password')
  const passwordHash = await hashPassword(password)
  await context.database.transaction(async (transaction) => {
    const reset = await PasswordReset.findByPk(hashToken(token), { transaction, lock: transaction.LOCK.UPDATE })
    if (reset === null || !isOpen(reset)) throw new Refusal('link-expired')
    await voidResetLinks(user.id, transaction)
    await user.update({ passwordHash }, { transaction })
    await endSessionsOf(user.id, 'password reset', transaction)
  })
  context.log.info({ user: user.id }, 'password reset')
}

const isOpen = (reset: PasswordReset): boolean => reset.usedAt === null && reset.expiresAt.getTime() > Date.now()

async function voidResetLinks(userId: string, transaction: Transaction): Promise<void> {
  await PasswordReset.update({ usedAt: new Date() }, { where: { userId, usedAt: null }, transaction })
}
