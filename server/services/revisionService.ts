import { Op, type Transaction } from 'sequelize'
import { apply, ChangeError } from '#shared/build/apply.ts'
import type { Edit } from '#shared/build/changes.ts'
import { buildDocumentSchema, type BuildDocument } from '#shared/build/document.ts'
import { problemsOf, type DocumentProblem } from '#shared/build/problems.ts'
import { resolve, type ResolvedBuild } from '#shared/build/resolve.ts'
import { clashes, touched } from '#shared/build/touch.ts'
import type { CatalogIndex } from '#shared/catalog/catalog.ts'
import type { SaveAnswer, SaveRequest } from '#shared/contract/build.ts'
import { publish } from '../events/publish.ts'
import { Build, BuildRevision } from '../models/index.ts'
import { lapseApprovals } from './approvalService.ts'
import { contentColumns, promptVerdict } from './buildSummary.ts'
import { contentHash } from './contentHash.ts'
import type { Context } from './context.ts'
import { keepDrives } from './driveIndex.ts'
import { keepPins } from './keepPins.ts'
import { Refusal } from './refusal.ts'
import { readDocument } from './revisionStore.ts'

/** The newest state of a build while it is held for a save, and what others did since the save's base. */
interface Standing {
  build: Build
  document: BuildDocument
  since: readonly Edit[]
}

/**
 * Saves edits as a new revision. Saves of one build take turns; a save from an older base is merged where the others'
 * edits since then touch other things, and refused with what collides where they touch the same.
 */
export async function saveRevision(
  context: Context,
  buildId: string,
  authorId: string,
  request: SaveRequest,
): Promise<SaveAnswer> {
  return saveEdits(context, buildId, authorId, request)
}

/** What is saved: edits as they came, or as they are worked out once the build is held. */
interface Saving {
  base: number
  requestId: string
  edits: readonly Edit[] | ((transaction: Transaction) => Promise<readonly Edit[]>)
  /** The revision that the edits bring back. */
  restored?: number
}

/** As `saveRevision`, for edits that are made on the server too. */
export async function saveEdits(
  context: Context,
  buildId: string,
  authorId: string,
  request: Saving,
): Promise<SaveAnswer> {
  const catalog = await context.catalog.current()
  const answer = await context.database.transaction(async (transaction) => {
    const build = await holdBuild(buildId, transaction)
    const repeated = await findRepeated(build, request, transaction)
    if (repeated) return repeated
    const standing = await readStanding(context, build, request.base, transaction)
    const edits = typeof request.edits === 'function' ? await request.edits(transaction) : request.edits
    refuseClashes(standing, edits)
    const document = applyEdits(standing, edits)
    const resolved = refuseLooseEnds(standing, document, catalog.index, request.restored !== undefined)
    const revision = build.revision + 1
    const savedAt = new Date()
    const label = labelOf(edits)
    await BuildRevision.append(
      {
        buildId,
        revision,
        document,
        hash: contentHash(document),
        edits,
        label,
        base: request.base,
        requestId: request.requestId,
        authorId,
        savedAt,
        ...(request.restored === undefined ? {} : { restored: request.restored }),
      },
      transaction,
    )
    await build.update(
      {
        revision,
        ...contentColumns(document, resolved),
        ...(await promptVerdict(context, document, catalog, revision)),
        changedAt: savedAt,
        changedBy: authorId,
      },
      { transaction },
    )
    await keepDrives(context.database, { buildId, document, edits }, transaction)
    await keepPins(context, { buildId, revision, document }, transaction)
    const what =
      request.restored === undefined
        ? ({ kind: 'revision-saved', revision, label } as const)
        : ({ kind: 'revision-restored', revision, restored: request.restored } as const)
    await publish(context, buildId, { userId: authorId }, what, transaction)
    await lapseApprovals(context, { buildId, revision, document, cause: { userId: authorId } }, transaction)
    return { revision, savedAt: savedAt.toISOString(), merged: [...standing.since] }
  })
  context.jobs.wake('check builds')
  return answer
}

async function holdBuild(buildId: string, transaction: Transaction): Promise<Build> {
  const build = await Build.findByPk(buildId, { transaction, lock: transaction.LOCK.UPDATE })
  if (!build) throw new Refusal('not-found')
  return build
}

