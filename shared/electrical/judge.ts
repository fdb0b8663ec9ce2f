import type { Settings } from '../build/document.ts'
import { momentIds, type MomentId } from '../check/result.ts'
import { severityRank, type Severity } from '../check/severity.ts'
import { exceeds } from './figures.ts'
import type { PerMoment, PowerResult } from './result.ts'
import { isStart } from './tolerance.ts'

/** The worst that a load does in any moment. */
export interface Verdict {
  severity: Severity
  moment: MomentId
  load: number
  limit: number
}

/**
 * Heat of wires and contacts. They age by sustained current: above the limit is a danger. Seconds of a start may pass
 * it by the short-time allowance as a caution, beyond as a fault. Above the derating share is a caution.
 */
export function judgeHeat(
  { applies }: Pick<PowerResult, 'applies'>,
  current_A: PerMoment,
  limit_A: number,
  settings: Settings,
): Verdict | null {
  if (staysBelow(current_A, limit_A * settings.derating)) return null
  return worstOf(applies, current_A, (moment, load) => {
    const severity = heatSeverity(load, limit_A, isStart(moment), settings)
    return severity && { severity: lessSureInWake(moment, severity), moment, load, limit: limit_A }
  })
}

function heatSeverity(load: number, limit: number, start: boolean, settings: Settings): Severity | null {
  if (exceeds(load, limit)) {
    if (!start) return 'danger'
    return exceeds(load, limit * settings.shortTimeAllowance) ? 'fault' : 'caution'
  }
  return exceeds(load, limit * settings.derating) ? 'caution' : null
}

/** What a supply may deliver: for good, and for the seconds of a start where its maker says so. */
export interface SupplyLimit {
  sustained: number
  /** Stated peak, with the seconds it holds; null seconds where the maker states none. */
  peak: { load: number; seconds: number | null } | null
}

/**
 * Peak of a supply: it trips. Above its limit for good is a danger, at a start a fault unless the stated peak covers
 * load and seconds. `secondsAbove` tells how long a moment stays above a limit.
 */
export function judgeSupply(
  { applies }: Pick<PowerResult, 'applies'>,
  loads: PerMoment,
  { sustained, peak }: SupplyLimit,
  settings: Settings,
  secondsAbove: (moment: MomentId) => number,
): Verdict | null {
  if (staysBelow(loads, sustained * settings.derating)) return null
  return worstOf(applies, loads, (moment, load) => {
    const start = isStart(moment)
    const covered =
      start && peak !== null && !exceeds(load, peak.load) && !exceeds(secondsAbove(moment), peak.seconds ?? Infinity)
    if (exceeds(load, sustained)) {
      if (covered) return { severity: 'caution', moment, load, limit: sustained }
      return { severity: start ? lessSureInWake(moment, 'fault') : 'danger', moment, load, limit: sustained }
    }
    const stated = covered ? Math.max(sustained, peak.load) : sustained
    return exceeds(load, stated * settings.derating) ? { severity: 'caution', moment, load, limit: sustained } : null
  })
}

/** In every moment: most hops are far from their limit and need no further look. */
const staysBelow = (loads: PerMoment, limit: number): boolean => !loads.some((load) => exceeds(Math.abs(load), limit))

/** A wake only happens where drives are let to sleep: what fails in no other moment is a caution. */
const lessSureInWake = (moment: MomentId, severity: Severity): Severity =>
  moment === 'wake' && severity === 'fault' ? 'caution' : severity

function worstOf(
  applies: ReadonlySet<MomentId>,
  loads: PerMoment,
  judge: (moment: MomentId, load: number) => Verdict | null,
): Verdict | null {
  let worst: Verdict | null = null
  for (const [index, moment] of momentIds.entries()) {
    if (!applies.has(moment)) continue
    const verdict = judge(moment, Math.abs(loads[index]!))
    if (verdict && (!worst || isWorse(verdict, worst))) worst = verdict
  }
  return worst
}

/** Graver first, then the higher share of its limit. */
export function isWorse(a: Verdict, b: Verdict): boolean {
  const rank = severityRank[a.severity] - severityRank[b.severity]
  return rank < 0 || (rank === 0 && exceeds(a.load / a.limit, b.load / b.limit))
}
