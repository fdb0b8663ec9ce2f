import { flushPromises, type VueWrapper } from '@vue/test-utils'
import { describe, expect, it, vi } from 'vitest'
import { indexCatalog, catalogSchema } from '#shared/catalog/catalog.ts'
import { modelSchema, type Model } from '#shared/catalog/model.ts'
import ModelForm from '../../../../src/components/catalog/ModelForm.vue'
import { fakeServer, irma, json, problem, sessionOf } from '../../helpers/fakeServer.ts'
import { mountPage, words } from '../../helpers/mountPage.ts'
import { ProblemError } from '../../../../src/api/errors.ts'
import { problemSchema } from '#shared/contract/problems.ts'

const about = (value: number | null, more: object = {}) => ({ value, origin: 'class default' as const, ...more })
const power = {
  contacts: { '12V': 1, '5V': 1, '3.3V': 1, return: 2 },
  rating_A: about(9),
  contactResistance_mohm: { initial: about(5), endOfLife: about(10) },
}
const index = indexCatalog(
  catalogSchema.parse({
    connectorTypes: [
      { id: 'plug-a', name: 'Plug', standard: 'none', side: 'plug', power, matesWith: ['outlet-a'] },
      { id: 'outlet-a', name: 'Outlet', standard: 'none', side: 'receptacle', power, matesWith: ['plug-a'] },
    ],
    classes: [],
    models: [],
    sources: [{ id: 'S1', title: 'Drive manual', sureness: 'read' }],
  }),
)
const fan: Model = modelSchema.parse({
  id: 'own-new',
  kind: 'fan',
  name: 'Fan',
  connectors: [{ id: 'power', label: 'power', type: 'plug-a' }],
  load: { '12V': { rest_A: about(0.2), scan_A: about(0.3, { low: 0.1, high: 0.5, source: 'S1' }) } },
})
const lead: Model = modelSchema.parse({
  id: 'own-new',
  kind: 'lead',
  name: 'Lead',
  connectors: [
    { id: 'supply', label: 'supply end', type: 'plug-a' },
    { id: 'out-1', label: '1', type: 'outlet-a' },
    { id: 'out-2', label: '2', type: 'outlet-a' },
  ],
  wiring: [
    { from: 'supply', to: 'out-1', line: '12V', awg: 18, length_mm: about(450) },
    { from: 'supply', to: 'out-1', line: 'return', awg: 18, length_mm: about(450) },
    { from: 'out-1', to: 'out-2', line: '12V', awg: 18, length_mm: about(150) },
    { from: 'out-1', to: 'out-2', line: 'return', awg: 18, length_mm: about(150) },
  ],
})

async function open(start: Model, save = vi.fn(async (_model: Model, _target: string): Promise<unknown> => undefined)) {
  localStorage.setItem('bayloom.length', 'mm')
  fakeServer({ 'GET /api/session': json(sessionOf(irma)) })
  const { wrapper } = await mountPage(ModelForm, {
    start,
    index,
    author: { name: 'Irma Solberg', today: '2026-12-01' },
    sourceTitle: (id: string | undefined) => (id ? index.sources.get(id)?.title : undefined),
    targets: [
      { id: 'own', words: 'Save to my library' },
      { id: 'shared', words: 'Save to the shared catalog' },
    ],
    save,
  })
  return { wrapper, save }
}

const named = (label: string): HTMLInputElement => {
  const found = [...document.querySelectorAll('label')].find((one) => words(one) === label)
  return document.getElementById(found?.htmlFor ?? '') as HTMLInputElement
}
async function type(label: string, text: string): Promise<void> {
  const input = named(label)
  input.value = text
  input.dispatchEvent(new Event('input', { bubbles: true }))
  input.dispatchEvent(new Event('change', { bubbles: true }))
  await flushPromises()
}
async function submit(wrapper: VueWrapper, words = 'Save to my library'): Promise<void> {
  await wrapper
    .findAll('button[type="submit"]')
    .find((one) => one.text() === words)!
    .trigger('click')
  await wrapper.get('form').trigger('submit')
  await flushPromises()
}

