import type { ResolvedJoint } from '../../build/resolve.ts'
import { jointSubject, partSubject } from '../../check/subjects.ts'
import { counted, placeOf } from '../../check/words.ts'
import type { Rail } from '../../quantity/rails.ts'
import type { Draw } from '../../electrical/attach.ts'
import { loadFigures } from '../../electrical/evidence.ts'
import { exceeds } from '../../electrical/figures.ts'
import { hopRemedy } from '../../electrical/hopRemedy.ts'
import { isWorse, judgeHeat, type Verdict } from '../../electrical/judge.ts'
import { lineName } from '../../electrical/lines.ts'
import { feeds, gravity, loadOfLimit } from '../../electrical/loadWords.ts'
import { atMoment } from '../../electrical/names.ts'
import { findRelief, type Relief } from '../../electrical/relief.ts'
import type { ContactLoad } from '../../electrical/result.ts'
import { defineRule, type RawFinding, type RuleContext } from '../rule.ts'

interface Facts {
  contact: ContactLoad
  verdict: Verdict
  /** Other lines of the joint that are over their limit or short of room too. */
  alsoOver: ContactLoad['line'][]
  draws: readonly Draw[]
  relief: Relief
}

export const contactOverRating = defineRule<Facts>({
  meta: {
    id: 'contact-over-rating',
    title: 'A contact carries more than its rating',
    severities: ['danger', 'fault', 'caution'],
    finds:
      'Mated contacts of a lead, splitter, backplane or drive that carry more than they are rated for, sustained or while motors start.',
    why: 'An overloaded contact warms, its spring tires and its resistance grows, which warms it more: plugs brown and drives drop out long before any fuse or supply notices.',
    needs: ['contacts of both connectors', 'rating of a contact, by the wire in it', 'loads of the devices behind it'],
    sources: ['S24', 'S25', 'S27', 'S31'],
  },
  check(context) {
    const byJoint = new Map<ResolvedJoint, { contact: ContactLoad; verdict: Verdict }[]>()
    for (const contact of context.power.contacts) {
      if (contact.limit_A === null) continue
      const verdict = judgeHeat(context.power, contact.current_A, contact.limit_A, context.build.settings)
      if (!verdict || isWithinSlot(contact, verdict)) continue
      const others = byJoint.get(contact.joint)
      if (others) others.push({ contact, verdict })
      else byJoint.set(contact.joint, [{ contact, verdict }])
    }
    return [...byJoint.values()].map((found) => toFinding(context, found))
  },
  words({ facts, about }, { build }) {
    const { contact, verdict, alsoOver, draws, relief } = facts
    const { load, limit, moment, severity } = verdict
    const place = placeOf(contact.weaker)
    const also =
      alsoOver.length > 0
        ? ` The same plug is short of room on ${alsoOver.map((line) => lineName[line]).join(' and ')}.`
        : ''
    return {
      message:
        `${place} carries ${loadOfLimit(load, limit, 'A', about ?? false)} on ${lineName[contact.line]} ${atMoment(moment)}` +
        ` through ${counted(contact.contacts, 'contact')}: ${gravity(severity, moment, load, limit, build.settings.shortTimeAllowance)}.` +
        feeds(draws) +
        also,
      remedy: hopRemedy(
        { owner: contact.weaker.part, at: contact.weaker, draws, relief, moment },
        `Put less behind ${place}, or use a connector with more or stronger contacts.`,
      ),
    }
  },
})

/** A card or module in its slot and within the limit: the slot's standard gives it all of that, and nothing can be moved. */
const isWithinSlot = ({ joint }: ContactLoad, { load, limit }: Verdict): boolean =>
  [joint.a, joint.b].some(({ type }) => type.side === 'edge') && !exceeds(load, limit)

function toFinding(
  { power }: RuleContext,
  found: readonly { contact: ContactLoad; verdict: Verdict }[],
): RawFinding<Facts> {
  const worst = found.reduce((most, entry) => (isWorse(entry.verdict, most.verdict) ? entry : most))
  const { contact, verdict } = worst
  const draws = power.behind(contact.line, contact.branch)
  const rail: Rail = contact.line === 'return' ? '12V' : contact.line
  return {
    severity: verdict.severity,
    subjects: [jointSubject(contact.joint), partSubject(contact.weaker.part), partSubject(otherEnd(contact).part)],
    moment: verdict.moment,
    load: verdict.load,
    limit: verdict.limit,
    unit: 'A',
    decidedBy: [...(contact.rating ? [contact.rating] : []), ...loadFigures(draws, verdict.moment)],
    about: contact.about,
    facts: {
      contact,
      verdict,
      alsoOver: found.filter((entry) => entry !== worst).map((entry) => entry.contact.line),
      draws,
      relief: findRelief(power, draws, rail, verdict.moment, verdict.load - verdict.limit),
    },
  }
}

const otherEnd = ({ joint, weaker }: ContactLoad) => (joint.a === weaker ? joint.b : joint.a)
