import { expect, it } from 'vitest'
import CommentText from '../../../../src/components/comments/CommentText.vue'
import { fakeServer, irma, json, sessionOf } from '../../helpers/fakeServer.ts'
import { mountPage, words } from '../../helpers/mountPage.ts'

const show = async (text: string, mentions: { userId: string; name: string | null }[] = []) => {
  fakeServer({ 'GET /api/session': json(sessionOf(irma)) })
  return (await mountPage(CommentText, { comment: { text, mentions } })).wrapper
}

it('shows hostile markup as the text that it is', async () => {
  const hostile = '<img src=x onerror=alert(1)> <script>alert(1)</script> [x](javascript:alert(1))'
  const wrapper = await show(hostile)
  expect(words()).toBe(hostile)
  expect(wrapper.find('img, script, a').exists()).toBe(false)
})

it('opens links elsewhere and gives nothing of this page to them', async () => {
  const link = (await show('see https://example.org/a')).get('a')
  expect(link.attributes()).toMatchObject({
    href: 'https://example.org/a',
    target: '_blank',
    rel: 'noopener noreferrer nofollow',
  })
})

it('names who is mentioned, and who is gone', async () => {
  const [here, gone] = ['11111111-2222-4333-8444-555555555555', '3f0c1d9e-0d2a-4c1b-9a5e-1b2c3d4e5f60']
  await show(`@{${here}} and @{${gone}}`, [
    { userId: here, name: 'Teo Marchetti' },
    { userId: gone, name: null },
  ])
  expect(words()).toBe('@Teo Marchetti and @former member')
})

it('keeps lists, quotes and code apart', async () => {
  const wrapper = await show('- a\n- b\n\n> c\n\n```\n**d**\n```')
  expect(wrapper.findAll('li').map((item) => item.text())).toEqual(['a', 'b'])
  expect(wrapper.get('blockquote').text()).toBe('c')
  expect(wrapper.get('pre').text()).toBe('**d**')
})
