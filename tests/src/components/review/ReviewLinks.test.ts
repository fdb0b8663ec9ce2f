import { flushPromises } from '@vue/test-utils'
import { describe, expect, it } from 'vitest'
import type { BuildLink } from '#shared/contract/buildLinks.ts'
import ReviewLinks from '../../../../src/components/review/ReviewLinks.vue'
import { fakeServer, irma, json, sessionOf } from '../../helpers/fakeServer.ts'
import { mountPage, words } from '../../helpers/mountPage.ts'

const guest = { id: 'g1', name: 'Jo', joinedAt: '2026-11-30T10:00:00.000Z', lastSeenAt: '2026-12-01T09:00:00.000Z' }
const link: BuildLink = {
  id: 'l1',
  kind: 'review',
  label: 'For the cutting room',
  hasPassPhrase: true,
  madeBy: 'Irma Solberg',
  madeAt: '2026-11-29T10:00:00.000Z',
  expiresAt: '2027-01-01T10:00:00.000Z',
  revokedAt: null,
  state: 'open',
  guests: [{ ...guest, state: 'here' }],
}
const over: BuildLink = { ...link, id: 'l2', label: 'An old one', state: 'expired', guests: [] }

const show = async () => {
  const server = fakeServer({
    'GET /api/session': json(sessionOf(irma)),
    'GET /api/builds/b1/links': json([link, over]),
    'DELETE /api/builds/b1/links/l1': json(null, 204),
    'DELETE /api/builds/b1/guests/g1': json(null, 204),
    'POST /api/builds/b1/links': json({ link, token: 'k'.repeat(43) }, 201),
  })
  const page = await mountPage(ReviewLinks, { buildId: 'b1' })
  await flushPromises()
  return { ...page, server }
}
const press = async (label: string) => {
  const found = [...document.querySelectorAll('button')].find(
    (button) => (button.getAttribute('aria-label') ?? button.textContent?.trim()) === label,
  )
  if (!found) throw new Error(`no button "${label}"`)
  found.click()
  await flushPromises()
}

describe('the links of a build', () => {
  it('tell what they allow, until when, and who came by them', async () => {
    await show()
    for (const told of ['For the cutting room', 'to review, with a pass phrase', 'Jo', '1 link is over'])
      expect(words()).toContain(told)
  })

  it('are revoked after a question', async () => {
    const { server } = await show()
    await press('Revoke the link For the cutting room')
    expect(words()).toContain('whoever came by it is out at once')
    expect(server.of('DELETE', '/api/builds/b1/links/l1')).toHaveLength(0)
    await press('Revoke the link')
    expect(server.of('DELETE', '/api/builds/b1/links/l1')).toHaveLength(1)
  })

  it('let a single guest be closed out', async () => {
    const { server } = await show()
    await press('Close out Jo')
    expect(server.of('DELETE', '/api/builds/b1/guests/g1')).toHaveLength(1)
  })

  it('are made with a name, and their address is shown once', async () => {
    const { server } = await show()
    await press('Make a link')
    await press('Make the link')
    document.querySelector('form')?.dispatchEvent(new Event('submit', { cancelable: true }))
    await flushPromises()
    expect(words()).toContain('Say whom the link is for.')
    expect(server.of('POST', '/api/builds/b1/links')).toHaveLength(0)
    const input = document.querySelector<HTMLInputElement>('form input[maxlength="80"]')
    if (!input) throw new Error('no field for the name')
    input.value = 'For Jo'
    input.dispatchEvent(new Event('input'))
    document.querySelector('form')?.dispatchEvent(new Event('submit', { cancelable: true }))
    await flushPromises()
    expect(server.of('POST', '/api/builds/b1/links')[0]?.body).toEqual({ kind: 'read', label: 'For Jo', days: 14 })
    const shown = [...document.querySelectorAll('input')].map(({ value }) => value)
    expect(shown).toContain(`${location.origin}/links/${'k'.repeat(43)}`)
  })
})
