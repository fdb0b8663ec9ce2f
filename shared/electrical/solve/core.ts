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
  const core = plan.core.filter((branch) => reached[from[branch]!] === 1)
  const plain = core.filter((branch) => resistance_ohm[branch]! > 0)
  const bare = core.filter((branch) => !(resistance_ohm[branch]! > 0))
  const clusters = contract(plan, core, bare)

  const size = clusters.count
  const clusterHeld_V = heldVoltages(plan, clusters, held_V)
  const factors = factorise(
    size,
    clusterHeld_V,
    plain.length,
    Int32Array.from(plain, (branch) => clusters.of[from[branch]!]!),
    Int32Array.from(plain, (branch) => clusters.of[to[branch]!]!),
    Float64Array.from(plain, (branch) => 1 / resistance_ohm[branch]!),
  )

  const at = new Int32Array(size + 1)
  for (let i = 0; i < size; i++) {
    let width = 0
    for (const node of clusters.members[i]!) width = Math.max(width, columns.node[node + 1]! - columns.node[node]!)
    at[i + 1] = at[i]! + (Number.isNaN(clusterHeld_V[i]!) ? width : 0)
  }
  const draw = new Float64Array(at[size]!)
  for (let i = 0; i < size; i++)
    if (Number.isNaN(clusterHeld_V[i]!))
      for (const node of clusters.members[i]!)
        for (let k = 0, own = columns.node[node]!; k < at[i + 1]! - at[i]!; k++) draw[at[i]! + k]! += drawn_A[own + k]!
  const solved = factors(at, draw)

  const fixedAt = (node: number) => clusterHeld_V[clusters.of[node]!]!
  for (const members of clusters.members)
    for (const node of members) {
      if (held[node] === 1) continue
      const fixed = fixedAt(node)
      const own = columns.node[node]!
      const from_ = at[clusters.of[node]!]!
      for (let k = 0; k < columns.node[node + 1]! - own; k++)
        voltage_V[own + k] = Number.isNaN(fixed) ? solved[from_ + k]! : fixed
    }

  for (const branch of plain) {
    const u = from[branch]!
    const v = to[branch]!
    const conductance = 1 / resistance_ohm[branch]!
    const out = columns.branch[branch]!
    for (let k = 0; k < columns.branch[branch + 1]! - out; k++) {
      const uV = Number.isNaN(fixedAt(u)) ? solved[at[clusters.of[u]!]! + k]! : fixedAt(u)
      const vV = Number.isNaN(fixedAt(v)) ? solved[at[clusters.of[v]!]! + k]! : fixedAt(v)
      const current = (uV - vV) * conductance
      current_A[out + k] = current
      if (held[u] === 0) drawn_A[columns.node[u]! + k]! += current
      if (held[v] === 0) drawn_A[columns.node[v]! + k]! -= current
    }
  }
  return bare.length > 0 ? shareBare(plan, columns, bare, drawn_A, current_A) : []
}

interface Contracted {
  count: number
  /** Cluster of each node, -1 outside the core. */
  of: Int32Array
  members: number[][]
}

function contract({ nodes, from, to }: Plan, core: Int32Array, bare: Int32Array): Contracted {
  const sets = new Clusters(nodes)
  for (const branch of bare) sets.join(from[branch]!, to[branch]!)
  const of = new Int32Array(nodes).fill(-1)
  const numberOf = new Int32Array(nodes).fill(-1)
  const members: number[][] = []
  for (const branch of core)
    for (const node of [from[branch]!, to[branch]!]) {
      if (of[node] !== -1) continue
      const root = sets.of(node)
      if (numberOf[root] === -1) numberOf[root] = members.push([]) - 1
      of[node] = numberOf[root]!
      members[of[node]!]!.push(node)
    }
  return { count: members.length, of, members }
}

/** Voltage of each cluster that holds a source, the mean where several are tied together; NaN where free. */
function heldVoltages({ held }: Plan, { members }: Contracted, held_V: Float64Array): Float64Array {
  return Float64Array.from(members, (nodes) => {
    const sources = nodes.filter((node) => held[node] === 1)
    return sources.length === 0 ? NaN : sources.reduce((sum, node) => sum + held_V[node]!, 0) / sources.length
  })
}

/**
 * Currents of branches without resistance: each cluster's own network, solved as if its branches were alike. Trees
 * give the exact currents whatever the resistance; a loop has no answer of its own and is named.
 */
function shareBare(
  plan: Plan,
  columns: Columns,
  bare: Int32Array,
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
