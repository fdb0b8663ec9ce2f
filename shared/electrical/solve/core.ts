import { Clusters, type Plan, planNetwork } from './plan.ts'
import { factorise } from './factorise.ts'
import { type Columns, columnsOf, solveNetwork } from './solve.ts'

/**
 * Solves what pruning leaves: loops, and ways between held nodes. Branches without resistance are contracted first;
 * their currents follow from what their ends must carry. Writes into `voltage_V` and `current_A`; answers with the
 * loops that have no resistance at all.
 */
export function solveCore(
  plan: Plan,
  columns: Columns,
  resistance_ohm: Float64Array,
  held_V: Float64Array,
  drawn_A: Float64Array,
  voltage_V: Float64Array,
  current_A: Float64Array,
): number[][] {
  const { from, to, held, reached } = plan
  const plain: number[] = []
  const bare: number[] = []
  for (let i = 0; i < plan.core.length; i++) {
    const branch = plan.core[i]!
    if (reached[from[branch]!] === 1) (resistance_ohm[branch]! > 0 ? plain : bare).push(branch)
  }
  const clusters = contract(plan, plain, bare)
  const clusterHeld_V = heldVoltages(plan, clusters, held_V)
  const from_ = new Int32Array(plain.length)
  const to_ = new Int32Array(plain.length)
  const conductance = new Float64Array(plain.length)
  for (let i = 0; i < plain.length; i++) {
    from_[i] = clusters.of[from[plain[i]!]!]!
    to_[i] = clusters.of[to[plain[i]!]!]!
    conductance[i] = 1 / resistance_ohm[plain[i]!]!
  }
  const solveFor = factorise(clusterHeld_V, from_, to_, conductance)

  const { node: nodeAt, branch: branchAt } = columns
  const at = clusterColumns(clusters, clusterHeld_V, nodeAt)
  const draw = new Float64Array(at[clusters.count]!)
  for (const node of clusters.nodes) {
    const cluster = clusters.of[node]!
    const own = nodeAt[node]!
    for (let k = 0; k < at[cluster + 1]! - at[cluster]!; k++) draw[at[cluster]! + k]! += drawn_A[own + k]!
  }
  const solved = solveFor(at, draw)

  for (const node of clusters.nodes) {
    if (held[node] === 1) continue
    const cluster = clusters.of[node]!
    const fixed_V = clusterHeld_V[cluster]!
    const own = nodeAt[node]!
    for (let k = 0; k < nodeAt[node + 1]! - own; k++)
      voltage_V[own + k] = Number.isNaN(fixed_V) ? solved[at[cluster]! + k]! : fixed_V
  }

  for (let i = 0; i < plain.length; i++) {
    const branch = plain[i]!
    const u = from[branch]!
    const v = to[branch]!
    const uFixed_V = clusterHeld_V[from_[i]!]!
    const vFixed_V = clusterHeld_V[to_[i]!]!
    const out = branchAt[branch]!
    for (let k = 0; k < branchAt[branch + 1]! - out; k++) {
      const u_V = Number.isNaN(uFixed_V) ? solved[at[from_[i]!]! + k]! : uFixed_V
      const v_V = Number.isNaN(vFixed_V) ? solved[at[to_[i]!]! + k]! : vFixed_V
      const current = (u_V - v_V) * conductance[i]!
      current_A[out + k] = current
      if (held[u] === 0) drawn_A[nodeAt[u]! + k]! += current
      if (held[v] === 0) drawn_A[nodeAt[v]! + k]! -= current
    }
  }
  return bare.length > 0 ? shareBare(plan, columns, bare, drawn_A, current_A) : []
}

/** Nodes of the core, those joined without resistance taken as one cluster. */
interface Contracted {
  count: number
  nodes: number[]
  /** Cluster of each node, -1 outside the core. */
  of: Int32Array
}

