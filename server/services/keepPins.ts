import type { Transaction } from 'sequelize'
import type { BuildDocument } from '#shared/build/document.ts'
import type { Context } from './context.ts'

/**
 * Notes at which threads the part or joint has gone with this revision, and takes the note back where it has returned
 * (an undo, a restored revision). In the transaction of the save.
 */
export async function keepPins(
  { database }: Pick<Context, 'database'>,
  { buildId, revision, document }: { buildId: string; revision: number; document: BuildDocument },
  transaction: Transaction,
): Promise<void> {
  const parts = document.parts.map(({ id }) => id)
  const joints = document.joints.map(({ id }) => id)
  await database.query(
    `UPDATE comment_threads t SET gone_in = CASE WHEN h.there THEN NULL ELSE $2::integer END
     FROM (
       SELECT id, (part_id IS NULL OR part_id = ANY($3::text[])) AND (joint_id IS NULL OR joint_id = ANY($4::text[])) AS there
       FROM comment_threads WHERE build_id = $1 AND (part_id IS NOT NULL OR joint_id IS NOT NULL)
     ) h
     WHERE t.id = h.id AND h.there = (t.gone_in IS NOT NULL)`,
    { bind: [buildId, revision, parts, joints], transaction },
  )
}
