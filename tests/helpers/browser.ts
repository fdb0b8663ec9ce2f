import { chromium, type Browser, type BrowserContext, type BrowserContextOptions, type Page } from 'playwright-core'
import { afterAll, afterEach, beforeAll, expect } from 'vitest'
import { findChromium } from '../../server/setup/programs.mjs'

/** Headless Chromium in a container, silent on the network but for the page. */
const flags = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
]

export interface TestBrowser {
  /** A page in a context of its own: no cookies, no storage. */
  newPage(options?: BrowserContextOptions): Promise<Page>
  /** A context for several pages of the same person, watched like a page. */
  newContext(options?: BrowserContextOptions): Promise<BrowserContext>
  /** Says that this test brings about a complaint of the page that matches, as a refused request. */
  expectComplaint(pattern: RegExp): void
  /** What the pages of this test complained of so far. */
  complaints(): readonly string[]
}

/**
 * Chromium for the tests of one file. A test fails where a page logged an error, threw one, or met the
 * Content-Security-Policy, unless it said before that it expects that.
 */
export function useBrowser(): TestBrowser {
  let browser: Browser
  let contexts: BrowserContext[] = []
  let complaints: string[] = []
  let expected: RegExp[] = []

  const listen = (page: Page) => {
    page.setDefaultTimeout(45_000)
    page.on('pageerror', (error) => complaints.push(`thrown: ${error.message}`))
    page.on('console', (message) => {
      if (message.type() === 'error') complaints.push(`console: ${message.text()} (${message.location().url})`)
    })
  }

  beforeAll(async () => {
    browser = await chromium.launch({ executablePath: findChromium() ?? 'chromium', args: flags })
  })

  afterEach(async () => {
    await Promise.all(contexts.map((context) => context.close()))
    const unexpected = complaints.filter((complaint) => !expected.some((pattern) => pattern.test(complaint)))
    contexts = []
    complaints = []
    expected = []
    expect(unexpected, 'complaints of the page').toEqual([])
  })

  afterAll(async () => {
    await browser.close()
  })

  const newContext = async (options: BrowserContextOptions = {}) => {
    const context = await browser.newContext({ viewport: { width: 1440, height: 900 }, locale: 'en-GB', ...options })
    contexts.push(context)
    context.on('page', listen)
    await context.exposeFunction('reportViolation', (what: string) => {
      complaints.push(`policy: ${what}`)
    })
    await context.addInitScript(() => {
      const report = (globalThis as unknown as { reportViolation(what: string): void }).reportViolation
      addEventListener('securitypolicyviolation', (event) => {
        report(
          `${event.violatedDirective} forbids ${event.blockedURI || 'inline'} in ${event.sourceFile || location.href}`,
        )
      })
    })
    return context
  }

  return {
    newContext,
    newPage: async (options) => (await newContext(options)).newPage(),
    expectComplaint: (pattern) => void expected.push(pattern),
    complaints: () => complaints,
  }
}
