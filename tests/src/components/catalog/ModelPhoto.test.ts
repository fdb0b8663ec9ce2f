import { flushPromises } from '@vue/test-utils'
import { expect, it, vi } from 'vitest'
import { modelSchema } from '#shared/catalog/model.ts'
import ModelPhoto from '../../../../src/components/catalog/ModelPhoto.vue'
import ModelPhotoChoice from '../../../../src/components/catalog/ModelPhotoChoice.vue'
import { fakeServer, irma, json, problem, sessionOf } from '../../helpers/fakeServer.ts'
import { mountPage, words } from '../../helpers/mountPage.ts'

const model = modelSchema.parse({ id: 'own-x', kind: 'fan', name: 'Own thing' })
const own = (photo?: string) =>
  json([{ id: 'own-x', model, changedAt: '2026-01-01T00:00:00Z', ...(photo ? { photo } : {}) }])
const address = '/api/own-models/own-x/photo'
const picture = new File([new Uint8Array([1, 2, 3])], 'label.jpg', { type: 'image/jpeg' })

async function choose(field: Element, file: File): Promise<void> {
  Object.defineProperty(field, 'files', { value: [file], configurable: true })
  field.dispatchEvent(new Event('change'))
  await flushPromises()
}
const field = () => document.querySelector('input[type=file]')!

it('sends a chosen picture as it is, with the token, and shows what the server kept', async () => {
  const server = fakeServer({
    'GET /api/session': json(sessionOf(irma)),
    'GET /api/own-models': [own(), own('v1')],
    [`PUT ${address}`]: json({ version: 'v1' }),
  })
  const sent = vi.spyOn(globalThis, 'fetch')
  await mountPage(ModelPhoto, { modelId: 'own-x', name: 'Own thing' })
  expect(document.querySelector('img')).toBeNull()
  expect(words()).toContain('Add a photo of the label')
  await choose(field(), picture)
  expect(server.of('PUT', address)).toEqual([expect.objectContaining({ csrf: 'token-1' })])
  const [, init] = sent.mock.calls.find(([path]) => path === address)!
  expect(init!.body).toBe(picture)
  expect(new Headers(init!.headers).get('content-type')).toBe('image/jpeg')
  const img = document.querySelector('img')!
  expect(img.getAttribute('src')).toBe(`${address}?v=v1`)
  expect(img.getAttribute('alt')).toContain('Own thing')
  expect(words()).toContain('Change the photo')
})

it('says so where the server refuses, and keeps what is shown', async () => {
  fakeServer({
    'GET /api/session': json(sessionOf(irma)),
    'GET /api/own-models': own('v1'),
    [`PUT ${address}`]: problem('bad-input', { detail: 'Not a picture that can be read: JPEG, PNG or WebP.' }),
  })
  await mountPage(ModelPhoto, { modelId: 'own-x', name: 'Own thing' })
  await choose(field(), picture)
  const { useNotices } = await import('../../../../src/composables/useNotices.ts')
  expect(JSON.stringify(useNotices().notices.value)).toContain('The photo was not kept.')
  expect(document.querySelector('img')!.getAttribute('src')).toBe(`${address}?v=v1`)
})

it('removes it', async () => {
  const server = fakeServer({
    'GET /api/session': json(sessionOf(irma)),
    'GET /api/own-models': [own('v1'), own()],
    [`GET ${address}`]: new Response('x'),
    [`DELETE ${address}`]: json(null, 204),
  })
  const { wrapper } = await mountPage(ModelPhoto, { modelId: 'own-x', name: 'Own thing' })
  await wrapper.findAll('button').at(-1)!.trigger('click')
  await flushPromises()
  await vi.waitFor(() => expect(server.of('DELETE', address)).toHaveLength(1))
  await vi.waitFor(() => expect(document.querySelector('img')).toBeNull())
})

it('shows a picture chosen before the model is saved, and lets it be left out', async () => {
  fakeServer({ 'GET /api/session': json(sessionOf(irma)) })
  vi.stubGlobal('URL', Object.assign(URL, { createObjectURL: () => 'blob:label', revokeObjectURL: vi.fn() }))
  const update = vi.fn()
  const { wrapper } = await mountPage(ModelPhotoChoice, { 'onUpdate:modelValue': update })
  await choose(field(), picture)
  expect(update).toHaveBeenLastCalledWith(picture)
  await wrapper.setProps({ modelValue: picture })
  expect(document.querySelector('img')!.getAttribute('src')).toBe('blob:label')
  expect(words()).toContain('label.jpg: kept when you save to your library.')
  await wrapper.findAll('button').at(-1)!.trigger('click')
  expect(update).toHaveBeenLastCalledWith(undefined)
})
