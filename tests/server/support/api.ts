import { randomUUID } from 'node:crypto'
import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import { pino, type Logger } from 'pino'
import supertest, { type Response } from 'supertest'
import type { InstallationRole } from '#shared/contract/session.ts'
import { createApp } from '../../../server/app.ts'
import { readConfig } from '../../../server/config.ts'
import type { MailTransport } from '../../../server/mail/transport.ts'
import { makeContext, type OwnedContext } from '../../../server/makeContext.ts'
import { User } from '../../../server/models/index.ts'
import { hashPassword } from '../../../server/services/passwordService.ts'
import { openSession } from '../../../server/services/sessionService.ts'
import { freshDatabase, type TestDatabase } from '../../helpers/database.ts'

/** A browser as far as the API sees one: it keeps cookies and sends its token with every change. */
export interface Client {
  cookies: Map<string, string>
  csrfToken: string
  user: User | null
  get(path: string, headers?: Record<string, string>): Promise<Response>
  send(method: Method, path: string, body?: unknown, headers?: Record<string, string>): Promise<Response>
  post(path: string, body?: unknown): Promise<Response>
  put(path: string, body?: unknown): Promise<Response>
  patch(path: string, body?: unknown): Promise<Response>
  delete(path: string): Promise<Response>
  /** Fetches the session, and with it the token. */
  refreshToken(): Promise<Response>
}

export type Method = 'get' | 'post' | 'put' | 'patch' | 'delete'

export interface Api {
  url: string
  context: OwnedContext
  database: TestDatabase
  /** A browser in which nobody is signed in. */
  visitor(): Promise<Client>
  /** A new account, signed in. */
  person(options?: { role?: InstallationRole; email?: string; name?: string }): Promise<Client>
  /** A further browser in which an account is signed in. */
  browserOf(user: User): Promise<Client>
  close(): Promise<void>
}

export const testPassword = 'forty feet of leader'
let passwordHash: Promise<string> | undefined

/** The whole API on a database of its own. Jobs run only when a test drains them. */
export async function startApi(
  options: { settings?: Record<string, string>; transport?: MailTransport; log?: Logger } = {},
): Promise<Api> {
  const database = await freshDatabase()
  const config = readConfig({
    DATABASE_URL: database.url,
    BAYLOOM_DEMO: '0',
    LOG_LEVEL: 'silent',
    PORT: '0',
    ...options.settings,
  })
  const context = makeContext(config, options.log ?? pino({ level: config.logLevel }), options.transport)
  await context.loadSecrets()
  const server = createServer(createApp(context))
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
  const url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`

  const browserOf = async (user: User): Promise<Client> => {
    const issued = await context.database.transaction((transaction) => openSession(context, user, transaction))
    const client = makeClient(url)
    client.user = user
    const prefix = config.publicUrl?.startsWith('https:') ? '__Host-' : ''
    client.cookies.set(`${prefix}bayloom-access`, issued.accessToken)
    client.cookies.set(`${prefix}bayloom-refresh`, issued.refreshToken ?? '')
    await client.refreshToken()
    return client
  }

  return {
    url,
    context,
    database,
    browserOf,
    async visitor() {
      const client = makeClient(url)
      await client.refreshToken()
      return client
    },
    async person({ role = 'member', email = `${randomUUID()}@example.org`, name = 'Ada Quill' } = {}) {
      passwordHash ??= hashPassword(testPassword)
      return browserOf(await User.create({ id: randomUUID(), email, name, role, passwordHash: await passwordHash }))
    },
    async close() {
      server.closeAllConnections()
      await new Promise<void>((resolve) => server.close(() => resolve()))
      await context.close()
      await database.drop()
    },
  }
}

export function makeClient(url: string): Client {
  const client: Client = {
    cookies: new Map(),
    csrfToken: '',
    user: null,
    async send(method, path, body, headers = {}) {
      let request = supertest(url)[method](path)
      const cookie = [...client.cookies].map(([name, value]) => `${name}=${value}`).join('; ')
      if (cookie) request = request.set('Cookie', cookie)
      if (method !== 'get') request = request.set('x-csrf-token', client.csrfToken)
      request = request.set(headers)
      const response = body === undefined ? await request : await request.send(body as object)
      keepCookies(client, response)
      return response
    },
    get: (path, headers) => client.send('get', path, undefined, headers),
    post: (path, body) => client.send('post', path, body),
    put: (path, body) => client.send('put', path, body),
    patch: (path, body) => client.send('patch', path, body),
    delete: (path) => client.send('delete', path),
    async refreshToken() {
      const response = await client.get('/api/session')
      client.csrfToken = (response.body as { csrfToken: string }).csrfToken
      return response
    },
  }
  return client
}

function keepCookies(client: Client, response: Response): void {
  const set = (response.headers as unknown as Record<string, unknown>)['set-cookie']
  for (const line of Array.isArray(set) ? (set as string[]) : []) {
    const [pair = ''] = line.split(';')
    const [name = '', value = ''] = pair.split(/=(.*)/s)
    if (value === '' || /Expires=Thu, 01 Jan 1970/.test(line)) client.cookies.delete(name)
    else client.cookies.set(name, value)
  }
}
