import { planNetwork } from '#shared/electrical/solve/plan.ts'
import { evenColumns, solveNetwork } from '#shared/electrical/solve/solve.ts'
import { hasNgspice, solveWithNgspice, type PlainNetwork } from '../helpers/ngspice.ts'
import { median_ms, type Row } from './measure.ts'
import { randomStream } from './randomStream.ts'

const source_V = 12

/** A tree as leads and splitters make it: wide at the supply, a few hops deep. */
function radial(nodes: number, seed: number): PlainNetwork {
  const random = randomStream(seed)
  const branches = Array.from({ length: nodes - 1 }, (_, i) => ({
    from: i < 20 ? 0 : Math.floor(i / 4 + (random() * i) / 4),
    to: i + 1,
    ohm: 0.0005 + random() * 0.02,
  }))
  return {
    nodes,
    branches,
    held: new Map([[0, source_V]]),
    draw_A: Array.from({ length: nodes }, () => random() * 0.02),
  }
}

/** Backplanes of 24 bays, each fed by four leads whose inlets a plane joins: three loops in 61 nodes. */
function meshed(nodes: number, seed: number): PlainNetwork {
  const random = randomStream(seed)
  const ohm = () => 0.0005 + random() * 0.02
  const branches: PlainNetwork['branches'][number][] = []
  const draw_A = [0]
  const add = (from: number, ampere = 0) => {
    branches.push({ from, to: draw_A.length, ohm: ohm() })
    return draw_A.push(ampere) - 1
  }
  while (draw_A.length < nodes) {
    // Supply to socket, socket to lead, lead to inlet, then bay and drive.
    const inlets = Array.from({ length: 4 }, () => add(add(add(0))))
    inlets.slice(1).forEach((inlet, i) => branches.push({ from: inlets[i]!, to: inlet, ohm: ohm() }))
    for (const inlet of inlets) for (let bay = 0; bay < 6; bay++) add(add(inlet), random() * 0.5)
  }
  return { nodes: draw_A.length, branches, held: new Map([[0, source_V]]), draw_A }
}

/** Network solve beside the operating point of ngspice, its own analysis time, in the same run. */
export function networkSolveRows(): Row[] {
  const shapes: [string, PlainNetwork][] = [
    ['radial, 1,000 terminals', radial(1_000, 1)],
    ['radial, 10,000 terminals', radial(10_000, 2)],
    ['meshed, 1,000 terminals', meshed(1_000, 3)],
    ['meshed, 10,000 terminals', meshed(10_000, 4)],
  ]
  return shapes.map(([what, network]) => {
    const { from, to, ohm, held, held_V, draw_A } = typed(network)
    const topology = { nodes: network.nodes, from, to, held }
    const solve = () => {
      const plan = planNetwork(topology)
      return solveNetwork(plan, evenColumns(plan, 1), ohm, held_V, draw_A.slice())
    }
    const own_ms = median_ms(solve)
    if (!hasNgspice()) return { what: `network solve, ${what}`, own_ms, beside: 'ngspice is not installed' }
    const reference = solveWithNgspice([network], 10)
    const ngspice_ms = (reference.analysis_s * 1000) / 10
    const { voltage_V } = solve()
    const difference = reference.voltage_V[0]!.reduce(
      (most, volts, i) => Math.max(most, Math.abs(volts - voltage_V[i]!)),
      0,
    )
    const factor = (ngspice_ms / own_ms).toFixed(0)
    return {
      what: `network solve, ${what}`,
      own_ms,
      beside: `ngspice ${ngspice_ms.toFixed(2)} ms: ${factor} times faster, within ${(difference / source_V).toExponential(1)} of the source`,
    }
  })
}

function typed({ nodes, branches, held, draw_A }: PlainNetwork) {
  return {
    from: Int32Array.from(branches, (branch) => branch.from),
    to: Int32Array.from(branches, (branch) => branch.to),
    ohm: Float64Array.from(branches, (branch) => branch.ohm),
    held: Uint8Array.from({ length: nodes }, (_, node) => (held.has(node) ? 1 : 0)),
    held_V: Float64Array.from({ length: nodes }, (_, node) => held.get(node) ?? 0),
    draw_A: Float64Array.from(draw_A),
  }
}