describe('the form for a model', () => {
  it('saves the typed figures as the person’s own, with origin, name and day, and leaves the rest as defaults', async () => {
    const { wrapper, save } = await open(fan)
    await type('Name', 'Vault fan 120')
    await type('12 V, at work', '0,25')
    expect(words()).toContain('yours, 2026-12-01')
    await submit(wrapper)
    const [saved, target] = save.mock.calls[0]!
    expect(target).toBe('own')
    expect(saved.name).toBe('Vault fan 120')
    expect(saved.load?.['12V']).toEqual({
      rest_A: about(0.2),
      scan_A: { value: 0.25, origin: 'maker', by: 'Irma Solberg', on: '2026-12-01' },
    })
  })

  it('shows where a default comes from, and gives it back', async () => {
    const { wrapper, save } = await open(fan)
    expect(words()).toContain('Default of its class: Drive manual.0.1 to 0.5 A')
    await type('Name', 'Vault fan 120')
    await type('12 V, at work', '0.4')
    await wrapper.get('.back').trigger('click')
    expect(named('12 V, at work').value).toBe('0.3')
    await submit(wrapper)
    expect(save.mock.calls[0]![0].load).toEqual(fan.load)
  })

  it('takes an emptied figure as unknown and keeps its range', async () => {
    const { wrapper, save } = await open(fan)
    await type('Name', 'Vault fan 120')
    await type('12 V, at work', '')
    await submit(wrapper)
    expect(save.mock.calls[0]![0].load?.['12V']?.scan_A).toMatchObject({ value: null, low: 0.1, high: 0.5 })
  })

  it('says so where something is no number, and keeps the figure before', async () => {
    const { wrapper, save } = await open(fan)
    await type('Name', 'Vault fan 120')
    await type('12 V, at work', '0.2 A')
    expect(words()).toContain('Write a number, as 1.8.')
    expect(named('12 V, at work').getAttribute('aria-invalid')).toBe('true')
    await submit(wrapper)
    expect(save).not.toHaveBeenCalled()
    expect(words(wrapper.get('[role="alert"]').element)).toContain('12 V, at work write a number')
    await type('12 V, at work', '0.2')
    await submit(wrapper)
    expect(save.mock.calls[0]![0].load?.['12V']?.scan_A.value).toBe(0.2)
  })

  it('wants a name', async () => {
    const { wrapper, save } = await open({ ...fan, name: '' })
    await submit(wrapper)
    expect(save).not.toHaveBeenCalled()
    expect(words()).toContain('Give the model a name')
  })

  it('grows a lead by an outlet with the wire and length that were typed', async () => {
    const { wrapper, save } = await open(lead)
    await type('Name', 'Vendor lead, 3')
    await type('1 to 2, length', '120')
    await wrapper.get('button[aria-label="Outlets on it: one more"]').trigger('click')
    await flushPromises()
    await submit(wrapper, 'Save to the shared catalog')
    const [saved, target] = save.mock.calls[0]!
    expect(target).toBe('shared')
    const added = saved.wiring.filter((conductor) => conductor.to === 'out-3')
    expect(added.map((conductor) => [conductor.from, conductor.line, conductor.length_mm?.value])).toEqual([
      ['out-2', '12V', 120],
      ['out-2', 'return', 120],
    ])
    expect(saved.wiring.filter((conductor) => conductor.to === 'out-1')[0]?.length_mm).toEqual(about(450))
  })

  it('lists by path what the server refuses', async () => {
    const error = new ProblemError(
      problemSchema.parse(
        await problem('bad-input', { errors: [{ path: 'model.load.12V.scan_A', message: 'too large' }] }).json(),
      ),
    )
    const { wrapper } = await open(
      fan,
      vi.fn(() => Promise.reject(error)),
    )
    await type('Name', 'Vault fan 120')
    await submit(wrapper)
    expect(words(wrapper.get('[role="alert"]').element)).toContain('model.load.12V.scan_A too large')
  })
})
