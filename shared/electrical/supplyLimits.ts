import type { MomentId } from '../check/result.ts'
import type { Quantity } from '../quantity/quantity.ts'
import { longestStart_s } from './evidence.ts'
import { exceeds } from './figures.ts'
import type { SupplyLimit } from './judge.ts'
import type { PowerResult, StageStep, SupplyRailLoad } from './result.ts'

/** A supply's limit with its stated peak; null where the limit is unknown. */
export function supplyLimit(limit: Quantity | undefined, peak?: Quantity, seconds?: Quantity): SupplyLimit | null {
  const sustained = limit?.value ?? limit?.low
  if (sustained === undefined || sustained === 0) return null
  const load = peak?.value ?? peak?.low
  return { sustained, peak: load === undefined ? null : { load, seconds: seconds?.value ?? seconds?.low ?? null } }
}

/**
 * Seconds that rails stay above a limit at a moment: in a staged start read off its timeline, else as long as the
 * longest start behind them. `load` weighs the rails of one step.
 */
export function secondsAbove(
  power: PowerResult,
  rails: readonly SupplyRailLoad[],
  limit: number,
  load: (rails_A: Float64Array) => number,
  moment: MomentId,
): number {
  if (moment === 'staged-start') return longestAbove(power.timeline, limit, load)
  const fed = new Set(rails.map(({ rail }) => rail))
  // Devices stand in the order of the draws that they were made from.
  return longestStart_s(power.draws.filter((_, i) => power.devices[i]!.fedBy.some((source) => fed.has(source.rail))))
}

function longestAbove(timeline: readonly StageStep[], limit: number, load: (rails_A: Float64Array) => number): number {
  let longest = 0
  let since: number | null = null
  for (const { from_s, rails_A } of timeline) {
    if (exceeds(load(rails_A), limit)) since ??= from_s
    else if (since !== null) {
      longest = Math.max(longest, from_s - since)
      since = null
    }
  }
  return since === null ? longest : Infinity
}
