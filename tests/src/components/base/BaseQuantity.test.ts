import { mount } from '@vue/test-utils'
import { afterEach, describe, expect, it } from 'vitest'
import type { Quantity } from '#shared/quantity/quantity.ts'
import BaseQuantity from '../../../../src/components/base/BaseQuantity.vue'

const figure: Quantity = { value: 2, low: 1.7, high: 2.2, origin: 'maker', source: 'S41', clause: 'p. 9' }
const show = (quantity: Quantity, sourceTitle?: string) =>
  mount(BaseQuantity, { props: { quantity, unit: 'A' as const, sourceTitle }, attachTo: document.body })
const plain = (text: string): string => text.replace(/\u00a0/g, ' ')

afterEach(() => (document.body.innerHTML = ''))

describe('a figure', () => {
  it('stands with its unit', () => expect(plain(show(figure).text())).toBe('2 A'))

  it('says "about" before a guess, a class default or a figure from memory', () => {
    for (const doubt of [{ origin: 'guess' }, { origin: 'class default' }, { fromMemory: true }] as const)
      expect(plain(show({ ...figure, ...doubt }).text())).toBe('about 2 A')
  })

  it('says "unknown" where nobody knows, never zero', () =>
    expect(show({ value: null, origin: 'class default' }).text()).toBe('unknown'))

  it('shows zero as a figure', () => expect(plain(show({ value: 0, origin: 'measured' }).text())).toBe('0 A'))

  it.each(['focus', 'click'])('tells range and source on %s and hides them on Escape', async (event) => {
    const wrapper = show(figure, 'Drive manual')
    await wrapper.get('button').trigger(event)
    const told = wrapper.get('[role="tooltip"]')
    expect(plain(told.text())).toContain('1.7 to 2.2 A')
    expect(told.text()).toContain('Stated by the maker: Drive manual, p. 9.')
    expect(wrapper.get('button').attributes('aria-describedby')).toBe(told.attributes('id'))
    document.dispatchEvent(new KeyboardEvent('keydown', { key: 'Escape', bubbles: true }))
    await wrapper.vm.$nextTick()
    expect(wrapper.find('[role="tooltip"]').exists()).toBe(false)
  })

  it('tells on pointing, until the pointer leaves', async () => {
    const wrapper = show({ ...figure, by: 'Irma Solberg', on: '2026-11-30', origin: 'measured', source: undefined })
    await wrapper.get('.quantity').trigger('mouseenter')
    expect(wrapper.get('[role="tooltip"]').text()).toContain('Measured by Irma Solberg on 2026-11-30')
    await wrapper.get('.quantity').trigger('mouseleave')
    expect(wrapper.find('[role="tooltip"]').exists()).toBe(false)
  })
})
