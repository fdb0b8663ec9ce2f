import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { openBuildSchema } from '#shared/contract/build.ts'
import { cellCorner, labelSheets, type KnownSheet, type LabelSheet } from '#shared/paper/labels/sheet.ts'
import { pdfBoxes, pdfWords } from '../helpers/pdf.ts'
import { startApi, type Api, type Client } from './support/api.ts'
import { edit, save, serial } from './support/documents.ts'

let api: Api
let owner: Client
let buildId: string

beforeAll(async () => {
  api = await startApi()
  owner = await api.person()
  const made = await owner.post('/api/builds', { name: 'Ärkiv, north room', example: 'north-room' })
  buildId = openBuildSchema.parse(made.body).id
})
afterAll(() => api.close())

const plain = ({ source: _, ...sheet }: KnownSheet): LabelSheet => sheet
const sheetOf = (id: string) => plain(labelSheets.find((sheet) => sheet.id === id)!)
const ask = (more: object = {}) =>
  owner.post(`/api/builds/${buildId}/labels`, {
    groups: ['power', 'data', 'tray', 'spare'],
    sheet: sheetOf('a4-21'),
    ...more,
  })
const pdfOf = async (more: object = {}): Promise<Buffer> => {
  const response = await ask(more)
  expect(response.status, response.text).toBe(200)
  return response.body as Buffer
}

describe('a sheet of labels as PDF', () => {
  test('is named after build and revision', async () => {
    const response = await ask()
    expect(response.headers['content-type']).toBe('application/pdf')
    expect(response.headers['content-disposition']).toContain(
      "filename*=UTF-8''%C3%84rkiv%2C%20north%20room%20labels%20revision%201.pdf",
    )
  })

  test.each(labelSheets.map((sheet) => [sheet.name, plain(sheet)] as const))(
    '%s: page and edges lie within 0.3 mm of its geometry',
    async (_, sheet) => {
      const [page] = await pdfBoxes(await pdfOf({ sheet, edges: true, groups: ['power', 'data'], start: 1 }))
      expect(Math.abs(page!.width_mm - sheet.pageWidth_mm)).toBeLessThan(0.3)
      expect(Math.abs(page!.height_mm - sheet.pageHeight_mm)).toBeLessThan(0.3)
      const cells = Math.min(page!.boxes.length, sheet.columns * sheet.rows - 1)
      expect(cells).toBeGreaterThan(10)
      for (let cell = 1; cell <= cells; cell++) {
        const corner = cellCorner(sheet, cell)
        const box = page!.boxes[cell - 1]!
        const off = [
          box.x - corner.x,
          box.y - corner.y,
          box.width - sheet.labelWidth_mm,
          box.height - sheet.labelHeight_mm,
        ]
        expect(Math.max(...off.map(Math.abs)), `cell ${cell}`).toBeLessThan(0.3)
      }
    },
  )

  test('has its words as text, each inside the label it belongs to', async () => {
    const sheet = sheetOf('a4-21')
    const pages = await pdfWords(await pdfOf({ groups: ['tray'] }))
    const words = pages.flatMap((page) => page)
    expect(words.map(({ text }) => text)).toEqual(expect.arrayContaining(['RVN3T1101', 'RVN3T1108', 'RVNB0001']))
    const serialOf = words.find(({ text }) => text === 'RVN3T1105')!
    const corner = cellCorner(sheet, 4)
    expect(serialOf.left).toBeGreaterThan(corner.x)
    expect(serialOf.right).toBeLessThan(corner.x + sheet.labelWidth_mm)
    expect(serialOf.top).toBeGreaterThan(corner.y)
    expect(serialOf.bottom).toBeLessThan(corner.y + sheet.labelHeight_mm)
  })

  test('prints only what changed since a revision', async () => {
    const saved = await owner.post(
      `/api/builds/${buildId}/revisions`,
      save(1, edit('Serial', serial('c3', 'NEW00042'))),
    )
    expect(saved.status, saved.text).toBe(201)
    const words = (await pdfWords(await pdfOf({ since: 1 }))).flat().map(({ text }) => text)
    expect(words).toContain('NEW00042')
    expect(words.filter((word) => word.startsWith('RVN'))).toEqual([])
    const old = (await pdfWords(await pdfOf({ revision: 1, groups: ['tray'] }))).flat().map(({ text }) => text)
    expect(old).toContain('RVN3T1103')
  })

  test('says where there is nothing to print, and refuses a sheet that runs over its page', async () => {
    expect((await ask({ since: 2 })).status).toBe(400)
    const wide = await ask({ sheet: { ...sheetOf('a4-21'), columns: 9 } })
    expect(wide.status).toBe(400)
    expect(JSON.stringify(wide.body)).toContain('beyond the page')
    expect((await ask({ revision: 99 })).status).toBe(404)
  })
})
