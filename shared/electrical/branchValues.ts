import { momentIds } from '../check/result.ts'
import type { Island, Islands } from './islands.ts'
import type { LineNetwork } from './network.ts'
import type { PerMoment } from './result.ts'
import type { Columns, Solution } from './solve/solve.ts'

/** A solved line: what each branch carries and each node stands at, column by column. */
export interface SolvedLine {
  network: LineNetwork
  columns: Columns
  solution: Solution
  /** 1 for branches whose current rests on an unknown or guessed figure. */
  about: Uint8Array
}

/** The island that a branch belongs to; undefined where nothing draws, so that no columns were solved. */
export function islandOf({ network }: SolvedLine, branch: number, islands: Islands): Island | undefined {
  const { from, to } = network.plan
  const island = islands.of[to[branch]!] ?? islands.of[from[branch]!] ?? -1
  const found = islands.all[island]
  return found && found.draws.length > 0 ? found : undefined
}

/** The column of each moment at which a branch carries most, relative to its first; -1 for branches without columns. */
export function peakColumns(
  { columns, solution }: SolvedLine,
  branch: number,
  { first, cases }: Island,
  scenario: number,
): Int32Array {
  const at = columns.branch[branch]! + scenario * cases
  const peaks = new Int32Array(momentIds.length)
  for (let m = 0; m < momentIds.length; m++) {
    let best = first[m]!
    for (let column = best + 1; column < first[m + 1]!; column++)
      if (Math.abs(solution.current_A[at + column]!) > Math.abs(solution.current_A[at + best]!)) best = column
    peaks[m] = best
  }
  return peaks
}

/** Largest current of a branch in each moment, signed `from` to `to` in the sense in which it really flows. */
export function branchCurrents(line: SolvedLine, branch: number, island: Island | undefined, scenario = 0): PerMoment {
  const currents = new Float64Array(momentIds.length)
  if (!island || line.network.plan.reached[line.network.plan.to[branch]!] === 0) return currents
  const sense = line.network.line === 'return' ? -1 : 1
  const at = line.columns.branch[branch]! + scenario * island.cases
  peakColumns(line, branch, island, scenario).forEach((column, m) => {
    currents[m] = sense * line.solution.current_A[at + column]! || 0
  })
  return currents
}

/** Magnitudes at the low and high end of all figures. */
export function branchRange(line: SolvedLine, branch: number, island: Island | undefined) {
  const low = branchCurrents(line, branch, island, 1)
  const high = branchCurrents(line, branch, island, 2)
  for (let m = 0; m < low.length; m++) {
    low[m] = Math.abs(low[m]!)
    high[m] = Math.abs(high[m]!)
  }
  return { low, high }
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
