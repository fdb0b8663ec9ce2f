import type { CatalogIndex } from '../catalog/catalog.ts'
import type { RawFinding, Rule, RuleContext, RuleMeta } from '../rules/rule.ts'
import { findingKey } from './keys.ts'
import type { Finding } from './result.ts'
import { buildSubject, inOrder } from './subjects.ts'

/**
 * Runs every rule and puts its findings into words. A rule that breaks takes only itself down, and never silently: a
 * caution says that this check was not made. With `strict` the error is thrown instead; tests run that way.
 */
export function runRules(rules: readonly Rule[], context: RuleContext, strict: boolean): Finding[] {
  return rules.flatMap((rule) => {
    try {
      return rule.check(context).map((raw) => toFinding(rule, raw, context))
    } catch (error) {
      if (strict) throw error
      return [unfinished(rule.meta)]
    }
  })
}

function toFinding(rule: Rule, raw: RawFinding<unknown>, context: RuleContext): Finding {
  const { message, remedy } = rule.words(raw, context)
  return {
    key: findingKey(context.build, rule.meta.id, raw.subjects, raw.detail),
    rule: rule.meta.id,
    severity: raw.severity,
    subjects: inOrder(raw.subjects),
    ...(raw.moment === undefined ? {} : { moment: raw.moment }),
    ...(raw.load === undefined ? {} : { load: raw.load }),
    ...(raw.limit === undefined ? {} : { limit: raw.limit }),
    ...(raw.unit === undefined ? {} : { unit: raw.unit }),
    message,
    why: rule.meta.why,
    remedy,
    source: sourceTitles(rule.meta, context.build.catalog),
    decidedBy: raw.decidedBy ?? [],
    about: raw.about ?? false,
  }
}

function sourceTitles(meta: RuleMeta, catalog: CatalogIndex): string[] {
  const titles = meta.sources.map((id) => catalog.sources.get(id)?.title ?? id)
  return meta.commonPractice ? [...titles, 'common practice'] : titles
}

function unfinished(meta: RuleMeta): Finding {
  return {
    key: `${meta.id}|build|unfinished`,
    rule: meta.id,
    severity: 'caution',
    subjects: [buildSubject],
    message: `The check "${meta.title}" could not be carried out on this build.`,
    why: 'What this check looks for is not known here: take it as unchecked, not as good.',
    remedy: 'Look at this point by hand, and report the build document so that the check can be mended.',
    source: [],
    decidedBy: [],
    about: true,
  }
}
