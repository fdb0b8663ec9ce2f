import type { ResolvedConnector } from '../build/resolve.ts'
import type { MomentId } from '../check/result.ts'
import { type Rail } from '../quantity/rails.ts'
import { onlyWay } from './downstream.ts'
import { momentIndex } from './evidence.ts'
import { lineIndex } from './lines.ts'
import type { PowerResult } from './result.ts'

/** An open outlet and what the weakest hop on its way leaves, on the rail asked for. */
export interface SpareOutlet {
  connector: ResolvedConnector
  left_A: number
}

/**
 * Open outlets of a connector type, those with the most left first. What is left is the smallest limit minus load of
 * all contacts, wires and rails on the way from the supply, at the given moment. Outlets in loops are left out.
 */
export function spareOutlets(power: PowerResult, typeId: string, rail: Rail, moment: MomentId): SpareOutlet[] {
  return power.network.build.connectors
    .filter(
      (connector) =>
        connector.type.id === typeId &&
        connector.contacts[rail] > 0 &&
        power.reaches(connector, rail) &&
        !connector.joints.some(({ mating }) => mating.power),
    )
    .flatMap((connector): SpareOutlet[] => {
      const left_A = leftAt(power, connector, rail, moment)
      return left_A === null ? [] : [{ connector, left_A }]
    })
    .sort((a, b) => b.left_A - a.left_A)
}

function leftAt(power: PowerResult, connector: ResolvedConnector, rail: Rail, moment: MomentId): number | null {
  const m = momentIndex(moment)
  let left = Infinity
  for (const line of [rail, 'return'] as const) {
    const at = lineIndex[line]
    const network = power.network.byLine[at]!
    const way = onlyWay(network, connector.index)
    const last = way.at(-1)
    const feed = last === undefined ? undefined : network.branches[last]
    if (feed?.kind !== 'feed') return null
    for (const branch of way) {
      const load = power.byBranch[at]![branch]
      if (load && load.limit_A !== null) left = Math.min(left, load.limit_A - Math.abs(load.current_A[m]!))
    }
    for (const { part, rail: fed, current_A } of power.rails)
      if (part === feed.source.part && fed === feed.source.rail)
        left = Math.min(left, (fed.limit_A.value ?? fed.limit_A.low ?? 0) - current_A[m]!)
  }
  return left === Infinity ? null : left
}
