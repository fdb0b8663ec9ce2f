import type { ResolvedPart } from '../build/resolve.ts'
import type { MomentId } from '../check/result.ts'
import type { Severity } from '../check/severity.ts'
import { amount, refsOf, type WordUnit } from '../check/words.ts'
import type { Draw } from './attach.ts'
import { isStart } from './tolerance.ts'

/** "8.0 A of 4.5 A (178 %)", "about" where the load rests on an unknown figure. */
export const loadOfLimit = (load: number, limit: number, unit: WordUnit, about: boolean): string =>
  `${about ? 'about ' : ''}${amount(load, unit)} of ${amount(limit, unit)} (${amount((load / limit) * 100, '%')})`

/** Two voltages told apart: to the hundredth of a volt, to the thousandth where that would show them alike. */
export function twoVolts(one: number, other: number): [string, string] {
  const decimals = one.toFixed(2) === other.toFixed(2) ? 3 : 2
  return [`${one.toFixed(decimals)} V`, `${other.toFixed(decimals)} V`]
}

/** Why this much counts as this grave: lasting heat, seconds of a start, or little left. */
export function gravity(severity: Severity, moment: MomentId, load: number, limit: number, allowance: number): string {
  if (load <= limit * (1 + 1e-9)) return 'within the limit, but with little left'
  if (severity === 'danger') return 'for as long as this lasts, and it heats'
  if (!isStart(moment)) return 'above the limit'
  const factor = `${allowance} times`
  return load > limit * allowance * (1 + 1e-9)
    ? `past the ${factor} that the seconds of a start may take`
    : `within the ${factor} that the seconds of a start may take`
}

/** " It feeds C1 to C4.", empty where nothing is known to hang on the hop. */
export function feeds(draws: readonly Draw[]): string {
  const parts: ResolvedPart[] = draws.map(({ part }) => part)
  return parts.length === 0 ? '' : ` It feeds ${refsOf(parts)}.`
}
