import type { ResolvedConnector, ResolvedJoint } from '../resolve.ts'

/** Name of a connector as it is spoken and written on tape: "W2.3", "W8 leg 1", a drive's plug by the drive alone. */
export function connectorName(connector: ResolvedConnector): string {
  const { ref } = connector.part.part
  if (connector.part.model.kind === 'drive') return ref
  const { label } = connector.connector
  return /^\d+$/.test(label) ? `${ref}.${label}` : `${ref} ${label}`
}

/** "T1 drive 1 to W2 supply". */
export const jointName = (joint: ResolvedJoint): string => `${connectorName(joint.a)} to ${connectorName(joint.b)}`

/** Numbers as people say them: "1", "1 and 4", "1 to 3", "1 to 3, 7 and 9". */
export function numberRanges(numbers: Iterable<number>): string {
  const sorted = [...new Set(numbers)].sort((a, b) => a - b)
  const runs: [number, number][] = []
  for (const n of sorted) {
    const last = runs.at(-1)
    if (last && last[1] === n - 1) last[1] = n
    else runs.push([n, n])
  }
  const pieces = runs.flatMap(([from, to]) =>
    to - from >= 2 ? [`${from} to ${to}`] : from === to ? [`${from}`] : [`${from}`, `${to}`],
  )
  return listOf(pieces)
}

/** "bay 4", "bays 5 to 8". */
export function bayRange(slots: Iterable<number>): string {
  const all = [...slots]
  return `${all.length === 1 ? 'bay' : 'bays'} ${numberRanges(all)}`
}

/** "a", "a and b", "a, b and c". */
export function listOf(words: readonly string[]): string {
  if (words.length < 2) return words[0] ?? ''
  return `${words.slice(0, -1).join(', ')} and ${words.at(-1) ?? ''}`
}

/** Refs for a label, shortened where there are many: "W1, W2 and 5 more". */
export function refList(refs: readonly string[], most = 4): string {
  return refs.length <= most ? listOf(refs) : `${refs.slice(0, most - 1).join(', ')} and ${refs.length - most + 1} more`
}

/** "1 joint", "3 joints". */
export const count = (n: number, one: string, many = `${one}s`): string => `${n} ${n === 1 ? one : many}`
