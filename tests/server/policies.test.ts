import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { openBuildSchema } from '#shared/contract/build.ts'
import { madeLinkSchema } from '#shared/contract/buildLinks.ts'
import { createApp } from '../../server/app.ts'
import { BuildMember } from '../../server/models/index.ts'
import { may, policies, type PolicyName } from '../../server/policies/policy.ts'
import { routes } from '../../server/routes/index.ts'
import type { AnyRoute } from '../../server/routes/route.ts'
import { startApi, type Api, type Client } from './support/api.ts'
import { cablesDocument } from './support/documents.ts'

/**
 * Everybody who may come along: nobody, the installation's roles without a build, the roles in a build, and people who
 * came by a link into this build, into another one, or by one that was revoked.
 */
const visitors = [
  'nobody',
  'member',
  'catalog-editor',
  'administrator',
  'owner',
  'editor',
  'reviewer',
  'reader',
  'guest-reader',
  'guest-reviewer',
  'guest-elsewhere',
  'guest-revoked',
] as const
type Visitor = (typeof visitors)[number]

const everybody = [...visitors]
/** Nobody of these is signed in. */
const strangers: readonly Visitor[] = ['nobody', 'guest-reader', 'guest-reviewer', 'guest-elsewhere', 'guest-revoked']
const signedIn = visitors.filter((visitor) => !strangers.includes(visitor))

/** Who comes through each policy, written down apart from the code that decides it. */
const comesThrough: Readonly<Record<PolicyName, readonly Visitor[]>> = {
  anybody: everybody,
  'signed-in': signedIn,
  'administer-installation': ['administrator'],
  'edit-catalog': ['administrator', 'catalog-editor'],
  'see-build': ['owner', 'editor', 'reviewer', 'reader', 'guest-reader', 'guest-reviewer'],
  'comment-on-build': ['owner', 'editor', 'reviewer', 'guest-reviewer'],
  'read-build': ['owner', 'editor', 'reviewer', 'reader'],
  'edit-build': ['owner', 'editor'],
  'own-build': ['owner'],
  'remove-member': ['owner'],
}

