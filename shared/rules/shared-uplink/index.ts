import { linkWords } from '../../check/dataWords.ts'
import { partSubject } from '../../check/subjects.ts'
import { amount } from '../../check/words.ts'
import type { SharedLink } from '../../datapath/result.ts'
import { hoursLost, slowShare, type HoursLost } from '../hoursLost.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  link: SharedLink
  lost: HoursLost
}

export const sharedUplink = defineRule<Facts>({
  meta: {
    id: 'shared-uplink',
    title: 'A scan slowed by a shared link',
    severities: ['caution', 'note'],
    finds:
      'A link to an expander, or a controller’s own way to the processor, that slows a full scan, with the hours lost.',
    why: 'When every drive reads at once, as an array check and a rebuild do, the drives share this link evenly and the slowest share sets the pace of all.',
    needs: ['lanes from every controller', 'rates of links and drives', 'capacity and track rates of the drives'],
    sources: ['R54', 'R33', 'R37', 'R129'],
    disputed:
      'Whether 6 Gb/s drives behind a 12 Gb/s expander can fill its uplink hangs on buffering in the expander: without it they share it at 6 Gb/s, half of what is reckoned here.',
  },
  check({ data }) {
    return data.shared.flatMap((link) => {
      if (isCutBySlot(link)) return []
      const lost = hoursLost(data, link)
      if (!lost || lost.share <= slowShare.note) return []
      return [
        {
          severity: lost.share >= slowShare.caution ? ('caution' as const) : ('note' as const),
          subjects: [partSubject(link.part), ...link.drives.map(partSubject)],
          detail: link.kind,
          load: lost.hours,
          limit: lost.alone_hours,
          unit: 'h' as const,
          about: data.scan.about,
          facts: { link, lost },
        },
      ]
    })
  },
  words({ facts: { link, lost } }) {
    const { hours, alone_hours, lost_hours } = lost
    return {
      message: `A full scan takes ${amount(hours, 'h')} instead of ${amount(alone_hours, 'h')}: ${amount(lost_hours, 'h')} are lost at ${linkWords(link)}.`,
      remedy:
        link.kind === 'uplink'
          ? 'Use a second cable to the expander as one wider link, a faster cable and controller, or spread the drives.'
          : 'Spread the drives over another controller.',
    }
  },
})

/** Left to the rule on narrow slots. */
const isCutBySlot = ({ kind, slot, capacity_MBps, wanted_MBps }: SharedLink): boolean =>
  kind === 'slot' && slot !== undefined && wanted_MBps !== undefined && capacity_MBps < wanted_MBps * (1 - 1e-9)