function contract({ nodes, from, to }: Plan, plain: readonly number[], bare: readonly number[]): Contracted {
  const sets = new Clusters(nodes)
  for (const branch of bare) sets.join(from[branch]!, to[branch]!)
  const of = new Int32Array(nodes).fill(-1)
  const numberOf = new Int32Array(nodes).fill(-1)
  const found: number[] = []
  let count = 0
  const take = (node: number) => {
    if (of[node] !== -1) return
    const root = sets.of(node)
    if (numberOf[root] === -1) numberOf[root] = count++
    of[node] = numberOf[root]!
    found.push(node)
  }
  for (const branches of [bare, plain])
    for (const branch of branches) {
      take(from[branch]!)
      take(to[branch]!)
    }
  return { count, nodes: found, of }
}

/** Voltage of each cluster that holds a source, the mean where several are tied together; NaN where free. */
function heldVoltages({ held }: Plan, { count, nodes, of }: Contracted, held_V: Float64Array): Float64Array {
  const sum = new Float64Array(count)
  const sources = new Int32Array(count)
  for (const node of nodes)
    if (held[node] === 1) {
      sum[of[node]!]! += held_V[node]!
      sources[of[node]!]!++
    }
  return sum.map((volts, cluster) => (sources[cluster] === 0 ? NaN : volts / sources[cluster]!))
}

/** Where the columns of each free cluster stand: as many as its nodes have. */
function clusterColumns({ count, nodes, of }: Contracted, clusterHeld_V: Float64Array, nodeAt: Int32Array): Int32Array {
  const at = new Int32Array(count + 1)
  for (const node of nodes) {
    const cluster = of[node]!
    if (Number.isNaN(clusterHeld_V[cluster]!))
      at[cluster + 1] = Math.max(at[cluster + 1]!, nodeAt[node + 1]! - nodeAt[node]!)
  }
  for (let cluster = 0; cluster < count; cluster++) at[cluster + 1]! += at[cluster]!
  return at
}

/**
 * Currents of branches without resistance: each cluster's own network, solved as if its branches were alike. Trees
 * give the exact currents whatever the resistance; a loop has no answer of its own and is named.
 */
function shareBare(
  plan: Plan,
  columns: Columns,
  bare: readonly number[],
  drawn_A: Float64Array,
  current_A: Float64Array,
): number[][] {
  const numberOf = new Map<number, number>()
  const nodes: number[] = []
  const local = (node: number) => {
    let index = numberOf.get(node)
    if (index === undefined) {
      index = nodes.push(node) - 1
      numberOf.set(node, index)
    }
    return index
  }
  const from = Int32Array.from(bare, (branch) => local(plan.from[branch]!))
  const to = Int32Array.from(bare, (branch) => local(plan.to[branch]!))
  const sets = new Clusters(nodes.length)
  for (let i = 0; i < bare.length; i++) sets.join(from[i]!, to[i]!)
  const held = Uint8Array.from(nodes, (node) => plan.held[node]!)
  const rooted = new Uint8Array(nodes.length)
  for (let i = 0; i < nodes.length; i++) if (held[i] === 1) rooted[sets.of(i)] = 1
  for (let i = 0; i < nodes.length; i++)
    if (rooted[sets.of(i)] === 0) {
      held[i] = 1
      rooted[sets.of(i)] = 1
    }

  const at = new Int32Array(nodes.length + 1)
  nodes.forEach((node, i) => (at[i + 1] = at[i]! + columns.node[node + 1]! - columns.node[node]!))
  const draw = new Float64Array(at[nodes.length]!)
  nodes.forEach((node, i) => draw.set(drawn_A.subarray(columns.node[node]!, columns.node[node + 1]!), at[i]!))
  const inner = planNetwork({ nodes: nodes.length, from, to, held })
  const innerColumns = columnsOf(inner, at)
  const alike = new Float64Array(bare.length).fill(1)
  const { current_A: shared } = solveNetwork(inner, innerColumns, alike, new Float64Array(nodes.length), draw)
  bare.forEach((branch, i) =>
    current_A.set(shared.subarray(innerColumns.branch[i]!, innerColumns.branch[i + 1]!), columns.branch[branch]!),
  )

  const byCluster = new Map<number, number[]>()
  for (const i of inner.core) {
    const cluster = sets.of(from[i]!)
    const loop = byCluster.get(cluster)
    if (loop) loop.push(bare[i]!)
    else byCluster.set(cluster, [bare[i]!])
  }
  return [...byCluster.values()]
}
