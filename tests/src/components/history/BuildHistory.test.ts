import { flushPromises } from '@vue/test-utils'
import { describe, expect, it } from 'vitest'
import { defineComponent, h, provide, ref, shallowRef } from 'vue'
import { comparisonSchema, revisionsPageSize, type Revision } from '#shared/contract/revisions.ts'
import { openBuildKey } from '../../../../src/components/diagram/openBuild.ts'
import BuildHistory from '../../../../src/components/history/BuildHistory.vue'
import { useNotices } from '../../../../src/composables/useNotices.ts'
import { useDiagramStore } from '../../../../src/stores/diagram.ts'
import { fakeServer, irma, json, problem, sessionOf } from '../../helpers/fakeServer.ts'
import { mountPage, words } from '../../helpers/mountPage.ts'

const revision = (number: number, more: Partial<Revision> = {}): Revision => ({
  revision: number,
  savedAt: '2026-11-30T10:00:00.000Z',
  savedBy: 'Irma Solberg',
  label: `Edit ${number}`,
  hash: String(number),
  name: null,
  note: null,
  restored: null,
  ...more,
})
const verdict = { worst: null, counts: { danger: 0, fault: 0, caution: 0, note: 0, accepted: 0 }, weakestHop: null }
const comparison = comparisonSchema.parse({
  from: revision(1, { name: 'As ordered' }),
  to: revision(3),
  changes: [
    { group: 'wiring', mark: 'moved', text: 'C7 moved from W2 outlet 3 to W4 outlet 1.', parts: ['C7'] },
    { group: 'parts', mark: 'added', text: 'C9 added: a drive.', parts: ['C9'] },
  ],
  moreChanges: 0,
  results: {
    before: { ...verdict, worst: 'caution' },
    after: verdict,
    gained: [],
    lost: [
      {
        key: 'k',
        rule: 'r',
        severity: 'caution',
        message: 'W2 in: 4.4 A of 4.5 A.',
        remedy: '',
        about: false,
        subjects: [],
        accepted: false,
      },
    ],
    shifted: [],
    margins: [
      {
        kind: 'contact',
        name: 'W2 in, 12 V',
        unit: 'A',
        subject: { kind: 'joint' },
        before: { moment: 'cold-start', load: 4.4, limit: 4.5, margin: 0.1, about: false },
        after: { moment: 'cold-start', load: 3, limit: 4.5, margin: 1.5, about: false },
      },
    ],
    moreMargins: 0,
  },
})

const list = 'GET /api/builds/b1/revisions'
const show = async (routes: Parameters<typeof fakeServer>[0] = {}, mayEdit = true) => {
  const server = fakeServer({
    'GET /api/session': json(sessionOf(irma)),
    [list]: json([revision(3), revision(2), revision(1, { name: 'As ordered', savedBy: null })]),
    'GET /api/builds/b1/comparison': json(comparison),
    ...routes,
  })
  const bases: number[] = []
  const Face = defineComponent({
    setup() {
      useDiagramStore().canEdit = mayEdit
      provide(openBuildKey, {
        buildId: 'b1',
        summary: shallowRef(null),
        state: ref({ kind: 'saved' as const, revision: 3 }),
        carryOut: async (_words, act) => {
          bases.push(3)
          await act(3)
        },
      })
      return () => h(BuildHistory)
    },
  })
  const page = await mountPage(Face)
  await flushPromises()
  const press = async (name: string) => {
    const found = [...document.querySelectorAll('button')].find(
      (button) => (button.getAttribute('aria-label') ?? button.textContent)?.trim() === name,
    )
    if (!found) throw new Error(`no button "${name}"`)
    found.click()
    await flushPromises()
    await flushPromises()
  }
  return { ...page, server, press, bases }
}

describe('the history of a build', () => {
  it('lists revisions with their words and names, and tells the author who is gone as a former member', async () => {
    await show()
    for (const told of ['Edit 3', 'Irma Solberg, the newest', 'As ordered', 'former member'])
      expect(words()).toContain(told)
  })

  it('asks for older ones from where the page ends', async () => {
    const page = Array.from({ length: revisionsPageSize }, (_, i) => revision(60 - i))
    const { server, press } = await show({ [list]: [json(page), json([revision(10, { label: 'Oldest' })])] })
    await press('Show older revisions')
    expect(words()).toContain('Oldest')
    expect(server.seen.at(-1)?.path).toContain('before=11')
  })

  it('compares one with now: in words, findings lost, margins before and after', async () => {
    const { press } = await show()
    await press('Compare revision 1')
    for (const told of [
      'Revision 1 against now',
      'C7 moved from W2 outlet 3 to W4 outlet 1.',
      'No finding came.',
      'Findings lost 1',
      'W2 in: 4.4 A of 4.5 A.',
      '+0.1 A',
      '3.0 of 4.5 A at cold start',
      'more left',
    ])
      expect(words()).toContain(told)
    await press('Compare revision 2')
    expect(words()).toContain('Revision 1 against revision 2')
    await press('What revision 3 changed')
    expect(words()).toContain('What revision 3 changed')
  })

  it('restores after asking, and offers the way back', async () => {
    const answer = json({ revision: 4, savedAt: '2026-12-01T10:00:00.000Z', merged: [] }, 201)
    const { server, press, bases } = await show({
      'POST /api/builds/b1/revisions/2/restore': answer,
      'POST /api/builds/b1/revisions/3/restore': answer,
    })
    await press('Restore revision 2')
    expect(server.of('POST', '/api/builds/b1/revisions/2/restore')).toHaveLength(0)
    await press('Restore revision 2')
    const dialog = document.querySelector('[role="dialog"]')
    const buttons = [...(dialog?.querySelectorAll('button') ?? [])]
    buttons.find((button) => button.textContent?.trim() === 'Restore revision 2')?.click()
    await flushPromises()
    await flushPromises()
    const [sent] = server.of('POST', '/api/builds/b1/revisions/2/restore')
    expect(sent?.body).toMatchObject({ base: 3 })
    const notice = useNotices().notices.value.at(-1)
    expect(notice?.text).toBe('The build is as it was in revision 2.')
    await notice?.action?.run()
    expect(server.of('POST', '/api/builds/b1/revisions/3/restore')).toHaveLength(1)
    expect(bases).toEqual([3, 3])
  })

  it('writes a name and a note in place, and keeps what was typed where the server refuses', async () => {
    const { wrapper, server, press } = await show({
      'PATCH /api/builds/b1/revisions/3': [problem('forbidden'), json(revision(3, { name: 'Built' }))],
    })
    await press('Name and note of revision 3')
    const form = wrapper.get('li form')
    await form.get('input').setValue('Built')
    await form.trigger('submit')
    await flushPromises()
    expect(useNotices().notices.value.at(-1)?.text).toContain('The words of revision 3 stay.')
    expect((wrapper.get('li form input').element as HTMLInputElement).value).toBe('Built')
    await wrapper.get('li form').trigger('submit')
    await flushPromises()
    expect(wrapper.find('li form').exists()).toBe(false)
    expect(server.of('PATCH', '/api/builds/b1/revisions/3').at(-1)?.body).toEqual({ name: 'Built', note: '' })
  })

  it('offers readers nothing that they may not do', async () => {
    await show({}, false)
    expect(words()).toContain('Compare')
    expect(words()).not.toContain('Restore')
    expect(words()).not.toContain('Edit words')
  })
})