/** The first answer to a request that was already carried out. */
async function findRepeated(build: Build, request: Saving, transaction: Transaction): Promise<SaveAnswer | null> {
  const done = await BuildRevision.findOne({
    where: { buildId: build.id, requestId: request.requestId },
    attributes: ['revision', 'base', 'savedAt'],
    transaction,
  })
  if (!done) return null
  const merged = await editsBetween(build.id, done.base, done.revision, transaction)
  return { revision: done.revision, savedAt: done.savedAt.toISOString(), merged: merged ?? [] }
}

async function readStanding(context: Context, build: Build, base: number, transaction: Transaction): Promise<Standing> {
  if (base > build.revision)
    throw new Refusal('bad-input', {
      errors: [{ path: 'base', message: `the newest revision is ${build.revision}` }],
    })
  const document = await readDocument(context.database, build.id, build.revision, transaction)
  const since = await editsBetween(build.id, base, build.revision + 1, transaction)
  const standing = { build, document, since: since ?? [] }
  if (since === null) throw conflict(standing, [], 'The build was replaced as a whole.')
  return standing
}

/** Edits of the revisions after `base` and before `end`, in order; null where one of them replaced the whole. */
async function editsBetween(
  buildId: string,
  base: number,
  end: number,
  transaction: Transaction,
): Promise<Edit[] | null> {
  if (end - base <= 1) return []
  const revisions = await BuildRevision.findAll({
    where: { buildId, revision: { [Op.gt]: base, [Op.lt]: end } },
    attributes: ['edits'],
    order: ['revision'],
    transaction,
  })
  if (revisions.some((revision) => revision.edits.length === 0)) return null
  return revisions.flatMap((revision) => revision.edits)
}

const changesOf = (edits: readonly Edit[]) => edits.flatMap((edit) => edit.changes)

function conflict(standing: Standing, collisions: readonly string[], detail?: string): Refusal {
  return new Refusal('conflict', {
    ...(detail === undefined ? {} : { detail }),
    extra: {
      revision: standing.build.revision,
      theirs: standing.since,
      clashes: collisions,
      document: standing.document,
    },
  })
}

function refuseClashes(standing: Standing, edits: readonly Edit[]): void {
  if (standing.since.length === 0) return
  const found = clashes(touched(changesOf(edits)), touched(changesOf(standing.since)))
  if (found.length > 0) throw conflict(standing, found)
}

/** Edits that do not fit: the sender's mistake where nobody else changed anything, else a conflict. */
function refuseUnfit(standing: Standing, errors: readonly DocumentProblem[]): never {
  if (standing.since.length > 0) throw conflict(standing, [], errors.map((e) => `${e.path}: ${e.message}`).join('; '))
  throw new Refusal('bad-input', { errors })
}

function applyEdits(standing: Standing, edits: readonly Edit[]): BuildDocument {
  let document = standing.document
  edits.forEach((edit, i) => {
    try {
      document = apply(document, edit.changes)
    } catch (error) {
      if (!(error instanceof ChangeError)) throw error
      refuseUnfit(standing, [{ path: `edits[${i}].changes[${error.index}]`, message: error.message }])
    }
  })
  const parsed = buildDocumentSchema.safeParse(document)
  if (!parsed.success) refuseUnfit(standing, problemsOf(parsed.error))
  // Not `parsed.data`: what the edits made is kept, so that replaying them gives the same again.
  return document
}

/**
 * Refuses references that lead nowhere, but for those that led nowhere before (a model gone from the catalog). What is
 * brought back was once saved: it comes as it was.
 */
function refuseLooseEnds(
  standing: Standing,
  document: BuildDocument,
  index: CatalogIndex,
  broughtBack: boolean,
): ResolvedBuild {
  const resolved = resolve(document, index)
  if (resolved.problems.length === 0 || broughtBack) return resolved
  const before = new Set(resolve(standing.document, index).problems.map((problem) => problem.message))
  const fresh = resolved.problems.filter((problem) => !before.has(problem.message))
  if (fresh.length > 0) refuseUnfit(standing, fresh.slice(0, 100))
  return resolved
}

/** Words for the history: the labels of the edits, as far as they fit. */
function labelOf(edits: readonly Edit[]): string {
  const labels = [...new Set(edits.map((edit) => edit.label))]
  let text = labels[0] ?? ''
  for (const [i, label] of labels.entries()) {
    if (i === 0) continue
    if (text.length + label.length > 300) return `${text}; and ${labels.length - i} more`
    text += `; ${label}`
  }
  return text
}
