import { randomUUID } from 'node:crypto'
import { Op, QueryTypes, type Transaction } from 'sequelize'
import { documentFormat, documentVersion, buildDocumentSchema, type BuildDocument } from '#shared/build/document.ts'
import { readBuild } from '#shared/build/read.ts'
import { resolve } from '#shared/build/resolve.ts'
import type { BuildRole, BuildSummary } from '#shared/contract/build.ts'
import { publish } from '../events/publish.ts'
import { readExample } from '../files/exampleFiles.ts'
import { Build, BuildMember, BuildRevision, Guest } from '../models/index.ts'
import { findOpenBuild, findSummary, type OpenBuild } from './buildList.ts'
import { contentColumns, promptVerdict } from './buildSummary.ts'
import { contentHash } from './contentHash.ts'
import type { Context } from './context.ts'
import type { KnownGuest } from './guestService.ts'
import { keepDrives } from './driveIndex.ts'
import { Refusal } from './refusal.ts'
import { readDocument } from './revisionStore.ts'

/** The actor's role in a build; null: none, or no such build. */
export async function findRole(context: Context, buildId: string, userId: string): Promise<BuildRole | null> {
  const rows = await context.database.query<{ role: BuildRole }>(
    'SELECT role FROM build_members WHERE build_id = $1 AND user_id = $2',
    { bind: [buildId, userId], type: QueryTypes.SELECT },
  )
  return rows[0]?.role ?? null
}

export async function openBuild(context: Context, buildId: string, userId: string): Promise<OpenBuild> {
  const build = await findOpenBuild(context.database, buildId, { userId })
  if (!build) throw new Refusal('not-found')
  return build
}

/** As `openBuild`, for somebody who came by a link. Notes when they were last here. */
export async function openBuildAsGuest(context: Context, guest: KnownGuest): Promise<OpenBuild> {
  const build = await findOpenBuild(context.database, guest.buildId, { guest })
  if (!build) throw new Refusal('not-found')
  await Guest.update({ lastSeenAt: new Date() }, { where: { id: guest.id } })
  return build
}

/** The newest document alone, whoever asks. */
export async function newestDocument(context: Context, buildId: string): Promise<BuildDocument> {
  const build = await Build.findByPk(buildId, { attributes: ['revision'] })
  if (!build) throw new Refusal('not-found')
  return readDocument(context.database, buildId, build.revision)
}

/** Makes a build: empty, or as a copy of an example. */
export async function createBuild(
  context: Context,
  userId: string,
  request: { name: string; example?: string | undefined },
): Promise<OpenBuild> {
  if (request.example === undefined) return addBuild(context, userId, emptyDocument(request.name), 'Start empty')
  const example = await readExample(context.config.examplesDir, request.example)
  if (!example) throw new Refusal('not-found', { detail: `There is no example "${request.example}".` })
  return importBuild(context, userId, { document: example.document, name: request.name }, 'Start from an example')
}

/** Makes a build from a document, if every part of it can be read; else names each error by its place. */
export async function importBuild(
  context: Context,
  userId: string,
  request: { document?: unknown; name?: string | undefined },
  label = 'Import',
): Promise<OpenBuild> {
  const read = readBuild(request.document, (await context.catalog.current()).index)
  if (!read.ok) throw new Refusal('unreadable-document', { errors: read.problems })
  const document = request.name === undefined ? read.document : { ...read.document, name: request.name }
  return addBuild(context, userId, document, label)
}

/** Makes a build of one's own from the newest state of one that may be read. */
export async function duplicateBuild(context: Context, userId: string, buildId: string): Promise<OpenBuild> {
  const { document } = await openBuild(context, buildId, userId)
  return addBuild(context, userId, { ...document, name: `Copy of ${document.name}`.slice(0, 120) }, 'Duplicate')
}

/** Puts a build away, or takes it out again. Nothing of it is lost. */
export async function setArchived(
  context: Context,
  userId: string,
  buildId: string,
  archived: boolean,
): Promise<BuildSummary> {
  await context.database.transaction(async (transaction) => {
    const archivedAt = archived ? new Date() : null
    const [changed] = await Build.update(
      { archivedAt },
      { where: { id: buildId, archivedAt: archived ? null : { [Op.ne]: null } }, transaction },
    )
    const kind = archived ? 'build-archived' : 'build-restored'
    if (changed > 0) await publish(context, buildId, { userId }, { kind }, transaction)
  })
  const summary = await findSummary(context.database, buildId, userId)
  if (!summary) throw new Refusal('not-found')
  return summary
}

const emptyDocument = (name: string): BuildDocument =>
  buildDocumentSchema.parse({ format: documentFormat, version: documentVersion, name, parts: [], joints: [] })

async function addBuild(context: Context, userId: string, document: BuildDocument, label: string): Promise<OpenBuild> {
  const id = randomUUID()
  await context.database.transaction(async (transaction) => {
    await writeBuild(context, { id, document, label, authorId: userId }, transaction)
    await BuildMember.create({ buildId: id, userId, role: 'owner' }, { transaction })
  })
  context.jobs.wake()
  return openBuild(context, id, userId)
}

/** Writes a build with its first revision. People are added by the caller, in the same transaction. */
export async function writeBuild(
  context: Context,
  made: { id: string; document: BuildDocument; label: string; authorId: string; demoExample?: string },
  transaction: Transaction,
): Promise<void> {
  const { id, document, label, authorId } = made
  const catalog = await context.catalog.current()
  const hash = contentHash(document)
  await Build.create(
    {
      id,
      revision: 1,
      ...contentColumns(document, resolve(document, catalog.index)),
      ...(await promptVerdict(context, document, catalog, 1)),
      changedBy: authorId,
      ...(made.demoExample === undefined ? {} : { demoExample: made.demoExample, demoHash: hash }),
    },
    { transaction },
  )
  await BuildRevision.append(
    {
      buildId: id,
      revision: 1,
      document,
      hash,
      edits: [],
      label,
      base: 0,
      requestId: null,
      authorId,
      savedAt: new Date(),
    },
    transaction,
  )
  await keepDrives(context.database, { buildId: id, document, edits: [] }, transaction)
}
