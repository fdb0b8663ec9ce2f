import type { BuildDocument } from '#shared/build/document.ts'
import { tellChanges } from '#shared/build/compareTold.ts'
import { resolve } from '#shared/build/resolve.ts'
import { compareResults, type ResultComparison } from '#shared/check/compareResults.ts'
import type { CheckResult } from '#shared/check/result.ts'
import { comparisonLimits, type Comparison, type ComparisonQuery } from '#shared/contract/revisions.ts'
import type { CurrentCatalog } from './catalogService.ts'
import type { Context } from './context.ts'
import { findRevision } from './revisionList.ts'
import { readDocument } from './revisionStore.ts'

/** Comparisons kept in memory: revisions never change, so one that was worked out holds. */
const kept = 40

export interface ComparisonService {
  /** What changed from one revision of a build to another, and what the checker says of either. */
  compare(context: Context, buildId: string, wanted: ComparisonQuery): Promise<Comparison>
}

type Worked = Omit<Comparison, 'from' | 'to'>

export function makeComparisonService(): ComparisonService {
  const known = new Map<string, Worked>()

  async function work(context: Context, buildId: string, from: number, to: number): Promise<Worked> {
    const [before, after, catalog] = await Promise.all([
      readDocument(context.database, buildId, from),
      readDocument(context.database, buildId, to),
      context.catalog.current(),
    ])
    const results = await checkBoth(context, before, after, catalog)
    const finding = findingNames(results)
    const changes = tellChanges(resolve(before, catalog.index), resolve(after, catalog.index), finding)
    return {
      changes: changes.slice(0, comparisonLimits.changes),
      moreChanges: Math.max(0, changes.length - comparisonLimits.changes),
      results: results && shortened(compareResults(...results)),
    }
  }

  return {
    async compare(context, buildId, wanted) {
      const [from, to, { version }] = await Promise.all([
        findRevision(context, buildId, wanted.from),
        findRevision(context, buildId, wanted.to),
        context.catalog.current(),
      ])
      const key = [from.hash, to.hash, version].join(' ')
      const worked = known.get(key) ?? (await work(context, buildId, from.revision, to.revision))
      known.delete(key)
      if (worked.results) known.set(key, worked)
      for (const oldest of known.keys()) if (known.size > kept) known.delete(oldest)
      return { from, to, ...worked }
    },
  }
}

type Both = [before: CheckResult, after: CheckResult]

/** Null where the checker breaks off: what changed is told all the same. */
async function checkBoth(
  context: Context,
  before: BuildDocument,
  after: BuildDocument,
  catalog: CurrentCatalog,
): Promise<Both | null> {
  try {
    return await Promise.all([context.checks.check(before, catalog), context.checks.check(after, catalog)])
  } catch (error) {
    context.log.error({ err: error }, 'check broke off')
    return null
  }
}

/** Findings by what they say; the acceptance of one that is no longer found keeps its key. */
function findingNames(results: Both | null): (key: string) => string {
  const messages = new Map(results?.flatMap(({ findings }) => findings.map(({ key, message }) => [key, message])))
  return (key) => messages.get(key) ?? key
}

const shortened = (compared: ResultComparison) => ({
  ...compared,
  margins: compared.margins.slice(0, comparisonLimits.margins),
  moreMargins: Math.max(0, compared.margins.length - comparisonLimits.margins),
})
