import { lines, type Line } from '../quantity/rails.ts'
import type { Draw } from './attach.ts'
import type { LineNetwork } from './network.ts'
import type { PowerResult } from './result.ts'

/** The branches from a node towards its source, as far as they are the only way. */
export function onlyWay({ plan, towardsSource }: LineNetwork, node: number): number[] {
  const way: number[] = []
  let at = node
  for (let branch = towardsSource[at]!; branch >= 0; branch = towardsSource[at]!) {
    way.push(branch)
    at = plan.from[branch] === at ? plan.to[branch]! : plan.from[branch]!
    if (plan.held[at] === 1) break
  }
  return way
}

/**
 * The draws whose current a branch carries. A branch of a loop shares the currents of all that hangs on the loop, so
 * it counts those whose only way ends at a loop of the same piece.
 */
export function drawsThrough(power: PowerResult, line: Line, branch: number): Draw[] {
  const network = power.network.byLine[lines.indexOf(line)]!
  const { plan, towardsSource } = network
  const inLoop = towardsSource[plan.to[branch]!] !== branch && towardsSource[plan.from[branch]!] !== branch
  const sources = network.sourcesOf(plan.to[branch]!)
  return power.draws.filter((draw) => {
    if (!draw.flows || (line !== 'return' && draw.rail !== line)) return false
    const way = onlyWay(network, draw.connector.index)
    if (!inLoop) return way.includes(branch)
    if (network.sourcesOf(draw.connector.index) !== sources) return false
    const last = way.at(-1)
    return last === undefined || (plan.held[plan.from[last]!] === 0 && plan.held[plan.to[last]!] === 0)
  })
}

/** The branch of a line's network that a load was made from. */
export function branchOf(power: PowerResult, line: Line, load: object): number {
  return power.byBranch[lines.indexOf(line)]!.findIndex((entry) => entry === load)
}
