import { CholeskyDecomposition, Matrix } from 'ml-matrix'

/** Solves for the node voltages: `at` places each free node's columns, `draw_A` is what is drawn there. */
export type Factors = (at: Int32Array, draw_A: Float64Array) => Float64Array

/** Nodes with more neighbours than this are left to the dense solver: eliminating them would fill the network. */
const maxNeighbours = 16

interface Eliminated {
  node: number
  /** Sum of its conductances. */
  pivot: number
  neighbours: number[]
  conductances: number[]
}

/**
 * Prepares a network of conductances between nodes, some held (`held_V` not NaN), for any currents.
 *
 * Nodes with few neighbours are eliminated one by one, fewest first: a chain becomes one branch, a star becomes a
 * mesh. Pivots are sums of conductances, so nothing cancels. What stays is solved by Cholesky decomposition.
 */
export function factorise(
  nodes: number,
  held_V: Float64Array,
  branches: number,
  from: Int32Array,
  to: Int32Array,
  conductance: Float64Array,
): Factors {
  const around: Map<number, number>[] = Array.from({ length: nodes }, () => new Map<number, number>())
  const isHeld = (node: number) => !Number.isNaN(held_V[node]!)
  const connect = (u: number, v: number, value: number) => {
    if (u === v) return
    if (!isHeld(u)) around[u]!.set(v, (around[u]!.get(v) ?? 0) + value)
    if (!isHeld(v)) around[v]!.set(u, (around[v]!.get(u) ?? 0) + value)
  }
  for (let i = 0; i < branches; i++) connect(from[i]!, to[i]!, conductance[i]!)

  const steps: Eliminated[] = []
  const gone = new Uint8Array(nodes)
  for (let node = 0; node < nodes; node++) if (isHeld(node)) gone[node] = 1

  for (let limit = 1; limit <= maxNeighbours; limit++) {
    const stack: number[] = []
    for (let node = 0; node < nodes; node++) if (gone[node] === 0 && around[node]!.size <= limit) stack.push(node)
    while (stack.length > 0) {
      const node = stack.pop()!
      const map = around[node]!
      if (gone[node] === 1 || map.size > limit) continue
      gone[node] = 1
      const neighbours = [...map.keys()]
      const conductances = [...map.values()]
      const pivot = conductances.reduce((sum, value) => sum + value, 0)
      steps.push({ node, pivot, neighbours, conductances })
      for (const neighbour of neighbours) if (!isHeld(neighbour)) around[neighbour]!.delete(node)
      for (let i = 0; i < neighbours.length; i++)
        for (let j = i + 1; j < neighbours.length; j++)
          connect(neighbours[i]!, neighbours[j]!, (conductances[i]! * conductances[j]!) / pivot)
      for (const neighbour of neighbours)
        if (gone[neighbour] === 0 && around[neighbour]!.size <= limit) stack.push(neighbour)
    }
  }

  const blocks = denseBlocks(nodes, gone, around, isHeld)
  return (at, draw_A) => {
    const draw = Float64Array.from(draw_A)
    const voltage = new Float64Array(draw_A.length)
    for (const { node, pivot, neighbours, conductances } of steps)
      neighbours.forEach((neighbour, i) => {
        if (isHeld(neighbour)) return
        const share = conductances[i]! / pivot
        for (let k = 0, width = at[node + 1]! - at[node]!; k < width; k++)
          draw[at[neighbour]! + k]! += share * draw[at[node]! + k]!
      })
    for (const block of blocks) solveBlock(block, around, held_V, at, draw, voltage)
    for (let i = steps.length - 1; i >= 0; i--) {
      const { node, pivot, neighbours, conductances } = steps[i]!
      if (pivot === 0) continue
      for (let k = 0, width = at[node + 1]! - at[node]!; k < width; k++) {
        let sum = -draw[at[node]! + k]!
        for (let j = 0; j < neighbours.length; j++) {
          const neighbour = neighbours[j]!
          sum += conductances[j]! * (isHeld(neighbour) ? held_V[neighbour]! : voltage[at[neighbour]! + k]!)
        }
        voltage[at[node]! + k] = sum / pivot
      }
    }
    return voltage
  }
}

interface Block {
  nodes: number[]
  cholesky: CholeskyDecomposition
}

/** Groups the nodes that stay into connected blocks and decomposes each block's conductance matrix. */
function denseBlocks(
  nodes: number,
  gone: Uint8Array,
  around: readonly Map<number, number>[],
  isHeld: (node: number) => boolean,
): Block[] {
  const seen = Uint8Array.from(gone)
  const blocks: Block[] = []
  for (let first = 0; first < nodes; first++) {
    if (seen[first] === 1) continue
    seen[first] = 1
    const members = [first]
    for (const node of members)
      for (const neighbour of around[node]!.keys())
        if (seen[neighbour] === 0) {
          seen[neighbour] = 1
          members.push(neighbour)
        }
    const place = new Map(members.map((node, i) => [node, i]))
    const matrix = Matrix.zeros(members.length, members.length)
    members.forEach((node, i) => {
      let sum = 0
      for (const [neighbour, value] of around[node]!) {
        sum += value
        if (!isHeld(neighbour)) matrix.set(i, place.get(neighbour)!, -value)
      }
      matrix.set(i, i, sum)
    })
    blocks.push({ nodes: members, cholesky: new CholeskyDecomposition(matrix) })
  }
  return blocks
}

function solveBlock(
  { nodes, cholesky }: Block,
  around: readonly Map<number, number>[],
  held_V: Float64Array,
  at: Int32Array,
  draw: Float64Array,
  voltage: Float64Array,
): void {
  const width = at[nodes[0]! + 1]! - at[nodes[0]!]!
  if (width === 0) return
  const right = Matrix.zeros(nodes.length, width)
  nodes.forEach((node, i) => {
    let fromHeld = 0
    for (const [neighbour, value] of around[node]!)
      if (!Number.isNaN(held_V[neighbour]!)) fromHeld += value * held_V[neighbour]!
    for (let k = 0; k < width; k++) right.set(i, k, fromHeld - draw[at[node]! + k]!)
  })
  const solved = cholesky.solve(right)
  nodes.forEach((node, i) => {
    for (let k = 0; k < width; k++) voltage[at[node]! + k] = solved.get(i, k)
  })
}
