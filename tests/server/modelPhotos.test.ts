import sharp from 'sharp'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { ownModelSchema } from '#shared/contract/catalog.ts'
import { ModelPhoto } from '../../server/models/index.ts'
import { loadCatalogFiles } from '../../server/services/catalogFiles.ts'
import { startApi, type Api, type Client } from './support/api.ts'

let api: Api
let owner: Client
let other: Client
const cable = loadCatalogFiles().models.find(({ kind }) => kind === 'cable')!
const id = 'own-cable'
const address = `/api/own-models/${id}/photo`

beforeAll(async () => {
  api = await startApi()
  owner = await api.person()
  other = await api.person()
  await owner.put(`/api/own-models/${id}`, { model: { ...cable, id } })
})
afterAll(() => api.close())

/** A photo as phones make them: lying on its side, with a place in its data. */
const phonePhoto = () =>
  sharp({ create: { width: 2400, height: 1200, channels: 3, background: '#c63' } })
    .jpeg()
    .withExif({ IFD0: { Make: 'Invented' }, IFD3: { GPSLatitude: '50/1 0/1 0/1' } })
    .withMetadata({ orientation: 6 })
    .toBuffer()
const put = (client: Client, bytes: Buffer, type = 'image/jpeg') =>
  client.send('put', address, bytes, { 'content-type': type })
const photoOf = async (client: Client) =>
  ownModelSchema
    .array()
    .parse((await client.get('/api/own-models')).body)
    .find((own) => own.id === id)?.photo

describe('a photo of a label', () => {
  test('is drawn anew: upright, bounded, as WebP, without place or camera', async () => {
    const original = await phonePhoto()
    expect((await sharp(original).metadata()).exif).toBeDefined()
    const answer = await put(owner, original)
    expect(answer.status, answer.text).toBe(200)
    const seen = await owner.get(address)
    expect(seen.headers['content-type']).toBe('image/webp')
    const kept = await sharp(seen.body as Buffer).metadata()
    expect([kept.format, kept.width, kept.height]).toEqual(['webp', 800, 1600])
    expect(kept.exif).toBeUndefined()
    expect((seen.body as Buffer).includes('Invented')).toBe(false)
  })

  test('is served as a picture and nothing else, and kept by its version', async () => {
    const seen = await owner.get(address)
    expect(seen.headers['content-disposition']).toBe('inline; filename="label-own-cable.webp"')
    expect(seen.headers['x-content-type-options']).toBe('nosniff')
    expect(seen.headers['content-security-policy']).toBe("default-src 'none'; sandbox")
    const version = await photoOf(owner)
    expect(seen.headers['etag']).toBe(`"${version}"`)
    expect((await owner.get(address, { 'if-none-match': `"${version}"` })).status).toBe(304)
  })

  test('belongs to its owner alone', async () => {
    await other.put(`/api/own-models/${id}`, { model: { ...cable, id } })
    expect((await other.get(address)).status).toBe(404)
    expect((await other.delete(address)).status).toBe(404)
    expect((await (await api.visitor()).get(address)).status).toBe(401)
    expect(await photoOf(owner)).toBeDefined()
  })

  test('is taken as PNG and WebP too, whatever the sender calls it', async () => {
    const plain = sharp({ create: { width: 20, height: 10, channels: 3, background: '#333' } })
    expect((await put(owner, await plain.clone().png().toBuffer(), 'image/jpeg')).status).toBe(200)
    expect((await put(owner, await plain.clone().webp().toBuffer(), 'image/png')).status).toBe(200)
    const kept = await sharp((await owner.get(address)).body as Buffer).metadata()
    expect([kept.width, kept.height]).toEqual([20, 10])
  })

  test.each([
    ['a drawing with a script in it', Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"><script/></svg>')],
    ['a page', Buffer.from('<!doctype html><script>1</script>')],
    ['half a picture', Buffer.from([0xff, 0xd8, 0xff, 0xe0, 0, 16, 1, 2, 3])],
    ['nothing', Buffer.alloc(0)],
  ])('is refused as %s', async (_what, bytes) => {
    const answer = await put(owner, bytes)
    expect(answer.status).toBe(400)
    expect(await photoOf(owner)).toBeDefined()
  })

  test('is refused where its type is no picture, and where it is too large', async () => {
    expect((await put(owner, await phonePhoto(), 'application/octet-stream')).status).toBe(400)
    const large = Buffer.concat([Buffer.from([0xff, 0xd8, 0xff]), Buffer.alloc(13 * 1024 * 1024)])
    expect((await put(owner, large)).status).toBe(413)
  })

  test('needs a model of one’s own', async () => {
    const answer = await owner.send('put', '/api/own-models/no-such/photo', await phonePhoto(), {
      'content-type': 'image/jpeg',
    })
    expect(answer.status).toBe(404)
  })

  test('comes back with a model that is put back, and is forgotten a day after it was not', async () => {
    const model = { ...cable, id }
    await owner.delete(`/api/own-models/${id}`)
    expect((await owner.get(address)).status).toBe(404)
    await owner.put(`/api/own-models/${id}`, { model })
    expect((await owner.get(address)).status).toBe(200)
    await owner.put('/api/own-models/own-second', { model: { ...cable, id: 'own-second' } })
    await owner.delete(`/api/own-models/${id}`)
    const userId = owner.user!.id
    await ModelPhoto.update({ savedAt: new Date('2020-01-01') }, { where: { userId, modelId: id } })
    const photo = await phonePhoto()
    await owner.send('put', '/api/own-models/own-second/photo', photo, { 'content-type': 'image/jpeg' })
    expect((await ModelPhoto.findAll({ where: { userId } })).map(({ modelId }) => modelId)).toEqual(['own-second'])
  })

  test('is removed', async () => {
    const second = '/api/own-models/own-second/photo'
    expect((await owner.delete(second)).status).toBe(204)
    expect((await owner.get(second)).status).toBe(404)
  })
})