/** What each route is for, written down apart from the table: a new or changed route has to be entered here as well. */
const expectedPolicies: Readonly<Record<string, PolicyName>> = {
  'get /api/health': 'anybody',
  'get /api/openapi.json': 'anybody',
  'get /api/session': 'anybody',
  'post /api/session': 'anybody',
  'delete /api/session': 'signed-in',
  'post /api/accounts': 'anybody',
  'patch /api/account': 'signed-in',
  'delete /api/account': 'signed-in',
  'get /api/account/export': 'signed-in',
  'get /api/account/leaving': 'signed-in',
  'get /api/sessions': 'signed-in',
  'delete /api/sessions': 'signed-in',
  'delete /api/sessions/:sessionId': 'signed-in',
  'put /api/account/password': 'signed-in',
  'post /api/password-resets': 'anybody',
  'put /api/password-resets/:token': 'anybody',
  'get /api/users': 'administer-installation',
  'patch /api/users/:userId': 'administer-installation',
  'get /api/mailbox': 'administer-installation',
  'post /api/mailbox/:messageId/again': 'administer-installation',
  'get /api/account/mail-choices': 'signed-in',
  'put /api/account/mail-choices': 'signed-in',
  'post /api/unsubscribe/:token': 'anybody',
  'post /api/unsubscribe/:token/undo': 'anybody',
  'get /api/builds': 'signed-in',
  'post /api/builds': 'signed-in',
  'post /api/builds/import': 'signed-in',
  'get /api/builds/:buildId': 'see-build',
  'post /api/builds/:buildId/revisions': 'edit-build',
  'get /api/builds/:buildId/revisions': 'see-build',
  'get /api/builds/:buildId/revisions/:revision': 'see-build',
  'patch /api/builds/:buildId/revisions/:revision': 'edit-build',
  'post /api/builds/:buildId/revisions/:revision/restore': 'edit-build',
  'get /api/builds/:buildId/comparison': 'see-build',
  'get /api/builds/:buildId/export': 'read-build',
  'get /api/builds/:buildId/check': 'see-build',
  'post /api/builds/:buildId/duplicate': 'read-build',
  'post /api/builds/:buildId/archive': 'own-build',
  'post /api/builds/:buildId/restore': 'own-build',
  'get /api/builds/:buildId/threads': 'see-build',
  'get /api/builds/:buildId/threads/:threadId': 'see-build',
  'get /api/builds/:buildId/pins': 'see-build',
  'get /api/builds/:buildId/mentionable': 'comment-on-build',
  'post /api/builds/:buildId/threads': 'comment-on-build',
  'post /api/builds/:buildId/threads/:threadId/comments': 'comment-on-build',
  'put /api/builds/:buildId/threads/:threadId/state': 'comment-on-build',
  'patch /api/builds/:buildId/comments/:commentId': 'comment-on-build',
  'delete /api/builds/:buildId/comments/:commentId': 'comment-on-build',
  'get /api/builds/:buildId/members': 'read-build',
  'post /api/builds/:buildId/invitations': 'own-build',
  'delete /api/builds/:buildId/invitations/:invitationId': 'own-build',
  'patch /api/builds/:buildId/members/:userId': 'own-build',
  'delete /api/builds/:buildId/members/:userId': 'remove-member',
  'post /api/builds/:buildId/ownership': 'own-build',
  'get /api/invitations/:token': 'anybody',
  'post /api/invitations/:token/accept': 'signed-in',
  'get /api/builds/:buildId/links': 'own-build',
  'post /api/builds/:buildId/links': 'own-build',
  'delete /api/builds/:buildId/links/:linkId': 'own-build',
  'delete /api/builds/:buildId/guests/:guestId': 'own-build',
  'get /api/builds/:buildId/rounds': 'see-build',
  'post /api/builds/:buildId/rounds': 'edit-build',
  'put /api/builds/:buildId/rounds/:roundId/verdict': 'comment-on-build',
  'post /api/builds/:buildId/rounds/:roundId/end': 'edit-build',
  'put /api/builds/:buildId/review-rules': 'own-build',
  'get /api/links/:token': 'anybody',
  'post /api/links/:token/guests': 'anybody',
  'delete /api/guest': 'anybody',
  'post /api/builds/:buildId/labels': 'see-build',
  'post /api/builds/:buildId/lid-sheet': 'see-build',
  'get /api/builds/:buildId/events': 'see-build',
  'put /api/builds/:buildId/presence': 'see-build',
  'get /api/builds/:buildId/activity': 'see-build',
  'get /api/events': 'signed-in',
  'get /api/notifications': 'signed-in',
  'post /api/notifications/read': 'signed-in',
  'get /api/drives': 'signed-in',
  'get /api/catalog': 'anybody',
  'put /api/catalog/models/:modelId': 'edit-catalog',
  'get /api/own-models': 'signed-in',
  'put /api/own-models/:modelId': 'signed-in',
  'delete /api/own-models/:modelId': 'signed-in',
  'put /api/own-models/:modelId/photo': 'signed-in',
  'get /api/own-models/:modelId/photo': 'signed-in',
  'delete /api/own-models/:modelId/photo': 'signed-in',
  'get /api/examples': 'signed-in',
  'post /api/check': 'signed-in',
}

let api: Api
let buildId: string
const clients = new Map<Visitor, Client>()

beforeAll(async () => {
  api = await startApi({ settings: { RATE_LIMIT_FACTOR: '1000' } })
  clients.set('nobody', await api.visitor())
  for (const role of ['member', 'catalog-editor', 'administrator'] as const)
    clients.set(role, await api.person({ role }))
  for (const role of ['owner', 'editor', 'reviewer', 'reader'] as const) clients.set(role, await api.person())
  const made = await clientOf('owner').post('/api/builds/import', { document: cablesDocument('Walked', 1) })
  buildId = openBuildSchema.parse(made.body).id
  for (const role of ['editor', 'reviewer', 'reader'] as const)
    await BuildMember.create({ buildId, userId: clientOf(role).user?.id ?? '', role })
  const elsewhere = await clientOf('owner').post('/api/builds/import', { document: cablesDocument('Elsewhere', 1) })
  clients.set('guest-reader', await comeByLink(buildId, 'read'))
  clients.set('guest-reviewer', await comeByLink(buildId, 'review'))
  clients.set('guest-elsewhere', await comeByLink(openBuildSchema.parse(elsewhere.body).id, 'review'))
  clients.set('guest-revoked', await comeByLink(buildId, 'review', true))
})
afterAll(() => api.close())

