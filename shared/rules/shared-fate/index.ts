import type { ResolvedPart } from '../../build/resolve.ts'
import { buildSubject, partSubject } from '../../check/subjects.ts'
import { counted, listed, nameOf, refsOf } from '../../check/words.ts'
import type { ModelKind } from '../../catalog/model.ts'
import { byRef } from '../../datapath/parts.ts'
import { defineRule, type RawFinding, type RuleContext } from '../rule.ts'
import { dataFate } from './dataFate.ts'
import { powerFate } from './powerFate.ts'

interface Loss {
  part: ResolvedPart
  members: ResolvedPart[]
}

type Facts =
  | { kind: 'splitter'; loss: Loss; bears: number }
  | { kind: 'others'; losses: readonly Loss[]; members: number; bears: number }

export const sharedFate = defineRule<Facts>({
  meta: {
    id: 'shared-fate',
    title: 'One part that takes too much of the array with it',
    severities: ['caution', 'note'],
    finds:
      'A splitter, lead, cable, backplane, controller or supply whose loss takes more array members than the array can lose.',
    why: 'Redundancy covers drives that fail one by one. When one plug works loose under several of them, the array stops, and drives that dropped out at different moments may not agree afterwards.',
    needs: ['role of each drive', 'settings: redundancy drives of the array', 'what feeds and reaches each drive'],
    sources: [],
    commonPractice: true,
    disputed:
      'Many sound builds share one supply, one controller and leads of four drives: those are named in a note only. A splitter is one more pair of contacts that can be avoided, and gets a caution.',
  },
  check(context) {
    const bears = context.build.settings.array.parityDrives
    const members = context.build.parts.filter(isMember)
    if (bears < 1 || members.length <= bears) return []
    const losses = lossesOf(context, members).filter((loss) => loss.members.length > bears)
    const splitters = losses.filter(({ part }) => isSplitter(part.model.kind))
    const others = losses.filter(({ part }) => !isSplitter(part.model.kind))
    return [
      ...splitters
        .filter((loss) => !splitters.some((other) => takesMore(other, loss)))
        .map((loss): RawFinding<Facts> => splitterFinding(loss, bears)),
      ...(others.length > 0 ? [othersFinding(others, members.length, bears)] : []),
    ]
  },
  words({ facts }) {
    const canLose = `an array that can lose ${facts.bears}`
    if (facts.kind === 'splitter')
      return {
        message: `If ${nameOf(facts.loss.part)} fails, ${refsOf(facts.loss.members)} go at once: ${counted(facts.loss.members.length, 'member')} of ${canLose}.`,
        remedy: 'Spread the array over more leads of the supply, or let the splitter feed members of different arrays.',
      }
    const parts = facts.losses.map(({ part, members }) => `${part.part.ref} (${members.length} of ${facts.members})`)
    return {
      message: `Each of these takes more members than the array can lose (${facts.bears}): ${listed(parts, 8)}.`,
      remedy:
        'Usual where one supply, one controller or one lead serves many drives. Where it matters, spread the members over more leads, controllers or supplies.',
    }
  },
})

const isMember = ({ model, part }: ResolvedPart): boolean =>
  model.drive !== undefined && (part.role === 'data' || part.role === 'parity')

const isSplitter = (kind: ModelKind): boolean => kind === 'splitter' || kind === 'adapter'

/** Whether one loss takes all that another takes and more; of two alike the one that comes first stands for both. */
function takesMore(loss: Loss, other: Loss): boolean {
  if (loss === other || !other.members.every((member) => loss.members.includes(member))) return false
  return loss.members.length > other.members.length || byRef(loss.part, other.part) < 0
}

function lossesOf({ build, power, data }: RuleContext, members: readonly ResolvedPart[]): Loss[] {
  const byPower = powerFate(build, power)
  const losses = new Map<ResolvedPart, ResolvedPart[]>()
  for (const member of [...members].sort(byRef))
    for (const part of new Set([...(byPower.get(member) ?? []), ...dataFate(data, member)])) {
      const taken = losses.get(part)
      if (taken) taken.push(member)
      else losses.set(part, [member])
    }
  return [...losses].map(([part, taken]) => ({ part, members: taken })).sort((a, b) => byRef(a.part, b.part))
}

function splitterFinding(loss: Loss, bears: number): RawFinding<Facts> {
  return {
    severity: 'caution',
    subjects: [loss.part, ...loss.members].map(partSubject),
    load: loss.members.length,
    limit: bears,
    unit: '',
    facts: { kind: 'splitter', loss, bears },
  }
}

function othersFinding(losses: readonly Loss[], members: number, bears: number): RawFinding<Facts> {
  return {
    severity: 'note',
    subjects: [buildSubject, ...losses.map(({ part }) => partSubject(part))],
    detail: 'others',
    load: Math.max(...losses.map((loss) => loss.members.length)),
    limit: bears,
    unit: '',
    facts: { kind: 'others', losses, members, bears },
  }
}
