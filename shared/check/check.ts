import type { BuildDocument } from '../build/document.ts'
import { resolve } from '../build/resolve.ts'
import type { CatalogIndex } from '../catalog/catalog.ts'
import { analyseData } from '../datapath/analyse.ts'
import { analysePower } from '../electrical/analyse.ts'
import { energy_kWhPerYear, ups_VA } from '../electrical/wall.ts'
import { rules } from '../rules/index.ts'
import type { Rule, RuleContext } from '../rules/rule.ts'
import { markAccepted } from './accept.ts'
import { inFixedOrder, turnBack } from './canonical.ts'
import { toDataPaths, toScanTime } from './dataPaths.ts'
import { withUniqueKeys } from './keys.ts'
import { ledgerRows } from './ledger.ts'
import { momentResults, timelineSteps } from './moments.ts'
import { sortFindings, summarise } from './order.ts'
import type { CheckResult, LedgerRow, MomentResult } from './result.ts'
import { runRules } from './runRules.ts'
import { weakestHop } from './weakestHop.ts'

export interface CheckOptions {
  /** Rules to run; all of them by default. */
  rules?: readonly Rule[]
  /** Throws what a rule throws, instead of reporting that its check was not made. For tests. */
  strict?: boolean
}

/** Everything that is reckoned before the first rule runs. */
export interface Analysis extends RuleContext {
  /** Joints that were turned round for the fixed order. */
  turned: ReadonlySet<string>
}

/**
 * The checker: document and catalog in, one answer out. The same call in browser, server, command line and tests, and
 * the same answer for the same document, however its lists are ordered.
 *
 * Never throws on a document that the schema accepts; references that lead nowhere are left out.
 */
export function check(document: BuildDocument, catalog: CatalogIndex, options: CheckOptions = {}): CheckResult {
  return acceptIn(judge(analyse(document, catalog), document, options), document)
}

/** First half: references followed, lanes traced, the power network solved. */
export function analyse(document: BuildDocument, catalog: CatalogIndex): Analysis {
  const { document: ordered, turned } = inFixedOrder(document)
  const build = resolve(ordered, catalog)
  const data = analyseData(build)
  return { build, data, power: analysePower(build, data), turned }
}

/** Second half: rules, findings, words. Nobody has accepted anything yet. */
export function judge(analysis: Analysis, document: BuildDocument, options: CheckOptions = {}): CheckResult {
  const { build, data, power, turned } = analysis
  const found = runRules(options.rules ?? rules, analysis, options.strict ?? false)
  const findings = withUniqueKeys(sortFindings(found))
  let ledger: LedgerRow[] | undefined
  let moments: MomentResult[] | undefined
  return {
    build: {
      name: document.name,
      ...(document.machine === undefined ? {} : { machine: document.machine }),
      parts: build.parts.length,
      joints: build.joints.length,
      drives: build.parts.filter((part) => part.model.kind === 'drive').length,
    },
    ...summarise(findings),
    weakestHop: weakestHop(power, build.settings.derating),
    findings,
    // Thousands of rows that only some readers want: written out when first read, and then kept.
    get ledger() {
      return (ledger ??= ledgerRows(power))
    },
    get moments() {
      return (moments ??= turnBack(momentResults(power), turned))
    },
    timeline: timelineSteps(power),
    dataPaths: toDataPaths(data),
    scan: toScanTime(data.scan),
    energy_kWhPerYear: energy_kWhPerYear(power),
    ups_VA: ups_VA(power),
  }
}

/** Marks in an answer what the people of a document accepted. */
export function acceptIn(result: CheckResult, { accepted }: BuildDocument): CheckResult {
  if (accepted.length === 0) return result
  const findings = markAccepted(result.findings, accepted)
  // Copied by descriptors: a plain copy would write out the ledger.
  const copy = Object.defineProperties({}, Object.getOwnPropertyDescriptors(result)) as CheckResult
  return Object.assign(copy, { findings, ...summarise(findings) })
}
