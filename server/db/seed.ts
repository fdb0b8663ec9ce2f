import { createHash } from 'node:crypto'
import { pathToFileURL } from 'node:url'
import { pino } from 'pino'
import { resolve } from '#shared/build/resolve.ts'
import { readBuild } from '#shared/build/read.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import { processConfig } from '../config.ts'
import { readExamples, type ExampleFile } from '../files/exampleFiles.ts'
import { makeContext } from '../makeContext.ts'
import { Build, BuildMember, BuildRevision, User } from '../models/index.ts'
import { lapseApprovals } from '../services/approvalService.ts'
import { writeBuild } from '../services/buildService.ts'
import { contentColumns, promptVerdict } from '../services/buildSummary.ts'
import { contentHash } from '../services/contentHash.ts'
import type { Context } from '../services/context.ts'
import { keepDrives } from '../services/driveIndex.ts'
import { keepPins } from '../services/keepPins.ts'
import { hashPassword } from '../services/passwordService.ts'
import { demoAccounts } from './demoAccounts.ts'
import { withLock } from './lock.ts'
import { migrateUp } from './migrate.ts'

/**
 * Demo people and a build of every example. Can be run again and again: what is there stays, an example whose file
 * changed becomes a new revision, and a build that somebody edited is never touched.
 */
export async function seedDemo(context: Context): Promise<void> {
  await withLock(context.database, 'seed', async () => {
    await seedAccounts()
    for (const example of await readExamples(context.config.examplesDir)) await seedExample(context, example)
  })
}

async function seedAccounts(): Promise<void> {
  const there = new Set((await User.findAll({ where: { demo: true }, attributes: ['id'] })).map((user) => user.id))
  for (const { id, email, name, password, role } of demoAccounts) {
    if (there.has(id)) continue
    const passwordHash = await hashPassword(password)
    await User.findOrCreate({ where: { email }, defaults: { id, email, name, role, passwordHash, demo: true } })
  }
}

async function seedExample(context: Context, example: ExampleFile): Promise<void> {
  const fileHash = contentHash(example.document)
  const build = await Build.findOne({ where: { demoExample: example.id } })
  if (build?.demoFileHash === fileHash) return
  const read = readBuild(example.document, (await context.catalog.current()).index)
  if (!read.ok) {
    context.log.warn({ example: example.id, problems: read.problems.slice(0, 3) }, 'example cannot be read: left out')
    return
  }
  if (!build) await addDemoBuild(context, example.id, read.document)
  else if (build.demoHash !== contentHash(read.document)) await renewDemoBuild(context, build, read.document)
  await Build.update({ demoFileHash: fileHash }, { where: { demoExample: example.id } })
}

async function addDemoBuild(context: Context, exampleId: string, document: BuildDocument): Promise<void> {
  const people = demoAccounts.flatMap(({ id, buildRole }) => (buildRole === null ? [] : [{ id, buildRole }]))
  const owner = demoOwner()
  const id = demoBuildId(exampleId)
  await context.database.transaction(async (transaction) => {
    const label = 'Demo'
    await writeBuild(context, { id, document, label, authorId: owner.id, demoExample: exampleId }, transaction)
    for (const person of people)
      await BuildMember.create({ buildId: id, userId: person.id, role: person.buildRole }, { transaction })
  })
}

function demoOwner() {
  const owner = demoAccounts.find((person) => person.buildRole === 'owner')
  if (!owner) throw new Error('the demo has no owner')
  return owner
}

/** The example's file changed: a new revision, unless somebody has worked on the build. */
async function renewDemoBuild(context: Context, build: Build, document: BuildDocument): Promise<void> {
  const catalog = await context.catalog.current()
  const hash = contentHash(document)
  await context.database.transaction(async (transaction) => {
    await build.reload({ transaction, lock: transaction.LOCK.UPDATE })
    const where = { buildId: build.id, revision: build.revision }
    const newest = await BuildRevision.findOne({ where, attributes: ['hash', 'authorId'], transaction })
    if (newest?.hash !== build.demoHash) return
    const revision = build.revision + 1
    await BuildRevision.append(
      {
        buildId: build.id,
        revision,
        document,
        hash,
        edits: [],
        label: 'Demo, renewed',
        base: build.revision,
        requestId: null,
        authorId: newest.authorId,
        savedAt: new Date(),
      },
      transaction,
    )
    await build.update(
      {
        revision,
        ...contentColumns(document, resolve(document, catalog.index)),
        ...(await promptVerdict(context, document, catalog, revision)),
        demoHash: hash,
        changedAt: new Date(),
      },
      { transaction },
    )
    await keepDrives(context.database, { buildId: build.id, document, edits: [] }, transaction)
    await keepPins(context, { buildId: build.id, revision, document }, transaction)
    const cause = { userId: newest.authorId ?? demoOwner().id }
    await lapseApprovals(context, { buildId: build.id, revision, document, cause }, transaction)
  })
}

/** The same example has the same address on every installation. */
function demoBuildId(exampleId: string): string {
  const hex = createHash('sha256').update(`bayloom-example:${exampleId}`).digest('hex')
  return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-4${hex.slice(13, 16)}-8${hex.slice(17, 20)}-${hex.slice(20, 32)}`
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  const config = processConfig()
  const context = makeContext(config, pino({ level: config.logLevel }))
  await migrateUp(context.database)
  if (config.demo) await seedDemo(context)
  process.stdout.write(config.demo ? 'Demo accounts and builds are in place\n' : 'BAYLOOM_DEMO=0: nothing to seed\n')
  await context.close()
}
