import type { DataResult } from '../datapath/result.ts'
import type { PowerResult } from '../electrical/result.ts'
import type { ResolvedBuild } from '../build/resolve.ts'
import type { Figure, MomentId, Subject } from '../check/result.ts'
import type { Severity } from '../check/severity.ts'

/** What a rule says of itself: shown on its page in the app, printed into its README, held against the code by a test. */
export interface RuleMeta {
  /** Folder name. */
  id: string
  title: string
  severities: readonly Severity[]
  /** One sentence: what it finds. */
  finds: string
  /** Why it matters, for somebody tired. */
  why: string
  /** Inputs of the document and models that it reads. */
  needs: readonly string[]
  /** Ids in `catalog/sources.json`. Empty only with `commonPractice`. */
  sources: readonly string[]
  /** True for rules of thumb of the trade. */
  commonPractice?: boolean
  /** What is disputed about the advice, where it is. */
  disputed?: string
}

/** Everything that a rule may read. All of it is computed before the first rule runs. */
export interface RuleContext {
  build: ResolvedBuild
  power: PowerResult
  data: DataResult
}

/** A finding as data. `facts` are what the rule's own `words` need; words come last. */
export interface RawFinding<Facts> {
  severity: Severity
  subjects: Subject[]
  /** Makes the key unique where one rule finds several things on one subject. */
  detail?: string
  moment?: MomentId
  load?: number
  limit?: number
  unit?: 'A' | 'W' | 'V' | 'mm' | 'TB' | 'h' | 'Gb/s' | ''
  decidedBy?: Figure[]
  about?: boolean
  facts: Facts
}

export interface Words {
  /** Which part, what is wrong, measured and allowed with unit. */
  message: string
  /** What to do. */
  remedy: string
}

/** One rule. `check` never throws on any document that the schema accepts. */
export interface Rule<Facts = unknown> {
  meta: RuleMeta
  check(context: RuleContext): RawFinding<Facts>[]
  words(finding: RawFinding<Facts>, context: RuleContext): Words
}

/** Keeps a rule's own facts type inside its file while the list holds them all alike. */
export const defineRule = <Facts>(rule: Rule<Facts>): Rule => rule as unknown as Rule
