import { readFileSync } from 'node:fs'
import type { Download, Page } from 'playwright-core'
import { PNG } from 'pngjs'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { indexCatalog } from '#shared/catalog/catalog.ts'
import { readBuildText } from '#shared/build/read.ts'
import { loadCatalogFiles } from '../../server/services/catalogFiles.ts'
import { useBrowser } from '../helpers/browser.ts'
import { startProduct, type Product } from '../helpers/server.ts'

const catalog = indexCatalog(loadCatalogFiles())
const nameOf = (id: string): string => {
  const model = catalog.models.get(id)
  if (!model) throw new Error(`the catalog has no "${id}"`)
  return model.name
}

/** Places parts from the shelf with the keyboard: search, how many, Enter. */
async function place(page: Page, id: string, many = 1): Promise<void> {
  await page.getByRole('searchbox', { name: 'Search parts' }).fill(nameOf(id))
  const item = page.getByRole('button', { name: `${nameOf(id)}. Enter places one.`, exact: true })
  await item.focus()
  if (many > 1) {
    await page.getByRole('spinbutton', { name: 'How many' }).fill(String(many))
    await page.getByRole('spinbutton', { name: 'How many' }).press('Tab')
    await page.getByRole('button', { name: `Add ${many} in the next free bays` }).click()
  } else await item.press('Enter')
}

async function fileOf(download: Download): Promise<Buffer> {
  return readFileSync(await download.path())
}

const faults = (page: Page) => page.getByRole('region', { name: 'Findings: fault' })
const saved = (page: Page, revision: RegExp) => page.getByRole('status').filter({ hasText: revision })

describe('the main job, from sign-in to picture', () => {
  const browser = useBrowser()
  let product: Product

  beforeAll(async () => {
    product = await startProduct({ demo: false })
  })
  afterAll(() => product.stop())

  it('registers, draws, sees the overload, mends it, saves, comes back and takes the picture away', async () => {
    const page = await browser.newPage({ acceptDownloads: true })

    await page.goto(`${product.url}/register`)
    await page.getByLabel('Name').fill('Builder')
    await page.getByLabel('E-mail').fill('builder@reelvault.example')
    await page.getByLabel('Password', { exact: true }).fill('nine reels and a splice')
    await page.getByRole('button', { name: 'Create account' }).click()
    await page.getByRole('button', { name: 'New build' }).first().click()
    await page.getByLabel('Name').fill('Reel shelf')
    await page.getByRole('button', { name: 'Create build' }).click()
    await page.getByRole('heading', { name: 'Reel shelf' }).waitFor()

    await page.getByRole('searchbox', { name: 'Search parts' }).waitFor()
    await place(page, 'case-tower-12')
    await place(page, 'supply-atx-650')
    await place(page, 'hdd-35-7200-sata-4tb', 4)
    await place(page, 'lead-sata-4-a')

    const connect = async (ref: string, connector: RegExp) => {
      await page.getByRole('button', { name: `Remove ${ref}` }).waitFor()
      await page.getByRole('button', { name: 'Connect…', exact: true }).click()
      const dialog = page.getByRole('dialog', { name: `Connect ${ref} to…` })
      await dialog.getByRole('button', { name: connector }).first().click()
      await dialog.waitFor({ state: 'hidden' })
    }
    const outletsToBays = async () => {
      await page.getByRole('button', { name: 'Connect outlets…' }).click()
      await page.getByRole('button', { name: 'Make 4 joints' }).click()
      await page.getByRole('dialog').waitFor({ state: 'hidden' })
    }
    await connect('W1', /^T1\b/)
    await place(page, 'splitter-sata-4')
    await connect('W2', /^W1\./)
    await outletsToBays()

    await page.getByRole('tab', { name: 'Findings' }).click()
    const overload = faults(page).getByRole('button', { name: /W2 in carries 8\.0 A of 4\.5 A/ })
    await overload.waitFor()
    await page.getByRole('button', { name: 'Undo' }).click()
    await overload.waitFor({ state: 'hidden' })
    await page.getByRole('button', { name: 'Redo' }).click()
    await overload.click()
    await page
      .getByText(/Feed 2 drives of these 4 another way/)
      .first()
      .waitFor()

    await page.getByRole('button', { name: 'Undo' }).click()
    await overload.waitFor({ state: 'hidden' })
    await page.getByRole('button', { name: 'Joints', exact: true }).click()
    await page.getByRole('button', { name: 'Wiring', exact: true }).click()
    await saved(page, /^saved, revision \d+$/).waitFor()

    const asked = page.url()
    await page.reload()
    await page.getByRole('heading', { name: 'Reel shelf' }).waitFor()
    expect(page.url()).toBe(asked)
    await saved(page, /^saved, revision \d+$/).waitFor()
    await page.getByRole('button', { name: 'Bays', exact: true }).click()
    for (const drive of ['C1', 'C2', 'C3', 'C4']) await page.getByText(drive, { exact: true }).first().waitFor()
    await page.getByRole('button', { name: 'Wiring', exact: true }).click()

    const take = async (what: string) => {
      const [download] = await Promise.all([
        page.waitForEvent('download'),
        page
          .getByRole('button', { name: 'Export' })
          .click()
          .then(() => page.getByRole('menuitem', { name: what }).click()),
      ])
      return download
    }
    const picture = await take('Picture (PNG)')
    expect(picture.suggestedFilename()).toMatch(/reel-shelf.*\.png$/i)
    const png = PNG.sync.read(await fileOf(picture))
    expect(Math.min(png.width, png.height)).toBeGreaterThan(600)
    const tally = { light: 0, ink: 0 }
    for (let i = 0; i < png.data.length; i += 4) {
      const sum = png.data[i]! + png.data[i + 1]! + png.data[i + 2]!
      if (sum > 720) tally.light++
      else if (sum < 240) tally.ink++
    }
    const pixels = png.width * png.height
    expect(tally.light / pixels).toBeGreaterThan(0.6)
    expect(tally.ink / pixels).toBeGreaterThan(0.002)

    const drawing = (await fileOf(await take('Drawing (SVG)'))).toString('utf8')
    for (const words of ['Reel shelf', 'T1', 'W1', 'C1', 'C4', 'Revision']) expect(drawing).toContain(words)

    const exported = await page.request.get(`${product.url}/api${new URL(asked).pathname}/export`)
    const read = readBuildText(await exported.text(), catalog)
    expect(read.ok && read.document.parts.map((part) => part.ref).sort()).toEqual(
      ['A1', 'C1', 'C2', 'C3', 'C4', 'T1', 'W1', 'W2'].sort(),
    )
  })
})
