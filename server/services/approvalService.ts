import { QueryTypes, type Transaction } from 'sequelize'
import type { BuildDocument } from '#shared/build/document.ts'
import { publish, type Cause } from '../events/publish.ts'
import { contentHash } from './contentHash.ts'
import type { Context } from './context.ts'

/** Hash of everything that an approval covers: all but where things are drawn on the sheet and what is bought already. */
export const approvedHash = (document: BuildDocument): string =>
  contentHash({
    ...document,
    purchases: undefined,
    parts: document.parts.map(({ position: _position, ...part }) => part),
  })

/**
 * Takes away approvals that a new revision no longer deserves: an approval covers one state of the plan, so any change but
 * moving things on the sheet or noting what was bought ends it. It stays lapsed, also where the change is taken back: ask
 * again. Called in the transaction of every new revision, and where an approval comes after the diagram moved on.
 */
export async function lapseApprovals(
  context: Context,
  moved: { buildId: string; revision: number; document: BuildDocument; cause: Cause },
  transaction: Transaction,
): Promise<void> {
  const { buildId, revision, document, cause } = moved
  const standing = await context.database.query<{ id: string; number: number; revision: number; content_hash: string }>(
    `SELECT id, number, revision, content_hash FROM rounds
     WHERE build_id = $1 AND approved_at IS NOT NULL AND lapsed_revision IS NULL AND state <> 'withdrawn'
     ORDER BY number DESC`,
    { bind: [buildId], type: QueryTypes.SELECT, transaction },
  )
  if (standing.length === 0) return
  const hash = approvedHash(document)
  const lapsed = standing.filter((round) => round.content_hash !== hash)
  const [newest] = lapsed
  if (!newest) return
  await context.database.query('UPDATE rounds SET lapsed_revision = $2 WHERE id = ANY($1)', {
    bind: [lapsed.map(({ id }) => id), revision],
    transaction,
  })
  await publish(
    context,
    buildId,
    cause,
    { kind: 'approval-lapsed', roundId: newest.id, round: newest.number, revision: newest.revision },
    transaction,
  )
}
