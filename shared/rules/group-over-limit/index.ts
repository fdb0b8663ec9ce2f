import type { Figure, Subject } from '../../check/result.ts'
import { partSubject, railSubject } from '../../check/subjects.ts'
import { amount } from '../../check/words.ts'
import type { Quantity } from '../../quantity/quantity.ts'
import { nominal_V } from '../../quantity/rails.ts'
import { figureOf } from '../../electrical/figures.ts'
import { judgeSupply, type Verdict } from '../../electrical/judge.ts'
import { loadOfLimit } from '../../electrical/loadWords.ts'
import { atMoment } from '../../electrical/names.ts'
import type { PerMoment, SupplyGroupLoad, SupplyRailLoad, SupplyTotalLoad } from '../../electrical/result.ts'
import { secondsAbove, supplyLimit } from '../../electrical/supplyLimits.ts'
import { isStart } from '../../electrical/tolerance.ts'
import { defineRule, type RawFinding, type RuleContext } from '../rule.ts'

interface Facts {
  /** "5 V and 3.3 V together of T1", "T1 as a whole". */
  name: string
  rails: string
  unit: 'W' | 'A'
  verdict: Verdict
}

/** A set of rails with one limit. */
interface Shared {
  name: string
  subjects: Subject[]
  loads: PerMoment
  unit: 'W' | 'A'
  about: boolean
  members: SupplyRailLoad[]
  limit: Quantity | undefined
  peak?: Quantity
  figure: Figure | null
}

export const groupOverLimit = defineRule<Facts>({
  meta: {
    id: 'group-over-limit',
    title: 'Rails together above a shared limit',
    severities: ['danger', 'fault', 'caution'],
    finds: 'Rails that share a converter, or a whole supply, delivering more than their common limit.',
    why: 'Each rail can be within its own limit while the converter behind them is not: 5 V and 3.3 V share one, several 12 V rails often do, and the label gives the sum.',
    needs: ['groups of rails with their limits', 'rated and peak watts of the supply', 'loads of all devices'],
    sources: ['S2', 'S17'],
  },
  check(context) {
    const { power } = context
    return [
      ...power.groups.flatMap((group) => judge(context, ofGroup(context, group))),
      ...power.totals.flatMap((total) => judge(context, ofWhole(context, total))),
    ]
  },
  words({ facts, about }, { build }) {
    const { name, rails, unit, verdict } = facts
    const how =
      verdict.load > verdict.limit
        ? 'above the limit that they share'
        : `more than ${amount(build.settings.derating * 100, '%')} of it`
    return {
      message: `${name} (${rails}) deliver ${loadOfLimit(verdict.load, verdict.limit, unit, about ?? false)} ${atMoment(verdict.moment)}: ${how}.`,
      remedy: isStart(verdict.moment)
        ? 'Start the drives in groups, or use a supply with a higher limit.'
        : 'Take devices off these rails, or use a supply with a higher limit.',
    }
  },
})

function ofGroup({ power }: RuleContext, { part, group, load, unit, about }: SupplyGroupLoad): Shared {
  const limit = unit === 'W' ? group.limit_W : group.limit_A
  return {
    name: `${part.part.ref} ${group.name}`,
    subjects: [railSubject(part, group.id, 'group'), partSubject(part)],
    loads: load,
    unit,
    about,
    members: power.rails.filter((rail) => rail.part === part && group.rails.includes(rail.rail.id)),
    limit,
    figure: limit ? figureOf(limit, `limit of ${part.part.ref} ${group.name}`, unit) : null,
  }
}

function ofWhole({ power }: RuleContext, { part, load_W, about }: SupplyTotalLoad): Shared {
  const { total_W, peakTotal_W } = part.model.supply!
  return {
    name: `All rails of ${part.part.ref}`,
    subjects: [partSubject(part)],
    loads: load_W,
    unit: 'W',
    about,
    members: power.rails.filter((rail) => rail.part === part),
    limit: total_W,
    ...(peakTotal_W ? { peak: peakTotal_W } : {}),
    figure: figureOf(total_W, `rated power of ${part.part.ref}`, 'W'),
  }
}

function judge({ power, build }: RuleContext, shared: Shared): RawFinding<Facts>[] {
  const { name, subjects, loads, unit, about, members, figure } = shared
  const limit = supplyLimit(shared.limit, shared.peak)
  if (!limit) return []
  const weights = power.rails.map((load) =>
    members.includes(load) ? (unit === 'W' ? (load.rail.setPoint_V.value ?? nominal_V[load.rail.rail]) : 1) : 0,
  )
  const load = (rails_A: Float64Array) => rails_A.reduce((sum, current, i) => sum + current * weights[i]!, 0)
  const verdict = judgeSupply(power, loads, limit, build.settings, (moment) =>
    secondsAbove(power, members, limit.sustained, load, moment),
  )
  if (!verdict) return []
  return [
    {
      severity: verdict.severity,
      subjects,
      moment: verdict.moment,
      load: verdict.load,
      limit: verdict.limit,
      unit,
      detail: unit,
      decidedBy: figure ? [figure] : [],
      about,
      facts: { name, rails: members.map(({ rail }) => rail.id).join(', '), unit, verdict },
    },
  ]
}
