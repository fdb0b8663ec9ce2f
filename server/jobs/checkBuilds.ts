import { Op, QueryTypes } from 'sequelize'
import { Build, BuildRevision } from '../models/index.ts'
import { verdictColumns } from '../services/buildSummary.ts'
import type { Context } from '../services/context.ts'
import type { Job } from './jobLoop.ts'

/** Checks the newest revision of a build that was too large to be checked while it was saved. */
export function checkBuilds(context: Pick<Context, 'database' | 'catalog' | 'checks' | 'log'>): Job {
  return async () => {
    const rows = await context.database.query<{ id: string; revision: number }>(
      `SELECT id, revision FROM builds
       WHERE checked_revision < revision AND check_failed_revision < revision ORDER BY changed_at LIMIT 1`,
      { type: QueryTypes.SELECT },
    )
    const waiting = rows[0]
    if (!waiting) return false
    const { id, revision } = waiting
    const saved = await BuildRevision.findOne({ where: { buildId: id, revision }, attributes: ['document'] })
    if (!saved) return false
    try {
      const result = await context.checks.check(saved.document, await context.catalog.current())
      await Build.update(verdictColumns(result, revision), { where: { id, checkedRevision: { [Op.lt]: revision } } })
    } catch (error) {
      context.log.error({ err: error, build: id, revision }, 'check broke off')
      await Build.update({ checkFailedRevision: revision }, { where: { id } })
    }
    return true
  }
}
