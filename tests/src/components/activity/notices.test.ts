import { flushPromises } from '@vue/test-utils'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import AccountMail from '../../../../src/components/account/AccountMail.vue'
import MailboxMessage from '../../../../src/components/account/MailboxMessage.vue'
import ActivityList from '../../../../src/components/activity/ActivityList.vue'
import NotificationsView from '../../../../src/views/NotificationsView.vue'
import UnsubscribeView from '../../../../src/views/UnsubscribeView.vue'
import { fakeServer, irma, json, problem, sessionOf } from '../../helpers/fakeServer.ts'
import { mountPage, words } from '../../helpers/mountPage.ts'

const session = { 'GET /api/session': json(sessionOf(irma)) }
const at = '2026-12-01T10:00:00Z'
const teo = { kind: 'member', userId: 'u2', name: 'Teo Marchetti' }
const comment = {
  kind: 'comment-added',
  threadId: 't1',
  commentId: 'c1',
  about: 'W4',
  excerpt: 'Too thin?',
  mentions: ['u1'],
  repliesTo: [],
}
const notice = {
  id: 5,
  buildName: 'North room',
  reason: 'mention',
  read: false,
  activity: { id: 5, buildId: 'b1', at, by: teo, what: comment },
}

beforeEach(() => vi.useFakeTimers({ now: Date.parse(at), toFake: ['Date'] }))
afterEach(() => vi.useRealTimers())

describe('notifications', () => {
  it('lead to the very thing and are marked as read on the way', async () => {
    const server = fakeServer({
      ...session,
      'GET /api/notifications': json({ items: [notice], more: false, unread: 1 }),
      'POST /api/notifications/read': json({ unread: 0 }),
    })
    const { wrapper } = await mountPage(NotificationsView)
    const link = wrapper.get('li a')
    expect(link.attributes('href')).toBe('/builds/b1?thread=t1&comment=c1')
    expect(words(link.element)).toContain('Teo Marchetti mentioned you in the comments on W4: "Too thin?"')
    await link.trigger('click')
    await flushPromises()
    expect(server.of('POST', '/api/notifications/read').map(({ body }) => body)).toEqual([{ id: 5 }])
  })

  it('teach what will stand there while there is none', async () => {
    fakeServer({ ...session, 'GET /api/notifications': json({ items: [], more: false, unread: 0 }) })
    await mountPage(NotificationsView)
    expect(words()).toContain('When somebody mentions you')
  })
})

describe('the activity', () => {
  it('gathers saves and goes on to earlier pages', async () => {
    const save = (id: number) => ({
      id,
      buildId: 'b1',
      at,
      by: teo,
      what: { kind: 'revision-saved', revision: id, label: `Move C${id}` },
    })
    const server = fakeServer({
      'GET /api/session': json(sessionOf(irma)),
      'GET /api/builds/b1/activity': [
        json({ items: [save(9), save(8)], more: true }),
        json({ items: [save(7)], more: false }),
      ],
    })
    const { wrapper } = await mountPage(ActivityList, { buildId: 'b1' })
    expect(words()).toContain('Teo Marchetti saved revisions 8 to 9, last: Move C9')
    await wrapper.get('button').trigger('click')
    await flushPromises()
    expect(words()).toContain('Teo Marchetti saved revisions 7 to 9, last: Move C9')
    expect(server.seen.at(-1)?.path).toBe('/api/builds/b1/activity?before=8')
  })
})

describe('choosing mails', () => {
  const choices = {
    'review-asked': 'at-once',
    verdict: 'at-once',
    mention: 'at-once',
    reply: 'at-once',
    comment: 'digest',
    invitation: 'at-once',
    digest: 'weekly',
  }

  it('saves each choice as it is made, and says what a digest that never comes means', async () => {
    const server = fakeServer({
      ...session,
      'GET /api/account/mail-choices': json(choices),
      'PUT /api/account/mail-choices': json({ ...choices, digest: 'never' }),
    })
    const { wrapper } = await mountPage(AccountMail)
    expect(words()).not.toContain('You get no digest')
    const select = wrapper.get<HTMLSelectElement>('#mail-digest')
    expect([...select.element.options].map((option) => option.text)).toEqual(['every day', 'every week', 'never'])
    await select.setValue('never')
    await flushPromises()
    expect(server.of('PUT', '/api/account/mail-choices').map(({ body }) => body)).toEqual([
      { kind: 'digest', timing: 'never' },
    ])
    expect(words()).toContain('You get no digest')
  })

  it('is done by one click in a mail, signed out, and undone by another', async () => {
    const server = fakeServer({
      'GET /api/session': json(sessionOf(null)),
      'POST /api/unsubscribe/tok': json({ kind: 'mention', timing: 'never' }),
      'POST /api/unsubscribe/tok/undo': json({ kind: 'mention', timing: 'at-once' }),
    })
    const { wrapper } = await mountPage(UnsubscribeView, { token: 'tok' })
    expect(words()).toContain('You get no more mails of this kind: mentions. All else is as before.')
    await wrapper.get('button').trigger('click')
    await flushPromises()
    expect(words()).toContain('Mails of this kind (mentions) come at once, as before.')
    expect(server.seen.filter(({ method }) => method === 'POST')).toHaveLength(2)
  })

  it('says so where the link is broken', async () => {
    fakeServer({ 'GET /api/session': json(sessionOf(null)), 'POST /api/unsubscribe/tok': problem('not-found') })
    await mountPage(UnsubscribeView, { token: 'tok' })
    expect(words()).toContain('This link is not whole.')
  })
})

describe('a message of the mailbox', () => {
  const message = {
    id: 'm1',
    to: 'noor@reelvault.example',
    kind: 'mention',
    subject: 'S',
    text: 'T',
    html: '',
    state: 'failed',
    attempts: 8,
    lastError: '550 no such mailbox',
    queuedAt: at,
    nextTryAt: null,
    sentAt: null,
  }

  it('that was given up says why, after how many tries, and can be tried again', async () => {
    fakeServer(session)
    const { wrapper } = await mountPage(MailboxMessage, { message, busy: false })
    expect(words()).toContain('given up after 8 tries')
    expect(words()).toContain('550 no such mailbox')
    await wrapper.get('button').trigger('click')
    expect(wrapper.emitted('again')).toHaveLength(1)
  })

  it('that was sent offers nothing', async () => {
    fakeServer(session)
    const { wrapper } = await mountPage(MailboxMessage, {
      message: { ...message, state: 'sent', sentAt: at, attempts: 2 },
      busy: false,
    })
    expect(wrapper.find('button').exists()).toBe(false)
    expect(words()).not.toContain('550')
  })
})
