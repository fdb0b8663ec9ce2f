import { randomUUID } from 'node:crypto'
import { readFileSync } from 'node:fs'
import pg from 'pg'
import { pino } from 'pino'
import type { BuildDocument } from '#shared/build/document.ts'
import { readBuildText } from '#shared/build/read.ts'
import { readConfig } from '../../server/config.ts'
import { migrateUp } from '../../server/db/migrate.ts'
import { makeContext, type OwnedContext } from '../../server/makeContext.ts'
import { Build } from '../../server/models/index.ts'
import { makeComparisonService } from '../../server/services/comparisonService.ts'
import { contentHash } from '../../server/services/contentHash.ts'
import { listRevisions, readRevision } from '../../server/services/revisionList.ts'
import { openTestDatabase } from '../../server/setup/testDatabase.mjs'
import type { Row } from './measure.ts'

const example = new URL('../../examples/stress-60/build.json', import.meta.url)
const count = 10_000
/** As `BuildRevision.append` keeps them. */
const stride = 50
const buildId = randomUUID()

/** A build of sixty drives with ten thousand revisions: its history listed, old ones opened, two compared. */
export async function revisionRows(): Promise<Row[]> {
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
    return await measureIn(context)
  } finally {
    await context.close()
    await administrator.query(`DROP DATABASE IF EXISTS "${name}" WITH (FORCE)`)
    await administrator.end()
    await cluster.close()
  }
}

async function measureIn(context: OwnedContext): Promise<Row[]> {
  const read = readBuildText(readFileSync(example, 'utf8'), (await context.catalog.current()).index)
  if (!read.ok) throw new Error('the example cannot be read')
  const whole_kB = await fill(context, read.document)
  const [size] = await context.database.query(`SELECT pg_total_relation_size('build_revisions') / 1000 AS size`)
  const kept_kB = Number((size[0] as { size: string }).size)
  const onDisk = `${(kept_kB / 1000).toFixed(1)} MB on disk; ${Math.round(whole_kB / 1000)} MB of JSON were each kept whole`
  // A service of its own each time: the one that is kept remembers what it compared.
  const compare = () => makeComparisonService().compare(context, buildId, { from: 1, to: count })
  return [
    await timed('list of 10,000 revisions, newest page', () => listRevisions(context, buildId, { named: 'no' })),
    await timed('list of 10,000 revisions, last page', () =>
      listRevisions(context, buildId, { named: 'no', before: 50 }),
    ),
    await timed(
      'open the newest of 10,000 revisions, 287 parts',
      () => readRevision(context, buildId, count),
      31,
      onDisk,
    ),
    await timed('open an old one, 49 edits replayed', () => readRevision(context, buildId, 5_000)),
    await timed('compare the first with the last, both checked', compare, 11),
  ]
}

async function timed(what: string, call: () => Promise<unknown>, runs = 31, beside = ''): Promise<Row> {
  for (let i = 0; i < 5; i++) await call()
  const times: number[] = []
  for (let i = 0; i < runs; i++) {
    const start = performance.now()
    await call()
    times.push(performance.now() - start)
  }
  return { what, own_ms: times.sort((a, b) => a - b)[runs >> 1] ?? 0, beside }
}

/** Writes the rows that so many saves leave behind. Answers what they would weigh, each kept whole. */
async function fill(context: OwnedContext, document: BuildDocument): Promise<number> {
  const { id } = document.parts[0] ?? { id: '' }
  const at = (revision: number): BuildDocument =>
    revision === 1
      ? document
      : {
          ...document,
          parts: document.parts.map((part) => (part.id === id ? { ...part, note: `note ${revision}` } : part)),
        }
  await Build.create({
    id: buildId,
    name: document.name,
    machine: null,
    revision: count,
    parts: document.parts.length,
    drives: 60,
    changedBy: null,
  })
  await context.database.transaction(async (transaction) => {
    for (let revision = 1; revision <= count; revision++) {
      const from = Math.floor((revision - 1) / stride) * stride + 1
      const isWhole = revision === from
      const edits = [{ label: 'Note', changes: [{ op: 'updatePart', id, patch: { note: `note ${revision}` } }] }]
      const isRead = revision === 1 || revision === 5_000 || revision === count
      await context.database.query(
        `INSERT INTO build_revisions (build_id, revision, document, replay_from, hash, edits, label, base)
         VALUES ($1, $2, $3, $4, $5, $6, 'Note', $7)`,
        {
          bind: [
            buildId,
            revision,
            isWhole || revision === count ? JSON.stringify(at(revision)) : null,
            isWhole ? null : from,
            isRead ? contentHash(at(revision)) : 'not read',
            JSON.stringify(revision === 1 ? [] : edits),
            revision - 1,
          ],
          transaction,
        },
      )
    }
  })
  return (JSON.stringify(document).length * count) / 1000
}
