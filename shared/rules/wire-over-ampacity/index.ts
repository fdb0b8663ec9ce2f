import type { ResolvedPart } from '../../build/resolve.ts'
import { conductorSubject, partSubject } from '../../check/subjects.ts'
import type { Draw } from '../../electrical/attach.ts'
import { gaugeOf } from '../../electrical/conductors.ts'
import { loadFigures } from '../../electrical/evidence.ts'
import { hopRemedy } from '../../electrical/hopRemedy.ts'
import { isWorse, judgeHeat, type Verdict } from '../../electrical/judge.ts'
import { feeds, gravity, loadOfLimit } from '../../electrical/loadWords.ts'
import { atMoment, conductorName } from '../../electrical/names.ts'
import type { ConductorLoad } from '../../electrical/result.ts'
import { defineRule, type RawFinding, type RuleContext } from '../rule.ts'

interface Found {
  conductor: ConductorLoad
  verdict: Verdict
}
interface Facts extends Found {
  /** Conductors of the same part that are over too. */
  others: number
  draws: readonly Draw[]
}

export const wireOverAmpacity = defineRule<Facts>({
  meta: {
    id: 'wire-over-ampacity',
    title: 'A wire carries more than it may',
    severities: ['danger', 'fault', 'caution'],
    finds: 'Wires that carry more than their gauge allows in a bundle, sustained or while motors start.',
    why: 'A thin wire in a bundle cannot shed its heat: insulation softens and ages, and the voltage at the far end sags.',
    needs: ['gauge or area of the wires', 'wires in parallel', 'share of ampacity left in a bundle (setting)'],
    sources: ['S57'],
    disputed:
      'The table is for one wire in free air; the share that a bundle leaves (0.7 unless set) is common practice, not a standard.',
  },
  check(context) {
    const byPart = new Map<ResolvedPart, Found[]>()
    for (const conductor of context.power.conductors) {
      if (conductor.limit_A === null) continue
      const verdict = judgeHeat(context.power, conductor.current_A, conductor.limit_A, context.build.settings)
      if (!verdict) continue
      const others = byPart.get(conductor.part)
      if (others) others.push({ conductor, verdict })
      else byPart.set(conductor.part, [{ conductor, verdict }])
    }
    return [...byPart.values()].map((found) => toFinding(context, found))
  },
  words({ facts, about }, { build }) {
    const { conductor, verdict, others, draws } = facts
    const { load, limit, moment, severity } = verdict
    const gauge = gaugeOf(conductor.conductor)
    const more = others > 0 ? ` ${others === 1 ? 'One more conductor' : `${others} more conductors`} of it too.` : ''
    return {
      message:
        `${conductorName(conductor)}${gauge === undefined ? '' : ` (${gauge} AWG)`} carries ${loadOfLimit(load, limit, 'A', about ?? false)}` +
        ` ${atMoment(moment)}: ${gravity(severity, moment, load, limit, build.settings.shortTimeAllowance)}.` +
        feeds(draws) +
        more,
      remedy: hopRemedy(
        { owner: conductor.part, at: farEnd(conductor), draws, relief: noRelief, moment },
        `Replace ${conductor.part.part.ref} with one of thicker wire, or feed fewer devices through it.`,
      ),
    }
  },
})

/** Thicker wire is the first thing to think of, not which device to move. */
const noRelief = { move: 0, of: 0 }

const farEnd = ({ part, conductor }: ConductorLoad) => part.connectorById.get(conductor.to) ?? part.connectors[0]!

function toFinding({ power }: RuleContext, found: readonly Found[]): RawFinding<Facts> {
  const worst = found.reduce((most, entry) => (isWorse(entry.verdict, most.verdict) ? entry : most))
  const { conductor, verdict } = worst
  const { line } = conductor.conductor
  const draws = power.behind(line, conductor.branch)
  return {
    severity: verdict.severity,
    subjects: [
      partSubject(conductor.part),
      ...found.map((entry) => conductorSubject(conductor.part, entry.conductor.index)),
    ],
    moment: verdict.moment,
    load: verdict.load,
    limit: verdict.limit,
    unit: 'A',
    decidedBy: [...(conductor.ampacity ? [conductor.ampacity] : []), ...loadFigures(draws, verdict.moment)],
    about: conductor.about,
    facts: { conductor, verdict, others: found.length - 1, draws },
  }
}
