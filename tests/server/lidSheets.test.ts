import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { openBuildSchema } from '#shared/contract/build.ts'
import { askPoppler, codeOn, pdfPictures, squeezed } from '../helpers/scan.ts'
import { example, lidOf } from '../shared/paper/lid/sample.ts'
import { startApi, type Api, type Client } from './support/api.ts'

let api: Api
let owner: Client
const builds = new Map<string, string>()

beforeAll(async () => {
  api = await startApi()
  owner = await api.person()
  for (const id of ['north-room', 'projection-24', 'stress-60']) {
    const made = await owner.post('/api/builds', { name: `Ärkiv ${id}`, example: id })
    builds.set(id, openBuildSchema.parse(made.body).id)
  }
})
afterAll(() => api.close())

const address = 'https://plans.reelvault.example/links/vault-north-room-0123456789'
const ask = (id: string, more: object = {}, who = owner) =>
  who.post(`/api/builds/${builds.get(id)}/lid-sheet`, { date: '2026-12-01', address, ...more })
const pdfOf = async (id: string, more: object = {}): Promise<Buffer> => {
  const response = await ask(id, more)
  expect(response.status, response.text).toBe(200)
  return response.body as Buffer
}

describe('the lid sheet as PDF', () => {
  test('is named after build and revision', async () => {
    const response = await ask('north-room')
    expect(response.headers['content-type']).toBe('application/pdf')
    expect(response.headers['content-disposition']).toContain(
      "filename*=UTF-8''%C3%84rkiv%20north-room%20lid%20sheet%20revision%201.pdf",
    )
  })

  test.each(['north-room', 'projection-24', 'stress-60'])(
    '%s: every serial and both ways of every drive can be read out of it',
    async (id) => {
      const text = squeezed(
        askPoppler('pdftotext', await pdfOf(id, { diagram: id === 'north-room' ? 'pages' : 'none' })),
      )
      const { drives } = lidOf(example(id)).content
      expect(drives.length).toBeGreaterThan(9)
      for (const { serial, power, data } of drives)
        for (const words of [serial, power, data]) expect(text).toContain(squeezed(words))
    },
  )

  test('carries title, language, tags and its own typeface', async () => {
    const pdf = await pdfOf('north-room', { paper: 'letter' })
    const info = askPoppler('pdfinfo', pdf)
    expect(info).toMatch(/Title: +Ärkiv north-room \(RV-N-01\), lid sheet, revision 1/)
    expect(info).toMatch(/Tagged: +yes/)
    expect(info).toMatch(/Page size: +612 x 792 pts \(letter\)/)
    expect(pdf.includes('/Lang (en)')).toBe(true)
    expect(pdf.includes('/Outlines')).toBe(true)
    const fonts = askPoppler('pdffonts', pdf).split('\n').slice(2).filter(Boolean)
    expect(fonts.length).toBeGreaterThan(1)
    for (const font of fonts) expect(font).toMatch(/NotoSans.* yes yes yes /)
  })

  test.each(['a4', 'a5', 'letter'])('has a code on %s that opens the address given', async (paper) => {
    const [first] = pdfPictures(await pdfOf('north-room', { paper, diagram: 'none' }), 150, 1)
    expect(codeOn(first!)).toBe(address)
  })

  test('takes an address of a page only, and none is none', async () => {
    expect((await ask('north-room', { address: 'javascript:alert(1)' })).status).toBe(400)
    const [first] = pdfPictures(await pdfOf('north-room', { address: '', diagram: 'none' }), 150, 1)
    expect(codeOn(first!)).toBeNull()
  })

  test('is not there for strangers', async () => {
    expect((await ask('north-room', {}, await api.person())).status).toBe(404)
  })

  test('of a revision that there is not is refused', async () => {
    expect((await ask('north-room', { revision: 99 })).status).toBe(404)
  })
})
