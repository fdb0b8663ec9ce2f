import type { Logger } from 'pino'
import type { Sequelize } from 'sequelize'
import type { Config } from '../config.ts'
import type { Live } from '../events/live.ts'
import type { JobLoop } from '../jobs/jobLoop.ts'
import type { CatalogService } from './catalogService.ts'
import type { CheckService } from './checkService.ts'
import type { ComparisonService } from './comparisonService.ts'
import type { PaperService } from './paperService.ts'
import type { Secrets } from './secretService.ts'

/** What every use case may need, made once at start. */
export interface Context {
  config: Config
  database: Sequelize
  secrets: Secrets
  catalog: CatalogService
  checks: CheckService
  papers: PaperService
  comparisons: ComparisonService
  jobs: JobLoop
  live: Live
  log: Logger
  /** Address for links in mails, without a trailing slash. */
  publicUrl: string
}
