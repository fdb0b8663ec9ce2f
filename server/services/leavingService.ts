import { Op, QueryTypes, type Transaction } from 'sequelize'
import type { HeldBuild, Leaving } from '#shared/contract/account.ts'
import { takeLock } from '../db/lock.ts'
import { publish } from '../events/publish.ts'
import { Build, Message, User } from '../models/index.ts'
import type { Context } from './context.ts'
import { verifyPassword } from './passwordService.ts'
import { Refusal } from './refusal.ts'

/** What deleting one's account would do to builds. */
export async function whatLeavingDoes(context: Context, userId: string, transaction?: Transaction): Promise<Leaving> {
  const rows = await context.database.query<HeldBuild & { held: boolean }>(
    `SELECT b.id, b.name,
       (SELECT count(*)::int FROM build_members o WHERE o.build_id = b.id AND o.user_id <> $1) AS others,
       m.role = 'owner' AND NOT EXISTS (
         SELECT FROM build_members o WHERE o.build_id = b.id AND o.user_id <> $1 AND o.role = 'owner') AS held
     FROM build_members m JOIN builds b ON b.id = m.build_id WHERE m.user_id = $1 ORDER BY lower(b.name)`,
    { bind: [userId], type: QueryTypes.SELECT, ...(transaction ? { transaction } : {}) },
  )
  const held = rows.filter((row) => row.held).map(({ id, name, others }) => ({ id, name, others }))
  return {
    toHandOver: held.filter(({ others }) => others > 0),
    toDelete: held.filter(({ others }) => others === 0),
    toLeave: rows.length - held.length,
  }
}

/**
 * Deletes an account for good. Builds that others work in are never lost with it: they stay with their whole history,
 * which then speaks of a former member, and those without another owner have to be handed over first. Builds that
 * nobody else is in go with the account.
 */
export async function deleteAccount(context: Context, userId: string, password: string): Promise<void> {
  const user = await User.findByPk(userId)
  if (!user) throw new Refusal('not-found')
  if (user.demo) throw new Refusal('forbidden', { detail: 'Demo accounts stay, for everybody to try.' })
  if (!(await verifyPassword(user.passwordHash, password)))
    throw new Refusal('bad-input', { errors: [{ path: 'password', message: 'this is not your password' }] })
  await context.database.transaction(async (transaction) => {
    await takeLock(context.database, 'administrators', transaction)
    await refuseLastAdministrator(context, user, transaction)
    await holdBuilds(context, userId, transaction)
    const { toHandOver, toDelete } = await whatLeavingDoes(context, userId, transaction)
    if (toHandOver.length > 0)
      throw new Refusal('last-owner', {
        detail: 'Others work in builds that only you own. Hand them over first.',
        extra: { builds: toHandOver },
      })
    await Build.destroy({ where: { id: toDelete.map(({ id }) => id) }, transaction })
    await sayGoodbye(context, userId, transaction)
    await Message.destroy({ where: { recipient: user.email }, transaction })
    await user.destroy({ transaction })
  })
  context.log.info({ user: userId }, 'account deleted')
}

async function refuseLastAdministrator(context: Context, user: User, transaction: Transaction): Promise<void> {
  if (user.role !== 'administrator') return
  const others = await User.count({
    where: {
      role: 'administrator',
      disabledAt: null,
      id: { [Op.ne]: user.id },
      ...(context.config.demo ? {} : { demo: false }),
    },
    transaction,
  })
  if (others === 0) throw new Refusal('last-administrator')
}

/** Nobody else leaves, joins or changes roles in the person's builds meanwhile. */
async function holdBuilds(context: Context, userId: string, transaction: Transaction): Promise<void> {
  await context.database.query(
    `SELECT id FROM builds WHERE id IN (SELECT build_id FROM build_members WHERE user_id = $1) ORDER BY id FOR UPDATE`,
    { bind: [userId], transaction },
  )
}

/** Says in each build that stays that a member left, and takes the name out of what the activity tells of them. */
async function sayGoodbye(context: Context, userId: string, transaction: Transaction): Promise<void> {
  const rows = await context.database.query<{ build_id: string }>(
    'SELECT build_id FROM build_members WHERE user_id = $1 ORDER BY build_id',
    { bind: [userId], type: QueryTypes.SELECT, transaction },
  )
  await context.database.query(
    `UPDATE activity SET details = jsonb_set(details, '{name}', '"former member"')
     WHERE details ->> 'userId' = $1 AND details ? 'name'`,
    { bind: [userId], transaction },
  )
  for (const { build_id } of rows)
    await publish(context, build_id, { userId }, { kind: 'member-left', userId, name: 'former member' }, transaction)
}
