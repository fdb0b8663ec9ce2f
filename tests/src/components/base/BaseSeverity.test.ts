import { mount } from '@vue/test-utils'
import { describe, expect, it } from 'vitest'
import { severities } from '#shared/check/severity.ts'
import BaseSeverity from '../../../../src/components/base/BaseSeverity.vue'

const shapeOf = (severity: (typeof severities)[number] | null): string =>
  mount(BaseSeverity, { props: { severity } }).find('svg').html()

describe('a severity', () => {
  it('has its own shape, never colour alone', () => {
    expect(new Set([...severities, null].map(shapeOf)).size).toBe(severities.length + 1)
  })

  it('has its word, also where only the shape is seen', () => {
    for (const severity of severities)
      expect(mount(BaseSeverity, { props: { severity, bare: true } }).text()).toBe(severity)
  })

  it('counts in words', () => {
    expect(mount(BaseSeverity, { props: { severity: 'fault', count: 1 } }).text()).toBe('1 fault')
    expect(mount(BaseSeverity, { props: { severity: 'fault', count: 3 } }).text()).toBe('3 faults')
  })

  it('says "within the stated limits" where nothing was found, and hides the shape from readers', () => {
    const wrapper = mount(BaseSeverity, { props: { severity: null } })
    expect(wrapper.text()).toBe('within the stated limits')
    expect(wrapper.find('svg').attributes('aria-hidden')).toBe('true')
  })
})
