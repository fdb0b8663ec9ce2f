import type { BrowserContext } from 'playwright-core'
import { expect } from 'vitest'

interface DemoSession {
  csrfToken: string
  demoAccounts: { email: string; password: string }[]
}

/** Signs a demo person in without the form: the context's pages then carry the session. */
export async function signInDemo(context: BrowserContext, url: string, name: string): Promise<void> {
  const session = (await (await context.request.get(`${url}/api/session`)).json()) as DemoSession
  const account = session.demoAccounts.find(({ email }) => email.startsWith(`${name}@`))
  if (!account) throw new Error(`no demo account "${name}"`)
  const answer = await context.request.post(`${url}/api/session`, {
    data: { email: account.email, password: account.password },
    headers: { 'x-csrf-token': session.csrfToken, origin: url },
  })
  expect(answer.status()).toBe(200)
}

/** Id of a build of the signed-in person by its name. */
export async function buildIdOf(context: BrowserContext, url: string, name: string): Promise<string> {
  const list = (await (await context.request.get(`${url}/api/builds?pageSize=100`)).json()) as {
    items: { id: string; name: string }[]
  }
  const found = list.items.find((build) => build.name === name)
  if (!found) throw new Error(`no build "${name}"`)
  return found.id
}
