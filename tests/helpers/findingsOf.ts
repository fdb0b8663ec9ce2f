import { resolve } from '#shared/build/resolve.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import type { CatalogIndex } from '#shared/catalog/catalog.ts'
import type { Finding } from '#shared/check/result.ts'
import { runRules } from '#shared/check/runRules.ts'
import { analyseData } from '#shared/datapath/analyse.ts'
import { analysePower } from '#shared/electrical/analyse.ts'
import type { Rule } from '#shared/rules/rule.ts'
import { catalog as small } from './fixtures/build.ts'

/** What one rule says of a document. Throws what the rule throws, and on a reference that leads nowhere. */
export function findingsOf(rule: Rule, document: BuildDocument, catalog: CatalogIndex = small): Finding[] {
  const build = resolve(document, catalog)
  if (build.problems.length > 0) throw new Error(JSON.stringify(build.problems))
  const data = analyseData(build)
  return runRules([rule], { build, data, power: analysePower(build, data) }, true)
}

/** Severity and first subject of each finding: what most tests ask. */
export const gist = (findings: readonly Finding[]): string[] =>
  findings.map(({ severity, subjects }) => {
    const [first] = subjects
    return `${severity} ${first?.ref ?? 'build'}${first?.connector ? `.${first.connector}` : ''}`
  })
