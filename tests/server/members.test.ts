import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest'
import {
  acceptedInvitationSchema,
  invitationSchema,
  invitationViewSchema,
  membersAnswerSchema,
  openBuildSchema,
} from '#shared/contract/build.ts'
import { problemSchema } from '#shared/contract/problems.ts'
import { BuildMember, Invitation, Message } from '../../server/models/index.ts'
import { startApi, type Api, type Client } from './support/api.ts'

let api: Api
let owner: Client
let buildId: string

beforeAll(async () => {
  api = await startApi({ settings: { PUBLIC_URL: 'http://plans.example.org' } })
  owner = await api.person({ name: 'Olga <b>Owner</b>', email: 'olga@example.org' })
})
afterAll(() => api.close())
beforeEach(async () => {
  buildId = openBuildSchema.parse((await owner.post('/api/builds', { name: 'Shared & "more"' })).body).id
})

const code = (response: { body: unknown }) => problemSchema.parse(response.body).code
const add = async (client: Client, role: 'owner' | 'editor' | 'reviewer' | 'reader') =>
  BuildMember.create({ buildId, userId: client.user?.id ?? '', role })
const members = async (client: Client) =>
  membersAnswerSchema.parse((await client.get(`/api/builds/${buildId}/members`)).body)

async function invited(email: string): Promise<{ token: string; id: string; mail: Message }> {
  const response = await owner.post(`/api/builds/${buildId}/invitations`, { email, role: 'reviewer' })
  expect(response.status).toBe(201)
  const mail = await Message.findOne({ where: { recipient: email.toLowerCase() }, order: [['queuedAt', 'DESC']] })
  const token = /http:\/\/plans\.example\.org\/invitations\/([\w-]+)/.exec(mail?.textBody ?? '')?.[1]
  if (!mail || !token) throw new Error('no mail with a link was queued')
  return { token, id: invitationSchema.parse(response.body).id, mail }
}

describe('an invitation', () => {
  test('goes by mail, shows what it is about, and lets its addressee in once', async () => {
    const guest = await api.person({ email: 'guest@example.org', name: 'Guest' })
    const { token } = await invited('Guest@Example.org')
    const view = invitationViewSchema.parse((await (await api.visitor()).get(`/api/invitations/${token}`)).body)
    expect(view).toEqual({
      buildName: 'Shared & "more"',
      role: 'reviewer',
      email: 'guest@example.org',
      invitedBy: 'Olga <b>Owner</b>',
    })
    const accepted = await guest.post(`/api/invitations/${token}/accept`)
    expect(acceptedInvitationSchema.parse(accepted.body)).toEqual({ buildId })
    expect(openBuildSchema.parse((await guest.get(`/api/builds/${buildId}`)).body).role).toBe('reviewer')
    expect(code(await guest.post(`/api/invitations/${token}/accept`))).toBe('link-expired')
    expect((await members(owner)).invitations).toEqual([])
  })

  test('writes what people typed as text, never as markup or another header', async () => {
    const { mail } = await invited('markup@example.org')
    expect(mail.htmlBody).toContain('Olga &lt;b&gt;Owner&lt;/b&gt;')
    expect(mail.htmlBody).not.toContain('<b>')
    expect(mail.subject).toBe('Olga <b>Owner</b> invites you to the build "Shared & "more""')
  })

  test('is for its address only', async () => {
    const other = await api.person({ email: 'other@example.org' })
    const { token } = await invited('somebody@example.org')
    expect(code(await other.post(`/api/invitations/${token}/accept`))).toBe('forbidden')
    expect((await other.get(`/api/builds/${buildId}`)).status).toBe(404)
  })

  test('ends when it is withdrawn, replaced or too old', async () => {
    const guest = await api.person({ email: 'late@example.org' })
    const first = await invited('late@example.org')
    const second = await invited('late@example.org')
    expect((await members(owner)).invitations.map((invitation) => invitation.id)).toEqual([second.id])
    expect(code(await guest.get(`/api/invitations/${first.token}`))).toBe('link-expired')
    await Invitation.update({ expiresAt: new Date(Date.now() - 1) }, { where: { id: second.id } })
    expect(code(await guest.post(`/api/invitations/${second.token}/accept`))).toBe('link-expired')
    const third = await invited('late@example.org')
    expect((await owner.delete(`/api/builds/${buildId}/invitations/${third.id}`)).status).toBe(204)
    expect(code(await guest.get(`/api/invitations/${third.token}`))).toBe('link-expired')
    expect((await owner.delete(`/api/builds/${buildId}/invitations/${third.id}`)).status).toBe(404)
  })

  test('is not made for somebody who belongs to the build', async () => {
    const response = await owner.post(`/api/builds/${buildId}/invitations`, {
      email: 'olga@example.org',
      role: 'reader',
    })
    expect(code(response)).toBe('already-there')
  })

  test('cannot make an owner', async () => {
    const response = await owner.post(`/api/builds/${buildId}/invitations`, { email: 'x@example.org', role: 'owner' })
    expect(response.status).toBe(400)
  })

  test('is kept as a hash, and is shown to owners only', async () => {
    const reader = await api.person()
    await add(reader, 'reader')
    const { token } = await invited('hash@example.org')
    expect(JSON.stringify(await Invitation.findAll())).not.toContain(token)
    expect((await members(owner)).invitations).toHaveLength(1)
    expect((await members(reader)).invitations).toEqual([])
  })
})

describe('roles', () => {
  test('are changed by the owner and count at once', async () => {
    const member = await api.person({ name: 'Member' })
    await add(member, 'reader')
    const path = `/api/builds/${buildId}/members/${member.user?.id}`
    expect((await member.patch(path, { role: 'owner' })).status).toBe(403)
    expect((await owner.patch(path, { role: 'owner' })).body).toMatchObject({ role: 'owner' })
    expect((await member.post(`/api/builds/${buildId}/archive`)).status).toBe(200)
  })

  test('leave one owner, whatever two owners do at the same moment', async () => {
    const second = await api.person()
    await add(second, 'owner')
    const path = (client: Client) => `/api/builds/${buildId}/members/${client.user?.id}`
    const answers = await Promise.all([owner.delete(path(owner)), second.patch(path(second), { role: 'reader' })])
    expect(answers.map((answer) => answer.status).sort()).toEqual(
      [200, 409].includes(answers[1].status) && answers[0].status === 204 ? [204, 409] : [200, 409],
    )
    expect(await BuildMember.count({ where: { buildId, role: 'owner' } })).toBe(1)
  })

  test('are not taken from the last owner', async () => {
    const path = `/api/builds/${buildId}/members/${owner.user?.id}`
    expect(code(await owner.delete(path))).toBe('last-owner')
    expect(code(await owner.patch(path, { role: 'editor' }))).toBe('last-owner')
  })

  test('let a person leave, and nobody else send them away', async () => {
    const [reader, other] = [await api.person(), await api.person()]
    await add(reader, 'reader')
    await add(other, 'reader')
    const path = (client: Client) => `/api/builds/${buildId}/members/${client.user?.id}`
    expect((await reader.delete(path(other))).status).toBe(403)
    expect((await reader.delete(path(reader))).status).toBe(204)
    expect((await reader.get(`/api/builds/${buildId}`)).status).toBe(404)
    expect((await owner.delete(path(other))).status).toBe(204)
  })
})