/** A browser that came by a link of its own. */
async function comeByLink(into: string, kind: 'read' | 'review', revoked = false): Promise<Client> {
  const links = `/api/builds/${into}/links`
  const made = madeLinkSchema.parse((await clientOf('owner').post(links, { kind, label: kind, days: 1 })).body)
  const guest = await api.visitor()
  expect((await guest.post(`/api/links/${made.token}/guests`, { name: 'Passer-by' })).status).toBe(201)
  if (revoked) expect((await clientOf('owner').delete(`${links}/${made.link.id}`)).status).toBe(204)
  return guest
}

function clientOf(visitor: Visitor): Client {
  const client = clients.get(visitor)
  if (!client) throw new Error(`nobody plays the ${visitor}`)
  return client
}

/** An address of the route in the walked build; all else in it leads nowhere, so that nothing is really done. */
const addressOf = (route: AnyRoute) =>
  route.path
    .replace(':buildId', buildId)
    .replace(':token', 'a'.repeat(43))
    .replace(':modelId', 'no-such-model')
    .replace(':revision', '1')
    .replace(/:\w+/g, randomUUID())

const named = routes.map((route) => ({ name: `${route.method} ${route.path}`, route }))

test('the table holds the routes that are written down here, under the same policies', () => {
  const actual = Object.fromEntries(named.map(({ name, route }) => [name, route.policy]))
  expect(actual).toEqual(expectedPolicies)
  expect(named).toHaveLength(Object.keys(actual).length)
})

/** Signing out and leaving are walked last: they really end the visit. */
const isSignOut = (name: string) => name === 'delete /api/session'
const isLeaving = (name: string) => name === 'delete /api/guest'
const walked = [
  ...named.filter(({ name }) => !isSignOut(name) && !isLeaving(name)),
  ...named.filter(({ name }) => isLeaving(name)),
  ...named.filter(({ name }) => isSignOut(name)),
]

describe.each(walked)('$name', ({ route }) => {
  test.each(visitors)('asked by %s', async (visitor) => {
    const response = await clientOf(visitor).send(route.method, addressOf(route), route.body ? {} : undefined)
    const { status } = response
    expect(status, response.text).toBeLessThan(500)
    const mayPass = comesThrough[route.policy].includes(visitor)
    const isBuildRoute = route.path.includes(':buildId')
    if (mayPass) expect([401, 403]).not.toContain(status)
    // A guest of the build whom the link does not let do this is told so, where guests may come at all.
    else if (visitor === 'guest-reader' && route.policy === 'comment-on-build') expect(status).toBe(403)
    else if (strangers.includes(visitor)) expect(status).toBe(401)
    else if (isBuildRoute && (visitor === 'member' || visitor === 'catalog-editor' || visitor === 'administrator'))
      expect(status).toBe(404)
    else expect(status).toBe(403)
  })
})

test('a route without a policy keeps the app from being made', () => {
  const [route] = routes
  if (!route) throw new Error('the table is empty')
  const { policy: _policy, ...without } = route
  expect(() => createApp(api.context, [without as AnyRoute])).toThrow('GET /api/health names no policy')
  expect(() => createApp(api.context, [{ ...route, policy: 'toString' as PolicyName }])).toThrow('names no policy')
})

describe('the policy module', () => {
  const actor = (role: 'administrator' | 'catalog-editor' | 'member') => ({
    id: 'x',
    email: 'x@example.org',
    name: 'X',
    role,
  })

  test('lets a reader leave and nobody else', () => {
    const member = actor('member')
    expect(may(member, 'remove-member', { buildRole: 'reader', self: true })).toBe('allow')
    expect(may(member, 'remove-member', { buildRole: 'editor', self: false })).toBe('forbid')
    expect(may(member, 'remove-member', { buildRole: null, self: true })).toBe('hide')
  })

  test('gives an administrator no way into others’ builds', () => {
    const builds = (Object.keys(policies) as PolicyName[]).filter((name) => /build|member/.test(name))
    for (const policy of builds) expect(may(actor('administrator'), policy, { buildRole: null })).toBe('hide')
  })
})
