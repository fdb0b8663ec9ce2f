import { vi } from 'vitest'
import { problemKinds, type ProblemCode } from '#shared/contract/problems.ts'
import type { Session, User } from '#shared/contract/session.ts'

export interface Seen {
  method: string
  path: string
  body: unknown
  csrf: string | null
}

type Answer = Response | (() => Response | Promise<Response>)

export const json = (body: unknown, status = 200): Response =>
  new Response(status === 204 ? null : JSON.stringify(body), {
    status,
    headers: { 'content-type': 'application/json' },
  })

export const problem = (code: ProblemCode, more: object = {}): Response =>
  json({ type: `urn:test:${code}`, code, ...problemKinds[code], ...more }, problemKinds[code].status)

export const irma: User = { id: 'u1', email: 'irma@reelvault.example', name: 'Irma Solberg', role: 'member' }

export const sessionOf = (user: User | null, csrfToken = 'token-1'): Session => ({
  user,
  guest: null,
  visitEnded: false,
  csrfToken,
  firstAccount: false,
  demoAccounts: [],
})

/**
 * Stands in for the server behind `fetch`. Each route ("GET /api/session") holds its answers in turn, the last one for
 * good; what has no answer fails the test by name.
 */
export function fakeServer(routes: Record<string, Answer | Answer[]>) {
  const seen: Seen[] = []
  const left = new Map(Object.entries(routes).map(([route, answers]) => [route, [answers].flat()]))
  vi.stubGlobal('fetch', async (path: string, init: RequestInit = {}) => {
    const method = init.method ?? 'GET'
    const { pathname } = new URL(path, 'http://bayloom.test')
    const body = typeof init.body === 'string' ? (JSON.parse(init.body) as unknown) : undefined
    seen.push({ method, path, body, csrf: new Headers(init.headers).get('x-csrf-token') })
    const answers = left.get(`${method} ${pathname}`)
    if (!answers) throw new Error(`no answer for ${method} ${pathname}`)
    const answer = answers.length > 1 ? answers.shift()! : answers[0]!
    return answer instanceof Response ? answer.clone() : answer()
  })
  return {
    seen,
    of: (method: string, path: string) => seen.filter((one) => one.method === method && one.path === path),
  }
}
