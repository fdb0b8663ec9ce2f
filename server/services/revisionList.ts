import { QueryTypes, type Transaction } from 'sequelize'
import type { BuildDocument } from '#shared/build/document.ts'
import {
  revisionsPageSize,
  type DescribeRevisionRequest,
  type ListRevisionsQuery,
  type Revision,
} from '#shared/contract/revisions.ts'
import { publish } from '../events/publish.ts'
import { BuildRevision } from '../models/index.ts'
import type { Context } from './context.ts'
import { Refusal } from './refusal.ts'
import { readDocument } from './revisionStore.ts'

/** The history, newest first. */
export async function listRevisions(
  context: Context,
  buildId: string,
  { before, named }: ListRevisionsQuery,
): Promise<Revision[]> {
  const rows = await context.database.query<RevisionRow>(
    `${selectRevision} WHERE r.build_id = $1 AND r.revision < $2 ${named === 'yes' ? 'AND r.name IS NOT NULL' : ''}
     ORDER BY r.revision DESC LIMIT ${revisionsPageSize}`,
    { bind: [buildId, before ?? 2 ** 31 - 1], type: QueryTypes.SELECT },
  )
  return rows.map(toView)
}

/** One revision as the history lists it; the newest one where none is named. */
export async function findRevision(
  context: Context,
  buildId: string,
  revision: number | undefined,
  transaction?: Transaction,
): Promise<Revision> {
  const [row] = await context.database.query<RevisionRow>(
    `${selectRevision} WHERE r.build_id = $1 ${revision === undefined ? '' : 'AND r.revision = $2'}
     ORDER BY r.revision DESC LIMIT 1`,
    {
      bind: revision === undefined ? [buildId] : [buildId, revision],
      type: QueryTypes.SELECT,
      ...(transaction ? { transaction } : {}),
    },
  )
  if (!row) throw new Refusal('not-found')
  return toView(row)
}

/** One revision with its document. */
export async function readRevision(
  context: Context,
  buildId: string,
  revision: number,
): Promise<{ revision: Revision; document: BuildDocument }> {
  const [view, document] = await Promise.all([
    findRevision(context, buildId, revision),
    readDocument(context.database, buildId, revision),
  ])
  return { revision: view, document }
}

/** Gives a revision a name or a note, or takes them away. What was saved stays as it is. */
export async function describeRevision(
  context: Context,
  userId: string,
  at: { buildId: string; revision: number },
  { name, note }: DescribeRevisionRequest,
): Promise<Revision> {
  return context.database.transaction(async (transaction) => {
    const before = await findRevision(context, at.buildId, at.revision, transaction)
    const words = { ...(name === undefined ? {} : { name }), ...(note === undefined ? {} : { note }) }
    await BuildRevision.update(words, { where: at, transaction })
    if (name !== undefined && name !== before.name)
      await publish(
        context,
        at.buildId,
        { userId },
        { kind: 'revision-named', revision: at.revision, name },
        transaction,
      )
    return { ...before, ...words }
  })
}

interface RevisionRow {
  revision: number
  saved_at: Date
  saved_by: string | null
  label: string
  hash: string
  name: string | null
  note: string | null
  restored: number | null
}

const selectRevision = `SELECT r.revision, r.saved_at, r.label, r.hash, r.name, r.note, r.restored, u.name AS saved_by
  FROM build_revisions r LEFT JOIN users u ON u.id = r.author_id`

const toView = ({ saved_at, saved_by, ...row }: RevisionRow): Revision => ({
  ...row,
  savedAt: saved_at.toISOString(),
  savedBy: saved_by,
})
