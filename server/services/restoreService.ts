import { changesBetween } from '#shared/build/changesBetween.ts'
import type { Change, Edit } from '#shared/build/changes.ts'
import type { SaveAnswer } from '#shared/contract/build.ts'
import type { RestoreRevisionRequest } from '#shared/contract/revisions.ts'
import type { Context } from './context.ts'
import { Refusal } from './refusal.ts'
import { saveEdits } from './revisionService.ts'
import { readDocument } from './revisionStore.ts'

/** Changes that one edit takes, as the schema says. */
const mostChanges = 40_000

/**
 * Brings an old state back as a new revision. It is an edit like any other, from the state that the person saw to the
 * old one: merged with what others did meanwhile, refused where that collides, and undone by restoring what was there.
 */
export async function restoreRevision(
  context: Context,
  userId: string,
  at: { buildId: string; revision: number },
  { base, requestId }: RestoreRevisionRequest,
): Promise<SaveAnswer> {
  return saveEdits(context, at.buildId, userId, {
    base,
    requestId,
    restored: at.revision,
    edits: async (transaction) => {
      const seen = await readDocument(context.database, at.buildId, base, transaction)
      const wanted = await readDocument(context.database, at.buildId, at.revision, transaction)
      const changes = changesBetween(seen, wanted)
      if (changes.length === 0)
        throw new Refusal('already-there', { detail: `The build is as it was in revision ${at.revision} already.` })
      return inEdits(changes, `Restore revision ${at.revision}`)
    },
  })
}

function inEdits(changes: readonly Change[], label: string): Edit[] {
  const edits: Edit[] = []
  for (let i = 0; i < changes.length; i += mostChanges)
    edits.push({ label, changes: changes.slice(i, i + mostChanges) })
  return edits
}
