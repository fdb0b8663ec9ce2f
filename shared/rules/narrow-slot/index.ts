import { connectorSubject, partSubject } from '../../check/subjects.ts'
import { amount, counted, nameOf, placeOf } from '../../check/words.ts'
import type { DataResult, SharedLink } from '../../datapath/result.ts'
import { hoursLost, slowShare, type HoursLost } from '../hoursLost.ts'
import { defineRule, type RawFinding } from '../rule.ts'

type Facts = { kind: 'cut'; link: SharedLink; lost: HoursLost | null } | { kind: 'no slot'; link: SharedLink }

export const narrowSlot = defineRule<Facts>({
  meta: {
    id: 'narrow-slot',
    title: 'A slot narrower than its card',
    severities: ['caution', 'note'],
    finds: 'A controller card in a slot with fewer lanes or an older generation than the card, with what it costs.',
    why: 'All drives of the card share the slot. A slot can be longer than it is wired: what counts are its electrical lanes and its generation.',
    needs: ['slot of each controller card', 'lanes and generation of slot and card', 'rates of the drives'],
    sources: ['R37'],
  },
  check({ data }) {
    return data.shared.flatMap((link) => (link.kind === 'slot' ? slotFinding(data, link) : []))
  },
  words({ facts }) {
    const { link } = facts
    const card = nameOf(link.part)
    if (facts.kind === 'no slot')
      return {
        message: `${card} sits in no slot on this plan, so what the slot leaves to its ${counted(link.drives.length, 'drive')} is not known.`,
        remedy: 'Join its edge to the slot that it will use.',
      }
    const { slot, lanes, generation = 1, capacity_MBps, wanted_MBps = capacity_MBps } = link
    const rates = `${amount(capacity_MBps, 'MB/s')} of the ${amount(wanted_MBps, 'MB/s')} that the card could use`
    const seat = slot ? placeOf(slot) : 'its slot'
    const head = `${card} runs with ${counted(lanes, 'lane')} of generation ${generation} in ${seat}: ${rates}`
    const { lost } = facts
    return lost && lost.share > slowShare.note
      ? {
          message: `${head}. A full scan takes ${amount(lost.hours, 'h')} instead of ${amount(lost.alone_hours, 'h')}.`,
          remedy: 'Move the card to a slot with more lanes, or move some drives to another controller.',
        }
      : {
          message: `${head}. That is enough for ${link.drives.length > 0 ? `its ${counted(link.drives.length, 'drive')}` : 'now'}.`,
          remedy: 'Nothing to do; think of it before faster or more drives are added.',
        }
  },
})

function slotFinding(data: DataResult, link: SharedLink): RawFinding<Facts>[] {
  const { part, slot, capacity_MBps, wanted_MBps, drives } = link
  if (!slot) {
    const plugs = part.model.controllers.some((controller) => controller.uplink?.connector !== undefined)
    return plugs && drives.length > 0
      ? [{ severity: 'note', subjects: [partSubject(part)], detail: 'no slot', facts: { kind: 'no slot', link } }]
      : []
  }
  if (wanted_MBps === undefined || capacity_MBps >= wanted_MBps * (1 - 1e-9)) return []
  const lost = hoursLost(data, link)
  const slows = lost !== null && lost.share >= slowShare.caution
  return [
    {
      severity: slows ? 'caution' : 'note',
      subjects: [partSubject(part), connectorSubject(slot)],
      ...(lost && lost.share > slowShare.note ? { load: lost.hours, limit: lost.alone_hours, unit: 'h' as const } : {}),
      about: data.scan.about,
      facts: { kind: 'cut', link, lost },
    },
  ]
}
