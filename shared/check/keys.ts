import type { ResolvedBuild } from '../build/resolve.ts'
import type { Subject } from './result.ts'

/**
 * What a finding is known by, so that an acceptance finds it again: rule, first subject and discriminator. Written with
 * reference designations, which are given once, not with ids or places in lists.
 */
export function findingKey(build: ResolvedBuild, rule: string, subjects: readonly Subject[], detail?: string): string {
  const [first] = subjects
  const key = [rule, first ? subjectKey(build, first) : 'build', ...(detail === undefined ? [] : [detail])].join('|')
  return key.length > 300 ? key.slice(0, 300) : key
}

/** Tells findings apart that are known by the same key, as two joints drawn twice: the second gets "#2". */
export function withUniqueKeys<T extends { key: string }>(findings: readonly T[]): T[] {
  const seen = new Map<string, number>()
  return findings.map((finding) => {
    const count = (seen.get(finding.key) ?? 0) + 1
    seen.set(finding.key, count)
    return count === 1 ? finding : { ...finding, key: `${finding.key}#${count}` }
  })
}

function subjectKey(build: ResolvedBuild, subject: Subject): string {
  const ref = subject.ref ?? 'build'
  switch (subject.kind) {
    case 'build':
      return 'build'
    case 'part':
      return ref
    case 'connector':
      return `${ref}:${subject.connector ?? ''}`
    case 'conductor':
      return `${ref}#${subject.conductor ?? ''}`
    case 'rail':
    case 'group':
      return `${ref}=${subject.rail ?? ''}`
    case 'joint':
      return jointKey(build, subject.joint ?? '')
  }
}

/** Both ends of a joint in a fixed order, whichever way round it was drawn. */
function jointKey(build: ResolvedBuild, id: string): string {
  const joint = build.jointById.get(id)
  if (!joint) return id
  return [joint.a, joint.b]
    .map((end) => `${end.part.part.ref}:${end.connector.id}`)
    .sort()
    .join('~')
}
