import { connectorName } from '../../build/edits/words.ts'
import type { ResolvedConnector, ResolvedPart } from '../../build/resolve.ts'
import type { CheckResult } from '../../check/result.ts'
import { amount, counted, listed, refsOf } from '../../check/words.ts'
import { byRef } from '../../datapath/parts.ts'
import { fedFrom, railsNeeded } from '../../electrical/feeding.ts'
import { lineName } from '../../electrical/lines.ts'
import { atMoment } from '../../electrical/names.ts'
import type { PowerResult } from '../../electrical/result.ts'
import { groupBy } from '../../layout/groupBy.ts'
import { rails, type Rail } from '../../quantity/rails.ts'
import type { Answer, AnswerInput, AnswerLine } from '../answer.ts'

interface Feeding {
  drive: ResolvedPart
  missing: readonly Rail[]
  way: string
  parts: readonly string[]
}

/** How each drive is powered: its way back to the supply, and what arrives at the worst moment. */
export function answerPower({ analysis: { build, power }, result }: AnswerInput): Answer {
  const drives = build.parts.filter(({ model }) => model.kind === 'drive').sort(byRef)
  const feedings = drives.map((drive) => feedingOf(drive, power))
  const unfed = feedings.filter(({ missing }) => missing.length > 0)
  const beyond = new Set(result.findings.flatMap((finding) => (finding.accepted ? [] : partsOfPower(finding))))
  const lines = [...groupBy(feedings, ({ way, missing }) => `${missing.join()} ${way}`).values()].map((alike) =>
    toLine(alike, result, beyond),
  )
  return {
    id: 'power',
    question: 'How is each drive powered?',
    short:
      drives.length === 0
        ? 'No drive is drawn.'
        : `${counted(drives.length, 'drive')} by ${counted(lines.length, 'way')}${unfed.length > 0 ? `; ${counted(unfed.length, 'drive')} without power` : ''}. ${result.weakestHop ?? 'Every hop is within the stated limits.'}`,
    lines,
  }
}

const powerRules: ReadonlySet<string> = new Set([
  'contact-over-rating',
  'wire-over-ampacity',
  'voltage-out-of-tolerance',
  'deep-branching',
  'moulded-adapter',
  'foreign-lead',
  'power-disable',
])

function partsOfPower({ rule, severity, subjects }: CheckResult['findings'][number]): string[] {
  return severity !== 'note' && powerRules.has(rule) ? subjects.flatMap(({ part }) => part ?? []) : []
}

function feedingOf(drive: ResolvedPart, power: PowerResult): Feeding {
  const loads = power.devices.filter(({ part }) => part === drive)
  const missing = railsNeeded(drive).filter(
    (rail) => !loads.some((load) => load.rail === rail && load.fedBy.length > 0),
  )
  const inlet = loads.find(({ fedBy }) => fedBy.length > 0)?.connector
  if (!inlet) return { drive, missing, way: '', parts: [drive.part.id] }
  const steps = wayTo(inlet, power)
  return {
    drive,
    missing,
    way: steps.map(stepWords).join(' › '),
    parts: [drive.part.id, ...steps.filter(({ part }) => !part.model.supply).map(({ part }) => part.part.id)],
  }
}

/** The outlets that the current leaves by, from the supply on; null stands for more than one way. */
function wayTo(inlet: ResolvedConnector, power: PowerResult): ResolvedConnector[] {
  const steps: ResolvedConnector[] = []
  const rail = rails.find((line) => fedFrom(power, inlet, line) !== null)
  if (!rail) return steps
  let at = inlet
  for (let above = fedFrom(power, at, rail); above; above = fedFrom(power, at, rail)) {
    if (above.part !== at.part) steps.unshift(above)
    at = above
  }
  return steps
}

/** The supply by its outlet; of what lies between, the part alone, so that drives on one splitter read as one way. */
const stepWords = (outlet: ResolvedConnector): string =>
  outlet.part.model.supply ? connectorName(outlet) : outlet.part.part.ref

function toLine(alike: readonly Feeding[], result: CheckResult, beyond: ReadonlySet<string>): AnswerLine {
  const drives = alike.map(({ drive }) => drive)
  const { missing, way } = alike[0] as Feeding
  const parts = [...new Set(alike.flatMap((feeding) => feeding.parts))]
  const subject = refsOf(drives)
  if (missing.length > 0)
    return {
      subject,
      words: `${listed(missing.map((rail) => lineName[rail]))} ${missing.length === 1 ? 'does' : 'do'} not arrive.`,
      look: true,
      parts,
    }
  const lowest = lowestVoltage(new Set(drives.map(({ part }) => part.id)), result)
  return {
    subject,
    words: `${way === '' ? 'fed from more than one side' : way}${lowest}.`,
    look: parts.some((part) => beyond.has(part)),
    parts,
  }
}

/** "; lowest 11.61 V on 12 V at cold start": the rail that has fallen furthest by share. */
function lowestVoltage(drives: ReadonlySet<string>, { moments }: CheckResult): string {
  const nominal: Record<Rail, number> = { '12V': 12, '5V': 5, '3.3V': 3.3 }
  const seen = moments
    .filter(({ applies }) => applies)
    .flatMap(({ moment, devices }) =>
      devices.flatMap(({ part, rail, voltage_V }) =>
        drives.has(part) && voltage_V !== null ? [{ moment, rail, voltage_V, share: voltage_V / nominal[rail] }] : [],
      ),
    )
  const worst = seen.reduce<(typeof seen)[number] | null>((a, b) => (a === null || b.share < a.share ? b : a), null)
  return worst ? `; lowest ${amount(worst.voltage_V, 'V')} on ${lineName[worst.rail]} ${atMoment(worst.moment)}` : ''
}
