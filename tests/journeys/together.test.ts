import type { BrowserContext, Page, Route } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { z } from 'zod'
import { useBrowser } from '../helpers/browser.ts'
import { startProduct, type Product } from '../helpers/server.ts'
import { buildIdOf, signInDemo } from '../helpers/signIn.ts'

const saves = '**/api/builds/*/revisions'
const documentSchema = z.object({ document: z.object({ name: z.string(), machine: z.string().optional() }) })

describe('two people in one build', () => {
  const browser = useBrowser()
  let product: Product
  /** Found by its name once: the first journey gives it another. */
  let buildId: string | undefined

  beforeAll(async () => {
    product = await startProduct()
  })
  afterAll(() => product.stop())

  async function signedIn(name: string): Promise<BrowserContext> {
    const context = await browser.newContext({ reducedMotion: 'reduce' })
    await signInDemo(context, product.url, name)
    buildId ??= await buildIdOf(context, product.url, 'North room, as found')
    return context
  }

  async function inBuild(name: string): Promise<{ context: BrowserContext; page: Page }> {
    const context = await signedIn(name)
    const page = await context.newPage()
    await page.goto(`${product.url}/builds/${buildId}`)
    await page.getByText(/^saved, revision/).waitFor()
    return { context, page }
  }

  async function rename(page: Page, field: 'Name' | 'Machine', to: string): Promise<void> {
    await page.getByRole('button', { name: 'Settings', exact: true }).click()
    const dialog = page.getByRole('dialog', { name: 'Build settings' })
    await dialog.getByLabel(field, { exact: field === 'Name' }).fill(to)
    await dialog.getByRole('button', { name: 'Change settings' }).click()
    await dialog.waitFor({ state: 'hidden' })
  }

  async function post(context: BrowserContext, path: string, data: unknown): Promise<number> {
    const { csrfToken } = z
      .object({ csrfToken: z.string() })
      .parse(await (await context.request.get(`${product.url}/api/session`)).json())
    return (await context.request.post(product.url + path, { data, headers: { 'x-csrf-token': csrfToken } })).status()
  }

  it('see each other, merge what they do apart, and settle what they both did', async () => {
    browser.expectComplaint(/409/)
    const irma = await inBuild('irma')
    const teo = await inBuild('teo')

    // Who is here, and what they have chosen.
    const chip = irma.page.getByRole('list', { name: 'Also here' }).getByRole('button')
    await chip.waitFor()
    expect(await chip.getAttribute('aria-label')).toBe('Teo Marchetti has the build open')
    await teo.page.locator('.tag', { hasText: 'W3' }).first().click()
    await irma.page.getByRole('button', { name: 'Teo Marchetti has chosen W3' }).waitFor()
    await irma.page.locator('.tag', { hasText: 'W3' }).getByTitle('Chosen by Teo Marchetti').waitFor()

    // A comment stands at the other's screen at once.
    await irma.page.getByRole('tab', { name: 'Comments' }).click()
    const comment = {
      requestId: crypto.randomUUID(),
      pin: { kind: 'build' },
      about: 'the build',
      text: 'Two leads are thin here.',
    }
    expect(await post(teo.context, `/api/builds/${buildId}/threads`, comment)).toBe(201)
    await irma.page.getByText('Two leads are thin here.').first().waitFor()

    // What one does apart is in at the other's at once, without a reload.
    await rename(teo.page, 'Name', 'North room, as Teo found it')
    await irma.page.getByRole('heading', { name: 'North room, as Teo found it', level: 1 }).waitFor()
    await irma.page.getByText('saved, revision 2').waitFor()

    // What both did at the same moment is shown to the one who came second.
    let release = () => {}
    const held = new Promise<void>((resolve) => (release = resolve))
    const hold = async (route: Route) => {
      await held
      await route.continue()
    }
    await irma.context.route(saves, hold)
    await rename(irma.page, 'Name', 'The name of Irma')
    await rename(teo.page, 'Name', 'The name of Teo')
    await teo.page.getByText('saved, revision 3').waitFor()
    release()
    const dialog = irma.page.getByRole('dialog', { name: 'Somebody else changed the same parts' })
    await dialog.getByRole('cell', { name: 'The name of Teo' }).waitFor()
    await dialog.getByRole('cell', { name: 'The name of Irma' }).waitFor()
    await irma.context.unroute(saves, hold)
    await dialog.getByRole('button', { name: 'Save with these choices' }).click()
    await teo.page.getByRole('heading', { name: 'The name of Irma', level: 1 }).waitFor()
    const stored = documentSchema.parse(
      await (await teo.context.request.get(`${product.url}/api/builds/${buildId}`)).json(),
    )
    expect(stored.document.name).toBe('The name of Irma')

    // Undo is for one's own: Teo's name is not as he left it any more.
    await teo.page.getByRole('button', { name: /Undo/ }).first().click()
    await teo.page.getByRole('status').filter({ hasText: 'can no longer be undone' }).first().waitFor()

    // Leaving is seen as well.
    await teo.page.goto(`${product.url}/builds`)
    await chip.waitFor({ state: 'detached' })
  })

  it('are told at once what concerns them, each where it is to be seen', async () => {
    const irma = await signedIn('irma')
    const page = await (await signedIn('noor')).newPage()
    const { members } = z
      .object({ members: z.array(z.object({ user: z.object({ id: z.string(), name: z.string() }) })) })
      .parse(await (await irma.request.get(`${product.url}/api/builds/${buildId}/members`)).json())
    const asked = members.find(({ user }) => user.name === 'Noor Castellan')
    await page.goto(`${product.url}/builds`)
    await page.getByRole('button', { name: 'Notifications', exact: true }).waitFor()
    const question = 'Does W1 hold at start?'
    expect(await post(irma, `/api/builds/${buildId}/rounds`, { question, reviewers: [asked?.user.id] })).toBe(201)

    await page.getByRole('button', { name: 'Notifications, 1 not read' }).click()
    await page
      .getByRole('link', { name: new RegExp(`Irma Solberg asked you to review.*${question.replace('?', '.')}`) })
      .click()
    await page.waitForURL(/show=review&round=/)
    await page.getByRole('button', { name: 'Notifications', exact: true }).waitFor()

    const mention = {
      requestId: crypto.randomUUID(),
      pin: { kind: 'build' },
      about: 'the build',
      text: `Look at the far end, @{${asked?.user.id}}.`,
    }
    expect(await post(irma, `/api/builds/${buildId}/threads`, mention)).toBe(201)
    await page.getByRole('button', { name: 'Notifications, 1 not read' }).click()
    await page.getByRole('link', { name: /Irma Solberg mentioned you/ }).click()
    await page.waitForURL(/thread=/)
    await page.getByRole('main').getByText('Look at the far end').first().waitFor()
  })
})
