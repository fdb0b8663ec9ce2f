import type { Finding } from '#shared/check/result.ts'
import { listed } from '#shared/check/words.ts'
import { wrap } from './table.ts'

const indent = '  '

/** The findings, worst first, then those that a person accepted. */
export function findingLines(findings: readonly Finding[], width: number): string {
  if (findings.length === 0) return 'No findings: within the stated limits.'
  const open = findings.filter((finding) => !finding.accepted)
  const accepted = findings.filter((finding) => finding.accepted)
  const explained = new Set<string>()
  return [...alike(open), ...accepted.map((finding) => [finding])]
    .map((group) => {
      const first = !explained.has(group[0]!.rule)
      explained.add(group[0]!.rule)
      return one(group, width, first)
    })
    .join('\n\n')
}

/** Findings that differ in nothing but the device, drawn together: same rule, moment and remedy, each with a number. */
function alike(findings: readonly Finding[]): Finding[][] {
  const groups = new Map<string, Finding[]>()
  for (const finding of findings) {
    const { rule, severity, moment, remedy, unit, limit, key } = finding
    const shared = unit === 'V' ? [rule, severity, moment, remedy, limit].join('|') : key
    const group = groups.get(shared)
    if (group) group.push(finding)
    else groups.set(shared, [finding])
  }
  return [...groups.values()].map((group) => group.sort((a, b) => (a.load ?? 0) - (b.load ?? 0)))
}

/** "So do C2, C3 and C4, which see 4.69 to 4.70 V." */
function othersLike([, ...others]: readonly Finding[]): string[] {
  const loads = others.map(({ load }) => load ?? 0)
  const refs = [...new Set(others.map(({ subjects }) => subjects[0]?.ref ?? ''))]
  if (refs.length === 0) return []
  const [least, most] = [Math.min(...loads).toFixed(2), Math.max(...loads).toFixed(2)]
  return [`The same holds for ${listed(refs, 30)}: ${least === most ? least : `${least} to ${most}`} V.`]
}

/** One finding, and those like it. Why a rule matters and where it comes from is said at its first finding. */
function one(group: readonly Finding[], width: number, first: boolean): string {
  const finding = group[0]!
  const { severity, rule, message, why, remedy, source, about, accepted } = finding
  const head = [severity.toUpperCase(), rule, refs({ subjects: group.flatMap(({ subjects }) => subjects) })]
    .filter((word) => word !== '')
    .join('  ')
  return [
    accepted ? `${head}  (accepted)` : head,
    wrap(about ? `${message} Rests on an unknown or guessed figure.` : message, width, indent),
    ...othersLike(group).map((line) => wrap(line, width, indent)),
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
function refs({ subjects }: Pick<Finding, 'subjects'>): string {
  const places = [
    ...new Set(subjects.flatMap(({ ref, connector }) => (ref ? [connector ? `${ref}.${connector}` : ref] : []))),
  ]
  return places.length > 5 ? `${places.slice(0, 5).join(' ')} +${places.length - 5}` : places.join(' ')
}
