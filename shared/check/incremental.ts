import type { BuildDocument, Part } from '../build/document.ts'
import { same } from '../build/same.ts'
import type { CatalogIndex } from '../catalog/catalog.ts'
import { acceptIn, analyse, judge, type Analysis, type CheckOptions } from './check.ts'
import type { CheckResult } from './result.ts'

/** Fields of a part by what an edit of them touches. Any other field makes the whole check anew. */
const fieldsByReach = {
  /** Nothing that the checker says. */
  none: ['position', 'note', 'wwn', 'makerModel'],
  /** Rules and words, but neither currents nor lanes. */
  rules: ['serial', 'bay', 'mode', 'routes_mm', 'pinTest'],
} as const

/** How far an edit reaches into the check. */
type Reach = 'none' | 'rules' | 'all'
const reaches: readonly Reach[] = ['none', 'rules', 'all']

interface Memory {
  document: BuildDocument
  analysis: Analysis
  /** The answer before anything was accepted. */
  bare: CheckResult
}

/**
 * A checker that remembers: after an edit it makes anew only what the edit can change. Dragging parts makes nothing anew,
 * accepting a finding only the marks, a serial or a bay the rules; joints, models, figures, roles and settings everything.
 * The answer equals that of `check`.
 */
export function createChecker(
  catalog: CatalogIndex,
  options: CheckOptions = {},
): (document: BuildDocument) => CheckResult {
  let memory: Memory | null = null
  return (document) => {
    const known = memory
    // Forgotten until the answer stands: a check that breaks off leaves nothing half made behind.
    memory = null
    const reach = known ? reachOf(known.document, document) : 'all'
    if (known && reach === 'none') memory = { ...known, document }
    else {
      const analysis = known && reach === 'rules' ? carryOver(known.analysis, document) : analyse(document, catalog)
      memory = { document, analysis, bare: judge(analysis, document, options) }
    }
    return acceptIn(memory.bare, document)
  }
}

/** How far the difference between two states of one build reaches. Unchanged pieces are known by identity, so it is quick. */
function reachOf(before: BuildDocument, after: BuildDocument): Reach {
  const fixed =
    before.name === after.name &&
    before.machine === after.machine &&
    same(before.settings, after.settings) &&
    same(before.models, after.models) &&
    same(before.joints, after.joints) &&
    before.parts.length === after.parts.length
  if (!fixed) return 'all'
  let furthest: Reach = 'none'
  for (const [i, part] of after.parts.entries()) {
    const was = before.parts[i]
    const reach = was ? reachOfPart(was, part) : 'all'
    if (reach === 'all') return 'all'
    if (reaches.indexOf(reach) > reaches.indexOf(furthest)) furthest = reach
  }
  return furthest
}

function reachOfPart(before: Part, after: Part): Reach {
  if (before === after) return 'none'
  let furthest: Reach = 'none'
  for (const field of new Set([...Object.keys(before), ...Object.keys(after)]) as Set<keyof Part>) {
    if (same(before[field], after[field])) continue
    if (fieldsByReach.none.some((name) => name === field)) continue
    if (!fieldsByReach.rules.some((name) => name === field)) return 'all'
    furthest = 'rules'
  }
  return furthest
}

/** Currents and lanes stay; the parts that they hold take over the new fields. */
function carryOver(analysis: Analysis, document: BuildDocument): Analysis {
  const parts = new Map(document.parts.map((part) => [part.id, part]))
  for (const resolved of analysis.build.parts) resolved.part = parts.get(resolved.part.id) ?? resolved.part
  return analysis
}
