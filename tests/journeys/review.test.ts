import { AxeBuilder } from '@axe-core/playwright'
import type { Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { useBrowser } from '../helpers/browser.ts'
import { startProduct, type Product } from '../helpers/server.ts'
import { buildIdOf, signInDemo } from '../helpers/signIn.ts'

const phone = { viewport: { width: 390, height: 844 }, hasTouch: true, isMobile: true }

describe('a second pair of eyes', () => {
  const browser = useBrowser()
  let product: Product

  beforeAll(async () => {
    product = await startProduct()
  })
  afterAll(() => product.stop())

  /** A demo person with the review of a build open. */
  async function openReview(name: string): Promise<Page> {
    const context = await browser.newContext()
    await signInDemo(context, product.url, name)
    const buildId = await buildIdOf(context, product.url, 'North room, as found')
    const page = await context.newPage()
    await page.goto(`${product.url}/builds/${buildId}?show=review`)
    await page.getByRole('heading', { name: 'What an approval needs' }).waitFor()
    return page
  }

  const expectAccessible = async (page: Page): Promise<void> => {
    await page.evaluate(() => Promise.allSettled(document.getAnimations().map((animation) => animation.finished)))
    const { violations } = await new AxeBuilder({ page }).setLegacyMode(true).analyze()
    const grave = violations.filter(({ impact }) => impact === 'serious' || impact === 'critical')
    expect(grave.map(({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html).join(', ')}`)).toEqual([])
  }

  /** Changes the machine's name in the settings, and waits until it is saved. */
  async function renameMachine(page: Page, machine: string, revision: number): Promise<void> {
    await page.getByRole('button', { name: 'Settings' }).click()
    await page.getByLabel('Written on the machine').fill(machine)
    await page.getByRole('button', { name: 'Change settings' }).click()
    await page.getByText(`saved, revision ${revision}`).waitFor()
  }

  it('is asked, sees the first questions answered on a phone, sends back, sees what changed, approves; the next edit ends it', async () => {
    const builder = await openReview('irma')
    await builder.getByRole('button', { name: 'Ask for a review' }).click()
    await builder.getByLabel('Your question').fill('Will it start with four drives on lead 1?')
    await builder.getByLabel('Anybody with a link').check()
    await builder.getByRole('button', { name: 'Ask about revision 1' }).click()
    const link = await builder.getByLabel('Address of the link').inputValue()
    expect(link).toMatch(/\/links\/[\w-]{43}$/)
    await builder.getByRole('button', { name: 'Done' }).click()

    const guest = await browser.newPage(phone)
    await guest.goto(link)
    await guest.getByText('Irma Solberg shows you the wiring plan').waitFor()
    await expectAccessible(guest)
    await guest.getByLabel('Your name').fill('Jo Amsel')
    await guest.getByRole('button', { name: 'Open the build' }).click()
    await guest.getByText('Will it start with four drives on lead 1?').first().waitFor()
    await guest.getByText('How is each drive powered?').click()
    await guest.getByText('T1 lead 1, outlet 1 › W1 › W8').waitFor()
    expect(await guest.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(390)
    await expectAccessible(guest)
    await guest.getByRole('button', { name: 'Give your verdict' }).click()
    await guest.getByLabel('In a few words').fill('W1 carries four motors on one plug: split it.')
    await guest.getByRole('button', { name: 'Ask for changes' }).click()
    await guest.getByText('Changes are asked for.').waitFor()

    await builder.getByText('W1 carries four motors on one plug: split it.').first().waitFor()
    await renameMachine(builder, 'RV-N-02', 2)
    await builder.getByText('The build is at revision 2 by now').waitFor()
    await builder.getByRole('button', { name: 'Ask for the next round' }).click()
    await builder.getByRole('checkbox', { name: 'Noor Castellan' }).check()
    await builder.getByRole('button', { name: 'Ask about revision 2' }).click()
    await builder.getByRole('heading', { name: 'Round 2: revision 2' }).waitFor()

    const reviewer = await openReview('noor')
    await reviewer.getByRole('heading', { name: 'What changed since the last round' }).waitFor()
    await reviewer.getByText(/Name on the machine .*RV-N-02/).waitFor()
    await reviewer.getByRole('button', { name: 'Approve revision 2' }).click()
    await reviewer.getByText('Revision 2 is approved.').waitFor()

    const mark = builder.getByRole('link', { name: /revision 2/ })
    await builder.getByRole('link', { name: 'approved at revision 2' }).waitFor()
    await renameMachine(builder, 'RV-N-03', 3)
    await builder.getByRole('link', { name: 'approval of revision 2 lapsed' }).waitFor()
    expect(await mark.first().getAttribute('href')).toContain('show=review')
    await reviewer.getByText('The approval lapsed at revision 3').waitFor()

    await reviewer.getByRole('link', { name: 'revision 2, as it was sent' }).click()
    await reviewer.getByText('as it was sent for review in round 2').waitFor()
    await reviewer.getByText('the build is at revision 3 by now').waitFor()

    await builder.getByRole('button', { name: 'Close out Jo Amsel' }).click()
    await builder.getByText('closed out').first().waitFor()
    browser.expectComplaint(/401/)
    await guest.getByText('Your visit is over').waitFor()
    await guest.reload()
    await guest.getByRole('heading', { name: 'Sign in' }).waitFor()
  })
})
