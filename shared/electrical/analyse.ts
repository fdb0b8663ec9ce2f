import type { ResolvedBuild } from '../build/resolve.ts'
import { momentIds, type MomentId } from '../check/result.ts'
import type { DataResult } from '../datapath/result.ts'
import { attachLoads, type Draw } from './attach.ts'
import { spreadAbout, type SolvedLine } from './branchValues.ts'
import { maySleep } from './courses.ts'
import { CurrentReader, hasStart, isSolidState, states } from './deviceCurrents.ts'
import { deviceLoads } from './deviceLoads.ts'
import { branchLoads } from './branchLoads.ts'
import { indexDraws } from './downstream.ts'
import { cutIslands, fillDraws, type Islands, scenarios } from './islands.ts'
import { lineIndex, returnIndex } from './lines.ts'
import { buildNetwork, type PowerNetwork } from './network.ts'
import { networkProblems } from './problems.ts'
import type { PowerResult } from './result.ts'
import { columnsOf, solveNetwork } from './solve/solve.ts'
import { planStart, type StartPlan } from './startPlan.ts'
import { addUpSupplies } from './supplyLoads.ts'

/**
 * Everything about power: the network built from the document, every moment solved at once, and what each rail,
 * contact, wire and device carries or sees. Never throws on a document that the schema accepts, never gives NaN.
 *
 * Takes the data paths, because a start given by a controller needs a path that passes it on.
 */
export function analysePower(build: ResolvedBuild, data: DataResult): PowerResult {
  const network = buildNetwork(build)
  const draws = attachLoads(network, new CurrentReader(build))
  const startPlan = planStart(build, data)
  const islands = cutIslands(network, draws, startPlan)
  const { fresh, aged } = solveLines(network, draws, islands, startPlan)
  const supplies = build.parts.filter(({ model }) => model.supply)
  return {
    applies: momentsOf(build, startPlan),
    ...branchLoads(fresh, islands),
    ...addUpSupplies(supplies, fresh, islands, startPlan),
    devices: deviceLoads(draws, fresh, aged, islands, startPlan),
    problems: networkProblems(fresh, draws),
    startPlan,
    network,
    draws,
    behind: indexDraws(network, draws),
    reaches: (connector, rail) => network.byLine[lineIndex[rail]]!.plan.reached[connector.index] === 1,
  }
}

/** Moments that this build has. A staged plan takes the place of the cold start. */
function momentsOf(build: ResolvedBuild, { staged }: StartPlan): ReadonlySet<MomentId> {
  const applies = new Set<MomentId>(['full-scan', 'at-rest'])
  if (build.parts.some(hasStart)) applies.add(staged ? 'staged-start' : 'cold-start')
  if (build.parts.some(maySleep)) applies.add('wake')
  if (build.parts.some(isSolidState)) applies.add('write-burst')
  return new Set(momentIds.filter((moment) => applies.has(moment)))
}

/** Solves all lines for all moments, with contacts as new and at the end of their life. */
function solveLines(
  { byLine, build }: PowerNetwork,
  draws: readonly Draw[],
  islands: Islands,
  plan: StartPlan,
): { fresh: SolvedLine[]; aged: SolvedLine[] } {
  const connectors = build.connectors.length
  const columnAt = new Int32Array(connectors + 1)
  for (let i = 0; i < connectors; i++) {
    const island = islands.all[islands.of[i]!]
    columnAt[i + 1] = columnAt[i]! + (island && island.draws.length > 0 ? island.cases * scenarios.length : 0)
  }
  const drawn = byLine.map(() => new Float64Array(columnAt[connectors]!))
  fillDraws(islands, plan, columnAt, ({ rail }) => drawn[lineIndex[rail]]!, drawn[returnIndex]!)
  const guessed = markGuessed(draws, byLine)

  const fresh: SolvedLine[] = []
  const aged: SolvedLine[] = []
  byLine.forEach((network, i) => {
    // Sources own no columns: their voltage is the same at all times.
    const nodeColumns = new Int32Array(network.plan.nodes + 1).fill(columnAt[connectors]!)
    nodeColumns.set(columnAt)
    const columns = columnsOf(network.plan, nodeColumns)
    const held_V = new Float64Array(network.plan.nodes)
    for (const source of network.sources) held_V[source.node] = source.above_V
    const about = spreadAbout(network, guessed[i]!)
    const solve = (ohm: Float64Array): SolvedLine => ({
      network,
      columns,
      solution: solveNetwork(network.plan, columns, ohm, held_V, drawn[i]!),
      about,
    })
    fresh.push(solve(network.new_ohm))
    aged.push(solve(network.aged_ohm))
  })
  return { fresh, aged }
}

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
