import type { TransferRequest } from '#shared/contract/account.ts'
import { publish } from '../events/publish.ts'
import { User } from '../models/index.ts'
import type { Context } from './context.ts'
import { holdMember } from './memberService.ts'
import { Refusal } from './refusal.ts'

/** Hands a build over: the other member becomes owner, and whoever hands it over stays or leaves as they said. */
export async function transferOwnership(
  context: Context,
  buildId: string,
  userId: string,
  { to, then }: TransferRequest,
): Promise<void> {
  if (to === userId)
    throw new Refusal('bad-input', { errors: [{ path: 'to', message: 'choose somebody else of this build' }] })
  await context.database.transaction(async (transaction) => {
    const giver = await holdMember(buildId, userId, transaction)
    // The role was read before the build was held: another owner may have taken it away meanwhile.
    if (giver.role !== 'owner') throw new Refusal('forbidden')
    const taker = await holdMember(buildId, to, transaction)
    const [heir, owner] = await Promise.all([
      User.findByPk(to, { transaction }),
      User.findByPk(userId, { transaction }),
    ])
    if (!heir || !owner) throw new Refusal('not-found')
    if (heir.disabledAt !== null)
      throw new Refusal('bad-input', {
        errors: [{ path: 'to', message: 'this account is shut: choose somebody else' }],
      })
    await taker.update({ role: 'owner' }, { transaction })
    if (then === 'leave') await giver.destroy({ transaction })
    else await giver.update({ role: then }, { transaction })
    const what = { kind: 'ownership-transferred', userId: heir.id, name: heir.name } as const
    await publish(context, buildId, { userId }, what, transaction)
    if (then === 'leave')
      await publish(context, buildId, { userId }, { kind: 'member-left', userId, name: owner.name }, transaction)
  })
}
