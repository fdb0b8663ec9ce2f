import type { Source } from '../catalog/source.ts'
import type { RuleMeta } from './rule.ts'

/** The page of a rule, made from what the rule says of itself. */
export function ruleReadme(meta: RuleMeta, sources: ReadonlyMap<string, Source>): string {
  const basis = [
    ...meta.sources.map((id) => sourceLine(id, sources.get(id))),
    ...(meta.commonPractice ? ['- Common practice of the trade'] : []),
  ]
  const sections = [
    `# ${meta.title}`,
    `\`${meta.id}\` gives ${listed(meta.severities.map((severity) => `\`${severity}\``))}.`,
    `## What it finds\n\n${meta.finds}`,
    `## Why it matters\n\n${meta.why}`,
    `## What it needs\n\n${meta.needs.map((need) => `- ${need}`).join('\n')}`,
    `## What it rests on\n\n${basis.join('\n')}`,
    ...(meta.disputed ? [`## What is disputed\n\n${meta.disputed}`] : []),
  ]
  return `${sections.join('\n\n')}\n`
}

function sourceLine(id: string, source: Source | undefined): string {
  if (!source) return `- ${id}`
  return `- ${[source.title, source.clause, source.publisher].filter(Boolean).join(', ')} (${id})`
}

function listed(items: readonly string[]): string {
  return items.length < 2 ? items.join('') : `${items.slice(0, -1).join(', ')} or ${items.at(-1)}`
}
