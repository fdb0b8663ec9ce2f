import type { Logger } from 'pino'
import type { Config } from './config.ts'
import { openDatabase } from './db/connection.ts'
import { makeLive } from './events/live.ts'
import { checkBuilds } from './jobs/checkBuilds.ts'
import { cleanUp } from './jobs/cleanUp.ts'
import { makeJobLoop } from './jobs/jobLoop.ts'
import { sendMail } from './jobs/sendMail.ts'
import { makeTransport, type MailTransport } from './mail/transport.ts'
import { loadCatalogFiles } from './services/catalogFiles.ts'
import { makeCatalogService } from './services/catalogService.ts'
import { makeCheckService } from './services/checkService.ts'
import type { Context } from './services/context.ts'
import { answerPasswordReset } from './services/passwordResetService.ts'
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
  const context: OwnedContext = {
    config,
    database,
    secrets: { accessToken: '', csrf: '' },
    catalog,
    checks,
    log,
    publicUrl: config.publicUrl ?? `http://${config.host}:${config.port}`,
    jobs: makeJobLoop(
      {
        'answer password resets': () => answerPasswordReset(context),
        'send mail': sendMail(database, transport, log),
        'check builds': checkBuilds({ database, catalog, checks, log }),
        'clean up': cleanUp(database),
      },
      log,
    ),
    live: makeLive(config, database, log, () => context.jobs.wake()),
    async loadSecrets() {
      context.secrets = await loadSecrets(database, config.secret)
    },
    async close() {
      await context.live.stop()
      await context.jobs.stop()
      checks.close()
      await database.close()
    },
  }
  return context
}
