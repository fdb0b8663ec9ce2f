import { randomUUID } from 'node:crypto'
import { readFileSync } from 'node:fs'
import { createServer, type Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import autocannon from 'autocannon'
import express from 'express'
import pg from 'pg'
import { pino } from 'pino'
import { createApp } from '../../server/app.ts'
import { readConfig } from '../../server/config.ts'
import { migrateUp } from '../../server/db/migrate.ts'
import { makeContext, type OwnedContext } from '../../server/makeContext.ts'
import { User } from '../../server/models/index.ts'
import { openSession } from '../../server/services/sessionService.ts'
import { openTestDatabase } from '../../server/setup/testDatabase.mjs'
import type { Figure } from './measure.ts'

const example = new URL('../../examples/stress-60/build.json', import.meta.url)
const seconds = 2
const rounds = 5
const connections = 4
const saves = 40

interface Bench {
  context: OwnedContext
  pool: pg.Pool
  own: string
  bare: string
  headers: Record<string, string>
  userId: string
  /** By path, what the bare route asks. */
  statements: Map<string, Asked[]>
}

/** The API beside a bare Express route that does the same SQL by hand, on the same database, each in its turn. */
export async function apiRows(): Promise<Figure[]> {
  const cluster = await openTestDatabase()
  const name = `bayloom_bench_${randomUUID().replaceAll('-', '')}`
  const administrator = new pg.Client({ connectionString: cluster.url })
  await administrator.connect()
  await administrator.query(`CREATE DATABASE "${name}"`)
  const url = new URL(cluster.url)
  url.pathname = `/${name}`
  try {
    return await measureOn(url.href)
  } finally {
    await administrator.query(`DROP DATABASE IF EXISTS "${name}" WITH (FORCE)`)
    await administrator.end()
    await cluster.close()
  }
}

async function measureOn(databaseUrl: string): Promise<Figure[]> {
  const settings = {
    DATABASE_URL: databaseUrl,
    BAYLOOM_DEMO: '0',
    LOG_LEVEL: 'silent',
    PORT: '0',
    RATE_LIMIT_FACTOR: '1000',
  }
  const context = makeContext(readConfig(settings), pino({ level: 'silent' }))
  await migrateUp(context.database)
  await context.loadSecrets()
  const pool = new pg.Pool({ connectionString: databaseUrl, max: 10 })
  const statements = new Map<string, Asked[]>()
  const servers = [createServer(createApp(context)), createServer(bareApp(pool, statements))]
  const [own, bare] = await Promise.all(servers.map(listen))
  try {
    const user = await User.create({
      id: randomUUID(),
      email: 'b@example.org',
      name: 'B',
      role: 'member',
      passwordHash: '',
    })
    const session = await context.database.transaction((transaction) => openSession(context, user, transaction))
    const cookie = `bayloom-access=${session.accessToken}`
    const { csrfToken } = (await (await fetch(`${own}/api/session`, { headers: { cookie } })).json()) as {
      csrfToken: string
    }
    const headers = {
      cookie,
      'x-csrf-token': csrfToken,
      'content-type': 'application/json',
      'x-session': session.sessionId,
      'x-user': user.id,
    }
    const bench: Bench = { context, pool, own: own!, bare: bare!, headers, userId: user.id, statements }
    const buildId = await importExample(bench)
    const read = await beside(bench, `/api/builds/${buildId}`, 'read of a build, 287 parts')
    const saved = await saveRow(bench, buildId)
    await addBuilds(bench, user.id, 998)
    const thousand = await beside(bench, '/api/builds?pageSize=50', 'list of 1,000 builds, a page of 50')
    const others = await User.create({
      id: randomUUID(),
      email: 'o@example.org',
      name: 'O',
      role: 'member',
      passwordHash: '',
    })
    await addBuilds(bench, others.id, 99_000)
    const many = await beside(bench, '/api/builds?pageSize=50', 'the same list among 100,000 builds')
    return [
      saved,
      read,
      thousand,
      { ...many, beside: `${(many.own / thousand.own).toFixed(2)} of the rate among 1,000; ${many.beside}` },
    ]
  } finally {
    for (const server of servers) server.close()
    await pool.end()
    await context.close()
  }
}

async function listen(server: Server): Promise<string> {
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
  return `http://127.0.0.1:${(server.address() as AddressInfo).port}`
}

/** The statements that a request of ours asks of the database. */
interface Asked {
  sql: string
  bind: unknown[]
}

/** Sends a request once and takes down what it asks, so that the bare route can ask the very same. */
async function statementsOf({ context, headers }: Bench, url: string): Promise<Asked[]> {
  const { database } = context
  const asked: Asked[] = []
  const real = database.query.bind(database)
  const listening = (sql: unknown, options?: { bind?: unknown }) => {
    const bind = Array.isArray(options?.bind) ? (options.bind as unknown[]) : []
    if (typeof sql === 'string') asked.push({ sql, bind })
    return real(sql as string, options as object)
  }
  database.query = listening as unknown as typeof database.query
  try {
    const response = await fetch(url, { headers })
    await response.arrayBuffer()
    if (!response.ok) throw new Error(`${url} answers ${response.status}`)
  } finally {
    database.query = real
  }
  return asked
}

/** The same SQL by hand, and nothing else: no schema, no policy. The last answer is sent as it comes. */
function bareApp(pool: pg.Pool, statements: ReadonlyMap<string, readonly Asked[]>) {
  const app = express()
  app.get('/{*path}', async (request, response) => {
    let rows: unknown[] = []
    for (const { sql, bind } of statements.get(request.path) ?? []) ({ rows } = await pool.query(sql, bind))
    response.json(rows)
  })
  app.post('/api/builds/:id/revisions', express.json({ limit: '4mb' }), async (request, response) => {
    const { id } = request.params
    const client = await pool.connect()
    try {
      await client.query('SELECT u.id FROM sessions s JOIN users u ON u.id = s.user_id WHERE s.id = $1', [
        request.get('x-session'),
      ])
      await client.query('BEGIN')
      await client.query('SELECT role FROM build_members WHERE build_id = $1 AND user_id = $2', [
        id,
        request.get('x-user'),
      ])
      const build = await client.query('SELECT * FROM builds WHERE id = $1 FOR UPDATE', [id])
      const { revision } = build.rows[0] as { revision: number }
      const newest = await client.query('SELECT document FROM build_revisions WHERE build_id = $1 AND revision = $2', [
        id,
        revision,
      ])
      const { document } = newest.rows[0] as { document: unknown }
      await client.query(
        `INSERT INTO build_revisions (build_id, revision, document, hash, edits, label, base, author_id)
         VALUES ($1, $2, $3, 'x', $4, 'x', $5, $6)`,
        [
          id,
          revision + 1,
          JSON.stringify(document),
          JSON.stringify((request.body as { edits: unknown }).edits),
          revision,
          request.get('x-user'),
        ],
      )
      await client.query('UPDATE builds SET revision = $2, changed_at = now() WHERE id = $1', [id, revision + 1])
      await client.query('COMMIT')
      response.status(201).json({ revision: revision + 1 })
    } finally {
      client.release()
    }
  })
  return app
}

async function importExample({ own, headers }: Bench): Promise<string> {
  const document: unknown = JSON.parse(readFileSync(example, 'utf8'))
  const response = await fetch(`${own}/api/builds/import`, {
    method: 'POST',
    headers,
    body: JSON.stringify({ document }),
  })
  if (response.status !== 201) throw new Error(await response.text())
  return ((await response.json()) as { id: string }).id
}

async function rate({ headers }: Bench, url: string): Promise<number> {
  const result = await autocannon({ url, headers, connections, duration: seconds })
  if (result.non2xx > 0 || result.errors > 0)
    throw new Error(`${url}: ${result.non2xx} refused, ${result.errors} failed`)
  return result.requests.average
}

/** Both sides in turn, several times over: what else the machine does then meets both alike. */
async function beside(bench: Bench, path: string, what: string): Promise<Figure> {
  bench.statements.set(path.split('?')[0]!, await statementsOf(bench, bench.own + path))
  const shares: number[] = []
  const rates: number[] = []
  for (let round = 0; round < rounds; round++) {
    const bare = await rate(bench, bench.bare + path)
    const own = await rate(bench, bench.own + path)
    shares.push(own / bare)
    rates.push(own)
  }
  const share = middle(shares)
  const own = middle(rates)
  return { what, own, unit: '/s', beside: `${share.toFixed(2)} of what a bare route with the same SQL gives` }
}

const middle = (values: readonly number[]): number => [...values].sort((a, b) => a - b)[values.length >> 1]!

/** Saves one after the other, as one person does; both sides in turn, each on a build of its own. */
async function saveRow(bench: Bench, buildId: string): Promise<Figure> {
  const sides = [
    { base: bench.bare, id: await importExample(bench), revision: 1, times: [] as number[] },
    { base: bench.own, id: buildId, revision: 1, times: [] as number[] },
  ]
  for (let i = 0; i < saves; i++)
    for (const side of sides) {
      const edits = [{ label: 'Rename', changes: [{ op: 'rename', name: `Vault ${i}` }] }]
      const body = JSON.stringify({ base: side.revision, requestId: randomUUID(), edits })
      const start = performance.now()
      const address = `${side.base}/api/builds/${side.id}/revisions`
      const response = await fetch(address, { method: 'POST', headers: bench.headers, body })
      const answer = (await response.json()) as { revision: number }
      if (response.status !== 201) throw new Error(JSON.stringify(answer))
      side.times.push(performance.now() - start)
      side.revision = answer.revision
    }
  const [bare_ms, own_ms] = sides.map(({ times }) => middle(times)) as [number, number]
  const share = (bare_ms / own_ms).toFixed(2)
  return {
    what: 'save of a 287-part diagram',
    own: 1000 / own_ms,
    unit: '/s',
    beside: `${share} of what a bare route gives that writes the revision by hand`,
  }
}

/** More builds of one person, without documents: the list reads none. */
async function addBuilds({ pool }: Bench, userId: string, count: number): Promise<void> {
  await pool.query(
    `WITH made AS (
       INSERT INTO builds (id, name, revision, changed_by, changed_at)
       SELECT gen_random_uuid(), 'Build ' || n, 1, $1::uuid, now() - n * interval '1 second' FROM generate_series(1, $2::int) n
       RETURNING id, name, changed_at)
     INSERT INTO build_members (build_id, user_id, role, archived, changed_at, name_key, search_text, worst_rank, drives)
     SELECT id, $1::uuid, 'owner', false, changed_at, lower(name), lower(name), 9, 0 FROM made`,
    [userId, count],
  )
  await pool.query('VACUUM ANALYZE')
}
