import { createServer, type Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { useBrowser } from '../helpers/browser.ts'

const page = (script: string) => `<!doctype html><title>x</title><script src="/script.js"></script>${script}`

describe('the watch over pages', () => {
  const browser = useBrowser()
  let server: Server
  let url = ''

  beforeAll(async () => {
    server = createServer((request, response) => {
      response.setHeader('content-security-policy', "default-src 'self'")
      if (request.url === '/script.js')
        response.setHeader('content-type', 'text/javascript').end('document.title = "ran"')
      else if (request.url === '/broken.js') response.setHeader('content-type', 'text/javascript').end('nothing.here()')
      else if (request.url === '/inline')
        response.setHeader('content-type', 'text/html').end(page('<script>1</script>'))
      else if (request.url === '/throws')
        response.setHeader('content-type', 'text/html').end(page('<script src="/broken.js"></script>'))
      else if (request.url === '/')
        response.setHeader('content-type', 'text/html').end(page('<link rel=icon href=/script.js>'))
      else response.writeHead(404).end()
    })
    await new Promise<void>((done) => server.listen(0, '127.0.0.1', done))
    url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`
  })
  afterAll(() => server.close())

  it('leaves a sound page in peace', async () => {
    const sound = await browser.newPage()
    await sound.goto(url)
    expect(await sound.title()).toBe('ran')
    expect(browser.complaints()).toEqual([])
  })

  it('sees a script that the policy forbids', async () => {
    browser.expectComplaint(/./)
    await (await browser.newPage()).goto(`${url}/inline`)
    await expect.poll(() => browser.complaints()).toContainEqual(expect.stringMatching(/^policy: script-src-elem/))
  })

  it('sees an error that a page throws', async () => {
    browser.expectComplaint(/./)
    await (await browser.newPage()).goto(`${url}/throws`)
    await expect
      .poll(() => browser.complaints())
      .toContainEqual(expect.stringMatching(/^thrown: nothing is not defined/))
  })

  it('sees a request that is refused', async () => {
    browser.expectComplaint(/./)
    const asking = await browser.newPage()
    await asking.goto(url)
    await asking.evaluate(() => fetch('/missing'))
    await expect.poll(() => browser.complaints()).toContainEqual(expect.stringMatching(/^console: .*404/))
  })
})
