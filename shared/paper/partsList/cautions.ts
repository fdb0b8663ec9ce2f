import type { ResolvedBuild } from '../../build/resolve.ts'
import type { Finding } from '../../check/result.ts'
import type { PartsLine } from './partsList.ts'

/** What the checker's rules mean for somebody who is about to buy one more of the same. */
const ruleWords: Readonly<Record<string, string>> = {
  'moulded-adapter': 'Do not buy a moulded one: take crimped or pressed-on wires whose cap can be opened.',
  'breakout-reversed': 'Do not buy this direction: forward and reverse breakouts look alike, and the links stay dark.',
  'foreign-lead': 'Do not buy for this supply: the lead is of another family, and a plug that fits may destroy drives.',
  'wrong-mating': 'Does not mate where it is joined: look at plug and receptacle before you buy.',
  'protocol-mismatch': 'Will not be seen where it is joined: controller and path do not speak its protocol.',
  'bay-size': 'Does not fit the bay that it is in.',
  'capacity-ceiling': 'Larger than its controller can address.',
  'link-too-long': 'Too long for its rate: buy a shorter one.',
}

/** Reasons not to buy a line as it stands, from the findings about its parts and from what the model is. */
export function lineCautions(line: PartsLine, build: ResolvedBuild, findings: readonly Finding[]): string[] {
  const own = new Set(line.parts.map(({ part }) => part.id))
  const told = findings
    .filter(({ rule, subjects }) => rule in ruleWords && isAbout(rule, subjects, own))
    .map(({ rule, severity, accepted }) => {
      const words = ruleWords[rule] ?? ''
      if (accepted) return `${words} Accepted in this plan: ${accepted.reason}`
      return rule === 'moulded-adapter' && severity === 'note'
        ? 'How its plugs are made is not stated: do not buy a moulded one.'
        : words
    })
  return [...new Set([...told, ...spareOfOtherFamily(line, build)])]
}

/** Some rules name a drive beside the cable at fault: only what would be bought is meant. */
function isAbout(rule: string, subjects: Finding['subjects'], own: ReadonlySet<string>): boolean {
  const parts = subjects.flatMap(({ part }) => part ?? [])
  if (rule === 'breakout-reversed') return own.has(parts[0] ?? '')
  if (rule === 'foreign-lead') return parts.slice(0, -1).some((part) => own.has(part))
  return parts.some((part) => own.has(part))
}

/** A modular lead that no supply of this build can take, joined or not. */
function spareOfOtherFamily({ kind, parts }: PartsLine, build: ResolvedBuild): string[] {
  if (kind !== 'lead') return []
  const family = parts[0]?.model.pinoutFamily
  const supplies = build.parts.filter(({ model }) => model.supply)
  if (family === undefined)
    return ['Its pinout family is not known: measure every pin against the supply before it is joined.']
  if (supplies.length === 0 || supplies.some(({ model }) => model.pinoutFamily === family)) return []
  return [`Only for supplies of ${family}: there is none in this build.`]
}
