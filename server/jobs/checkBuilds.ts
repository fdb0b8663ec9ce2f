import { Op, QueryTypes } from 'sequelize'
import type { BuildDocument } from '#shared/build/document.ts'
import { Build } from '../models/index.ts'
import { verdictColumns } from '../services/buildSummary.ts'
import type { Context } from '../services/context.ts'
import type { Job } from './jobLoop.ts'

/** Checks the newest revision of a build that was too large to be checked while it was saved. */
export function checkBuilds(context: Pick<Context, 'database' | 'catalog' | 'checks' | 'log'>): Job {
  return async () => {
    const rows = await context.database.query<{ id: string; revision: number; document: BuildDocument }>(
      `SELECT b.id, b.revision, r.document FROM builds b
       JOIN build_revisions r ON r.build_id = b.id AND r.revision = b.revision
       WHERE b.checked_revision < b.revision AND b.check_failed_revision < b.revision
       ORDER BY b.changed_at LIMIT 1`,
      { type: QueryTypes.SELECT },
    )
    const waiting = rows[0]
    if (!waiting) return false
    const { id, revision, document } = waiting
    try {
      const result = await context.checks.check(document, await context.catalog.current())
      await Build.update(verdictColumns(result, revision), { where: { id, checkedRevision: { [Op.lt]: revision } } })
    } catch (error) {
      context.log.error({ err: error, build: id, revision }, 'check broke off')
      await Build.update({ checkFailedRevision: revision }, { where: { id } })
    }
    return true
  }
}
