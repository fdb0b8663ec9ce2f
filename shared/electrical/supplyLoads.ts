import type { ResolvedPart } from '../build/resolve.ts'
import type { SupplyRail } from '../catalog/model.ts'
import { momentIds } from '../check/result.ts'
import { nominal_V } from '../quantity/rails.ts'
import { islandOf, type SolvedLine } from './branchValues.ts'
import { type Island, type Islands, scenarios } from './islands.ts'
import type { StageStep, SupplyGroupLoad, SupplyRailLoad, SupplyTotalLoad } from './result.ts'
import type { StartPlan } from './startPlan.ts'

export interface SupplyLoads {
  rails: SupplyRailLoad[]
  groups: SupplyGroupLoad[]
  totals: SupplyTotalLoad[]
  timeline: StageStep[]
}

/** An output of a supply into one island, as a row of solved currents. */
interface Outlet {
  rail: number
  /** First column of the feeding branch. */
  at: number
  current_A: Float64Array
}

const perMoment = () => new Float64Array(momentIds.length)
const range = () => ({ low: perMoment(), high: perMoment() })

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
  const rails = supplies.flatMap((part) =>
    part.model.supply!.rails.map((rail): SupplyRailLoad => ({
      part,
      rail,
      current_A: perMoment(),
      range_A: range(),
      about: false,
    })),
  )
  const railIndex = new Map<ResolvedPart, Map<SupplyRail, number>>()
  rails.forEach(({ part, rail }, i) => {
    const own = railIndex.get(part) ?? new Map<SupplyRail, number>()
    railIndex.set(part, own.set(rail, i))
  })
  const groups = supplies.flatMap((part) => groupsOf(part, railIndex.get(part)!))
  const totals = supplies.map((part): Total => {
    const load: SupplyTotalLoad = { part, load_W: perMoment(), range_W: range(), about: false }
    return { load, members: [...railIndex.get(part)!.values()] }
  })
  const outlets = outletsOf(solved, islands, railIndex, rails)
  for (const { load, members } of [...groups, ...totals]) load.about = members.some((i) => rails[i]!.about)

  const volts = rails.map(({ rail }) => rail.setPoint_V.value ?? nominal_V[rail.rail])
  const weighted = (members: readonly number[], now: Float64Array, by: readonly number[] | null) =>
    members.reduce((sum, i) => sum + now[i]! * (by ? by[i]! : 1), 0)
  const timeline: StageStep[] = []

  for (let moment = 0; moment < momentIds.length; moment++)
    for (let scenario = 0; scenario < scenarios.length; scenario++)
      walk(islands.all, outlets, moment, scenario, rails.length, (time, now) => {
        const keep = (of: Kept, value: number) => {
          const row = scenario === 0 ? of.stated : scenario === 1 ? of.range.low : of.range.high
          row[moment] = Math.max(row[moment]!, value)
        }
        rails.forEach((rail, i) => keep({ stated: rail.current_A, range: rail.range_A }, now[i]!))
        for (const { load, members } of groups)
          keep({ stated: load.load, range: load.range }, weighted(members, now, load.unit === 'W' ? volts : null))
        for (const { load, members } of totals)
          keep({ stated: load.load_W, range: load.range_W }, weighted(members, now, volts))
        if (scenario === 0 && plan.staged && momentIds[moment] === 'staged-start')
          timeline.push({ from_s: time, starting: startingAt(plan, time), rails_A: now.slice() })
      })
  return { rails, groups: groups.map(({ load }) => load), totals: totals.map(({ load }) => load), timeline }
}

interface Kept {
  stated: Float64Array
  range: { low: Float64Array; high: Float64Array }
}
interface Total {
  load: SupplyTotalLoad
  members: number[]
}
interface Group {
  load: SupplyGroupLoad
  members: number[]
}

function groupsOf(part: ResolvedPart, indexOf: ReadonlyMap<SupplyRail, number>): Group[] {
  const supply = part.model.supply!
  return supply.groups.flatMap((group) => {
    const members = supply.rails.filter(({ id }) => group.rails.includes(id)).map((rail) => indexOf.get(rail)!)
    const make = (unit: 'W' | 'A'): Group => ({
      load: { part, group, load: perMoment(), range: range(), unit, about: false },
      members,
    })
    return [...(group.limit_W ? [make('W')] : []), ...(group.limit_A ? [make('A')] : [])]
  })
}

function outletsOf(
  solved: readonly SolvedLine[],
  islands: Islands,
  railIndex: ReadonlyMap<ResolvedPart, ReadonlyMap<SupplyRail, number>>,
  rails: readonly SupplyRailLoad[],
): Outlet[][] {
  const outlets: Outlet[][] = islands.all.map(() => [])
  for (const line of solved)
    line.network.branches.forEach((branch, i) => {
      if (branch.kind !== 'feed' || !branch.source.rail) return
      const rail = railIndex.get(branch.source.part)!.get(branch.source.rail)!
      const island = islandOf(line, i, islands)
      if (!island) return
      outlets[island.index]!.push({ rail, at: line.columns.branch[i]!, current_A: line.solution.current_A })
      if (line.about[i] === 1) rails[rail]!.about = true
    })
  return outlets
}

/** Visits every step of a moment in order of time with the current of each rail. */
function walk(
  islands: readonly Island[],
  outlets: readonly (readonly Outlet[])[],
  moment: number,
  scenario: number,
  railCount: number,
  visit: (time: number, now: Float64Array) => void,
): void {
  const now = new Float64Array(railCount)
  const enter = (island: Island, step: number) => {
    const column = scenario * island.cases + island.first[moment]! + step
    for (const { rail, at, current_A } of outlets[island.index]!) {
      now[rail]! += current_A[at + column]!
      if (step > 0) now[rail]! -= current_A[at + column - 1]!
    }
  }
  const later: { time: number; island: Island; step: number }[] = []
  for (const island of islands) {
    if (outlets[island.index]!.length === 0) continue
    enter(island, 0)
    const times = island.times[moment]!
    for (let step = 1; step < times.length; step++) later.push({ time: times[step]!, island, step })
  }
  visit(0, now)
  later.sort((a, b) => a.time - b.time)
  for (let i = 0; i < later.length;) {
    const { time } = later[i]!
    for (; i < later.length && later[i]!.time === time; i++) enter(later[i]!.island, later[i]!.step)
    visit(time, now)
  }
}

function startingAt(plan: StartPlan, time: number): readonly ResolvedPart[] {
  const group = Math.round(time / plan.interval_s)
  const planned = group * plan.interval_s === time ? (plan.groups[group] ?? []) : []
  return time === 0 ? [...plan.idle.map(({ drive }) => drive), ...planned] : planned
}
