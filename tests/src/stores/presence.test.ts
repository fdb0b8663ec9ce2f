import { createPinia, setActivePinia } from 'pinia'
import { beforeEach, expect, it } from 'vitest'
import { happeningSchema } from '#shared/contract/activity.ts'
import { allBuildQueries, queriesOf } from '../../../src/composables/liveQueries.ts'
import { ownTab, usePresenceStore } from '../../../src/stores/presence.ts'

beforeEach(() => setActivePinia(createPinia()))

const teo = { kind: 'member', userId: 'u2', name: 'Teo Marchetti' } as const
const rune = { kind: 'guest', guestId: 'g1', name: 'Rune' } as const

it('shows others once each, in however many tabs, and never oneself', () => {
  const store = usePresenceStore()
  store.ownId = 'u1'
  store.present = [
    { tab: ownTab, by: { kind: 'member', userId: 'u1', name: 'Irma Solberg' }, chosen: ['p1'] },
    { tab: 't2', by: { kind: 'member', userId: 'u1', name: 'Irma Solberg' }, chosen: ['p1'] },
    { tab: 't3', by: teo, chosen: ['p1'] },
    { tab: 't4', by: teo, chosen: ['p2', 'p1'] },
    { tab: 't5', by: rune, chosen: [] },
  ]
  expect(store.others.map(({ name, initials, isGuest }) => [name, initials, isGuest])).toEqual([
    ['Rune', 'R', true],
    ['Teo Marchetti', 'TM', false],
  ])
  expect(store.byChosen.get('p1')?.map(({ name }) => name)).toEqual(['Teo Marchetti'])
  expect(store.byChosen.get('p2')?.map(({ name }) => name)).toEqual(['Teo Marchetti'])
  expect(store.byChosen.has('p3')).toBe(false)
})

it.each(happeningSchema.options.map((option) => option.shape.kind.value))('%s makes something old', (kind) => {
  const keys = queriesOf(kind)
  expect(keys).toContain('activity')
  expect(keys.length).toBeGreaterThan(1)
  for (const key of keys) expect([...allBuildQueries, 'builds']).toContain(key)
})
