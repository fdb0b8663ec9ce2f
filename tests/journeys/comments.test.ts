import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { useBrowser } from '../helpers/browser.ts'
import { startProduct, type Product } from '../helpers/server.ts'
import { buildIdOf, signInDemo } from '../helpers/signIn.ts'

const phone = { viewport: { width: 390, height: 844 }, hasTouch: true, isMobile: true }

describe('a guest on a phone and the builder', () => {
  const browser = useBrowser()
  let product: Product

  beforeAll(async () => {
    product = await startProduct()
  })
  afterAll(() => product.stop())

  it('talk about a splitter: pinned from the list, seen at once, answered, resolved', async () => {
    const irma = await browser.newContext()
    await signInDemo(irma, product.url, 'irma')
    const id = await buildIdOf(irma, product.url, 'North room, as found')
    const { csrfToken } = (await (await irma.request.get(`${product.url}/api/session`)).json()) as { csrfToken: string }
    const made = await irma.request.post(`${product.url}/api/builds/${id}/links`, {
      data: { kind: 'review', label: 'for the electrician', days: 1 },
      headers: { 'x-csrf-token': csrfToken, origin: product.url },
    })
    const { token } = (await made.json()) as { token: string }
    const desk = await irma.newPage()
    await desk.goto(`${product.url}/builds/${id}`)
    await desk.getByRole('tab', { name: 'Comments' }).click()
    await desk.getByText('No open comments').waitFor()

    const guest = await (await browser.newContext(phone)).newPage()
    await guest.goto(`${product.url}/links/${token}`)
    await guest.getByLabel(/name/i).fill('Jo Brandt')
    await guest.getByRole('button', { name: /open|look|join/i }).click()
    await guest.getByRole('combobox', { name: 'Face' }).selectOption('joints')
    await guest.getByRole('searchbox').or(guest.getByLabel('Search')).first().fill('W1')
    await guest
      .getByRole('button', { name: /Comment on W1/ })
      .first()
      .click()
    await guest.getByRole('textbox', { name: /Comment on W1/ }).fill('This **moulded** one gets warm, see W4.')
    await guest.getByRole('button', { name: 'Comment', exact: true }).click()

    const thread = desk.getByRole('region', { name: /Thread 1\. W1/ })
    await thread.getByText('Jo Brandt (guest)').waitFor()
    expect(await thread.locator('strong').textContent()).toBe('moulded')
    await desk.getByRole('button', { name: 'Comments 1' }).first().waitFor()
    await thread.getByRole('button', { name: 'Answer in thread 1' }).click()
    await desk.getByRole('textbox', { name: 'Your answer' }).fill('It goes. @te')
    await desk.keyboard.press('Enter')
    await desk.keyboard.press('Control+Enter')
    await guest.getByText('It goes.').waitFor()
    await guest.getByText('@Teo Marchetti').waitFor()

    await thread.getByRole('button', { name: 'Resolve thread 1' }).click()
    await desk.getByText('No open comments').waitFor()
    await guest.getByText('No open comments').waitFor()
  })
})
