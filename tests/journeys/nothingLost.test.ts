import type { BrowserContext, Page, Route } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { z } from 'zod'
import { useBrowser } from '../helpers/browser.ts'
import { startProduct, type Product } from '../helpers/server.ts'
import { signInDemo } from '../helpers/signIn.ts'

const openedSchema = z.object({ id: z.string(), revision: z.number(), document: z.object({ name: z.string() }) })

describe('no edit is lost', () => {
  const browser = useBrowser()
  let product: Product

  beforeAll(async () => {
    product = await startProduct()
  })
  afterAll(() => product.stop())

  /** A person with a build of their own, made from an example. */
  async function begin() {
    const context = await browser.newContext()
    await signInDemo(context, product.url, 'admin')
    const { csrfToken } = z
      .object({ csrfToken: z.string() })
      .parse(await (await context.request.get(`${product.url}/api/session`)).json())
    const post = (path: string, data: unknown) =>
      context.request.post(product.url + path, { data, headers: { 'x-csrf-token': csrfToken } })
    const made = await post('/api/builds', { name: 'First name', example: 'north-room-clean' })
    const build = openedSchema.parse(await made.json())
    const onServer = async () =>
      openedSchema.parse(await (await context.request.get(`${product.url}/api/builds/${build.id}`)).json())
    return { context, build, post, onServer }
  }

  async function open(context: BrowserContext, id: string): Promise<Page> {
    const page = await context.newPage()
    await page.goto(`${product.url}/builds/${id}`)
    await page.getByText(/^saved, revision/).waitFor()
    return page
  }

  async function rename(page: Page, name: string): Promise<void> {
    await page.getByRole('button', { name: 'Settings', exact: true }).click()
    const dialog = page.getByRole('dialog', { name: 'Build settings' })
    await dialog.getByLabel('Name', { exact: true }).fill(name)
    await dialog.getByRole('button', { name: 'Change settings' }).click()
    await dialog.waitFor({ state: 'hidden' })
    await page.getByRole('heading', { name, level: 1 }).waitFor()
  }

  const saves = '**/api/builds/*/revisions'

  it('keeps edits without a connection through a reload, and sends them when it is back', async () => {
    browser.expectComplaint(/ERR_FAILED/)
    const { context, build, onServer } = await begin()
    const page = await open(context, build.id)
    await context.route(saves, (route) => route.abort())
    await rename(page, 'Named without a connection')
    await page.getByText('not saved: no connection, kept on this computer').waitFor()
    await page.reload()
    await page.getByRole('heading', { name: 'Named without a connection' }).waitFor()
    expect((await onServer()).document.name).toBe('First name')
    await context.unroute(saves)
    await page.getByText(`saved, revision ${build.revision + 1}`).waitFor()
    expect((await onServer()).document.name).toBe('Named without a connection')
  })

  it('hands the unsaved work of a closed tab to the next one', async () => {
    browser.expectComplaint(/ERR_FAILED/)
    const { context, build, onServer } = await begin()
    const first = await open(context, build.id)
    await context.route(saves, (route) => route.abort())
    await rename(first, 'Named in a closed tab')
    await first.getByText('not saved: no connection, kept on this computer').waitFor()
    await first.close()
    await context.unroute(saves)
    const second = await context.newPage()
    await second.goto(`${product.url}/builds/${build.id}`)
    await second.getByRole('heading', { name: 'Named in a closed tab' }).waitFor()
    await second.getByText(`saved, revision ${build.revision + 1}`).waitFor()
    expect((await onServer()).document.name).toBe('Named in a closed tab')
  })

  it('counts a save once when its answer gets lost', async () => {
    browser.expectComplaint(/ERR_FAILED/)
    const { context, build, onServer } = await begin()
    const page = await open(context, build.id)
    let lost = 0
    const loseFirst = async (route: Route) => {
      if (lost++ > 0) return route.continue()
      await route.fetch()
      await route.abort()
    }
    await context.route(saves, loseFirst)
    await rename(page, 'Answered to nobody')
    await page.getByText(`saved, revision ${build.revision + 1}`).waitFor()
    expect(lost).toBeGreaterThan(1)
    expect((await onServer()).revision).toBe(build.revision + 1)
  })

  it('lets two tabs work on one build', async () => {
    const { context, build, onServer } = await begin()
    const one = await open(context, build.id)
    const two = await open(context, build.id)
    await rename(one, 'Named in tab one')
    await one.getByText(`saved, revision ${build.revision + 1}`).waitFor()
    await two.getByRole('heading', { name: 'Named in tab one' }).waitFor()
    await rename(two, 'Named in tab two')
    await two.getByText(`saved, revision ${build.revision + 2}`).waitFor()
    await one.getByRole('heading', { name: 'Named in tab two' }).waitFor()
    expect((await onServer()).revision).toBe(build.revision + 2)
  })

  it('shows both sides of a clash and saves what is chosen', async () => {
    browser.expectComplaint(/409/)
    const { context, build, post, onServer } = await begin()
    const page = await open(context, build.id)
    // Others' saves come in at once: only one that crosses one's own on its way is a clash.
    let release = () => {}
    const held = new Promise<void>((resolve) => (release = resolve))
    await context.route(saves, async (route) => {
      await held
      await route.continue()
    })
    await rename(page, 'My name')
    await post(`/api/builds/${build.id}/revisions`, {
      base: build.revision,
      requestId: crypto.randomUUID(),
      edits: [{ label: 'Rename', changes: [{ op: 'rename', name: 'Their name' }] }],
    })
    release()
    const dialog = page.getByRole('dialog', { name: 'Somebody else changed the same parts' })
    await dialog.getByText('Their name').waitFor()
    await dialog.getByText('My name').waitFor()
    await dialog.getByRole('radio').first().check()
    await dialog.getByRole('button', { name: 'Save with these choices' }).click()
    await page.getByText(`saved, revision ${build.revision + 2}`).waitFor()
    expect((await onServer()).document.name).toBe('My name')
  })
})
