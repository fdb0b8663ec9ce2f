import { momentIds } from '../check/result.ts'
import { nominal_V } from '../quantity/rails.ts'
import type { Draw } from './attach.ts'
import type { SolvedLine } from './branchValues.ts'
import { courseOf, type Course } from './courses.ts'
import { states, type RailCurrents, type State } from './deviceCurrents.ts'
import type { Island, Islands } from './islands.ts'
import { lineIndex, returnIndex } from './lines.ts'
import { pathToSource } from './pathToSource.ts'
import type { DeviceLoad } from './result.ts'
import type { StartPlan } from './startPlan.ts'

/** What every device takes and sees, at the worst step of each moment. */
export function deviceLoads(
  draws: readonly Draw[],
  fresh: readonly SolvedLine[],
  aged: readonly SolvedLine[],
  islands: Islands,
  plan: StartPlan,
): DeviceLoad[] {
  return draws.map((draw) => {
    const { part, connector, rail, currents, share, flows } = draw
    const busiest = momentIds.map((moment) => busiestState(courseOf(moment, part, currents, plan), currents))
    const supplied = fresh[lineIndex[rail]]!
    const load: DeviceLoad = {
      part,
      connector,
      rail,
      current_A: Float64Array.from(busiest, (state) => (flows ? currents.inState[state].value * share : 0)),
      share,
      fedBy: flows
        ? supplied.network.sourcesOf(connector.index).map((source) => ({ part: source.part, rail: source.rail! }))
        : [],
      voltage_V: new Float64Array(momentIds.length),
      aged_V: new Float64Array(momentIds.length),
      atHigh_V: new Float64Array(momentIds.length),
      drop_V: {
        wire: new Float64Array(momentIds.length),
        contact: new Float64Array(momentIds.length),
        return: new Float64Array(momentIds.length),
      },
      figures: Object.fromEntries(momentIds.map((moment, m) => [moment, currents.inState[busiest[m]!].figure])),
      about: states.some((state) => currents.inState[state].about),
    }
    const island = islands.all[islands.of[connector.index]!]
    if (flows && island) fillVoltages(load, supplied, fresh[returnIndex]!, aged, island, draw)
    return load
  })
}

/** The state of a course in which the device takes most. */
const busiestState = (course: Course, { inState }: RailCurrents): State =>
  course.reduce((most, { state }) => (inState[state].value > inState[most].value ? state : most), course[0]!.state)

function fillVoltages(
  load: DeviceLoad,
  supplied: SolvedLine,
  returned: SolvedLine,
  aged: readonly SolvedLine[],
  { first, cases }: Island,
  { connector, rail }: Draw,
): void {
  const node = connector.index
  const at = supplied.columns.node[node]!
  const atReturn = returned.columns.node[node]!
  const agedRail = aged[lineIndex[rail]]!.solution.voltage_V
  const agedReturn = aged[returnIndex]!.solution.voltage_V
  const seen = (rails: Float64Array, returns: Float64Array, column: number) =>
    nominal_V[rail] + rails[at + column]! + returns[atReturn + column]!

  for (let m = 0; m < momentIds.length; m++) {
    let worst = first[m]!
    let lowest = Infinity
    let lowestAged = Infinity
    let lowestAtHigh = Infinity
    for (let column = first[m]!; column < first[m + 1]!; column++) {
      const volts = seen(supplied.solution.voltage_V, returned.solution.voltage_V, column)
      if (volts < lowest) {
        lowest = volts
        worst = column
      }
      lowestAged = Math.min(lowestAged, seen(agedRail, agedReturn, column))
      const high = seen(supplied.solution.voltage_V, returned.solution.voltage_V, column + 2 * cases)
      lowestAtHigh = Math.min(lowestAtHigh, high)
    }
    load.voltage_V[m] = lowest
    load.aged_V[m] = lowestAged
    load.atHigh_V[m] = lowestAtHigh
    const path = pathToSource(supplied.network, supplied.columns, supplied.solution, node, worst)
    splitDrop(load, m, supplied, path, worst)
    load.drop_V.return[m] = -returned.solution.voltage_V[atReturn + worst]! || 0
  }
}

/** Shares the rail's drop between wires and contacts along the path of the current. */
function splitDrop(load: DeviceLoad, m: number, supplied: SolvedLine, path: readonly number[], column: number): void {
  const { network, columns, solution } = supplied
  for (const branch of path) {
    const { kind } = network.branches[branch]!
    if (kind === 'feed') continue
    const drop = Math.abs(solution.current_A[columns.branch[branch]! + column]!) * network.new_ohm[branch]!
    if (kind === 'wire') load.drop_V.wire[m]! += drop
    else load.drop_V.contact[m]! += drop
  }
}
