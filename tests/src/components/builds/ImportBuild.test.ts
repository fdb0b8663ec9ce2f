import { flushPromises, type VueWrapper } from '@vue/test-utils'
import { describe, expect, it, vi } from 'vitest'
import ImportBuild from '../../../../src/components/builds/ImportBuild.vue'
import { fakeServer, irma, json, problem, sessionOf } from '../../helpers/fakeServer.ts'
import { mountPage, words } from '../../helpers/mountPage.ts'

const signedIn = { 'GET /api/session': json(sessionOf(irma)) }

async function choose(wrapper: VueWrapper, name: string, text: string): Promise<void> {
  const input = wrapper.get('input[type="file"]')
  Object.defineProperty(input.element, 'files', { value: [new File([text], name)], configurable: true })
  await input.trigger('change')
  await flushPromises()
  await flushPromises()
}

describe('importing a build', () => {
  it('lists every bad place by its path and stays where it is', async () => {
    const errors = [
      { path: 'parts[0].ref', message: 'use a class letter and a number, as "W6"' },
      { path: 'joints[4].b.part', message: 'there is no part "p99"' },
    ]
    const server = fakeServer({ ...signedIn, 'POST /api/builds/import': problem('unreadable-document', { errors }) })
    const { wrapper, router } = await mountPage(ImportBuild)
    await choose(wrapper, 'old-plan.json', '{"format":"bayloom-build"}')
    await vi.waitFor(() => expect(server.of('POST', '/api/builds/import')).toHaveLength(1))
    expect(server.of('POST', '/api/builds/import')[0]?.body).toEqual({ document: { format: 'bayloom-build' } })
    const dialog = await vi.waitFor(() => words(document.querySelector('[role="dialog"]')!))
    expect(dialog).toContain('old-plan.json was not imported')
    expect(dialog).toContain('2 places in it cannot be read. Nothing was imported.')
    for (const { path, message } of errors) expect(dialog).toContain(`${path} ${message}`)
    expect(router.currentRoute.value.path).toBe('/')
  })

  it('sends nothing that is not JSON, and says so', async () => {
    const server = fakeServer(signedIn)
    const { wrapper } = await mountPage(ImportBuild)
    await choose(wrapper, 'notes.txt', 'twelve drives')
    expect(server.of('POST', '/api/builds/import')).toEqual([])
    const dialog = await vi.waitFor(() => words(document.querySelector('[role="dialog"]')!))
    expect(dialog).toContain('The file is not JSON')
  })

  it('opens the build that came in', async () => {
    const build = {
      id: 'b7',
      name: 'Reel vault',
      machine: null,
      revision: 1,
      drives: 10,
      parts: 24,
      worst: null,
      checked: true,
      counts: { danger: 0, fault: 0, caution: 0, note: 0 },
      changedAt: '2026-12-01T08:00:00Z',
      changedBy: 'Irma Solberg',
      archived: false,
      role: 'owner',
      people: [],
      document: {},
    }
    fakeServer({ ...signedIn, 'POST /api/builds/import': json(build, 201) })
    const { wrapper, router } = await mountPage(ImportBuild)
    const asked: string[] = []
    router.beforeEach((to) => {
      asked.push(to.fullPath)
      return false
    })
    await choose(wrapper, 'reel-vault.json', '{"format":"bayloom-build","version":1}')
    await vi.waitFor(() => expect(asked).toContain('/builds/b7'))
    expect(document.querySelector('[role="dialog"]')).toBeNull()
  })
})
