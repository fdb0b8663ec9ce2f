import type { ResolvedPart } from '../build/resolve.ts'
import type { SupplyRail } from '../catalog/model.ts'
import { momentIds } from '../check/result.ts'
import { nominal_V } from '../quantity/rails.ts'
import { islandOf } from './branchValues.ts'
import type { Island, Islands } from './islands.ts'
import type { LoadRange, StageStep, SupplyGroupLoad, SupplyRailLoad, SupplyTotalLoad } from './result.ts'
import type { SolvedLine } from './solveLines.ts'
import type { StartPlan } from './startPlan.ts'

export interface SupplyLoads {
  rails: SupplyRailLoad[]
  groups: SupplyGroupLoad[]
  totals: SupplyTotalLoad[]
  timeline: StageStep[]
}

/** One rail of one supply or converter, and whether what it delivers rests on an unknown or guessed figure. */
interface Output {
  part: ResolvedPart
  rail: SupplyRail
  about: boolean
}

/** An output of a supply into one island: where its current stands among the solved ones. */
interface Outlet {
  output: number
  /** First column of the feeding branch. */
  at: number
  line: SolvedLine
}

type Scenario = 'stated' | 'low' | 'high'

const currentsOf = ({ stated, low_A, high }: SolvedLine, scenario: Scenario): Float64Array =>
  scenario === 'low' ? low_A() : (scenario === 'high' ? high : stated).current_A

/** Keeps the largest weighted sum of some outputs over the steps of each moment. */
class Meter {
  readonly largest: Record<Scenario, number[]> = { stated: zeros(), low: zeros(), high: zeros() }
  readonly range: LoadRange
  readonly #outputs: readonly number[]
  readonly #weights: readonly number[]

  constructor(outputs: readonly number[], weights: readonly number[], readLow: () => void) {
    this.#outputs = outputs
    this.#weights = weights
    const { low, high } = this.largest
    this.range = {
      get low() {
        readLow()
        return low
      },
      high,
    }
  }

