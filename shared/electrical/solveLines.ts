import type { Line } from '../quantity/rails.ts'
import type { Draw } from './attach.ts'
import { spreadAbout } from './branchValues.ts'
import { states } from './deviceCurrents.ts'
import { fillDraws, type Islands, type Scenario } from './islands.ts'
import { lineIndex, returnIndex } from './lines.ts'
import type { LineNetwork, PowerNetwork } from './network.ts'
import { columnsOf, solveNetwork, voltagesOf, type Columns, type Solution } from './solve/solve.ts'

/** A solved line: what each branch carries and each node stands at, column by column. */
export interface SolvedLine {
  network: LineNetwork
  columns: Columns
  /** Figures as stated, contacts as new. */
  stated: Solution
  /** Voltages with contacts at the end of their life. */
  aged_V: Float64Array
  /** Currents with all loads at the low end of their figures: few verdicts ask for them. */
  low_A: () => Float64Array
  /** All of it with the loads at the high end. */
  high: Solution
  /** 1 for branches whose current rests on an unknown or guessed figure. */
  about: Uint8Array
}

/** Solves all lines for all moments: as stated, with aged contacts, and with all loads at either end of their range. */
export function solveLines({ byLine }: PowerNetwork, draws: readonly Draw[], islands: Islands): SolvedLine[] {
  const columns = byLine.map((network) => columnsOf(network.plan, layOutColumns(network, draws, islands)))
  const drawnIn = (scenario: Scenario) => {
    const drawn = columns.map(({ node }) => new Float64Array(node.at(-1)!))
    fillDraws(islands, columns, drawn, scenario)
    return drawn
  }
  const stated = drawnIn('value')
  let drawnLow: Float64Array[] | undefined
  const high = drawnIn('high')
  const guessed = markGuessed(draws, byLine)

  return byLine.map((network, i) => {
    const held_V = new Float64Array(network.plan.nodes)
    for (const source of network.sources) held_V[source.node] = source.above_V
    const { plan: topology, new_ohm, aged_ohm } = network
    const at = columns[i]!
    // Loops share anew when their contacts age; in a tree the currents stay what they are.
    const meshed = topology.core.length > 0
    const again = meshed ? stated[i]!.slice() : null
    const first = solveNetwork(topology, at, new_ohm, held_V, stated[i]!)
    let low: Float64Array | undefined
    return {
      network,
      columns: at,
      stated: first,
      aged_V: again
        ? solveNetwork(topology, at, aged_ohm, held_V, again).voltage_V
        : voltagesOf(topology, at, aged_ohm, held_V, first.current_A),
      low_A: () => (low ??= solveNetwork(topology, at, new_ohm, held_V, (drawnLow ??= drawnIn('low'))[i]!).current_A),
      high: solveNetwork(topology, at, new_ohm, held_V, high[i]!),
      about: spreadAbout(network, guessed[i]!),
    }
  })
}

/** Columns for nodes behind which something draws from this line, and for loops; sources and idle nodes own none. */
function layOutColumns({ line, plan }: LineNetwork, draws: readonly Draw[], islands: Islands): Int32Array {
  const used = new Uint8Array(plan.nodes)
  for (const draw of draws) if (draw.flows && carries(draw, line)) used[draw.connector.index] = 1
  for (let i = 0; i < plan.pruned.length; i++) {
    const node = plan.pruned[i]!
    const branch = plan.via[i]!
    if (used[node] === 1) used[plan.from[branch] === node ? plan.to[branch]! : plan.from[branch]!] = 1
  }
  for (const branch of plan.core) used[plan.from[branch]!] = used[plan.to[branch]!] = 1
  const node = new Int32Array(plan.nodes + 1)
  for (let i = 0; i < plan.nodes; i++) {
    const island = used[i] === 1 && plan.held[i] === 0 ? islands.all[islands.of[i]!] : undefined
    node[i + 1] = node[i]! + (island && island.draws.length > 0 ? island.cases : 0)
  }
  return node
}

const carries = ({ rail }: Draw, line: Line): boolean => line === 'return' || rail === line

/** By line, the nodes at which a device draws whose figures are unknown or guessed. */
function markGuessed(draws: readonly Draw[], byLine: PowerNetwork['byLine']): Uint8Array[] {
  const marks = byLine.map(({ plan }) => new Uint8Array(plan.nodes))
  for (const { connector, rail, currents, flows } of draws) {
    if (!flows || !states.some((state) => currents.inState[state].about)) continue
    marks[lineIndex[rail]]![connector.index] = 1
    marks[returnIndex]![connector.index] = 1
  }
  return marks
}
