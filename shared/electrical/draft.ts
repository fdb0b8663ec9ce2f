import type { Line } from '../quantity/rails.ts'
import type { Branch, LineNetwork, Source } from './network.ts'
import { Clusters, planNetwork, type Plan } from './solve/plan.ts'

/** One line while its branches are gathered. */
export interface Draft {
  line: Line
  branches: Branch[]
  from: number[]
  to: number[]
  sources: Source[]
  fresh: number[]
  aged: number[]
}

/** Adds a branch between two nodes. */
export function add(draft: Draft, branch: Branch, from: number, to: number, fresh_ohm: number, aged_ohm: number): void {
  draft.branches.push(branch)
  draft.from.push(from)
  draft.to.push(to)
  draft.fresh.push(fresh_ohm)
  draft.aged.push(aged_ohm)
}

/** Plans the solution of a gathered line. */
export function finish({ line, branches, from, to, sources, fresh, aged }: Draft, connectors: number): LineNetwork {
  const nodes = connectors + sources.length
  const held = new Uint8Array(nodes)
  held.fill(1, connectors)
  const plan = planNetwork({ nodes, from: new Int32Array(from), to: new Int32Array(to), held })
  const towardsSource = new Int32Array(nodes).fill(-1)
  for (let i = 0; i < plan.pruned.length; i++) {
    const node = plan.pruned[i]!
    if (plan.reached[node] === 1) towardsSource[node] = plan.via[i]!
  }
  return {
    line,
    branches,
    sources,
    plan,
    towardsSource,
    inLoops: loopsByNode(plan),
    new_ohm: new Float64Array(fresh),
    aged_ohm: new Float64Array(aged),
    sourcesOf: groupSources(plan, sources),
  }
}

function loopsByNode({ core, from, to }: Plan): ReadonlyMap<number, readonly number[]> {
  const byNode = new Map<number, number[]>()
  for (const branch of core)
    for (const node of [from[branch]!, to[branch]!]) {
      const others = byNode.get(node)
      if (others) others.push(branch)
      else byNode.set(node, [branch])
    }
  return byNode
}

/** Which sources each piece of the network has; worked out when first asked for. */
function groupSources(plan: Plan, sources: readonly Source[]): (node: number) => readonly Source[] {
  if (sources.length < 2) return (node) => (plan.reached[node] === 1 ? sources : none)
  let grouped: ((node: number) => readonly Source[]) | undefined
  return (node) => (grouped ??= piecesOf(plan, sources))(node)
}

function piecesOf({ nodes, from, to }: Plan, sources: readonly Source[]): (node: number) => readonly Source[] {
  const pieces = new Clusters(nodes)
  for (let i = 0; i < from.length; i++) pieces.join(from[i]!, to[i]!)
  const byPiece = new Map<number, Source[]>()
  for (const source of sources) {
    const piece = pieces.of(source.node)
    const others = byPiece.get(piece)
    if (others) others.push(source)
    else byPiece.set(piece, [source])
  }
  return (node) => byPiece.get(pieces.of(node)) ?? none
}

const none: readonly Source[] = []
