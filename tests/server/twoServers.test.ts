import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { openBuildSchema, saveAnswerSchema } from '#shared/contract/build.ts'
import { startProduct, type Product } from '../helpers/server.ts'
import { makeClient, type Client } from './support/api.ts'
import { addCable, cablesDocument, edit, save } from './support/documents.ts'
import { openEvents } from './support/eventStream.ts'

let here: Product
let there: Product
let client: Client
let buildId: string
let revision = 1
let cable = 10

beforeAll(async () => {
  here = await startProduct({ demo: false })
  there = await startProduct({ demo: false, beside: here })
  client = makeClient(here.url)
  await client.refreshToken()
  const account = { email: 'two@example.org', name: 'Two Servers', password: 'a reel of leader tape' }
  expect((await client.post('/api/accounts', account)).status).toBe(201)
  await client.refreshToken()
  const made = await client.post('/api/builds/import', { document: cablesDocument('Two', 2) })
  buildId = openBuildSchema.parse(made.body).id
})
afterAll(async () => {
  await there.stop()
  await here.stop()
})

/** The same person in a browser that reaches the other server. */
const clientThere = (): Client => {
  const other = makeClient(there.url)
  other.csrfToken = client.csrfToken
  for (const [name, value] of client.cookies) other.cookies.set(name, value)
  return other
}
const eventsAt = (product: Product, query = '', headers = {}) =>
  openEvents(product.url, client, `/api/builds/${buildId}/events${query}`, headers)

async function saveAt(at: Client): Promise<number> {
  const number = ++cable
  const answer = await at.post(
    `/api/builds/${buildId}/revisions`,
    save(revision, edit(`Add W${number}`, addCable(number))),
  )
  revision = saveAnswerSchema.parse(answer.body).revision
  return revision
}

test('what happens at one server reaches the browsers of the other, both ways', async () => {
  const [atHere, atThere] = await Promise.all([eventsAt(here), eventsAt(there)])
  await Promise.all([atHere.next('hello'), atThere.next('hello')])
  for (const at of [client, clientThere()]) {
    const saved = await saveAt(at)
    for (const reader of [atHere, atThere])
      expect((await reader.next('activity')).what).toMatchObject({ kind: 'revision-saved', revision: saved })
  }
  atHere.close()
  atThere.close()
})

test('people at different servers see each other, and what they have chosen', async () => {
  const [tabHere, tabThere] = [randomUUID(), randomUUID()]
  const atHere = await eventsAt(here, `?tab=${tabHere}`)
  await atHere.next('presence', (present) => present.length === 1)
  const atThere = await eventsAt(there, `?tab=${tabThere}`)
  const both = (present: readonly { tab: string }[]) =>
    [tabHere, tabThere].every((tab) => present.some((one) => one.tab === tab))
  await Promise.all([atHere.next('presence', both), atThere.next('presence', both)])
  // The word comes in at the server that does not hold the tab's stream.
  await client.put(`/api/builds/${buildId}/presence`, { tab: tabThere, chosen: ['p2'] })
  const chosen = (present: readonly { tab: string; chosen: string[] }[]) =>
    present.some((one) => one.tab === tabThere && one.chosen[0] === 'p2')
  await Promise.all([atHere.next('presence', chosen), atThere.next('presence', chosen)])
  atThere.close()
  await atHere.next('presence', (present) => present.length === 1)
  atHere.close()
})

test('a server that dies takes nothing with it: its browser comes back to the other and hears what it missed', async () => {
  const before = await eventsAt(there)
  await before.next('hello')
  await saveAt(client)
  const { eventId = '' } = await before.next('activity')
  await there.kill()
  await before.ended
  const missed = [await saveAt(client), await saveAt(client)]
  const after = await eventsAt(here, '', { 'last-event-id': eventId })
  for (const saved of missed)
    expect((await after.next('activity')).what).toMatchObject({ kind: 'revision-saved', revision: saved })
  after.close()
}, 60_000)
