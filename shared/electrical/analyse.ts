import type { ResolvedBuild } from '../build/resolve.ts'
import { momentIds, type MomentId } from '../check/result.ts'
import type { DataResult } from '../datapath/result.ts'
import { attachLoads } from './attach.ts'
import { convertedDraws } from './converters.ts'
import { maySleep } from './courses.ts'
import { CurrentReader, hasStart, isSolidState } from './deviceCurrents.ts'
import { deviceLoads } from './deviceLoads.ts'
import { branchLoads } from './branchLoads.ts'
import { indexDraws } from './downstream.ts'
import { cutIslands } from './islands.ts'
import { lineIndex } from './lines.ts'
import { buildNetwork } from './network.ts'
import { networkProblems } from './problems.ts'
import type { PowerResult } from './result.ts'
import { solveLines } from './solveLines.ts'
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
  const startPlan = planStart(build, data)
  const draws = attachLoads(network, new CurrentReader(build), startPlan)
  const all = [...draws, ...convertedDraws(network, draws)]
  const islands = cutIslands(network, all, startPlan)
  const solved = solveLines(network, all, islands)
  const supplies = build.parts.filter(({ model }) => model.supply)
  return {
    applies: momentsOf(build, startPlan),
    ...branchLoads(solved, islands),
    ...addUpSupplies(supplies, solved, islands, startPlan),
    devices: deviceLoads(draws, solved, islands, build.settings),
    problems: networkProblems(solved, draws),
    startPlan,
    network,
    draws,
    behind: indexDraws(network, all),
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
