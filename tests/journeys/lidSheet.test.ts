import { readFileSync } from 'node:fs'
import type { BrowserContext, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { useBrowser } from '../helpers/browser.ts'
import { askPoppler, codeOn, pdfPictures, squeezed } from '../helpers/scan.ts'
import { startProduct, type Product } from '../helpers/server.ts'
import { buildIdOf, signInDemo } from '../helpers/signIn.ts'
import { example, lidOf } from '../shared/paper/lid/sample.ts'

const machines = ['north-room', 'projection-24', 'stress-60'] as const

describe('the lid sheet, from the screen to paper', () => {
  const browser = useBrowser()
  let product: Product

  beforeAll(async () => {
    product = await startProduct()
  })
  afterAll(() => product.stop())

  const openSheet = async (context: BrowserContext, id: string): Promise<{ page: Page; address: string }> => {
    await signInDemo(context, product.url, 'irma')
    const buildId = await buildIdOf(context, product.url, example(id).name)
    const address = `${product.url}/builds/${buildId}`
    const page = await context.newPage()
    // The window to print in would wait for somebody to close it.
    await page.addInitScript('window.print = () => undefined')
    await page.goto(`${address}?show=lid`)
    await page
      .getByRole('status')
      .filter({ hasText: /Lid sheet on \d+ pages/ })
      .waitFor()
    return { page, address }
  }

  it.each(machines)(
    '%s: prints its pages and nothing else, with every serial and way, and its code opens it',
    async (id) => {
      const context = await browser.newContext()
      const { page, address } = await openSheet(context, id)
      const shown = await page.getByRole('list', { name: 'Pages of the sheet' }).getByRole('listitem').count()
      await page.getByRole('button', { name: 'Print sheet' }).click()
      const pdf = await page.pdf({ preferCSSPageSize: true, printBackground: true })

      const info = askPoppler('pdfinfo', pdf)
      expect(info).toMatch(new RegExp(`Pages: +${shown}\n`))
      expect(info).toMatch(/Page size: +(594\.9|595\.\d+|612)/)
      const text = squeezed(askPoppler('pdftotext', pdf))
      for (const { serial, power, data } of lidOf(example(id)).content.drives)
        for (const words of [serial, power, data]) expect(text).toContain(squeezed(words))
      expect(text).not.toContain('DownloadPDF')
      expect(codeOn(pdfPictures(pdf, 150, 1)[0]!)).toBe(address)
    },
  )

  it('gives the same sheet as a PDF, the tables and the words to take away', async () => {
    const context = await browser.newContext({ acceptDownloads: true })
    const { page, address } = await openSheet(context, 'north-room')
    const take = async (act: () => Promise<void>) => {
      const [download] = await Promise.all([page.waitForEvent('download'), act()])
      return { name: download.suggestedFilename(), file: readFileSync(await download.path()) }
    }
    const pdf = await take(() => page.getByRole('button', { name: 'Download PDF' }).click())
    expect(pdf.name).toBe('north-room-as-found-lid-sheet-revision-1.pdf')
    expect(codeOn(pdfPictures(pdf.file, 150, 1)[0]!)).toBe(address)
    expect(squeezed(askPoppler('pdftotext', pdf.file))).toContain('RVN3T1107T1lead2,outlet1>W22>W32>W9leg3')

    const fromMenu = async (name: string) => {
      await page.getByRole('button', { name: 'More files' }).click()
      return take(() => page.getByRole('menuitem', { name }).click())
    }
    const table = await fromMenu('Table of drives (CSV)')
    expect(table.name).toBe('north-room-as-found-drives-revision-1.csv')
    expect(table.file.toString()).toContain('07,C7,RVN3T1107,3 TB SAS,data,')
    const words = await fromMenu('Text for a forum or ticket')
    expect(words.name).toBe('north-room-as-found-revision-1.txt')
    expect(words.file.toString()).toContain('bay 7: C7')

    const picture = await take(() => page.getByRole('button', { name: 'Page 1 as picture (PNG)' }).click())
    expect(picture.name).toBe('north-room-as-found-lid-sheet-page-1-revision-1.png')
    expect(picture.file.readUInt32BE(16)).toBeGreaterThan(2000)
  })
})
