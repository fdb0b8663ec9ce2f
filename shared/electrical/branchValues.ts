import { momentIds } from '../check/result.ts'
import type { Island, Islands } from './islands.ts'
import type { LineNetwork } from './network.ts'
import type { LoadRange, PerMoment } from './result.ts'
import type { SolvedLine } from './solveLines.ts'

export const nothing: PerMoment = momentIds.map(() => 0)

/** The island that a branch belongs to; undefined where it carries nothing, so that no columns were solved. */
export function islandOf({ network, columns }: SolvedLine, branch: number, islands: Islands): Island | undefined {
  if (columns.branch[branch] === columns.branch[branch + 1]) return undefined
  const { from, to } = network.plan
  const island = islands.of[to[branch]!] ?? islands.of[from[branch]!] ?? -1
  return islands.all[island]
}

/** Largest current of a branch in each moment, signed `from` to `to` in the sense in which it really flows. */
export function branchCurrents(line: SolvedLine, branch: number, island: Island | undefined): PerMoment {
  if (!island) return nothing
  return peaks(line.stated.current_A, line.columns.branch[branch]!, island, line.network.line === 'return' ? -1 : 1)
}

/** Magnitudes at the low and high end of all figures, each worked out when asked for. */
export function branchRange(line: SolvedLine, branch: number, island: Island | undefined): LoadRange {
  if (!island) return { low: nothing, high: nothing }
  const at = line.columns.branch[branch]!
  let low: PerMoment | undefined
  let high: PerMoment | undefined
  return {
    get low() {
      return (low ??= peaks(line.low_A(), at, island, 0))
    },
    get high() {
      return (high ??= peaks(line.high.current_A, at, island, 0))
    },
  }
}

/** Largest magnitude of a branch at the high end of all figures, over all moments. */
export function mostAtHigh({ columns, high }: SolvedLine, branch: number): number {
  const { current_A } = high
  let most = 0
  for (let column = columns.branch[branch]!; column < columns.branch[branch + 1]!; column++) {
    const current = Math.abs(current_A[column]!)
    if (current > most) most = current
  }
  return most
}

/** The largest of each moment's columns, times `sense`; with sense 0 its magnitude. */
function peaks(current_A: Float64Array, at: number, { first }: Island, sense: -1 | 0 | 1): number[] {
  const largest = new Array<number>(momentIds.length)
  for (let m = 0; m < momentIds.length; m++) {
    const end = at + first[m + 1]!
    let most = current_A[at + first[m]!]!
    for (let column = at + first[m]! + 1; column < end; column++) {
      const current = current_A[column]!
      if (Math.abs(current) > Math.abs(most)) most = current
    }
    // Adding zero turns a negative zero into a plain one.
    largest[m] = (sense === 0 ? Math.abs(most) : sense * most) + 0
  }
  return largest
}

/** Marks the branches that carry the current of a device whose figures are unknown or guessed. */
export function spreadAbout({ plan }: LineNetwork, marked: Uint8Array): Uint8Array {
  const { from, to, pruned, via, core } = plan
  const branches = new Uint8Array(from.length)
  pruned.forEach((node, i) => {
    if (marked[node] === 0) return
    const branch = via[i]!
    branches[branch] = 1
    marked[from[branch] === node ? to[branch]! : from[branch]!] = 1
  })
  if (core.some((branch) => marked[from[branch]!] === 1 || marked[to[branch]!] === 1))
    for (const branch of core) branches[branch] = 1
  return branches
}
