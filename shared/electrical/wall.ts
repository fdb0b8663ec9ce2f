import type { Supply } from '../catalog/model.ts'
import { momentIds, type MomentId } from '../check/result.ts'
import type { PowerResult } from './result.ts'

/** What the mains delivers. */
export interface WallLoad {
  watts: number
  voltAmperes: number
}

/** Taken where a supply states no power factor: the least that 80 PLUS asks at full load [S56]. */
const worstPowerFactor = 0.9
const hoursPerYear = 24 * 365

/** Nothing gives more than it takes: an efficiency or power factor outside 0 to 1 counts as not stated. */
const isShare = (value: number | undefined): value is number => value !== undefined && value > 0 && value <= 1

/** Efficiency at a share of the rated watts, between the points of the supply's curve; null without a curve. */
export function efficiencyAt(supply: Supply, share: number): number | null {
  const points = supply.efficiency.flatMap(({ share: at, efficiency }) => {
    const value = efficiency.value ?? efficiency.low
    return isShare(value) ? [{ at, value }] : []
  })
  const first = points[0]
  const last = points.at(-1)
  if (!first || !last) return null
  // Below and above the curve its end points stand: no curve is stated there.
  if (share <= first.at) return first.value
  if (share >= last.at) return last.value
  const upper = points.findIndex(({ at }) => at >= share)
  const above = points[upper]!
  const below = points[upper - 1]!
  const way = above.at === below.at ? 1 : (share - below.at) / (above.at - below.at)
  return below.value + way * (above.value - below.value)
}

/** Direct-current watts of all supplies at a moment. */
export const dc_W = (power: PowerResult, moment: MomentId): number =>
  power.totals.reduce((sum, { load_W }) => sum + load_W[momentIds.indexOf(moment)]!, 0)

/** Watts and volt-amperes at the wall; null where a loaded supply states no efficiency. */
export function wallLoad(power: PowerResult, moment: MomentId): WallLoad | null {
  const at = momentIds.indexOf(moment)
  let watts = 0
  let voltAmperes = 0
  for (const { part, load_W } of power.totals) {
    const supply = part.model.supply!
    const load = load_W[at]!
    if (load === 0) continue
    const rated_W = supply.total_W.value ?? supply.total_W.low
    const efficiency = rated_W ? efficiencyAt(supply, load / rated_W) : null
    if (efficiency === null) return null
    watts += load / efficiency
    const powerFactor = supply.powerFactor?.value ?? supply.powerFactor?.low
    voltAmperes += load / efficiency / (isShare(powerFactor) ? powerFactor : worstPowerFactor)
  }
  return { watts, voltAmperes }
}

/** Energy of a year at rest; null where no efficiency is stated. */
export function energy_kWhPerYear(power: PowerResult): number | null {
  const load = wallLoad(power, 'at-rest')
  return load && power.totals.length > 0 ? (load.watts * hoursPerYear) / 1000 : null
}

/** Volt-amperes that an uninterruptible supply must carry: the largest of the moments that last, and of waking. */
export function ups_VA(power: PowerResult): number | null {
  const moments: readonly MomentId[] = ['wake', 'full-scan', 'write-burst', 'at-rest']
  const loads = moments.filter((moment) => power.applies.has(moment)).map((moment) => wallLoad(power, moment))
  if (power.totals.length === 0 || loads.some((load) => load === null)) return null
  return Math.max(...loads.map((load) => load!.voltAmperes))
}
