import { Op } from 'sequelize'
import type { Account, InstallationRole } from '#shared/contract/session.ts'
import { takeLock } from '../db/lock.ts'
import { User } from '../models/index.ts'
import type { Context } from './context.ts'
import { Refusal } from './refusal.ts'
import { endSessionsOf, toUserView } from './sessionService.ts'

/** Everybody with an account, for the administrator. */
export async function listUsers(): Promise<Account[]> {
  return (await User.findAll({ order: ['name', 'email'] })).map(toAccount)
}

/** Changes a person's role, or shuts them out and in again. One administrator always stays. */
export async function updateUser(
  context: Context,
  userId: string,
  request: { role?: InstallationRole | undefined; disabled?: boolean | undefined },
): Promise<Account> {
  return context.database.transaction(async (transaction) => {
    await takeLock(context.database, 'administrators', transaction)
    const user = await User.findByPk(userId, { transaction })
    if (!user) throw new Refusal('not-found')
    if (request.role !== undefined) user.role = request.role
    if (request.disabled !== undefined && request.disabled !== (user.disabledAt !== null))
      user.disabledAt = request.disabled ? new Date() : null
    const administers = user.role === 'administrator' && user.disabledAt === null
    const others = await User.count({
      where: {
        role: 'administrator',
        disabledAt: null,
        id: { [Op.ne]: userId },
        ...(context.config.demo ? {} : { demo: false }),
      },
      transaction,
    })
    if (!administers && others === 0) throw new Refusal('last-administrator')
    await user.save({ transaction })
    if (user.disabledAt !== null) await endSessionsOf(user.id, 'account disabled', transaction)
    return toAccount(user)
  })
}

const toAccount = (user: User): Account => ({
  ...toUserView(user),
  createdAt: user.createdAt.toISOString(),
  lastSeenAt: user.lastSeenAt?.toISOString() ?? null,
  disabled: user.disabledAt !== null,
})
