import { QueryTypes, type Sequelize, type Transaction } from 'sequelize'
import { apply } from '#shared/build/apply.ts'
import type { Edit } from '#shared/build/changes.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import { contentHash } from './contentHash.ts'
import { Refusal } from './refusal.ts'

type Kept = { document: BuildDocument | null; hash: string; replay_from: number | null }
type Step = { document: BuildDocument | null; edits: Edit[] }

/**
 * The document of a revision: as it lies there, or made anew from the nearest one that is kept whole and the edits
 * since. What was made anew is proved by its hash, so that nobody is ever shown something that was not saved.
 */
export async function readDocument(
  database: Sequelize,
  buildId: string,
  revision: number,
  transaction?: Transaction,
): Promise<BuildDocument> {
  const within = transaction ? { transaction } : {}
  const [kept] = await database.query<Kept>(
    'SELECT document, hash, replay_from FROM build_revisions WHERE build_id = $1 AND revision = $2',
    { bind: [buildId, revision], type: QueryTypes.SELECT, ...within },
  )
  if (!kept) throw new Refusal('not-found')
  if (kept.document) return kept.document
  const steps = await database.query<Step>(
    `SELECT CASE WHEN revision = $2 THEN document END AS document, edits FROM build_revisions
     WHERE build_id = $1 AND revision BETWEEN $2 AND $3 ORDER BY revision`,
    { bind: [buildId, kept.replay_from, revision], type: QueryTypes.SELECT, ...within },
  )
  const document = replay(steps)
  if (!document || contentHash(document) !== kept.hash)
    throw new Error(`revision ${revision} of build ${buildId} cannot be made anew from its edits`)
  return document
}

function replay([first, ...rest]: readonly Step[]): BuildDocument | null {
  if (!first?.document) return null
  return apply(
    first.document,
    rest.flatMap(({ edits }) => edits.flatMap(({ changes }) => changes)),
  )
}
