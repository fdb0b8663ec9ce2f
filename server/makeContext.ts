import type { Logger } from 'pino'
import type { Config } from './config.ts'
import { openDatabase } from './db/connection.ts'
import { makeLive } from './events/live.ts'
import { allJobs, type JobContext } from './jobs/allJobs.ts'
import { makeJobLoop } from './jobs/jobLoop.ts'
import { makeTransport, type MailTransport } from './mail/transport.ts'
import { loadCatalogFiles } from './services/catalogFiles.ts'
import { makeCatalogService } from './services/catalogService.ts'
import { makeCheckService } from './services/checkService.ts'
import { makeComparisonService } from './services/comparisonService.ts'
import type { Context } from './services/context.ts'
import { makePaperService } from './services/paperService.ts'
import { loadSecrets } from './services/secretService.ts'

export interface OwnedContext extends Context {
  /** Reads the keys that sign sessions; the database must have its shape by then. */
  loadSecrets(): Promise<void>
  close(): Promise<void>
}

/** Makes what every use case needs. Nothing listens yet, and no job runs. */
export function makeContext(
  config: Config,
  log: Logger,
  transport: MailTransport = makeTransport(config),
): OwnedContext {
  const database = openDatabase(config.databaseUrl, config.databasePool)
  const catalog = makeCatalogService(database, loadCatalogFiles())
  const checks = makeCheckService()
  const papers = makePaperService()
  const shared: JobContext = {
    config,
    database,
    secrets: { accessToken: '', csrf: '', unsubscribe: '' },
    catalog,
    checks,
    papers,
    comparisons: makeComparisonService(),
    log,
    publicUrl: config.publicUrl ?? `http://${config.host}:${config.port}`,
  }
  const jobs = makeJobLoop(allJobs(shared, transport), log)
  const context: OwnedContext = Object.assign(shared, {
    jobs,
    live: makeLive(config, database, log, () => jobs.wake('tell news')),
    async loadSecrets() {
      shared.secrets = await loadSecrets(database, config.secret)
    },
    async close() {
      await context.live.stop()
      await jobs.stop()
      checks.close()
      papers.close()
      await database.close()
    },
  })
  return context
}
