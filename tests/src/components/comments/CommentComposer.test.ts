import { flushPromises } from '@vue/test-utils'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import CommentComposer from '../../../../src/components/comments/CommentComposer.vue'
import { fakeServer, irma, json, sessionOf } from '../../helpers/fakeServer.ts'
import { mountPage, words } from '../../helpers/mountPage.ts'

const people = [
  { userId: '11111111-2222-4333-8444-555555555555', name: 'Teo Marchetti' },
  { userId: '3f0c1d9e-0d2a-4c1b-9a5e-1b2c3d4e5f60', name: 'Noor Castellan' },
]

beforeEach(() => {
  localStorage.clear()
  // The test environment has no layout to observe.
  vi.stubGlobal(
    'ResizeObserver',
    class {
      observe() {}
      unobserve() {}
      disconnect() {}
    },
  )
})

const show = async (send: (text: string, requestId: string) => Promise<unknown>) => {
  fakeServer({ 'GET /api/session': json(sessionOf(irma)) })
  const { wrapper } = await mountPage(CommentComposer, {
    draftKey: 'b1.part:p1',
    label: 'Comment on W1',
    act: 'Comment',
    people,
    send,
  })
  const area = wrapper.get('textarea')
  const field = area.element as HTMLTextAreaElement
  const type = async (text: string) => {
    await area.setValue(text)
    field.setSelectionRange(text.length, text.length)
    await area.trigger('input')
  }
  return {
    wrapper,
    area,
    field,
    type,
    submit: async () => (await wrapper.get('form').trigger('submit'), flushPromises()),
  }
}

describe('what is being written', () => {
  it('is gone once it is sent', async () => {
    const send = vi.fn(() => Promise.resolve())
    const { field, type, submit } = await show(send)
    await type('Is it thick enough?')
    await submit()
    expect(send).toHaveBeenCalledOnce()
    expect(field.value).toBe('')
    expect(Object.keys(localStorage).filter((key) => key.includes('draft'))).toEqual([])
  })

  it('stays when sending fails, through a reload, and is sent again under the same name', async () => {
    const failing = vi.fn((_text: string, _id: string) => Promise.reject(new Error('no connection')))
    const first = await show(failing)
    await first.type('Is it thick enough?')
    await first.submit()
    expect(words()).toContain('What you wrote is still here.')
    first.wrapper.unmount()
    const working = vi.fn((_text: string, _id: string) => Promise.resolve())
    const second = await show(working)
    expect(second.field.value).toBe('Is it thick enough?')
    await second.submit()
    expect(working.mock.calls[0]?.[1]).toBe(failing.mock.calls[0]?.[1])
  })

  it('gets another name when the words are others', async () => {
    const send = vi.fn((_text: string, _id: string) => Promise.reject(new Error('no')))
    const { type, submit } = await show(send)
    await type('one')
    await submit()
    await type('two')
    await submit()
    const [one, two] = send.mock.calls.map(([, id]) => id)
    expect(one).not.toBe(two)
  })
})

describe('a mention', () => {
  it('is completed from the keyboard and sent as an id', async () => {
    const send = vi.fn((_text: string, _id: string) => Promise.resolve())
    const { area, field, type, submit } = await show(send)
    await type('Ask @cas')
    expect(words()).toContain('Noor Castellan')
    expect(words()).not.toContain('Teo Marchetti')
    await area.trigger('keydown', { key: 'Enter' })
    await flushPromises()
    expect(field.value).toBe('Ask @Noor Castellan ')
    await submit()
    expect(send.mock.calls[0]?.[0]).toBe(`Ask @{${people[1]?.userId}}`)
  })

  it('is not offered again after Escape', async () => {
    const { area, type, wrapper } = await show(() => Promise.resolve())
    await type('Ask @Te')
    await area.trigger('keydown', { key: 'Escape' })
    expect(wrapper.find('[role="listbox"]').exists()).toBe(false)
  })
})
