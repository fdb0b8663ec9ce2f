import type { Plan } from './plan.ts'
import { solveCore } from './core.ts'

/**
 * Where each node's and branch's values stand. A node has one value a column (a moment, a step of a timeline).
 * Parts of the network that nothing but a held node joins may have different numbers of columns; a node behind which
 * nothing is drawn needs none.
 */
export interface Columns {
  /** Node `i` owns values `node[i]` up to `node[i + 1]`. Held nodes may own none. */
  node: Int32Array
  branch: Int32Array
}

export interface Solution {
  /** Voltage of each node at each column, on the scale of the held voltages. Zero where nothing reaches. */
  voltage_V: Float64Array
  /** Current of each branch at each column, signed `from` to `to`. */
  current_A: Float64Array
  /** Loops without any resistance: their current is shared as if all branches were alike. */
  loops: readonly (readonly number[])[]
}

/** The same number of columns for every node. */
export function evenColumns(plan: Plan, width: number): Columns {
  const even = (count: number) => {
    const at = new Int32Array(count + 1)
    for (let i = 0; i < count; i++) at[i + 1] = at[i]! + width
    return at
  }
  return { node: even(plan.nodes), branch: even(plan.from.length) }
}

/** Columns of branches: those of the node that hangs by it, in a loop those of its wider end. */
export function columnsOf({ from, to, pruned, via, core }: Plan, node: Int32Array): Columns {
  const width = (at: number) => node[at + 1]! - node[at]!
  const branch = new Int32Array(from.length + 1)
  for (let i = 0; i < pruned.length; i++) branch[via[i]! + 1] = width(pruned[i]!)
  for (const inLoop of core) branch[inLoop + 1] = Math.max(width(from[inLoop]!), width(to[inLoop]!))
  for (let i = 0; i < from.length; i++) branch[i + 1]! += branch[i]!
  return { node, branch }
}

/**
 * Solves a direct-current network of resistances, held voltages and constant currents drawn at nodes.
 *
 * One sweep up the pruned trees adds the currents, the core (loops, if any) is solved as a matrix, one sweep down
 * gives the voltages. Branches without resistance are allowed anywhere. What nothing reaches carries nothing.
 * `draw_A` is used up: afterwards it holds sums.
 */
export function solveNetwork(
  plan: Plan,
  columns: Columns,
  resistance_ohm: Float64Array,
  held_V: Float64Array,
  draw_A: Float64Array,
): Solution {
  const { from, to, pruned, via, reached, held } = plan
  const { node: nodeAt, branch: branchAt } = columns
  const voltage_V = new Float64Array(draw_A.length)
  const current_A = new Float64Array(branchAt[from.length]!)

  for (let i = 0; i < pruned.length; i++) {
    const node = pruned[i]!
    if (reached[node] === 0) continue
    const branch = via[i]!
    const downward = to[branch] === node
    const parent = downward ? from[branch]! : to[branch]!
    const sign = downward ? 1 : -1
    const width = nodeAt[node + 1]! - nodeAt[node]!
    const own = nodeAt[node]!
    const out = branchAt[branch]!
    for (let k = 0; k < width; k++) current_A[out + k] = sign * draw_A[own + k]!
    if (held[parent] === 1) continue
    const above = nodeAt[parent]!
    for (let k = 0; k < width; k++) draw_A[above + k]! += draw_A[own + k]!
  }

  for (let node = 0; node < plan.nodes; node++)
    if (held[node] === 1) voltage_V.fill(held_V[node]!, nodeAt[node]!, nodeAt[node + 1]!)
  const loops =
    plan.core.length > 0 ? solveCore(plan, columns, resistance_ohm, held_V, draw_A, voltage_V, current_A) : []

  sweepDown(plan, columns, resistance_ohm, held_V, current_A, voltage_V)
  return { voltage_V, current_A, loops }
}

/**
 * The voltages of a network without loops, of which the currents are known: they are the same whatever the
 * resistances, so that another set of resistances needs no more than this.
 */
export function voltagesOf(
  plan: Plan,
  columns: Columns,
  resistance_ohm: Float64Array,
  held_V: Float64Array,
  current_A: Float64Array,
): Float64Array {
  const voltage_V = new Float64Array(columns.node[plan.nodes]!)
  sweepDown(plan, columns, resistance_ohm, held_V, current_A, voltage_V)
  return voltage_V
}

function sweepDown(
  { from, to, pruned, via, reached, held }: Plan,
  { node: nodeAt, branch: branchAt }: Columns,
  resistance_ohm: Float64Array,
  held_V: Float64Array,
  current_A: Float64Array,
  voltage_V: Float64Array,
): void {
  for (let i = pruned.length - 1; i >= 0; i--) {
    const node = pruned[i]!
    if (reached[node] === 0) continue
    const branch = via[i]!
    const downward = to[branch] === node
    const parent = downward ? from[branch]! : to[branch]!
    const drop = downward ? resistance_ohm[branch]! : -resistance_ohm[branch]!
    const own = nodeAt[node]!
    const width = nodeAt[node + 1]! - own
    const out = branchAt[branch]!
    const above = nodeAt[parent]!
    if (held[parent] === 1)
      for (let k = 0; k < width; k++) voltage_V[own + k] = held_V[parent]! - drop * current_A[out + k]!
    else for (let k = 0; k < width; k++) voltage_V[own + k] = voltage_V[above + k]! - drop * current_A[out + k]!
  }
}
