import { AxeBuilder } from '@axe-core/playwright'
import type { Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { useBrowser } from '../helpers/browser.ts'
import { startProduct, type Product } from '../helpers/server.ts'
import { buildIdOf, signInDemo } from '../helpers/signIn.ts'

/** What a person waits for on each page before it counts as shown. */
const guestPages: readonly [path: string, heading: string | RegExp][] = [
  ['/sign-in', 'Sign in'],
  ['/register', /account/i],
  ['/password-resets', /password/i],
]
const pages: readonly [path: string, heading: string | RegExp][] = [
  ['/builds', 'Builds'],
  ['/account', 'Account'],
  ['/notifications', 'Notifications'],
  ['/catalog', 'Catalog'],
  ['/catalog/models/supply-atx-650', /650/],
  ['/catalog/connectors/sata-power-receptacle', /SATA power receptacle/],
  ['/catalog/add', /model/i],
  ['/rules', 'Rules'],
  ['/rules/contact-over-rating', /./],
  ['/mailbox', 'Mailbox'],
  ['/users', /./],
  ['/nowhere', /./],
]
/** What stands on each face of the build once it is checked and drawn. */
const faces: readonly [face: string, shown: RegExp][] = [
  ['wiring', /W1 in carries/],
  ['ledger', /W1 in, 12 V/],
  ['joints', /W1/],
  ['findings', /W1 in carries/],
  ['bays', /C1/],
  ['history', /Every save is a revision/],
  ['lid', /before you pull/i],
  ['labels', /./],
  ['parts', /still to buy|Nothing left to buy/],
  ['drives', /Names for the system/],
  ['review', /8 of 3 TB SAS/],
]

/** The rules whose verdict depends on the colours: the only ones that the other theme can break. */
const colourRules = ['color-contrast', 'link-in-text-block']

describe('axe on every page, in both themes', () => {
  const browser = useBrowser()
  let product: Product

  beforeAll(async () => {
    product = await startProduct()
  })
  afterAll(() => product.stop())

  const newContext = () => browser.newContext({ colorScheme: 'light', reducedMotion: 'reduce' })

  const seriousIn = async (page: Page, axe: AxeBuilder) => {
    // What still fades in has not its colour yet.
    await page.evaluate(() => Promise.allSettled(document.getAnimations().map((animation) => animation.finished)))
    // Legacy mode spares a second page for every look; it misses only frames of other origins, and there are none.
    const { violations } = await axe.setLegacyMode(true).analyze()
    return violations
      .filter(({ impact }) => impact === 'serious' || impact === 'critical')
      .map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.target.join(' ')).join(', ')}`)
  }

  /** Only violations are written out in full: what passes is thousands of nodes. */
  const lookAt = (page: Page) => new AxeBuilder({ page }).options({ resultTypes: ['violations'] })

  const paper = (page: Page) => page.evaluate(() => getComputedStyle(document.body).backgroundColor)

  const expectNothingSerious = async (page: Page, where: string) => {
    expect(await seriousIn(page, lookAt(page)), `${where}, light`).toEqual([])
    const light = await paper(page)
    await page.emulateMedia({ colorScheme: 'dark' })
    await expect.poll(() => paper(page), { message: `${where} turns dark`, timeout: 10_000 }).not.toBe(light)
    expect(await seriousIn(page, lookAt(page).withRules(colourRules)), `${where}, dark`).toEqual([])
    await page.emulateMedia({ colorScheme: 'light' })
  }

  it('finds nothing serious before signing in', async () => {
    const page = await (await newContext()).newPage()
    for (const [path, name] of guestPages) {
      await page.goto(product.url + path)
      await page.getByRole('heading', { name, level: 1 }).or(page.getByRole('heading', { name })).first().waitFor()
      await expectNothingSerious(page, path)
    }
  })

  it('finds nothing serious on the pages of an administrator', async () => {
    const context = await newContext()
    await signInDemo(context, product.url, 'admin')
    const page = await context.newPage()
    for (const [path, name] of pages) {
      await page.goto(product.url + path)
      await page.getByRole('heading', { name }).first().waitFor()
      await expectNothingSerious(page, path)
    }
  })

  it('finds nothing serious on the faces of a build', async () => {
    const context = await newContext()
    await signInDemo(context, product.url, 'irma')
    const id = await buildIdOf(context, product.url, 'North room, as found')
    const page = await context.newPage()
    for (const [face, shown] of faces) {
      await page.goto(`${product.url}/builds/${id}?show=${face}`)
      await page
        .getByRole('status')
        .filter({ hasText: /^saved, revision/ })
        .waitFor()
      await page.getByText(shown).filter({ visible: true }).first().waitFor()
      await expectNothingSerious(page, face)
    }
    await page.goto(`${product.url}/builds/${id}/people`)
    await page
      .getByRole('heading', { name: /people/i })
      .first()
      .waitFor()
    await expectNothingSerious(page, 'people')
  })
})
