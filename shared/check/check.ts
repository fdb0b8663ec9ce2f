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
import type { CheckResult } from './result.ts'
import { runRules } from './runRules.ts'
import { weakestHop } from './weakestHop.ts'

export interface CheckOptions {
  /** Rules to run; all of them by default. */
  rules?: readonly Rule[]
  /** Throws what a rule throws, instead of reporting that its check was not made. For tests. */
  strict?: boolean
}

/**
 * The checker: document and catalog in, one answer out. The same call in browser, server, command line and tests, and
 * the same answer for the same document, however its lists are ordered.
 *
 * Never throws on a document that the schema accepts; references that lead nowhere are left out.
 */
export function check(document: BuildDocument, catalog: CatalogIndex, options: CheckOptions = {}): CheckResult {
  const { document: ordered, turned } = inFixedOrder(document)
  const build = resolve(ordered, catalog)
  const data = analyseData(build)
  const power = analysePower(build, data)
  const context: RuleContext = { build, data, power }
  const found = runRules(options.rules ?? rules, context, options.strict ?? false)
  const findings = markAccepted(withUniqueKeys(sortFindings(found)), document.accepted)
  const ledger = ledgerRows(build, power)
  const moments = turnBack(momentResults(power), turned)
  return {
    build: {
      name: document.name,
      ...(document.machine === undefined ? {} : { machine: document.machine }),
      parts: build.parts.length,
      joints: build.joints.length,
      drives: build.parts.filter((part) => part.model.kind === 'drive').length,
    },
    ...summarise(findings),
    weakestHop: weakestHop(ledger, build.settings.derating),
    findings,
    ledger,
    moments,
    timeline: timelineSteps(power),
    dataPaths: toDataPaths(data),
    scan: toScanTime(data.scan),
    energy_kWhPerYear: energy_kWhPerYear(power),
    ups_VA: ups_VA(power),
  }
}
