import type { Finding } from '#shared/check/result.ts'
import { wrap } from './table.ts'

const indent = '  '

/** The findings, worst first, then those that a person accepted. */
export function findingLines(findings: readonly Finding[], width: number): string {
  if (findings.length === 0) return 'No findings: within the stated limits.'
  const open = findings.filter((finding) => !finding.accepted)
  const accepted = findings.filter((finding) => finding.accepted)
  const explained = new Set<string>()
  return [...open, ...accepted]
    .map((finding) => {
      const first = !explained.has(finding.rule)
      explained.add(finding.rule)
      return one(finding, width, first)
    })
    .join('\n\n')
}

/** One finding. Why a rule matters and where it comes from is said at its first finding. */
function one(finding: Finding, width: number, first: boolean): string {
  const { severity, rule, message, why, remedy, source, about, accepted } = finding
  const head = [severity.toUpperCase(), rule, refs(finding)].filter((word) => word !== '').join('  ')
  return [
    accepted ? `${head}  (accepted)` : head,
    wrap(about ? `${message} Rests on an unknown or guessed figure.` : message, width, indent),
    ...(first ? [wrap(`Why: ${why}`, width, indent)] : []),
    wrap(`Do: ${remedy}`, width, indent),
    ...(first && source.length > 0 ? [wrap(`From: ${source.join('; ')}`, width, indent)] : []),
    ...(accepted
      ? [
          wrap(
            `Accepted by ${accepted.by || 'unknown'} on ${accepted.on || 'unknown'}: ${accepted.reason}`,
            width,
            indent,
          ),
        ]
      : []),
  ].join('\n')
}

/** Where to look: the first few parts, the rest as a count. */
function refs({ subjects }: Finding): string {
  const places = [
    ...new Set(subjects.flatMap(({ ref, connector }) => (ref ? [connector ? `${ref}.${connector}` : ref] : []))),
  ]
  return places.length > 5 ? `${places.slice(0, 5).join(' ')} +${places.length - 5}` : places.join(' ')
}
