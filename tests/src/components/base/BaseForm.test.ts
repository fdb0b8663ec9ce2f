import { flushPromises } from '@vue/test-utils'
import InputText from 'primevue/inputtext'
import { describe, expect, it, vi } from 'vitest'
import { defineComponent, h } from 'vue'
import { z } from 'zod'
import { problemSchema } from '#shared/contract/problems.ts'
import { NetworkError, ProblemError } from '../../../../src/api/errors.ts'
import BaseForm from '../../../../src/components/base/BaseForm.vue'
import BaseFormField from '../../../../src/components/base/BaseFormField.vue'
import { fakeServer, json, problem, sessionOf } from '../../helpers/fakeServer.ts'
import { mountPage, words } from '../../helpers/mountPage.ts'

const schema = z.object({ name: z.string().trim().min(1, 'write a name'), size: z.string().min(3, 'at least 3 signs') })

const field = (name: string, label: string) =>
  h(
    BaseFormField,
    { name, label },
    { default: ({ control }: { control: object }) => h(InputText, { ...control, name }) },
  )

const formWith = (submit: (values: never) => Promise<unknown>) =>
  defineComponent({
    render: () =>
      h(
        BaseForm,
        { schema, initial: { name: '', size: '' }, submit },
        { default: () => [field('name', 'Name'), field('size', 'Size')] },
      ),
  })

async function fill(values: Record<string, string>, submit: (values: never) => Promise<unknown>) {
  fakeServer({ 'GET /api/session': json(sessionOf(null)) })
  const { wrapper } = await mountPage(formWith(submit))
  for (const [name, value] of Object.entries(values)) await wrapper.get(`input[name="${name}"]`).setValue(value)
  await wrapper.get('form').trigger('submit')
  await flushPromises()
  return wrapper
}

const refusal = async (more: object): Promise<ProblemError> =>
  new ProblemError(problemSchema.parse(await problem('bad-input', more).json()))

describe('a form', () => {
  it('sends what the schema makes of the fields', async () => {
    const submit = vi.fn(async () => undefined)
    await fill({ name: '  T1 ', size: 'ATX' }, submit)
    expect(submit).toHaveBeenCalledWith({ name: 'T1', size: 'ATX' })
  })

  it('says at each field what is wrong, sends nothing, and goes to the first', async () => {
    const submit = vi.fn(async () => undefined)
    const wrapper = await fill({ size: 'x' }, submit)
    expect(submit).not.toHaveBeenCalled()
    const name = wrapper.get('input[name="name"]')
    expect(name.attributes('aria-invalid')).toBe('true')
    expect(document.getElementById(name.attributes('aria-describedby') ?? '')?.textContent).toBe('Write a name')
    expect(words()).toContain('At least 3 signs')
    expect(document.activeElement).toBe(name.element)
  })

  it('is silent before somebody tried, and takes a complaint back as soon as it is met', async () => {
    fakeServer({ 'GET /api/session': json(sessionOf(null)) })
    const { wrapper } = await mountPage(formWith(async () => undefined))
    await wrapper.get('input[name="size"]').setValue('x')
    await flushPromises()
    expect(wrapper.find('[aria-invalid]').exists()).toBe(false)
    await wrapper.get('form').trigger('submit')
    await flushPromises()
    expect(wrapper.get('input[name="size"]').attributes('aria-invalid')).toBe('true')
    await wrapper.get('input[name="size"]').setValue('ATX')
    await flushPromises()
    expect(wrapper.get('input[name="size"]').attributes('aria-invalid')).toBeUndefined()
  })

  it('shows at its field what the server refuses by path, until that field changes', async () => {
    const error = await refusal({ errors: [{ path: 'name', message: 'already taken' }] })
    const wrapper = await fill({ name: 'T1', size: 'ATX' }, () => Promise.reject(error))
    expect(words()).toContain('Already taken')
    expect(wrapper.find('[role="alert"]').exists()).toBe(false)
    await wrapper.get('input[name="name"]').setValue('T2')
    expect(words()).not.toContain('Already taken')
  })

  it('shows above the form what belongs to no field', async () => {
    const error = await refusal({ detail: 'The note is too long', errors: [{ path: 'note', message: '301 signs' }] })
    const wrapper = await fill({ name: 'T1', size: 'ATX' }, () => Promise.reject(error))
    expect(words(wrapper.get('[role="alert"]').element)).toContain('note 301 signs')
  })

  it('keeps what was typed when there is no connection', async () => {
    const wrapper = await fill({ name: 'T1', size: 'ATX' }, () => Promise.reject(new NetworkError('down')))
    expect(words(wrapper.get('[role="alert"]').element)).toContain('No connection')
    expect((wrapper.get('input[name="name"]').element as HTMLInputElement).value).toBe('T1')
  })
})
