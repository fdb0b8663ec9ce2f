import type { ResolvedPart } from '../../build/resolve.ts'
import type { Subject } from '../../check/result.ts'
import { jointSubject, partSubject, railSubject } from '../../check/subjects.ts'
import { refsOf } from '../../check/words.ts'
import type { Draw } from '../../electrical/attach.ts'
import { isSolidState } from '../../electrical/deviceCurrents.ts'
import { busiest, loadFigures, momentIndex } from '../../electrical/evidence.ts'
import { exceeds } from '../../electrical/figures.ts'
import { lineIndex } from '../../electrical/lines.ts'
import { loadOfLimit } from '../../electrical/loadWords.ts'
import { contactName, railName } from '../../electrical/names.ts'
import type { PerMoment } from '../../electrical/result.ts'
import { defineRule, type RuleContext } from '../rule.ts'

/** A contact, rail or group that carries 5 V. */
interface Hop {
  name: string
  subject: Subject
  supply: ResolvedPart | undefined
  load: PerMoment
  limit: number
  unit: 'A' | 'W'
  about: boolean
  draws: () => readonly Draw[]
}
type Turns = (load: PerMoment, limit: number | null | undefined) => limit is number
interface Facts {
  hop: Hop
  drives: ResolvedPart[]
  scan: number
}

export const hungrySsd = defineRule<Facts>({
  meta: {
    id: 'hungry-ssd',
    title: 'Solid-state drives hungrier than they look',
    severities: ['caution'],
    finds:
      'Plugs, 5 V rails and joint 5 V + 3.3 V limits that are fine while solid-state drives read, and short of room when they all write.',
    why: 'Solid-state drives live on 5 V, the weakest rail of most supplies, and the typical figure on a datasheet hides a write peak of twice as much.',
    needs: ['write peak of solid-state drives on 5 V', 'contacts, 5 V rail and joint limit'],
    sources: ['S2', 'S47'],
  },
  check(context) {
    const { power, build } = context
    if (!power.applies.has('write-burst')) return []
    const scan = momentIndex('full-scan')
    const burst = momentIndex('write-burst')
    const worst = new Map<ResolvedPart | undefined, Facts>()
    const turns = (load: PerMoment, limit: number | null | undefined): limit is number => {
      const room = (limit ?? 0) * build.settings.derating
      return room > 0 && exceeds(Math.abs(load[burst]!), room) && !exceeds(Math.abs(load[scan]!), room)
    }
    for (const hop of hopsOf(context, turns)) {
      const writing = Math.abs(hop.load[burst]!)
      const reading = Math.abs(hop.load[scan]!)
      const solid = hop.draws().filter(({ part, rail }) => isSolidState(part) && rail === '5V')
      const theirs = solid.reduce((sum, draw) => sum + busiest(draw, 'write-burst').value * draw.share, 0)
      if (theirs * (hop.unit === 'W' ? 5 : 1) < writing / 2) continue
      const known = worst.get(hop.supply)
      if (!known || exceeds(writing / hop.limit, Math.abs(known.hop.load[burst]!) / known.hop.limit))
        worst.set(hop.supply, { hop, drives: solid.map(({ part }) => part), scan: reading })
    }
    return [...worst.values()].map((facts) => ({
      severity: 'caution' as const,
      subjects: [facts.hop.subject, ...facts.drives.map(partSubject)],
      moment: 'write-burst' as const,
      load: Math.abs(facts.hop.load[burst]!),
      limit: facts.hop.limit,
      unit: facts.hop.unit,
      decidedBy: loadFigures(facts.hop.draws(), 'write-burst'),
      about: facts.hop.about,
      facts,
    }))
  },
  words({ facts: { hop, drives, scan }, load = 0, about = false }) {
    return {
      message: `${hop.name} carries ${loadOfLimit(load, hop.limit, hop.unit, about)} while ${refsOf(drives)} write at their peak, against ${loadOfLimit(scan, hop.limit, hop.unit, about)} while they read.`,
      remedy: 'Spread the solid-state drives over more leads, or use a supply with more on 5 V.',
    }
  },
})

/** The hops on 5 V that are fine in one moment and short of room in the other. */
function hopsOf({ power }: RuleContext, turns: Turns): Hop[] {
  const contacts = power.contacts.flatMap((contact): Hop[] => {
    if (contact.line !== '5V' || !turns(contact.current_A, contact.limit_A)) return []
    const draws = () => power.behind('5V', contact.branch)
    const node = contact.joint.a.index
    return [
      {
        name: contactName(contact),
        subject: jointSubject(contact.joint),
        supply: power.network.byLine[lineIndex['5V']]!.sourcesOf(node)[0]?.part,
        load: contact.current_A,
        limit: contact.limit_A,
        unit: 'A',
        about: contact.about,
        draws,
      },
    ]
  })
  const onRails = (supply: ResolvedPart, ids: readonly string[]) => () =>
    power.draws.filter((_, i) =>
      power.devices[i]!.fedBy.some((source) => source.part === supply && ids.includes(source.rail.id)),
    )
  const rails = power.rails.flatMap(({ part, rail, current_A, about }): Hop[] => {
    const limit = rail.limit_A.value ?? rail.limit_A.low
    if (rail.rail !== '5V' || !turns(current_A, limit)) return []
    const subject = railSubject(part, rail.id)
    const draws = onRails(part, [rail.id])
    return [{ name: railName(part, rail), subject, supply: part, load: current_A, limit, unit: 'A', about, draws }]
  })
  const groups = power.groups.flatMap(({ part, group, load, unit, about }): Hop[] => {
    const quantity = unit === 'W' ? group.limit_W : group.limit_A
    const limit = quantity?.value ?? quantity?.low
    const on5V = part.model.supply!.rails.some(({ id, rail }) => rail === '5V' && group.rails.includes(id))
    if (!on5V || !turns(load, limit)) return []
    const subject = railSubject(part, group.id, 'group')
    const draws = onRails(part, group.rails)
    return [{ name: `${part.part.ref} ${group.name}`, subject, supply: part, load, limit, unit, about, draws }]
  })
  return [...contacts, ...rails, ...groups]
}
