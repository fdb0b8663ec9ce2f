/** The topology of one direct-current network. Branch `i` joins `from[i]` and `to[i]`; held nodes keep their voltage. */
export interface Topology {
  nodes: number
  from: Int32Array
  to: Int32Array
  held: Uint8Array
}

/** How a network is solved: found once from the topology, used for any resistances and currents. */
export interface Plan extends Topology {
  /** Free nodes outside any loop, leaves first. */
  pruned: Int32Array
  /** The branch by which each pruned node hangs on the rest, in the order of `pruned`. */
  via: Int32Array
  /** Branches that lie in loops or between held nodes; empty in a radial network with one source. */
  core: Int32Array
  /** 1 where a held node reaches. */
  reached: Uint8Array
}

/** Prunes every tree off the network, so that the rest is what a sweep cannot solve. Linear in size. */
export function planNetwork(topology: Topology): Plan {
  const { nodes, from, to, held } = topology
  const branches = from.length
  const degree = new Int32Array(nodes)
  const incident = new Int32Array(nodes)
  const alive = new Uint8Array(branches)
  for (let branch = 0; branch < branches; branch++) {
    const u = from[branch]!
    const v = to[branch]!
    if (u === v) continue
    alive[branch] = 1
    degree[u]!++
    degree[v]!++
    // The exclusive or of a node's living branches is its last branch once only one is left.
    incident[u]! ^= branch
    incident[v]! ^= branch
  }

  const pruned = new Int32Array(nodes)
  const via = new Int32Array(nodes)
  let count = 0
  for (let first = 0; first < nodes; first++) {
    let node = first
    while (degree[node] === 1 && held[node] === 0) {
      const branch = incident[node]!
      const parent = from[branch] === node ? to[branch]! : from[branch]!
      pruned[count] = node
      via[count++] = branch
      alive[branch] = 0
      degree[node] = 0
      degree[parent]!--
      incident[parent]! ^= branch
      node = parent
    }
  }

  const core = new Int32Array(branches)
  let coreCount = 0
  for (let branch = 0; branch < branches; branch++) if (alive[branch] === 1) core[coreCount++] = branch
  const plan: Plan = {
    ...topology,
    pruned: pruned.subarray(0, count),
    via: via.subarray(0, count),
    core: core.subarray(0, coreCount),
    reached: held.slice(),
  }
  markReached(plan)
  return plan
}

/** Spreads from held nodes through the core, then down the pruned trees. */
function markReached({ nodes, from, to, held, pruned, via, core, reached }: Plan): void {
  if (core.length > 0) {
    const cluster = new Clusters(nodes)
    for (const branch of core) cluster.join(from[branch]!, to[branch]!)
    const fed = new Uint8Array(nodes)
    for (let node = 0; node < nodes; node++) if (held[node] === 1) fed[cluster.of(node)] = 1
    for (const branch of core)
      if (fed[cluster.of(from[branch]!)] === 1) reached[from[branch]!] = reached[to[branch]!] = 1
  }
  for (let i = pruned.length - 1; i >= 0; i--) {
    const node = pruned[i]!
    const branch = via[i]!
    const parent = from[branch] === node ? to[branch]! : from[branch]!
    reached[node] = reached[parent]!
  }
}

/** Sets of nodes that belong together. */
export class Clusters {
  readonly #parent: Int32Array

  constructor(size: number) {
    this.#parent = new Int32Array(size)
    for (let i = 0; i < size; i++) this.#parent[i] = i
  }

  /** The node that stands for the set of `node`. */
  of(node: number): number {
    const parent = this.#parent
    while (parent[node] !== node) {
      parent[node] = parent[parent[node]!]!
      node = parent[node]!
    }
    return node
  }

  /** Joins two sets; false when they already were one. */
  join(a: number, b: number): boolean {
    const first = this.of(a)
    const second = this.of(b)
    if (first === second) return false
    this.#parent[Math.max(first, second)] = Math.min(first, second)
    return true
  }
}
