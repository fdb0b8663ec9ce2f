import { momentIds } from '../check/result.ts'
import { nominal_V } from '../quantity/rails.ts'
import type { Draw } from './attach.ts'
import { nothing } from './branchValues.ts'
import { courseOf, type Course } from './courses.ts'
import { states, type RailCurrents, type State } from './deviceCurrents.ts'
import { onlyWay } from './downstream.ts'
import type { Island, Islands } from './islands.ts'
import { lineIndex, returnIndex } from './lines.ts'
import { pathToSource } from './pathToSource.ts'
import type { DeviceLoad } from './result.ts'
import type { SolvedLine } from './solveLines.ts'
import type { StartPlan } from './startPlan.ts'

/** What every device takes and sees, at the worst step of each moment. */
export function deviceLoads(
  draws: readonly Draw[],
  solved: readonly SolvedLine[],
  islands: Islands,
  plan: StartPlan,
): DeviceLoad[] {
  return draws.map((draw) => {
    const { part, connector, rail, currents, share, flows } = draw
    const busiest = momentIds.map((moment) => busiestState(courseOf(moment, part, currents, plan), currents))
    const supplied = solved[lineIndex[rail]]!
    const island = islands.all[islands.of[connector.index]!]
    return {
      part,
      connector,
      rail,
      current_A: busiest.map((state) => (flows ? currents.inState[state].value * share : 0)),
      share,
      fedBy: flows ? sourcesOf(supplied, connector.index) : [],
      ...(flows && island ? voltages(draw, supplied, solved[returnIndex]!, island) : unfed),
      figures: Object.fromEntries(momentIds.map((moment, m) => [moment, currents.inState[busiest[m]!].figure])),
      about: states.some((state) => currents.inState[state].about),
    }
  })
}

const unfed = {
  voltage_V: nothing,
  aged_V: nothing,
  atHigh_V: nothing,
  drop_V: { wire: nothing, contact: nothing, return: nothing },
}

const sourcesOf = ({ network }: SolvedLine, node: number): DeviceLoad['fedBy'] =>
  network.sourcesOf(node).map(({ part, rail }) => ({ part, rail: rail! }))

/** The state of a course in which the device takes most. */
const busiestState = (course: Course, { inState }: RailCurrents): State =>
  course.reduce((most, { state }) => (inState[state].value > inState[most].value ? state : most), course[0]!.state)

/** Voltages of a device at the step of each moment at which it sees least, and where the drop comes from. */
function voltages(
  { connector, rail }: Draw,
  supplied: SolvedLine,
  returned: SolvedLine,
  { first }: Island,
): Pick<DeviceLoad, 'voltage_V' | 'aged_V' | 'atHigh_V' | 'drop_V'> {
  const node = connector.index
  const at = supplied.columns.node[node]!
  const atReturn = returned.columns.node[node]!
  // The return is solved as if it, too, were drawn from: its rise is the negative of what comes out.
  const lowest = (onRail_V: Float64Array, onReturn_V: Float64Array, m: number) => {
    let least = Infinity
    let column = first[m]!
    for (let each = column; each < first[m + 1]!; each++) {
      const volts = onRail_V[at + each]! + onReturn_V[atReturn + each]!
      if (volts >= least) continue
      least = volts
      column = each
    }
    return { volts: nominal_V[rail] + least, column }
  }
  const found = {
    voltage_V: zeros(),
    aged_V: zeros(),
    atHigh_V: zeros(),
    drop_V: { wire: zeros(), contact: zeros(), return: zeros() },
  }
  const way = onlyWay(supplied.network, node)
  for (let m = 0; m < momentIds.length; m++) {
    const { volts, column } = lowest(supplied.stated.voltage_V, returned.stated.voltage_V, m)
    found.voltage_V[m] = volts
    found.aged_V[m] = lowest(supplied.aged_V, returned.aged_V, m).volts
    found.atHigh_V[m] = lowest(supplied.high.voltage_V, returned.high.voltage_V, m).volts
    const { wire, contact } = dropOnTheWay(supplied, way, node, column)
    found.drop_V.wire[m] = wire
    found.drop_V.contact[m] = contact
    found.drop_V.return[m] = 0 - returned.stated.voltage_V[atReturn + column]!
  }
  return found
}

const zeros = (): number[] => [0, 0, 0, 0, 0, 0]

/** Shares the rail's drop between wires and contacts along the way of the current, through loops by its main path. */
function dropOnTheWay(line: SolvedLine, way: readonly number[], node: number, column: number) {
  const { network, columns, stated } = line
  const { branches } = network
  const last = way.at(-1)
  const ends = last !== undefined && branches[last]!.kind === 'feed'
  const path = ends ? way : pathToSource(network, columns, stated, node, column)
  const drop = { wire: 0, contact: 0 }
  for (const branch of path) {
    const kind = branches[branch]!.kind === 'contact' ? 'contact' : 'wire'
    drop[kind] += Math.abs(stated.current_A[columns.branch[branch]! + column]!) * network.new_ohm[branch]!
  }
  return drop
}
