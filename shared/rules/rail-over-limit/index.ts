import { partSubject, railSubject } from '../../check/subjects.ts'
import { amount } from '../../check/words.ts'
import { loadFigures } from '../../electrical/evidence.ts'
import { figureOf } from '../../electrical/figures.ts'
import { judgeSupply, type Verdict } from '../../electrical/judge.ts'
import { loadOfLimit } from '../../electrical/loadWords.ts'
import { atMoment, railName } from '../../electrical/names.ts'
import type { SupplyRailLoad } from '../../electrical/result.ts'
import { secondsAbove, supplyLimit } from '../../electrical/supplyLimits.ts'
import { isStart } from '../../electrical/tolerance.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  load: SupplyRailLoad
  verdict: Verdict
  /** Stated peak that covers the start. */
  coveredBy_A: number | null
}

export const railOverLimit = defineRule<Facts>({
  meta: {
    id: 'rail-over-limit',
    title: 'A supply rail above its limit',
    severities: ['danger', 'fault', 'caution'],
    finds: 'A rail of a supply that delivers more than its label allows, for good or while motors start.',
    why: 'A supply that is asked for more than its limit shuts down, or sags and takes every drive on that rail with it; most often in the seconds when all motors start.',
    needs: ['limit and stated peak of each rail', 'loads of all devices on it', 'planned start'],
    sources: ['S2', 'S17', 'S20'],
  },
  check({ power, build }) {
    return power.rails.flatMap((load, index) => {
      const { part, rail, current_A, about } = load
      const limit = supplyLimit(rail.limit_A, rail.peak_A, rail.peak_s)
      if (!limit) return []
      const verdict = judgeSupply(power, current_A, limit, build.settings, (moment) =>
        secondsAbove(power, [load], limit.sustained, (rails_A) => rails_A[index]!, moment),
      )
      if (!verdict) return []
      const over = verdict.load > verdict.limit
      const draws = power.draws.filter((_, i) => power.devices[i]!.fedBy.some((source) => source.rail === rail))
      return [
        {
          severity: verdict.severity,
          subjects: [railSubject(part, rail.id), partSubject(part)],
          moment: verdict.moment,
          load: verdict.load,
          limit: verdict.limit,
          unit: 'A' as const,
          decidedBy: [
            figureOf(rail.limit_A, `limit of ${railName(part, rail)}`, 'A'),
            ...loadFigures(draws, verdict.moment),
          ],
          about,
          facts: {
            load,
            verdict,
            coveredBy_A: over && verdict.severity === 'caution' ? (limit.peak?.load ?? null) : null,
          },
        },
      ]
    })
  },
  words({ facts, about }, { build }) {
    const { load, verdict, coveredBy_A } = facts
    const name = railName(load.part, load.rail)
    const how =
      coveredBy_A !== null
        ? `above what it holds for good, within the ${amount(coveredBy_A, 'A')} that its maker states for a peak`
        : verdict.load > verdict.limit
          ? 'above its limit'
          : `more than ${amount(build.settings.derating * 100, '%')} of its limit`
    return {
      message: `${name} delivers ${loadOfLimit(verdict.load, verdict.limit, 'A', about ?? false)} ${atMoment(verdict.moment)}: ${how}.`,
      remedy: isStart(verdict.moment)
        ? 'Start the drives in groups, move some to another rail, or use a supply with more on this rail.'
        : 'Move devices to another rail, or use a supply with more on this rail.',
    }
  },
})
