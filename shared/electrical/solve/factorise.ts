import { CholeskyDecomposition, Matrix } from 'ml-matrix'
import { ConductanceNetwork, type Elimination } from './eliminate.ts'

/** Solves for the node voltages: `at` places each free node's columns, `draw_A` is what is drawn there. */
export type Factors = (at: Int32Array, draw_A: Float64Array) => Float64Array

/**
 * Prepares a network of conductances between nodes, some held (`held_V` not NaN), for any currents: elimination as far
 * as it stays sparse, Cholesky decomposition for the rest.
 */
export function factorise(held_V: Float64Array, from: Int32Array, to: Int32Array, conductance: Float64Array): Factors {
  const held = new Uint8Array(held_V.length)
  for (let node = 0; node < held.length; node++) if (!Number.isNaN(held_V[node]!)) held[node] = 1
  const network = new ConductanceNetwork(held)
  for (let i = 0; i < from.length; i++) network.connect(from[i]!, to[i]!, conductance[i]!)
  const steps = network.eliminate()
  const blocks = network.blocks().map((nodes) => decompose(network, nodes, held))

  return (at, draw_A) => {
    const draw = draw_A.slice()
    const voltage = new Float64Array(draw_A.length)
    passOn(steps, held, at, draw)
    for (const block of blocks) solveBlock(network, block, held_V, at, draw, voltage)
    substitute(steps, held_V, held, at, draw, voltage)
    return voltage
  }
}

/** Hands what is drawn at each eliminated node on to its neighbours, by their conductances. */
function passOn(
  { node, pivot, first, neighbour, conductance }: Elimination,
  held: Uint8Array,
  at: Int32Array,
  draw: Float64Array,
): void {
  for (let step = 0; step < node.length; step++) {
    const own = at[node[step]!]!
    const width = at[node[step]! + 1]! - own
    for (let i = first[step]!; i < first[step + 1]!; i++) {
      if (held[neighbour[i]!] === 1) continue
      const share = conductance[i]! / pivot[step]!
      const there = at[neighbour[i]!]!
      for (let k = 0; k < width; k++) draw[there + k]! += share * draw[own + k]!
    }
  }
}

/** Works back through the eliminated nodes: each stands at the mean of its neighbours, less what is drawn. */
function substitute(
  { node, pivot, first, neighbour, conductance }: Elimination,
  held_V: Float64Array,
  held: Uint8Array,
  at: Int32Array,
  draw: Float64Array,
  voltage: Float64Array,
): void {
  for (let step = node.length - 1; step >= 0; step--) {
    if (pivot[step] === 0) continue
    const own = at[node[step]!]!
    const width = at[node[step]! + 1]! - own
    for (let k = 0; k < width; k++) {
      let sum = -draw[own + k]!
      for (let i = first[step]!; i < first[step + 1]!; i++) {
        const other = neighbour[i]!
        sum += conductance[i]! * (held[other] === 1 ? held_V[other]! : voltage[at[other]! + k]!)
      }
      voltage[own + k] = sum / pivot[step]!
    }
  }
}

interface Block {
  nodes: number[]
  cholesky: CholeskyDecomposition
}

function decompose(network: ConductanceNetwork, nodes: number[], held: Uint8Array): Block {
  const place = new Map(nodes.map((node, i) => [node, i]))
  const matrix = Matrix.zeros(nodes.length, nodes.length)
  nodes.forEach((node, i) => {
    let sum = 0
    network.forEachNeighbour(node, (neighbour, value) => {
      sum += value
      if (held[neighbour] === 0) matrix.set(i, place.get(neighbour)!, -value)
    })
    matrix.set(i, i, sum)
  })
  return { nodes, cholesky: new CholeskyDecomposition(matrix) }
}

function solveBlock(
  network: ConductanceNetwork,
  { nodes, cholesky }: Block,
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
    network.forEachNeighbour(node, (neighbour, value) => {
      if (!Number.isNaN(held_V[neighbour]!)) fromHeld += value * held_V[neighbour]!
    })
    for (let k = 0; k < width; k++) right.set(i, k, fromHeld - draw[at[node]! + k]!)
  })
  const solved = cholesky.solve(right)
  nodes.forEach((node, i) => {
    for (let k = 0; k < width; k++) voltage[at[node]! + k] = solved.get(i, k)
  })
}
