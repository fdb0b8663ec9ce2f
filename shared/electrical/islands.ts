import { momentIds, type MomentId } from '../check/result.ts'
import type { Draw } from './attach.ts'
import { lineIndex, returnIndex } from './lines.ts'
import type { PowerNetwork } from './network.ts'
import { Clusters } from './solve/plan.ts'
import type { Columns } from './solve/solve.ts'
import type { StartPlan } from './startPlan.ts'

/**
 * A piece of the network that hangs together without passing through a supply: a lead and all it feeds. Pieces do
 * not influence each other, so each is solved for the times at which something changes within it, and for no others.
 */
export interface Island {
  index: number
  draws: Draw[]
  /** For each moment the times at which currents change, from zero. */
  times: readonly Float64Array[]
  /** For each moment its first column; one more at the end. */
  first: Int32Array
  /** All columns. */
  cases: number
}

export interface Islands {
  all: readonly Island[]
  /** Island of each connector, -1 where no power passes. */
  of: Int32Array
}

/** Cuts the network into islands and lays out the columns of each. */
export function cutIslands(network: PowerNetwork, draws: readonly Draw[], plan: StartPlan): Islands {
  const connectors = network.build.connectors.length
  const sets = new Clusters(connectors)
  const powered = new Uint8Array(connectors)
  for (const { branches, plan: topology } of network.byLine)
    for (let i = 0; i < branches.length; i++) {
      const to = topology.to[i]!
      powered[to] = 1
      if (branches[i]!.kind === 'feed') continue
      powered[topology.from[i]!] = 1
      sets.join(topology.from[i]!, to)
    }

  const of = new Int32Array(connectors).fill(-1)
  const numberOf = new Int32Array(connectors).fill(-1)
  const drawsOf: Draw[][] = []
  for (let i = 0; i < connectors; i++) {
    if (powered[i] === 0) continue
    const root = sets.of(i)
    if (numberOf[root] === -1) numberOf[root] = drawsOf.push([]) - 1
    of[i] = numberOf[root]!
  }
  for (const draw of draws) {
    const island = of[draw.connector.index]!
    if (draw.flows && island >= 0) drawsOf[island]!.push(draw)
  }
  return { all: drawsOf.map((own, index) => layOut(index, own, plan)), of }
}

const still = Float64Array.of(0)

function layOut(index: number, draws: Draw[], plan: StartPlan): Island {
  const first = new Int32Array(momentIds.length + 1)
  const times = momentIds.map((moment, m) => {
    const own = changes(moment, m, draws, plan)
    first[m + 1] = first[m]! + own.length
    return own
  })
  return { index, draws, times, first, cases: first[momentIds.length]! }
}

function changes(moment: MomentId, m: number, draws: readonly Draw[], plan: StartPlan): Float64Array {
  if (!plan.staged || (moment !== 'staged-start' && moment !== 'wake')) return still
  const seen = new Set([0])
  for (const { courses } of draws) for (const { from } of courses[m]!) seen.add(from)
  return Float64Array.from(seen).sort()
}

/** Which end of every figure is taken: as stated, or its range's low or high end. */
export type Scenario = 'value' | 'low' | 'high'

/** Adds what each draw takes to the columns of its island at its own connector: on its rail, and on the return. */
export function fillDraws(
  islands: Islands,
  columns: readonly Columns[],
  drawn: readonly Float64Array[],
  scenario: Scenario,
): void {
  const onReturn = drawn[returnIndex]!
  for (const { draws, first, times } of islands.all)
    for (const { connector, rail, currents, courses, share, onReturn: returned } of draws) {
      const line = lineIndex[rail]
      const onRail = drawn[line]!
      const railAt = columns[line]!.node[connector.index]!
      const returnAt = columns[returnIndex]!.node[connector.index]!
      for (let m = 0; m < momentIds.length; m++) {
        const course = courses[m]!
        const steps = times[m]!
        let segment = 0
        for (let step = 0; step < steps.length; step++) {
          while (segment + 1 < course.length && course[segment + 1]!.from <= steps[step]!) segment++
          const ampere = currents.inState[course[segment]!.state][scenario] * share
          onRail[railAt + first[m]! + step]! += ampere
          onReturn[returnAt + first[m]! + step]! += ampere * returned
        }
      }
    }
}
