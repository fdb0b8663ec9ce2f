import { randomUUID } from 'node:crypto'
import pg from 'pg'
import { pino } from 'pino'
import { readConfig } from '../../server/config.ts'
import { migrateUp } from '../../server/db/migrate.ts'
import { makeContext, type OwnedContext } from '../../server/makeContext.ts'
import { listPinMarks, listThreads } from '../../server/services/threadList.ts'
import { openTestDatabase } from '../../server/setup/testDatabase.mjs'
import type { Row } from './measure.ts'

const reader = { userId: randomUUID(), role: 'owner' } as const

/** Fifty and five thousand comments in a build: a page of threads, and what the sheet is marked with. */
export async function commentRows(): Promise<Row[]> {
  const cluster = await openTestDatabase()
  const name = `bayloom_bench_${randomUUID().replaceAll('-', '')}`
  const administrator = new pg.Client({ connectionString: cluster.url })
  await administrator.connect()
  await administrator.query(`CREATE DATABASE "${name}"`)
  const url = new URL(cluster.url)
  url.pathname = `/${name}`
  const settings = { DATABASE_URL: url.href, BAYLOOM_DEMO: '0', LOG_LEVEL: 'silent', PORT: '0' }
  const context = makeContext(readConfig(settings), pino({ level: 'silent' }))
  try {
    await migrateUp(context.database)
    const few = await measureIn(context, 10)
    const many = await measureIn(context, 1_000)
    return many.map((row, i) => ({ ...row, beside: `${few[i]?.own_ms?.toFixed(2)} ms with 50 comments` }))
  } finally {
    await context.close()
    await administrator.query(`DROP DATABASE IF EXISTS "${name}" WITH (FORCE)`)
    await administrator.end()
    await cluster.close()
  }
}

/** So many threads of five comments each. */
async function measureIn(context: OwnedContext, threads: number): Promise<(Row & { own_ms: number })[]> {
  const buildId = randomUUID()
  const bind = [buildId, threads]
  await context.database.query(`INSERT INTO builds (id, name, revision) VALUES ($1, 'Bench', 1)`, { bind: [buildId] })
  await context.database.query(
    `INSERT INTO comment_threads (id, build_id, number, pin, part_id, about, revision)
     SELECT gen_random_uuid(), $1::uuid, n, json_build_object('kind', 'part', 'part', 'p' || n)::jsonb, 'p' || n, 'W' || n, 1
     FROM generate_series(1, $2::integer) n`,
    { bind },
  )
  await context.database.query(
    `INSERT INTO comments (id, thread_id, build_id, body, request_id)
     SELECT gen_random_uuid(), t.id, $1::uuid, 'Is **' || t.about || '** thick enough for what it carries?', gen_random_uuid()
     FROM comment_threads t, generate_series(1, 5) WHERE t.build_id = $1::uuid`,
    { bind: [buildId] },
  )
  await context.database.query('ANALYZE comment_threads, comments')
  const query = { state: 'open', of: 'all', page: 1 } as const
  return [
    await timed(`${threads * 5} comments: a page of threads`, () => listThreads(context, buildId, reader, query)),
    await timed(`${threads * 5} comments: the pins of the sheet`, () => listPinMarks(context, buildId)),
  ]
}

async function timed(what: string, call: () => Promise<unknown>): Promise<Row & { own_ms: number }> {
  for (let i = 0; i < 5; i++) await call()
  const times: number[] = []
  for (let i = 0; i < 31; i++) {
    const start = performance.now()
    await call()
    times.push(performance.now() - start)
  }
  return { what, own_ms: times.sort((a, b) => a - b)[15] ?? 0, beside: '' }
}
