import { lines, type Line } from '../quantity/rails.ts'
import type { Draw } from './attach.ts'
import { lineIndex } from './lines.ts'
import type { LineNetwork, PowerNetwork } from './network.ts'

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
 * Answers which draws a branch carries. Draws are put in an order in which those behind any branch of a tree stand
 * together, so that each answer is a slice. Built for a line when it is first asked for.
 */
export function indexDraws(network: PowerNetwork, draws: readonly Draw[]): (line: Line, branch: number) => Draw[] {
  const built: (LineIndex | undefined)[] = lines.map(() => undefined)
  return (line, branch) => {
    const at = lineIndex[line]
    const own = network.byLine[at]!
    const index = (built[at] ??= indexLine(own, drawsOn(line, draws)))
    const { from, to } = own.plan
    for (const node of [to[branch]!, from[branch]!])
      if (own.towardsSource[node] === branch) return index.behindNode(node)
    return loopNodes(own, branch).flatMap((node) => index.behindNode(node))
  }
}

const drawsOn = (line: Line, draws: readonly Draw[]): Draw[] =>
  draws.filter((draw) => draw.flows && (line === 'return' || draw.rail === line))

interface LineIndex {
  behindNode(node: number): Draw[]
}

function indexLine({ plan, towardsSource }: LineNetwork, draws: readonly Draw[]): LineIndex {
  const size = new Int32Array(plan.nodes)
  const own = new Int32Array(plan.nodes)
  for (const { connector } of draws) own[connector.index]!++
  size.set(own)
  const parentOf = (node: number) => {
    const branch = towardsSource[node]!
    return plan.from[branch] === node ? plan.to[branch]! : plan.from[branch]!
  }
  for (const node of plan.pruned) if (plan.reached[node] === 1) size[parentOf(node)]! += size[node]!

  const first = new Int32Array(plan.nodes)
  const next = new Int32Array(plan.nodes)
  let free = 0
  for (let node = 0; node < plan.nodes; node++) {
    if (towardsSource[node]! >= 0 || plan.reached[node] === 0) continue
    first[node] = free
    next[node] = free + own[node]!
    free += size[node]!
  }
  for (let i = plan.pruned.length - 1; i >= 0; i--) {
    const node = plan.pruned[i]!
    if (plan.reached[node] === 0) continue
    const parent = parentOf(node)
    first[node] = next[parent]!
    next[parent]! += size[node]!
    next[node] = first[node]! + own[node]!
  }

  const ordered = new Array<Draw>(draws.length)
  const filled = new Int32Array(plan.nodes)
  for (const draw of draws) {
    const node = draw.connector.index
    ordered[first[node]! + filled[node]!++] = draw
  }
  return { behindNode: (node) => ordered.slice(first[node]!, first[node]! + size[node]!) }
}

/** Free nodes of the loops that a branch is part of, sources not crossed. */
function loopNodes({ plan, inLoops }: LineNetwork, branch: number): number[] {
  const seen = new Set([plan.from[branch]!, plan.to[branch]!].filter((node) => plan.held[node] === 0))
  for (const node of seen)
    for (const other of inLoops.get(node) ?? [])
      for (const end of [plan.from[other]!, plan.to[other]!]) if (plan.held[end] === 0) seen.add(end)
  return [...seen]
}
