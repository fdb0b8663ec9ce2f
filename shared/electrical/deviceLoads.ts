import type { Settings } from '../build/document.ts'
import { momentIds } from '../check/result.ts'
import { nominal_V } from '../quantity/rails.ts'
import type { Draw } from './attach.ts'
import { nothing } from './branchValues.ts'
import type { Course } from './courses.ts'
import { states, type RailCurrents, type State } from './deviceCurrents.ts'
import { onlyWay } from './downstream.ts'
import type { Island, Islands } from './islands.ts'
import { lineIndex, returnIndex } from './lines.ts'
import { pathToSource } from './pathToSource.ts'
import type { DeviceLoad } from './result.ts'
import type { SolvedLine } from './solveLines.ts'
import { bandOf } from './tolerance.ts'

/** What every device takes and sees, at the worst step of each moment. */
export function deviceLoads(
  draws: readonly Draw[],
  solved: readonly SolvedLine[],
  islands: Islands,
  settings: Settings,
): DeviceLoad[] {
  return draws.map((draw) => {
    const { part, connector, rail, currents, courses, share, flows } = draw
    const busiest = courses.map((course) => busiestState(course, currents))
    const supplied = solved[lineIndex[rail]]!
    const island = islands.all[islands.of[connector.index]!]
    return {
      part,
      connector,
      rail,
      current_A: busiest.map((state) => (flows ? currents.inState[state].value * share : 0)),
      share,
      allowed: bandOf(part, connector, rail, settings),
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
  const found = {
    voltage_V: zeros(),
    aged_V: zeros(),
    atHigh_V: zeros(),
    drop_V: { wire: zeros(), contact: zeros(), return: zeros() },
  }
  const way = onlyWay(supplied.network, node)
  const nominal = nominal_V[rail]
  for (let m = 0; m < momentIds.length; m++) {
    const from = first[m]!
    const to = first[m + 1]!
    const column = lowestColumn(supplied.stated.voltage_V, returned.stated.voltage_V, at, atReturn, from, to)
    found.voltage_V[m] = nominal + sum(supplied.stated.voltage_V, returned.stated.voltage_V, at, atReturn, column)
    const aged = lowestColumn(supplied.aged_V, returned.aged_V, at, atReturn, from, to)
    found.aged_V[m] = nominal + sum(supplied.aged_V, returned.aged_V, at, atReturn, aged)
    const high = lowestColumn(supplied.high.voltage_V, returned.high.voltage_V, at, atReturn, from, to)
    found.atHigh_V[m] = nominal + sum(supplied.high.voltage_V, returned.high.voltage_V, at, atReturn, high)
    const { wire, contact } = dropOnTheWay(supplied, way, node, column)
    found.drop_V.wire[m] = wire
    found.drop_V.contact[m] = contact
    found.drop_V.return[m] = 0 - returned.stated.voltage_V[atReturn + column]!
  }
  return found
}

/** The return is solved as if it, too, were drawn from: its rise is the negative of what comes out. */
const sum = (onRail_V: Float64Array, onReturn_V: Float64Array, at: number, atReturn: number, column: number): number =>
  onRail_V[at + column]! + onReturn_V[atReturn + column]!

/** The first column of a moment at which the device sees least. */
function lowestColumn(
  onRail_V: Float64Array,
  onReturn_V: Float64Array,
  at: number,
  atReturn: number,
  from: number,
  to: number,
): number {
  let lowest = from
  let least = Infinity
  for (let column = from; column < to; column++) {
    const volts = onRail_V[at + column]! + onReturn_V[atReturn + column]!
    if (volts >= least) continue
    least = volts
    lowest = column
  }
  return lowest
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