  read(now_A: Float64Array, moment: number, scenario: Scenario): void {
    let sum = 0
    for (let i = 0; i < this.#outputs.length; i++) sum += now_A[this.#outputs[i]!]! * this.#weights[i]!
    const kept = this.largest[scenario]
    if (sum > kept[moment]!) kept[moment] = sum
  }
}

const zeros = (): number[] => [0, 0, 0, 0, 0, 0]

/**
 * Adds up what each supply rail, group and supply delivers: at each step of a moment the sum over all islands, and
 * the worst step of the moment. The steps of the staged start are kept as its timeline.
 */
export function addUpSupplies(
  supplies: readonly ResolvedPart[],
  solved: readonly SolvedLine[],
  islands: Islands,
  plan: StartPlan,
): SupplyLoads {
  const outputs = [
    ...supplies.flatMap((part) => part.model.supply!.rails.map((rail): Output => ({ part, rail, about: false }))),
    ...solved.flatMap(({ network }) =>
      network.sources.flatMap(({ part, rail, takes }): Output[] =>
        takes ? [{ part, rail: rail!, about: false }] : [],
      ),
    ),
  ]
  const outlets = outletsOf(solved, islands, outputs)
  const volts = outputs.map(({ rail }) => rail.setPoint_V.value ?? nominal_V[rail.rail])
  const meters: Meter[] = []
  const readAll = (m: number, scenario: Scenario, visit?: (time: number, now_A: Float64Array) => void) =>
    walk(islands.all, outlets, m, scenario, outputs.length, (time, now_A) => {
      for (const each of meters) each.read(now_A, m, scenario)
      visit?.(time, now_A)
    })
  let isLowRead = false
  const readLow = () => {
    if (isLowRead) return
    isLowRead = true
    momentIds.forEach((_, m) => readAll(m, 'low'))
  }
  const meter = (members: readonly number[], weigh: (output: number) => number): Meter => {
    const made = new Meter(members, members.map(weigh), readLow)
    meters.push(made)
    return made
  }
  const outputsOf = (part: ResolvedPart, wanted: (rail: SupplyRail) => boolean): number[] =>
    outputs.flatMap((output, i) => (output.part === part && wanted(output.rail) ? [i] : []))
  const isAbout = (members: readonly number[]) => members.some((i) => outputs[i]!.about)

  const rails = outputs.map(({ part, rail, about }, i): SupplyRailLoad => {
    const own = meter([i], () => 1)
    return { part, rail, current_A: own.largest.stated, range_A: own.range, about }
  })
  const groups = supplies.flatMap((part) =>
    part.model.supply!.groups.flatMap((group) => {
      const members = outputsOf(part, ({ id }) => group.rails.includes(id))
      const inUnit = (unit: 'W' | 'A'): SupplyGroupLoad => {
        const own = meter(members, (i) => (unit === 'W' ? volts[i]! : 1))
        return { part, group, load: own.largest.stated, range: own.range, unit, about: isAbout(members) }
      }
      return [...(group.limit_W ? [inUnit('W')] : []), ...(group.limit_A ? [inUnit('A')] : [])]
    }),
  )
  const totals = supplies.map((part): SupplyTotalLoad => {
    const members = outputsOf(part, () => true)
    const own = meter(members, (i) => volts[i]!)
    return { part, load_W: own.largest.stated, range_W: own.range, about: isAbout(members) }
  })

  const timeline: StageStep[] = []
  for (const [m, moment] of momentIds.entries()) {
    const keep = plan.staged && moment === 'staged-start'
    readAll(m, 'stated', (time, now_A) => {
      if (keep) timeline.push({ from_s: time, starting: startingAt(plan, time), rails_A: now_A.slice() })
    })
    readAll(m, 'high')
  }
  return { rails, groups, totals, timeline }
}

/** The outlets into each island; marks outputs that deliver a guessed current. */
function outletsOf(solved: readonly SolvedLine[], islands: Islands, outputs: readonly Output[]): Outlet[][] {
  const outlets: Outlet[][] = islands.all.map(() => [])
  for (const line of solved) {
    line.network.branches.forEach((branch, i) => {
      if (branch.kind !== 'feed' || !branch.source.rail) return
      const { part, rail } = branch.source
      const output = outputs.findIndex((candidate) => candidate.part === part && candidate.rail === rail)
      const island = islandOf(line, i, islands)
      if (!island || output < 0) return
      outlets[island.index]!.push({ output, at: line.columns.branch[i]!, line })
      if (line.about[i] === 1) outputs[output]!.about = true
    })
  }
  return outlets
}

/** Visits every step of a moment in order of time with the current of each output. */
function walk(
  islands: readonly Island[],
  outlets: readonly (readonly Outlet[])[],
  moment: number,
  scenario: Scenario,
  outputs: number,
  visit: (time: number, now_A: Float64Array) => void,
): void {
  const now_A = new Float64Array(outputs)
  const enter = (island: Island, step: number) => {
    const column = island.first[moment]! + step
    for (const { output, at, line } of outlets[island.index]!) {
      const currents = currentsOf(line, scenario)
      now_A[output]! += currents[at + column]!
      if (step > 0) now_A[output]! -= currents[at + column - 1]!
    }
  }
  const later: { time: number; island: Island; step: number }[] = []
  for (const island of islands) {
    if (outlets[island.index]!.length === 0) continue
    enter(island, 0)
    const times = island.times[moment]!
    for (let step = 1; step < times.length; step++) later.push({ time: times[step]!, island, step })
  }
  visit(0, now_A)
  later.sort((a, b) => a.time - b.time)
  for (let i = 0; i < later.length;) {
    const { time } = later[i]!
    for (; i < later.length && later[i]!.time === time; i++) enter(later[i]!.island, later[i]!.step)
    visit(time, now_A)
  }
}

function startingAt(plan: StartPlan, time: number): readonly ResolvedPart[] {
  const group = Math.round(time / plan.interval_s)
  const planned = group * plan.interval_s === time ? (plan.groups[group] ?? []) : []
  return time === 0 ? [...plan.idle.map(({ drive }) => drive), ...planned] : planned
}
