import type { JointFlow } from '#shared/check/result.ts'
import { rails, type Rail } from '#shared/quantity/rails.ts'

/** Which current the runs show: the rail that is nearest its limit or carries most, or one rail alone. */
export type RailView = 'all' | Rail

/** The current that stands for a joint, with its rail. Null where nothing flows on what is shown. */
export function currentOf(flow: JointFlow | undefined, view: RailView): { rail: Rail; amperes: number } | null {
  if (!flow) return null
  const shown = view === 'all' ? rails : [view]
  let best: { rail: Rail; amperes: number } | null = null
  for (const rail of shown) {
    const amperes = Math.abs(flow.current_A[rail] ?? 0)
    if (amperes > (best?.amperes ?? 0.0005)) best = { rail, amperes }
  }
  return best
}

/** "6.0 A", or "5.2 A 5 V" where it is not the 12 V rail. */
export function ampereWords(current: { rail: Rail; amperes: number }, view: RailView): string {
  const number = current.amperes < 0.095 ? current.amperes.toFixed(2) : current.amperes.toFixed(1)
  return view === 'all' && current.rail !== '12V' ? `${number} A ${railName(current.rail)}` : `${number} A`
}

export const railName = (rail: Rail): string => rail.replace('V', ' V')
