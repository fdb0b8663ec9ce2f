import { QueryTypes, type Transaction } from 'sequelize'
import type { BuildRole, Member } from '#shared/contract/build.ts'
import { publish } from '../events/publish.ts'
import { Build, BuildMember, User } from '../models/index.ts'
import type { Context } from './context.ts'
import { Refusal } from './refusal.ts'

type MemberRow = { id: string; name: string; email: string; role: BuildRole }

/** The people of a build, owners first. */
export async function listMembers(context: Context, buildId: string): Promise<Member[]> {
  const rows = await context.database.query<MemberRow>(
    `SELECT u.id, u.name, u.email, m.role FROM build_members m JOIN users u ON u.id = m.user_id
     WHERE m.build_id = $1
     ORDER BY array_position(ARRAY['owner', 'editor', 'reviewer', 'reader'], m.role), u.name`,
    { bind: [buildId], type: QueryTypes.SELECT },
  )
  return rows.map(({ role, ...user }) => ({ user, role }))
}

/** Changes a person's role. One owner always stays. */
export async function changeMember(
  context: Context,
  actorId: string,
  at: { buildId: string; userId: string },
  role: BuildRole,
): Promise<Member> {
  const { buildId, userId } = at
  return context.database.transaction(async (transaction) => {
    const member = await holdMember(buildId, userId, transaction)
    const before = member.role
    if (role !== 'owner') await refuseLastOwner(member, transaction)
    await member.update({ role }, { transaction })
    const user = await findUser(userId, transaction)
    const what = { kind: 'role-changed', userId, name: user.name, role } as const
    if (role !== before) await publish(context, buildId, { userId: actorId }, what, transaction)
    return { user: { id: user.id, name: user.name, email: user.email }, role }
  })
}

/** Takes a person out of a build, or lets them leave. One owner always stays. */
export async function removeMember(
  context: Context,
  actorId: string,
  { buildId, userId }: { buildId: string; userId: string },
): Promise<void> {
  await context.database.transaction(async (transaction) => {
    const member = await holdMember(buildId, userId, transaction)
    await refuseLastOwner(member, transaction)
    const { name } = await findUser(userId, transaction)
    await member.destroy({ transaction })
    await publish(context, buildId, { userId: actorId }, { kind: 'member-left', userId, name }, transaction)
  })
}

/** Finds a member while the build is held, so that two owners cannot leave at the same moment. */
export async function holdMember(buildId: string, userId: string, transaction: Transaction): Promise<BuildMember> {
  await Build.findByPk(buildId, { attributes: ['id'], transaction, lock: transaction.LOCK.UPDATE })
  const member = await BuildMember.findOne({ where: { buildId, userId }, transaction })
  if (!member) throw new Refusal('not-found')
  return member
}

async function findUser(userId: string, transaction: Transaction): Promise<User> {
  const user = await User.findByPk(userId, { transaction })
  if (!user) throw new Refusal('not-found')
  return user
}

async function refuseLastOwner(member: BuildMember, transaction: Transaction): Promise<void> {
  if (member.role !== 'owner') return
  const owners = await BuildMember.count({ where: { buildId: member.buildId, role: 'owner' }, transaction })
  if (owners < 2) throw new Refusal('last-owner')
}
