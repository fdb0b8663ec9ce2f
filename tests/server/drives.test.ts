import { afterAll, beforeAll, expect, test } from 'vitest'
import { openBuildSchema } from '#shared/contract/build.ts'
import { foundDrivesSchema } from '#shared/contract/drives.ts'
import { BuildMember } from '../../server/models/index.ts'
import { startApi, type Api, type Client } from './support/api.ts'
import { cablesDocument, edit, save, serial } from './support/documents.ts'

let api: Api
let owner: Client
let stranger: Client
let buildId: string

beforeAll(async () => {
  api = await startApi({ settings: { RATE_LIMIT_FACTOR: '1000' } })
  owner = await api.person()
  stranger = await api.person()
  const document = cablesDocument('Vault', 3)
  const [first, ...others] = document.parts ?? []
  const parts = [{ ...first, serial: 'WD-AB 12_3', wwn: '5000c500abcdef01' }, ...others] as typeof document.parts
  buildId = openBuildSchema.parse(
    (await owner.post('/api/builds/import', { document: { ...document, parts } })).body,
  ).id
})
afterAll(() => api.close())

const find = async (by: Client, search: string) => {
  const response = await by.get(`/api/drives?search=${encodeURIComponent(search)}`)
  expect(response.status, response.text).toBe(200)
  return foundDrivesSchema.parse(response.body).items.map(({ ref, buildName }) => `${buildName} ${ref}`)
}
const saved = async (base: number, ...edits: ReturnType<typeof edit>[]) =>
  expect((await owner.post(`/api/builds/${buildId}/revisions`, save(base, ...edits))).status).toBe(201)

test('any part of serial or WWN finds the drive, whatever its case and blanks', async () => {
  for (const part of ['ab 12', 'AB12', '12_3', 'abcdef', '0x5000c500', 'c500abcdef01'])
    expect(await find(owner, part), part).toEqual(['Vault W1'])
})

test('signs that mean something to the database mean themselves', async () => {
  expect(await find(owner, '12%3')).toEqual([])
  expect(await find(owner, 'ab12.3')).toEqual([])
})

test('nobody finds what is in builds of others', async () => {
  expect(await find(stranger, 'AB12')).toEqual([])
  await BuildMember.create({ buildId, userId: stranger.user?.id ?? '', role: 'reader' })
  expect(await find(stranger, 'AB12')).toEqual(['Vault W1'])
})

test('a save changes what is found, and an archived build is not searched', async () => {
  await saved(1, edit('Write serial', serial('p2', 'ZX9988')), edit('Again', serial('p1', 'NEW777')))
  expect(await find(owner, 'X9988')).toEqual(['Vault W2'])
  expect(await find(owner, 'AB12')).toEqual([])
  await saved(2, edit('Remove', { op: 'removePart', id: 'p2' }))
  expect(await find(owner, 'X9988')).toEqual([])
  expect((await owner.post(`/api/builds/${buildId}/archive`)).status).toBe(200)
  expect(await find(owner, 'NEW777')).toEqual([])
})

test('too little to search by is refused by its place', async () => {
  const response = await owner.get('/api/drives?search=ab')
  expect(response.status).toBe(400)
  expect(response.body).toMatchObject({ errors: [{ path: 'search' }] })
})
