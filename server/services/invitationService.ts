import { randomUUID } from 'node:crypto'
import { Op, type Transaction } from 'sequelize'
import type { z } from 'zod'
import type { BuildRole, Invitation as InvitationView, invitationViewSchema } from '#shared/contract/build.ts'
import type { User as UserView } from '#shared/contract/session.ts'
import { publish } from '../events/publish.ts'
import { invitationMail } from '../mail/templates.ts'
import { Build, BuildMember, Invitation, User } from '../models/index.ts'
import type { Context } from './context.ts'
import { mailFooter, timingsOf } from './mailChoiceService.ts'
import { queueMail } from './mailboxService.ts'
import { Refusal } from './refusal.ts'
import { hashToken, makeToken } from './tokens.ts'

const lifetime_ms = 14 * 24 * 3_600_000

/** Invites somebody by mail. A newer invitation of the same address takes the place of the older one. */
export async function invite(
  context: Context,
  invitedBy: UserView,
  buildId: string,
  request: { email: string; role: Exclude<BuildRole, 'owner'> },
): Promise<InvitationView> {
  const invitation = await context.database.transaction(async (transaction) => {
    const build = await Build.findByPk(buildId, { transaction, lock: transaction.LOCK.UPDATE })
    if (!build) throw new Refusal('not-found')
    return inviteWithin(context, invitedBy, build, request, transaction)
  })
  context.jobs.wake()
  return toView(invitation)
}

/** Invites within a transaction that holds the build. */
export async function inviteWithin(
  context: Context,
  invitedBy: UserView,
  build: Build,
  request: { email: string; role: Exclude<BuildRole, 'owner'> },
  transaction: Transaction,
): Promise<Invitation> {
  await refuseMember(build.id, request.email, transaction)
  await refuseUnwanted(context, request.email, transaction)
  await Invitation.destroy({ where: { buildId: build.id, email: request.email, acceptedAt: null }, transaction })
  const token = makeToken()
  const made = await Invitation.create(
    {
      id: randomUUID(),
      buildId: build.id,
      ...request,
      tokenHash: hashToken(token),
      invitedBy: invitedBy.id,
      expiresAt: new Date(Date.now() + lifetime_ms),
    },
    { transaction },
  )
  const why = `You get this because ${invitedBy.name} wrote your address into an invitation.`
  const { footer, token: unsubscribeToken } = mailFooter(context, request.email, 'invitation', why)
  const mail = invitationMail({
    footer,
    buildName: build.name,
    invitedBy: invitedBy.name,
    role: request.role,
    publicUrl: context.publicUrl,
    token,
  })
  await queueMail(context, { to: request.email, kind: 'invitation', mail, unsubscribeToken }, transaction)
  return made
}

/** An address that switched invitations off is left alone, and whoever invites is told so instead of waiting. */
async function refuseUnwanted(context: Context, email: string, transaction: Transaction): Promise<void> {
  const timingOf = await timingsOf(context.database, 'invitation', [email], transaction)
  if (timingOf(email) === 'never')
    throw new Refusal('forbidden', { detail: `${email} has asked not to be invited by mail. Send a link yourself.` })
}

async function refuseMember(buildId: string, email: string, transaction: Transaction): Promise<void> {
  const user = await User.findOne({ where: { email }, attributes: ['id'], transaction })
  if (user && (await BuildMember.findOne({ where: { buildId, userId: user.id }, transaction })))
    throw new Refusal('already-there', { detail: `${email} already belongs to this build.` })
}

/** Invitations that nobody has accepted yet. */
export async function listInvitations(buildId: string): Promise<InvitationView[]> {
  const open = await Invitation.findAll({
    where: { buildId, acceptedAt: null, expiresAt: { [Op.gt]: new Date() } },
    order: [['invitedAt', 'DESC']],
  })
  return open.map(toView)
}

export async function withdrawInvitation(buildId: string, invitationId: string): Promise<void> {
  const withdrawn = await Invitation.destroy({ where: { id: invitationId, buildId, acceptedAt: null } })
  if (withdrawn === 0) throw new Refusal('not-found')
}

/** What the page behind the link shows. */
export async function viewInvitation(token: string): Promise<z.infer<typeof invitationViewSchema>> {
  const invitation = await findOpen(token)
  const [build, inviter] = await Promise.all([Build.findByPk(invitation.buildId), User.findByPk(invitation.invitedBy)])
  if (!build || !inviter) throw new Refusal('link-expired')
  return { buildName: build.name, role: invitation.role, email: invitation.email, invitedBy: inviter.name }
}

/** Joins the build. The link works once, and only for the address that it was sent to. */
export async function acceptInvitation(context: Context, token: string, user: UserView): Promise<{ buildId: string }> {
  return context.database.transaction(async (transaction) => {
    const invitation = await findOpen(token, transaction)
    if (invitation.email !== user.email)
      throw new Refusal('forbidden', { detail: 'This invitation was sent to another e-mail address.' })
    const { buildId, role } = invitation
    const member = await BuildMember.findOne({ where: { buildId, userId: user.id }, transaction })
    if (!member) await BuildMember.create({ buildId, userId: user.id, role }, { transaction })
    await invitation.update({ acceptedAt: new Date() }, { transaction })
    if (!member) await publish(context, buildId, { userId: user.id }, { kind: 'member-joined', role }, transaction)
    return { buildId }
  })
}

async function findOpen(token: string, transaction?: Transaction): Promise<Invitation> {
  const invitation = await Invitation.findOne({
    where: { tokenHash: hashToken(token) },
    ...(transaction ? { transaction, lock: transaction.LOCK.UPDATE } : {}),
  })
  if (!invitation || invitation.acceptedAt !== null || invitation.expiresAt.getTime() <= Date.now())
    throw new Refusal('link-expired')
  return invitation
}

const toView = (invitation: Invitation): InvitationView => ({
  id: invitation.id,
  email: invitation.email,
  role: invitation.role,
  invitedAt: invitation.invitedAt.toISOString(),
  expiresAt: invitation.expiresAt.toISOString(),
})
